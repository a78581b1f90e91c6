import { z } from 'zod';
import {
  type CabinetDocument,
  cabinetFormat,
  type DocumentCalibration,
  type DocumentMount,
  type DocumentPlate,
  type DocumentRef,
  inOrder,
  refKey,
} from '../../../shared/cabinet-document';
import type { Transaction } from '../../db/database';
import { rowsOf } from '../../db/rows';
import {
  calibrationColumns,
  calibrationRow,
  mapCalibration,
  mapMountColumns,
  mapPlateColumns,
  mountColumnsRow,
  plateColumnsRow,
} from '../cabinet';

/** A lab's cabinet as a document, and which row each part of it is. */
export interface StoredCabinet {
  readonly document: CabinetDocument;
  /** By `refKey`. */
  readonly mountIds: ReadonlyMap<string, string>;
  readonly plateIds: ReadonlyMap<string, string>;
  /** By `seatKey`. */
  readonly seatIds: ReadonlyMap<string, string>;
  /** Of each plate by `refKey`, in the order in which a document numbers them. */
  readonly calibrationIds: ReadonlyMap<string, readonly string[]>;
}

export function seatKey(
  plate: DocumentRef,
  seat: { readonly mount: DocumentRef; readonly seatedAt: string },
): string {
  return `${refKey(plate)}\n${refKey(seat.mount)}\n${seat.seatedAt}`;
}

const iso = (date: Date | null): string | null => date?.toISOString() ?? null;

const mountRow = mountColumnsRow.extend({
  id: z.string(),
  name: z.string(),
  drive: z.enum(['hand', 'motor']),
  note: z.string(),
  retired_at: z.date().nullable(),
});

const plateRow = plateColumnsRow.extend({ id: z.string() });

const seatRow = z.object({
  id: z.string(),
  plate_id: z.string(),
  mount_id: z.string(),
  seated_at: z.date(),
  left_at: z.date().nullable(),
  left_why: z.string().nullable(),
});

const seatedCalibrationRow = calibrationRow.extend({ seat_id: z.string() });
type SeatRow = z.infer<typeof seatRow>;
type SeatedCalibrationRow = z.infer<typeof seatedCalibrationRow>;

/** Reads all of a lab's cabinet, the retired things too. */
export async function readStoredCabinet(transaction: Transaction, labId: string): Promise<StoredCabinet> {
  const rows = async <S extends z.ZodType>(schema: S, sql: string): Promise<z.output<S>[]> => {
    const found: unknown = await transaction.raw(sql, [labId]);
    return z.array(schema).parse(rowsOf(found));
  };
  const mounts = await rows(mountRow, 'select * from mounts where lab_id = ?');
  const plates = await rows(plateRow, 'select * from plates where lab_id = ?');
  // In the order of a document, so that places in it are places here.
  const seats = await rows(
    seatRow,
    'select * from seats where lab_id = ? order by seated_at, left_at nulls last, id',
  );
  const calibrations = await rows(
    seatedCalibrationRow,
    `select ${calibrationColumns}, c.seat_id from calibrations c join users u on u.id = c.recorded_by
      where c.lab_id = ? order by c.measured_at, c.recorded_at, c.id`,
  );
  return assembled(mounts, plates, seats, calibrations);
}

function assembled(
  mountRows: readonly z.infer<typeof mountRow>[],
  plateRows: readonly z.infer<typeof plateRow>[],
  seatRows: readonly SeatRow[],
  calibrationRows: readonly SeatedCalibrationRow[],
): StoredCabinet {
  const mounts = new Map(mountRows.map((row) => [row.id, documentMount(row)]));
  const seatsOf = groupedBy(seatRows, ({ plate_id }) => plate_id);
  const calibrationsOf = groupedBy(calibrationRows, ({ seat_id }) => seat_id);
  const seatIds = new Map<string, string>();
  const calibrationIds = new Map<string, readonly string[]>();
  const plates = plateRows.map((row): DocumentPlate => {
    const head = mapPlateColumns(row);
    const seats = seatsOf.get(row.id) ?? [];
    const ids = seats
      .flatMap(({ id }) => calibrationsOf.get(id) ?? [])
      .map(({ calibration_id }) => calibration_id);
    const places = new Map(ids.map((id, index) => [id, index + 1]));
    calibrationIds.set(refKey(head), ids);
    return {
      ...head,
      seats: seats.map((seat) => {
        const mount = mounts.get(seat.mount_id);
        if (mount === undefined) throw new Error('a seat is in a mount that is not there');
        const { name, retiredAt } = mount;
        const written = { mount: { name, retiredAt }, seatedAt: seat.seated_at.toISOString() };
        seatIds.set(seatKey(head, written), seat.id);
        return {
          ...written,
          leftAt: iso(seat.left_at),
          leftWhy: seat.left_why,
          calibrations: (calibrationsOf.get(seat.id) ?? []).map((one) => documentCalibration(one, places)),
        };
      }),
    };
  });
  return {
    document: inOrder({ format: cabinetFormat, mounts: [...mounts.values()], plates }),
    mountIds: new Map([...mounts].map(([id, mount]) => [refKey(mount), id])),
    plateIds: new Map(
      plateRows.map((row) => [refKey({ name: row.name, retiredAt: iso(row.retired_at) }), row.id]),
    ),
    seatIds,
    calibrationIds,
  };
}

function documentMount(row: z.infer<typeof mountRow>): DocumentMount {
  return {
    ...mapMountColumns(row, row.name),
    drive: row.drive,
    note: row.note,
    retiredAt: iso(row.retired_at),
  };
}

function documentCalibration(
  row: SeatedCalibrationRow,
  places: ReadonlyMap<string, number>,
): DocumentCalibration {
  const { settlesId, recordedBy, ...measured } = mapCalibration(row);
  return {
    wavelengthNm: measured.wavelengthNm,
    temperatureC: measured.temperatureC,
    retardanceDeg: measured.retardanceDeg,
    retardanceSigmaDeg: measured.retardanceSigmaDeg,
    offsetDeg: measured.offsetDeg,
    offsetSigmaDeg: measured.offsetSigmaDeg,
    method: measured.method,
    note: measured.note,
    openQuestions: measured.openQuestions,
    measuredAt: measured.measuredAt,
    settles: settlesId === null ? null : (places.get(settlesId) ?? null),
    // As another lab reads it: a person may be called anything.
    recordedBy: recordedBy.replaceAll(/\p{Cc}/gu, ' ').trim() || 'unknown',
  };
}

function groupedBy<Item>(items: readonly Item[], keyOf: (item: Item) => string): Map<string, Item[]> {
  const groups = new Map<string, Item[]>();
  for (const item of items) {
    const group = groups.get(keyOf(item));
    if (group === undefined) groups.set(keyOf(item), [item]);
    else group.push(item);
  }
  return groups;
}
