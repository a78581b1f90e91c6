import type { CreatePlate, Plate } from '../../shared/schemas/cabinet';
import type { CalibrationInput } from '../../shared/schemas/calibrations';
import type { WriteMount } from '../../shared/schemas/mounts';
import type { Bench } from '../../shared/schemas/benches';
import type { DraftContent, DraftTarget } from '../../shared/schemas/protocols';
import type { FrozenPlate } from '../../shared/schemas/versions';
import type { SolvingBench, SolvingTask } from '../../shared/protocol/solve-row';
import type { SolvingPlate } from '../../shared/protocol/solving-plates';

/*
 * Plates, benches and drafts for tests: everything invented, everything to be changed. A test that checks a number
 * names it in its own change.
 */

/** What is other of a plate; of its mount and its calibration only what is named is. */
export type PlateChange<P extends { readonly mount: object; readonly calibration: object }> = Partial<
  Omit<P, 'mount' | 'calibration'>
> & { readonly mount?: Partial<P['mount']>; readonly calibration?: Partial<P['calibration']> };

/** Ids in the form of UUIDs, one for each small number; `head` keeps those of one test from another's. */
export const idsFrom =
  (head: string) =>
  (number: number): string =>
    `${head}-0000-7000-8000-${String(number).padStart(12, '0')}`;

const id = idsFrom('0190a000');
const AT = '2026-11-01T09:00:00.000Z';

const BUILT = {
  designWavelengthNm: 810,
  construction: 'compound-zero-order',
  material: 'quartz',
  order: 0,
} as const;
const RING = {
  direction: 1,
  resolutionDeg: 0.1,
  repeatabilityDeg: 0.05,
  rangeDeg: null,
  speedDegPerS: null,
  backlashDeg: 0,
  approach: 'either',
} as const;
const MEASURED = {
  wavelengthNm: 810,
  temperatureC: null,
  retardanceDeg: 179.2,
  retardanceSigmaDeg: 0.3,
  offsetDeg: 12.4,
  offsetSigmaDeg: 0.05,
} as const;
const WRITTEN_DOWN = { method: 'scan between crossed polarisers', note: '', measuredAt: AT } as const;
const NOTHING_OPEN = { openQuestions: [], settlesId: null };
const RECORDED = {
  id: id(2),
  ...MEASURED,
  ...WRITTEN_DOWN,
  ...NOTHING_OPEN,
  fileId: null,
  recordedBy: 'Ines Okafor',
};
const NAMED_RING = { name: 'M-1', ...RING } as const;

/** As much of a plate as a solver takes. */
export function solvingPlate({
  mount,
  calibration,
  ...change
}: PlateChange<SolvingPlate> = {}): SolvingPlate {
  return {
    kind: 'other',
    ...BUILT,
    mount: { ...RING, ...mount },
    calibration: { ...MEASURED, ...calibration },
    ...change,
  };
}

/** A plate as the API gives one. */
export function plate({ mount, calibration, ...change }: PlateChange<Plate> = {}): Plate {
  return {
    id: id(1),
    name: 'H-1',
    kind: 'half',
    ...BUILT,
    note: '',
    mount: { ...NAMED_RING, ...mount },
    seatedAt: AT,
    calibration: { ...RECORDED, ...calibration },
    retiredAt: null,
    benches: [],
    revision: 1,
    ...change,
  };
}

/** A mount as it is put into a cabinet. */
export function newMount(change: Partial<WriteMount> = {}): WriteMount {
  return { ...NAMED_RING, drive: 'hand', note: '', ...change };
}

/** A calibration as a person writes it. */
export function newCalibration(change: Partial<CalibrationInput> = {}): CalibrationInput {
  return { ...MEASURED, ...WRITTEN_DOWN, ...NOTHING_OPEN, ...change };
}

/** What of a new plate may be other; of its mount and its calibration only what is named is. */
export type NewPlateChange = Partial<Omit<CreatePlate, 'seat'>> & {
  readonly mount?: Partial<WriteMount>;
  readonly calibration?: Partial<CalibrationInput>;
};

/** A plate as it is put into a cabinet, in a mount that comes with it and calibrated there. */
export function newPlate({ mount, calibration, ...change }: NewPlateChange = {}): CreatePlate {
  return {
    name: 'H-1',
    kind: 'half',
    ...BUILT,
    serial: '',
    clearApertureMm: null,
    coatingNm: null,
    damageNote: '',
    note: '',
    seat: {
      kind: 'new-mount',
      since: null,
      mount: newMount(mount),
      calibration: newCalibration(calibration),
    },
    ...change,
  };
}

/** A plate as a version keeps it, used at the wavelength that it was measured at. */
export function frozenPlate({ mount, calibration, ...change }: PlateChange<FrozenPlate> = {}): FrozenPlate {
  const measured = { ...RECORDED, ...calibration };
  return {
    id: id(1),
    name: 'H-1',
    kind: 'half',
    ...BUILT,
    mount: { ...NAMED_RING, ...mount },
    calibration: measured,
    used: {
      retardanceDeg: measured.retardanceDeg,
      shiftDeg: 0,
      source: 'calibration',
      perNmDeg: 0,
      perKelvinDeg: 0,
    },
    ...change,
  };
}

/** What light comes to the plates of a bench, and how well that is known. */
export const LIGHT = {
  wavelengthNm: 810,
  wavelengthSigmaNm: 0,
  temperatureC: null,
  temperatureSigmaK: 0,
  inputExpression: 'H',
  polariserSigmaDeg: 0.05,
  polariserExtinction: null,
} as const;

/** As much of a bench as a solver takes: a half-wave plate and a quarter-wave plate behind it, neither exact. */
export function solvingBench(change: Partial<SolvingBench> = {}): SolvingBench {
  return {
    ...LIGHT,
    plates: [solvingPlate(), solvingPlate({ calibration: { retardanceDeg: 88.9 } })],
    ...change,
  };
}

/** A bench as the API gives one; with no plates in its beam unless they are named. */
export function bench(change: Partial<Bench> = {}): Bench {
  return {
    id: id(3),
    name: 'signal arm',
    ...LIGHT,
    laserClass: '3B',
    hazardWavelengthsNm: [810],
    plates: [],
    analysisPlates: [],
    order: [],
    notReady: [],
    detectors: { passed: null, rejected: null, efficiencyRatio: null },
    retiredAt: null,
    revision: 1,
    ...change,
  };
}

/** What is asked of a bench: states, each made as well as it can be. */
export function solvingTask(change: Partial<SolvingTask> = {}): SolvingTask {
  return { kind: 'prepare', objective: 'least-expected-infidelity', presentDialsDeg: null, ...change };
}

/** A row that nobody holds. */
export function target(change: Partial<DraftTarget> = {}): DraftTarget {
  return { id: id(20), label: 't1', expression: 'H', heldFastAxesDeg: null, ...change };
}

export function draft(change: Partial<DraftContent> = {}): DraftContent {
  return {
    name: 'A protocol',
    purpose: '',
    kind: 'prepare',
    benchId: id(3),
    objective: 'least-expected-infidelity',
    presentDialsDeg: null,
    toleranceInfidelity: 1e-3,
    targets: [],
    ...change,
  };
}
