import { fastAxisFromDial } from '../../../shared/optics/dial';
import { degrees } from '../../../shared/optics/units';
import type { CabinetPlate, PlateHealth } from '../../../shared/schemas/cabinet';
import type { OpenQuestion } from '../../../shared/schemas/calibrations';
import { calibrationAge } from './calibration-age';

/** Between a number and its unit in plain text. */
const gap = '\u202f';

export const kindNames = { half: 'half-wave plate', quarter: 'quarter-wave plate', other: 'plate' } as const;

/** One word or two for how far a plate can be trusted. */
export const healthWords: Readonly<Record<PlateHealth, string>> = {
  calibrated: 'calibrated',
  due: 'due',
  overdue: 'overdue',
  'open-question': 'question open',
  'not-calibrated': 'not calibrated',
  'not-seated': 'not seated',
  retired: 'retired',
};

/** What a calibration left open, as it stands beside its values. */
export const questionWords: Readonly<Record<OpenQuestion, string>> = {
  axis: 'fast or slow axis not settled',
  branch: 'retardance or 360° less not settled',
  blind: 'retardance not felt to first order',
};

/** Under a ring of the tray: "½ wave, 780 nm", what it is made for; where it is neither, the retardance and where it was measured. */
export function shortKind({ kind, calibration, designWavelengthNm }: CabinetPlate): string {
  if (kind === 'other' && calibration !== null) {
    return `${calibration.retardanceDeg.toFixed(1)}°, ${calibration.wavelengthNm}${gap}nm`;
  }
  const words = { half: '½ wave', quarter: '¼ wave', other: 'plate' }[kind];
  return `${words}, ${designWavelengthNm}${gap}nm`;
}

/** How old a plate's calibration is, or why it has none, as it is read out after its name. */
export function trustWords(plate: CabinetPlate, dueDays: number, now: Date): string {
  if (plate.retiredAt !== null) return 'retired';
  if (plate.seat === null) return 'in no mount';
  if (plate.calibration === null) return 'not calibrated in this seat';
  const age = `calibration ${calibrationAge(plate.calibration.measuredAt, dueDays, now).words}`;
  const open = plate.calibration.openQuestions.map((question) => questionWords[question]);
  return [age, ...open].join(', ');
}

/**
 * The table angle of the fast axis with the dial at 0: how a plate is drawn where nobody says what its dial reads. Null
 * while nobody knows it.
 */
export function restingAxisDeg({ seat, calibration }: CabinetPlate): number | null {
  if (seat === null || calibration === null) return null;
  return fastAxisFromDial(degrees(0), { ...seat.mount, offsetDeg: calibration.offsetDeg });
}

type Names = Readonly<Record<string, string>>;

export const constructionNames: Names = {
  'true-zero-order': 'true zero order',
  'compound-zero-order': 'compound zero order',
  'multi-order': 'multi-order',
  achromatic: 'achromatic',
  unknown: 'not known',
};

export const materialNames: Names = {
  quartz: 'quartz',
  'magnesium-fluoride': 'magnesium fluoride',
  calcite: 'calcite',
  sapphire: 'sapphire',
  '': 'another, or not known',
};

/** ", compound zero order, quartz": how it is built, as far as that is known; starts with its comma. */
export function builtWords({ construction, material, order }: CabinetPlate): string {
  const parts = [
    construction === 'unknown' ? null : constructionNames[construction],
    order === 0 ? null : `${order} whole waves`,
    material === null ? null : materialNames[material],
  ];
  return parts.flatMap((part) => (part === null || part === undefined ? [] : [`, ${part}`])).join('');
}

/** "first", "second" up to "tenth", then "11th". */
export function ordinal(position: number): string {
  const words = [
    'first',
    'second',
    'third',
    'fourth',
    'fifth',
    'sixth',
    'seventh',
    'eighth',
    'ninth',
    'tenth',
  ];
  const tens = Math.floor(position / 10) % 10;
  const ending = tens === 1 ? 'th' : (['th', 'st', 'nd', 'rd'][position % 10] ?? 'th');
  return words[position - 1] ?? `${position}${ending}`;
}

/** "The bench signal arm waits": those that cannot be used without this plate; null where there are none. */
export function waitingBenches(benches: CabinetPlate['benches']): string | null {
  if (benches.length === 0) return null;
  const names = benches.map(({ name }) => name).join(' and ');
  return benches.length === 1 ? `The bench ${names} waits` : `The benches ${names} wait`;
}
