import {
  type CabinetPlate,
  cabinetPlateSchema,
  type PlateDetail,
  plateDetailSchema,
} from '../../../shared/schemas/cabinet';
import type { Calibration } from '../../../shared/schemas/calibrations';
import type { CabinetMount, Mount, Seat } from '../../../shared/schemas/mounts';
import { cabinetMountSchema } from '../../../shared/schemas/mounts';
import { idsFrom, newMount, plate } from '../../support/plates';

const id = idsFrom('0190a000');

/** What is other of a plate; of its mount and its calibration only what is named is, and null is none. */
type FixtureChange = Partial<Omit<CabinetPlate, 'seat' | 'calibration'>> & {
  readonly mount?: Partial<Mount> | null;
  readonly calibration?: Partial<Calibration> | null;
};

/** The quarter-wave plate that the pages of a cabinet are tried with. */
export function plateFixture({ mount, calibration, ...change }: FixtureChange = {}): CabinetPlate {
  const {
    mount: ring,
    seatedAt,
    calibration: measured,
    ...facts
  } = plate({
    name: 'Q-B',
    kind: 'quarter',
    designWavelengthNm: 808,
    mount: { name: 'M05', direction: -1, repeatabilityDeg: 0.06, ...mount },
    seatedAt: '2026-01-10T09:00:00.000Z',
    calibration: {
      retardanceDeg: 88.9,
      retardanceSigmaDeg: 0.4,
      offsetDeg: 301.73,
      offsetSigmaDeg: 0.09,
      method: 'between crossed polarisers, 31 points',
      measuredAt: '2026-03-01T12:00:00.000Z',
      recordedBy: 'Sami Oduya',
      ...calibration,
    },
    benches: [{ id: id(3), name: 'signal arm' }],
    revision: 3,
  });
  return cabinetPlateSchema.parse({
    ...facts,
    serial: '',
    clearApertureMm: null,
    coatingNm: null,
    damageNote: '',
    seat: mount === null ? null : { id: id(4), mountId: id(5), mount: ring, seatedAt },
    calibration: mount === null || calibration === null ? null : measured,
    health: mount === null ? 'not-seated' : calibration === null ? 'not-calibrated' : 'calibrated',
    ...change,
  });
}

/** One seat of the plate above; its number tells it from others. */
export function seatFixture(number: number, change: Partial<Seat> = {}): Seat {
  return {
    id: id(number),
    plate: { id: plateFixture().id, name: 'Q-B' },
    mount: { id: id(5), name: 'M05' },
    seatedAt: '2026-01-10T09:00:00.000Z',
    seatedBy: 'Tamsin Reeve',
    leftAt: null,
    leftWhy: null,
    ...change,
  };
}

/** What the page of a plate is given: its one seat, and its one calibration unless others are named. */
export function detailFixture(
  shown: CabinetPlate,
  change: Partial<Omit<PlateDetail, 'plate'>> = {},
): PlateDetail {
  const { seat, calibration } = shown;
  return plateDetailSchema.parse({
    plate: shown,
    seats: seat === null ? [] : [seatFixture(4, { seatedAt: seat.seatedAt })],
    calibrations:
      seat === null || calibration === null ? [] : [{ ...calibration, seatId: seat.id, scan: null }],
    files: [],
    ...change,
  });
}

/** An empty mount. */
export function mountFixture(change: Partial<CabinetMount> = {}): CabinetMount {
  return cabinetMountSchema.parse({
    ...newMount({ name: 'M13' }),
    id: id(13),
    plate: null,
    retiredAt: null,
    revision: 1,
    ...change,
  });
}
