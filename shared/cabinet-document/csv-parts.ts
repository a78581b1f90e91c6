import { type CellValue, type CsvColumn, csvColumns, type CsvPart } from './csv-columns';
import type { FaultList, PartPath } from './faults';
import type { Report } from './read-parts';

/** A row of a cabinet's CSV. */
export interface CsvRow {
  readonly row: number;
  /** A cell at fault has none. */
  readonly values: ReadonlyMap<CsvColumn, CellValue>;
  /** The parts that the row says anything of. */
  readonly filled: ReadonlySet<CsvPart>;
}

/** A part as its rows give it, with the row that it was first seen in. */
interface RowsOf {
  readonly row: number;
  readonly first: CsvRow;
}
interface RawSeat extends RowsOf {
  readonly calibrations: CsvRow[];
}
interface RawPlate extends RowsOf {
  readonly seats: Map<string, RawSeat>;
  /** Which place in the plate the calibration of a number has. */
  readonly numbers: Map<CellValue, CsvRow>;
}

const columnsOf = (part: CsvPart): readonly CsvColumn[] =>
  csvColumns.filter((column) => column.part === part);
const columns: Readonly<Record<CsvPart, readonly CsvColumn[]>> = {
  plate: columnsOf('plate'),
  mount: columnsOf('mount'),
  seat: columnsOf('seat'),
  calibration: columnsOf('calibration'),
};

function columnAt(part: CsvPart, key: string): CsvColumn {
  const found = columns[part].find(({ path }) => path.join('.') === key);
  if (found === undefined) throw new Error(`a ${part} has no column for ${key}`);
  return found;
}
const plateName = columnAt('plate', 'name');
const plateRetired = columnAt('plate', 'retiredAt');
const mountName = columnAt('mount', 'name');
const mountRetired = columnAt('mount', 'retiredAt');
const seatedAt = columnAt('seat', 'seatedAt');
const leftWhy = columnAt('seat', 'leftWhy');
const calibrationNumber = columnAt('calibration', 'number');
const settlesNumber = columnAt('calibration', 'settles');

/** What names a part. A cell at fault names none: its row stands for itself, so that rows are not held against each other for it. */
const keyOf = (row: CsvRow, ...by: readonly CsvColumn[]): string =>
  JSON.stringify(by.map((column) => (row.values.has(column) ? row.values.get(column) : { row: row.row })));

/** Puts the rows of a CSV together to plates and mounts, and says in which row each of them stands. */
export class CsvParts {
  private readonly plates = new Map<string, RawPlate>();
  private readonly mounts = new Map<string, RowsOf>();

  constructor(private readonly faults: FaultList) {}

  take(row: CsvRow): void {
    const { filled } = row;
    if (!filled.has('plate') && !filled.has('mount')) {
      this.fault(row, null, 'This row names neither a plate nor a mount.');
      return;
    }
    if (filled.has('mount')) this.group(this.mounts, keyOf(row, mountName, mountRetired), row, 'mount');
    if (!filled.has('plate')) {
      if (filled.has('seat') || filled.has('calibration')) {
        this.fault(row, plateName, 'This row tells of a seat and names no plate.');
      }
      return;
    }
    const plateKey = keyOf(row, plateName, plateRetired);
    const known = this.plates.get(plateKey);
    const plate = known ?? { row: row.row, first: row, seats: new Map(), numbers: new Map() };
    if (known === undefined) this.plates.set(plateKey, plate);
    else this.agree(known, row, 'plate');
    if (filled.has('mount') || filled.has('seat') || filled.has('calibration')) this.takeSeat(plate, row);
  }

  private takeSeat(plate: RawPlate, row: CsvRow): void {
    if (!row.filled.has('mount')) {
      this.fault(row, mountName, 'This row tells of a seat and names no mount.');
      return;
    }
    const key = keyOf(row, mountName, mountRetired, seatedAt);
    const known = plate.seats.get(key);
    const seat = known ?? { row: row.row, first: row, calibrations: [] };
    if (known === undefined) plate.seats.set(key, seat);
    else this.agree(known, row, 'seat');
    if (!row.filled.has('calibration')) return;
    seat.calibrations.push(row);
    const number = row.values.get(calibrationNumber) ?? null;
    if (number === null) return;
    const other = plate.numbers.get(number);
    if (other === undefined) plate.numbers.set(number, row);
    else
      this.fault(
        row,
        calibrationNumber,
        `Row ${other.row} has this number already. Number each calibration of a plate once.`,
      );
  }

  private group(into: Map<string, RowsOf>, key: string, row: CsvRow, part: CsvPart): void {
    const known = into.get(key);
    if (known === undefined) into.set(key, { row: row.row, first: row });
    else this.agree(known, row, part);
  }

  /** What is repeated must be the same in each row. */
  private agree(known: RowsOf, row: CsvRow, part: CsvPart): void {
    for (const column of columns[part]) {
      if (!row.values.has(column) || !known.first.values.has(column)) continue;
      const [here, there] = [row.values.get(column) ?? null, known.first.values.get(column) ?? null];
      if (here === there) continue;
      this.fault(
        row,
        column,
        `Row ${row.row} says ${said(here)} and row ${known.row} says ${said(there)} of one ${part}. Write the same in both.`,
      );
    }
  }

  private fault(row: CsvRow, column: CsvColumn | null, message: string): void {
    this.faults.add({ row: row.row, column: column?.header ?? null, message });
  }

  /** Plates and mounts as a JSON document would have them, nothing of them checked. `isWhole`: nothing was at fault so far. */
  raw(isWhole: boolean): { readonly mounts: readonly unknown[]; readonly plates: readonly unknown[] } {
    return {
      mounts: [...this.mounts.values()].map(({ first }) => partOf(first, 'mount')),
      plates: [...this.plates.values()].map((plate) => this.rawPlate(plate, isWhole)),
    };
  }

  private rawPlate({ first, seats, numbers }: RawPlate, isWhole: boolean): unknown {
    const rows = [...seats.values()].flatMap(({ calibrations }) => calibrations);
    const places = new Map(rows.map((row, place) => [row, place + 1]));
    const calibration = (row: CsvRow): unknown => {
      const part = partOf(row, 'calibration');
      const settled = row.values.get(settlesNumber) ?? null;
      if (settled === null) return part;
      const target = numbers.get(settled);
      const place = target === undefined ? undefined : places.get(target);
      if (place === undefined && isWhole) {
        this.fault(row, settlesNumber, `No calibration of this plate has the number ${said(settled)}.`);
      }
      return { ...part, settles: place ?? null };
    };
    return {
      ...partOf(first, 'plate'),
      seats: [...seats.values()].map((seat) => ({
        ...partOf(seat.first, 'seat'),
        leftWhy: seat.first.values.get(leftWhy) === '' ? null : seat.first.values.get(leftWhy),
        mount: {
          name: seat.first.values.get(mountName),
          retiredAt: seat.first.values.get(mountRetired),
        },
        calibrations: seat.calibrations.map(calibration),
      })),
    };
  }

  /** Takes faults by the place in the document, and says them by row and column. */
  readonly report: Report = (path, message) => {
    const { row, part, rest } = this.find(path);
    const at = rest.join('.');
    const column =
      part === null
        ? undefined
        : columns[part].find(({ path: own }) => `${at}.`.startsWith(`${own.join('.')}.`));
    this.faults.add({ row, column: column?.header ?? (at === '' ? null : at), message });
    return !this.faults.isFull();
  };

  private find(path: PartPath): { row: number | null; part: CsvPart | null; rest: PartPath } {
    const [list, index, within, seatIndex, inSeat, nth] = path;
    if (list === 'mounts') {
      return { row: nthOf(this.mounts, index)?.row ?? null, part: 'mount', rest: path.slice(2) };
    }
    const plate = nthOf(this.plates, index);
    if (within !== 'seats') return { row: plate?.row ?? null, part: 'plate', rest: path.slice(2) };
    const seat = plate === undefined ? undefined : nthOf(plate.seats, seatIndex);
    if (inSeat === 'mount') return { row: seat?.row ?? null, part: 'mount', rest: path.slice(5) };
    if (inSeat !== 'calibrations') return { row: seat?.row ?? null, part: 'seat', rest: path.slice(4) };
    const row = typeof nth === 'number' ? seat?.calibrations[nth]?.row : undefined;
    return { row: row ?? null, part: 'calibration', rest: path.slice(6) };
  }
}

const said = (value: CellValue): string => (value === null || value === '' ? 'nothing' : String(value));

function nthOf<Part>(parts: ReadonlyMap<string, Part>, index: string | number | undefined): Part | undefined {
  return typeof index === 'number' ? [...parts.values()][index] : undefined;
}

/** The facts of one part of a row, nested as its schema has them; a pair with nothing in it is null. */
function partOf(row: CsvRow, part: CsvPart): Record<string, unknown> {
  const found: Record<string, unknown> = {};
  const pairs: Record<string, Record<string, unknown>> = {};
  for (const column of columns[part]) {
    // The number is the file's own: in a document it is the place.
    if (column === calibrationNumber) continue;
    const [key, inner] = column.path;
    const value = row.values.get(column);
    if (inner === undefined) found[key] = value;
    else (pairs[key] ??= {})[inner] = value;
  }
  for (const [key, pair] of Object.entries(pairs)) {
    found[key] = Object.values(pair).every((value) => value === null) ? null : pair;
  }
  return found;
}
