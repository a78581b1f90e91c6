import {
  type DocumentRef,
  type ImportChange,
  type ImportPlan,
  refKey,
} from '../../../shared/cabinet-document';
import type { Transaction } from '../../db/database';
import { newId } from '../../db/new-id';
import { measuredColumns, mountColumns, plateColumns } from '../cabinet';
import { seatKey, type StoredCabinet } from './stored-cabinet';

/** Where, by whom and when. */
interface Place {
  readonly labId: string;
  readonly userId: string;
  readonly now: Date;
}

type Of<Kind extends ImportChange['kind']> = Extract<ImportChange, { kind: Kind }>;

/** Rows in one statement: well below the 65 535 values that PostgreSQL takes. */
const rowsAtOnce = 500;

/** Nobody else changes a plate or a mount of the lab, or seats one, until the transaction ends. */
export async function lockCabinet(transaction: Transaction, labId: string): Promise<void> {
  for (const table of ['plates', 'mounts']) {
    await transaction(table).where({ lab_id: labId }).orderBy('id').forUpdate().select('id');
  }
}

/** Carries out a plan that was made of this very cabinet. What ends comes before what begins, so that no mount holds two plates. */
export async function writeImport(
  transaction: Transaction,
  place: Place,
  plan: ImportPlan,
  stored: StoredCabinet,
): Promise<void> {
  const writer = new ImportWriter(transaction, place, stored);
  const of = <Kind extends ImportChange['kind']>(kind: Kind): Of<Kind>[] =>
    plan.changes.filter((change): change is Of<Kind> => change.kind === kind);
  await writer.addMounts(of('mount-added'));
  await writer.changeMounts(of('mount-changed'));
  await writer.addPlates(of('plate-added'));
  await writer.changePlates(of('plate-changed'));
  await writer.endSeats(of('seat-ended'));
  await writer.addSeats(of('seat-added'));
  await writer.addCalibrations(of('calibration-added'));
  await writer.raiseRevisions(
    [...of('seat-ended'), ...of('seat-added'), ...of('calibration-added')].map(({ plate }) => plate),
  );
}

class ImportWriter {
  private readonly mountIds: Map<string, string>;
  private readonly plateIds: Map<string, string>;
  private readonly seatIds: Map<string, string>;

  constructor(
    private readonly transaction: Transaction,
    private readonly place: Place,
    private readonly stored: StoredCabinet,
  ) {
    this.mountIds = new Map(stored.mountIds);
    this.plateIds = new Map(stored.plateIds);
    this.seatIds = new Map(stored.seatIds);
  }

  async addMounts(added: readonly Of<'mount-added'>[]): Promise<void> {
    const rows = added.map(({ mount }) => {
      const id = newId();
      this.mountIds.set(refKey(mount), id);
      return {
        ...this.own(id),
        ...mountColumns(mount),
        retired_at: mount.retiredAt,
        created_at: this.place.now,
      };
    });
    await this.insert('mounts', rows);
  }

  async changeMounts(changed: readonly Of<'mount-changed'>[]): Promise<void> {
    for (const { mount, to } of changed) {
      await this.change('mounts', idOf(this.mountIds, refKey(mount)), mountColumns(to));
    }
  }

  async addPlates(added: readonly Of<'plate-added'>[]): Promise<void> {
    const rows = added.map(({ plate }) => {
      const id = newId();
      this.plateIds.set(refKey(plate), id);
      return {
        ...this.own(id),
        ...plateColumns(plate),
        retired_at: plate.retiredAt,
        created_at: this.place.now,
      };
    });
    await this.insert('plates', rows);
  }

  async changePlates(changed: readonly Of<'plate-changed'>[]): Promise<void> {
    for (const { plate, to } of changed) {
      await this.change('plates', idOf(this.plateIds, refKey(plate)), plateColumns(to));
    }
  }

  async endSeats(ended: readonly Of<'seat-ended'>[]): Promise<void> {
    for (const { plate, seat, leftAt, leftWhy } of ended) {
      await this.transaction('seats')
        .where({ lab_id: this.place.labId, id: idOf(this.seatIds, seatKey(plate, seat)) })
        .update({ left_at: leftAt, left_why: leftWhy });
    }
  }

  /** Oldest first, as the plan has them: a plate shows the seat that was written last. */
  async addSeats(added: readonly Of<'seat-added'>[]): Promise<void> {
    const rows = added.map(({ plate, seat }) => {
      const id = newId();
      this.seatIds.set(seatKey(plate, seat), id);
      return {
        ...this.own(id),
        plate_id: idOf(this.plateIds, refKey(plate)),
        mount_id: idOf(this.mountIds, refKey(seat.mount)),
        seated_at: seat.seatedAt,
        seated_by: this.place.userId,
        left_at: seat.leftAt,
        left_why: seat.leftWhy,
      };
    });
    await this.insert('seats', rows);
  }

  /** Of two of one moment the later in the file counts: ids rise. */
  async addCalibrations(added: readonly Of<'calibration-added'>[]): Promise<void> {
    const placeOf = (plate: DocumentRef, position: number): string => `${refKey(plate)}\n${position}`;
    const ids = new Map(added.map(({ plate, position }) => [placeOf(plate, position), newId()]));
    const rows = added.map(({ plate, seat, position, calibration, settles }) => ({
      ...this.own(idOf(ids, placeOf(plate, position))),
      seat_id: idOf(this.seatIds, seatKey(plate, seat)),
      ...measuredColumns(calibration),
      settles_id:
        settles === null
          ? null
          : settles.isStored
            ? this.storedCalibration(plate, settles.position)
            : idOf(ids, placeOf(plate, settles.position)),
      recorded_by: this.place.userId,
      recorded_as: calibration.recordedBy,
      recorded_at: this.place.now,
    }));
    await this.transaction.raw('set constraints all deferred');
    await this.insert('calibrations', rows);
  }

  /** What was opened of a plate before is older now. */
  async raiseRevisions(plates: readonly DocumentRef[]): Promise<void> {
    const ids = new Set(plates.flatMap((plate) => this.stored.plateIds.get(refKey(plate)) ?? []));
    if (ids.size === 0) return;
    await this.transaction('plates')
      .where({ lab_id: this.place.labId })
      .whereIn('id', [...ids])
      .increment('revision');
  }

  private storedCalibration(plate: DocumentRef, position: number): string {
    const id = this.stored.calibrationIds.get(refKey(plate))?.[position - 1];
    if (id === undefined) throw new Error('a plan settles a calibration that is not there');
    return id;
  }

  private own(id: string) {
    return { id, lab_id: this.place.labId };
  }

  private async insert(table: string, rows: readonly object[]): Promise<void> {
    for (let from = 0; from < rows.length; from += rowsAtOnce) {
      await this.transaction(table).insert(rows.slice(from, from + rowsAtOnce));
    }
  }

  private async change(table: string, id: string, columns: object): Promise<void> {
    await this.transaction(table)
      .where({ lab_id: this.place.labId, id })
      .update(columns)
      .increment('revision');
  }
}

function idOf(ids: ReadonlyMap<string, string>, key: string): string {
  const id = ids.get(key);
  if (id === undefined) throw new Error('a plan names what is not there');
  return id;
}
