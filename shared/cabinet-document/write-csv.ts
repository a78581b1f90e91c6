import { quotedCell } from './csv-cells';
import { csvColumns, type CsvPart, writtenCell } from './csv-columns';
import type { CabinetDocument, DocumentMount, DocumentPlate } from './document';
import { refKey } from './document';
import { inOrder } from './document-order';

/** What a row says; a part that it says nothing of is absent. */
type RowParts = Readonly<Partial<Record<CsvPart, unknown>>>;

/**
 * A cabinet as CSV by RFC 4180: a header, a row for each calibration with plate, mount and seat repeated, and rows for seats
 * without one, plates without a seat and mounts that no plate ever sat in.
 */
export function writeCsv(document: CabinetDocument): string {
  const ordered = inOrder(document);
  const mounts = new Map(ordered.mounts.map((mount) => [refKey(mount), mount]));
  const rows = [...ordered.plates.flatMap((plate) => rowsOf(plate, mounts)), ...emptyMounts(ordered)];
  const lines = [
    csvColumns.map(({ header }) => header).join(','),
    ...rows.map((parts) =>
      csvColumns.map((column) => quotedCell(writtenCell(column, parts[column.part]))).join(','),
    ),
  ];
  return `${lines.join('\r\n')}\r\n`;
}

function rowsOf(plate: DocumentPlate, mounts: ReadonlyMap<string, DocumentMount>): readonly RowParts[] {
  if (plate.seats.length === 0) return [{ plate }];
  let number = 0;
  return plate.seats.flatMap((seat) => {
    const parts = { plate, mount: mounts.get(refKey(seat.mount)), seat };
    if (seat.calibrations.length === 0) return [parts];
    return seat.calibrations.map((calibration) => {
      number += 1;
      return { ...parts, calibration: { ...calibration, number } };
    });
  });
}

function emptyMounts({ mounts, plates }: CabinetDocument): readonly RowParts[] {
  const sat = new Set(plates.flatMap(({ seats }) => seats.map(({ mount }) => refKey(mount))));
  return mounts.filter((mount) => !sat.has(refKey(mount))).map((mount) => ({ mount }));
}
