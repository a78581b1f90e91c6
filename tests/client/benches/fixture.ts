import type { Bench, BenchPart } from '../../../shared/schemas/benches';
import { type CabinetPlate, cabinetPlateSchema } from '../../../shared/schemas/cabinet';
import type { LabContextValue } from '../../../src/features/labs';
import * as anyOf from '../../support/plates';

/** All of it invented. */
export const id = anyOf.idsFrom('0190a000');
export const now = new Date('2026-11-20T09:00:00.000Z');

export const lab: LabContextValue = {
  lab: {
    id: id(900),
    name: 'Tern Street quantum optics',
    convention: { phase: 'kz-wt', handedness: 'receiver', s3Sign: 'L' },
    calibrationDueDays: 90,
  },
  user: { id: id(901), name: 'Ines Varga', login: 'ines', email: null },
  member: { userId: id(901), labId: id(900), role: 'designer' },
};

/** A plate of the cabinet, seated and calibrated unless the change says otherwise. */
export function cabinetPlate(number: number, name: string, change: Partial<CabinetPlate> = {}): CabinetPlate {
  const { mount, seatedAt, calibration, ...facts } = anyOf.plate({ id: id(number), name });
  return cabinetPlateSchema.parse({
    ...facts,
    serial: '',
    clearApertureMm: null,
    coatingNm: null,
    damageNote: '',
    seat: { id: id(number + 300), mountId: id(number + 400), mount, seatedAt },
    calibration,
    health: 'calibrated',
    ...change,
  });
}

export const calibration = (change: Partial<NonNullable<CabinetPlate['calibration']>>) => ({
  ...anyOf.plate().calibration,
  ...change,
});

/** Where plates stand, as a bench's answer names them. */
export const order = (part: BenchPart, ...plates: readonly CabinetPlate[]): Bench['order'] =>
  plates.map((plate) => ({ part, plateId: plate.id, name: plate.name }));

export const bench = anyOf.bench;
