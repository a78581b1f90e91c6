import type { SolvingBench } from '../../../shared/protocol/solve-row';
import type { SolvingPlate } from '../../../shared/protocol/solving-plates';
import type { PlateKind } from '../../../shared/schemas/cabinet';
import type { Question } from './question';

/** Finer than any page shows, so that an ideal plate's angle is not rounded before it is read. */
const idealStepDeg = 0.001;

/** An exact plate is exact at any wavelength: this one only has to be the same for the bench and its plates. */
const idealWavelengthNm = 810;

function exactBench(inputExpression: string, kinds: readonly ('half' | 'quarter')[]): SolvingBench {
  return {
    wavelengthNm: idealWavelengthNm,
    wavelengthSigmaNm: 0,
    temperatureC: null,
    temperatureSigmaK: 0,
    inputExpression,
    polariserSigmaDeg: 0,
    polariserExtinction: null,
    plates: kinds.map((kind) => exactPlate(kind === 'half' ? 180 : 90)),
  };
}

function exactPlate(retardanceDeg: number): SolvingPlate {
  return {
    kind: 'other',
    designWavelengthNm: idealWavelengthNm,
    construction: 'unknown',
    material: null,
    order: 0,
    mount: {
      direction: 1,
      resolutionDeg: idealStepDeg,
      repeatabilityDeg: 0,
      rangeDeg: null,
      speedDegPerS: null,
      backlashDeg: 0,
      approach: 'either',
    },
    calibration: {
      wavelengthNm: idealWavelengthNm,
      temperatureC: null,
      retardanceDeg,
      retardanceSigmaDeg: 0,
      offsetDeg: 0,
      offsetSigmaDeg: 0,
    },
  };
}

/** Level light, an exact half-wave plate, then an exact quarter-wave plate; the dial reads the table angle. */
const idealBench: SolvingBench = exactBench('H', ['half', 'quarter']);

/** Exact quarter-, half- and quarter-wave plates, which together make every unitary. */
const idealGateBench: SolvingBench = exactBench('H', ['quarter', 'half', 'quarter']);

export function idealPlatesFor(question: Question): SolvingBench {
  return question === 'apply' ? idealGateBench : idealBench;
}

/**
 * A bench's twin as nobody owns it: the same light in, the same kinds of plates in the same order, each of them exact.
 * Null where a plate is neither a half- nor a quarter-wave plate, since then nothing says what it would ideally be.
 */
export function idealTwin(bench: SolvingBench, kinds: readonly PlateKind[]): SolvingBench | null {
  const exact = kinds.flatMap((kind) => (kind === 'other' ? [] : [kind]));
  if (exact.length !== bench.plates.length || kinds.length !== exact.length) return null;
  return exactBench(bench.inputExpression, exact);
}
