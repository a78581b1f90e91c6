import type { SolvingBench, SolvingPlate } from '../../../shared/protocol/solve-row';
import type { PlateKind } from '../../../shared/schemas/cabinet';

/** Finer than any page shows, so that an ideal plate's angle is not rounded before it is read. */
const idealStepDeg = 0.001;

function exactPlate(retardanceDeg: number): SolvingPlate {
  return {
    mount: { direction: 1, resolutionDeg: idealStepDeg, repeatabilityDeg: 0 },
    calibration: { retardanceDeg, retardanceSigmaDeg: 0, offsetDeg: 0, offsetSigmaDeg: 0 },
  };
}

/** Level light, an exact half-wave plate, then an exact quarter-wave plate; the dial reads the table angle. */
export const idealBench: SolvingBench = {
  inputExpression: 'H',
  polariserSigmaDeg: 0,
  plates: [exactPlate(180), exactPlate(90)],
};

/**
 * A bench's twin as nobody owns it: the same light in, the same kinds of plates in the same order, each of them exact.
 * Null where a plate is neither a half- nor a quarter-wave plate, since then nothing says what it would ideally be.
 */
export function idealTwin(bench: SolvingBench, kinds: readonly PlateKind[]): SolvingBench | null {
  if (kinds.length !== bench.plates.length || kinds.includes('other')) return null;
  return {
    inputExpression: bench.inputExpression,
    polariserSigmaDeg: 0,
    plates: kinds.map((kind) => exactPlate(kind === 'half' ? 180 : 90)),
  };
}
