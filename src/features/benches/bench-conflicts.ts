import { notReadySentences } from '../../../shared/bench-ready';
import { blindNearDeg } from '../../../shared/optics/calibration';
import { NOMINAL_DEG } from '../../../shared/optics/dispersion';
import { usedRetardance } from '../../../shared/protocol/solving-plates';
import { type BenchPart, createBenchSchema } from '../../../shared/schemas/benches';
import type { CabinetPlate, Plate } from '../../../shared/schemas/cabinet';
import type { Calibration, OpenQuestion } from '../../../shared/schemas/calibrations';
import { formatUncertain, thinGap } from '../../lib/format';
import { calibrationAge } from '../cabinet';
import { elsewhereSentence, usedElsewhere } from './elsewhere-words';

/** What speaks against a plate where it stands. With a fault the server refuses the bench; a warning is for a person to weigh. */
export interface PlateConflict {
  readonly kind: 'fault' | 'warning';
  readonly sentence: string;
}

/** What of a bench its plates have to go with, as it is typed or as it is. */
export interface ConflictBench {
  /** null for a bench that is not there yet. */
  readonly id: string | null;
  readonly name: string;
  readonly wavelengthNm: number;
  readonly temperatureC: number | null;
}

interface ConflictPlace {
  readonly part: BenchPart;
  /** How often the plate stands in this beam. */
  readonly times: number;
}

interface ConflictTime {
  readonly calibrationDueDays: number;
  readonly now: Date;
}

/** A shift of retardance, by the light's wavelength alone, that makes a plate another one than its name says: our choice. */
const farDeg = 5;

/** The plate as a solver takes it; null while it cannot be dialled. */
function readyPlate({ seat, calibration, ...facts }: CabinetPlate): Plate | null {
  if (seat === null || calibration === null) return null;
  return { ...facts, mount: seat.mount, seatedAt: seat.seatedAt, calibration };
}

/** Everything that speaks against a plate at one place of a bench: what is refused first, then what makes a number wrong. */
export function plateConflicts(
  plate: CabinetPlate,
  place: ConflictPlace,
  bench: ConflictBench,
  { calibrationDueDays, now }: ConflictTime,
): readonly PlateConflict[] {
  const faults = refusals(plate, place, bench);
  if (plate.retiredAt !== null) return faults;
  const age =
    plate.calibration === null ? null : calibrationAge(plate.calibration.measuredAt, calibrationDueDays, now);
  const warnings = [
    ...waitWords(plate, place, bench),
    ...openWords(plate),
    ...wavelengthWords(plate, bench),
    ...(age?.overdue === true ? [`${plate.name}’s calibration is ${age.words}. Calibrate it again.`] : []),
  ];
  return [...faults, ...warnings.map((sentence) => ({ kind: 'warning' as const, sentence }))];
}

/** What the server refuses a bench for. */
function refusals(plate: CabinetPlate, { times }: ConflictPlace, bench: ConflictBench): PlateConflict[] {
  const others = plate.benches.filter(({ id }) => id !== bench.id).map(({ name }) => name);
  const sentences = [
    others.length === 0
      ? null
      : `${plate.name} stands in the beam of ${others.join(' and ')}. Choose another, or take it out there first.`,
    times <= 1
      ? null
      : `${plate.name} is in this beam ${times === 2 ? 'twice' : `${times} times`}, and one plate stands in one place. Take it out of the other.`,
    plate.retiredAt === null
      ? null
      : `${plate.name} is retired. Return it in the cabinet, or choose another.`,
  ];
  return sentences.flatMap((sentence) => (sentence === null ? [] : [{ kind: 'fault' as const, sentence }]));
}

function waitWords(plate: CabinetPlate, { part }: ConflictPlace, bench: ConflictBench): readonly string[] {
  if (readyPlate(plate) !== null) return [];
  const why = plate.seat === null ? ('not-seated' as const) : ('not-calibrated' as const);
  return notReadySentences({
    name: bench.name.trim() === '' ? 'this bench' : bench.name.trim(),
    notReady: [{ plateId: plate.id, name: plate.name, part, why }],
  });
}

type Retardance = Pick<Calibration, 'retardanceDeg' | 'retardanceSigmaDeg'>;
const known = (deg: number, { retardanceSigmaDeg }: Retardance): string =>
  `${formatUncertain(deg, retardanceSigmaDeg)}°`;

const openQuestionWords: Readonly<Record<OpenQuestion, (name: string, calibration: Retardance) => string>> = {
  axis: (name) =>
    `Which axis of ${name} is the fast one is not settled. If it is the other, its zero is a quarter turn away and circular states come out with the other hand.`,
  branch: (name, of) =>
    `${name} retards by ${known(of.retardanceDeg, of)} or by ${known(360 - of.retardanceDeg, of)}: its calibration could not tell which.`,
  blind: (name, of) =>
    `${name}’s calibration hardly felt its retardance, so close to ${blindNearDeg(of.retardanceDeg)}°: it may be further from ${known(of.retardanceDeg, of)} than its σ says.`,
};

function openWords({ name, calibration }: CabinetPlate): readonly string[] {
  if (calibration === null) return [];
  return calibration.openQuestions.map((question) => openQuestionWords[question](name, calibration));
}

function wavelengthWords(plate: CabinetPlate, bench: ConflictBench): readonly string[] {
  const { shape } = createBenchSchema;
  // Of a wavelength or a temperature that the form refuses nothing follows.
  if (!shape.wavelengthNm.safeParse(bench.wavelengthNm).success) return [];
  const { data: temperatureC = null } = shape.temperatureC.safeParse(bench.temperatureC);
  const here = { wavelengthNm: bench.wavelengthNm, temperatureC };
  const ready = readyPlate(plate);
  const used = ready === null ? null : usedRetardance(ready, here);
  const elsewhere = ready !== null && used !== null && usedElsewhere(ready, used, here);
  return [
    ...(elsewhere ? [elsewhereSentence(ready, used, here)] : []),
    ...designWords(plate, here.wavelengthNm, used?.retardanceDeg ?? null),
    ...coatingWords(plate, here.wavelengthNm),
  ];
}

/**
 * A plate of one crystal retards in proportion to 1/λ but for the dispersion of its birefringence, which is the smaller
 * part; its whole waves with it. An achromatic one is made not to, and no name says what another kind should retard.
 */
function designWords(
  { name, kind, construction, order, designWavelengthNm }: CabinetPlate,
  wavelengthNm: number,
  usedDeg: number | null,
): readonly string[] {
  if (kind === 'other' || construction === 'achromatic') return [];
  const shiftDeg = (NOMINAL_DEG[kind] + 360 * order) * (designWavelengthNm / wavelengthNm - 1);
  if (Math.abs(shiftDeg) < farDeg) return [];
  const made = `${name} is made as a ${kind}-wave plate for ${designWavelengthNm}${thinGap}nm, and this bench runs at ${wavelengthNm}${thinGap}nm`;
  return [
    usedDeg === null
      ? `${made}: expect about ${Math.abs(shiftDeg).toFixed(0)}° ${shiftDeg > 0 ? 'more' : 'less'}.`
      : `${made}: here it is taken as ${usedDeg.toFixed(1)}°.`,
  ];
}

function coatingWords({ name, coatingNm }: CabinetPlate, wavelengthNm: number): readonly string[] {
  if (coatingNm === null) return [];
  const { from, to } = coatingNm;
  if (wavelengthNm >= from && wavelengthNm <= to) return [];
  return [
    `${name} is coated for ${from} to ${to}${thinGap}nm, and this bench runs at ${wavelengthNm}${thinGap}nm: it throws back more of the light.`,
  ];
}

/** What speaks against the plates of a whole bench, each sentence once. */
export function benchConflicts(
  plates: readonly { readonly part: BenchPart; readonly plate: CabinetPlate }[],
  bench: ConflictBench,
  time: ConflictTime,
): readonly (PlateConflict & { readonly plateId: string })[] {
  return plates.flatMap(({ part, plate }) => {
    const times = plates.filter((other) => other.plate.id === plate.id).length;
    return plateConflicts(plate, { part, times }, bench, time).map((conflict) => ({
      ...conflict,
      plateId: plate.id,
    }));
  });
}
