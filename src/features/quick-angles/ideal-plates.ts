import type { SolvingBench, SolvingPlate } from '../../../shared/protocol/solve-row';

/** Finer than any page shows, so that an ideal plate's angle is not rounded before it is read. */
const idealStepDeg = 0.001;

function idealPlate(retardanceDeg: number): SolvingPlate {
  return {
    mount: { direction: 1, resolutionDeg: idealStepDeg, repeatabilityDeg: 0 },
    calibration: { retardanceDeg, retardanceSigmaDeg: 0, offsetDeg: 0, offsetSigmaDeg: 0 },
  };
}

/** Level light, an exact half-wave plate, then an exact quarter-wave plate; the dial reads the table angle. */
export const idealBench: SolvingBench = {
  inputExpression: 'H',
  polariserSigmaDeg: 0,
  plates: [idealPlate(180), idealPlate(90)],
};
