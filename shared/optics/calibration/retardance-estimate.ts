import { asin } from '../elementary';
import { radians, toDegrees } from '../units';
import { type CoefficientFit, type CoefficientProblem, parameterCovariance } from './coefficient-fit';
import {
  asNormalSigmas,
  asStudentSigmas,
  INTERVAL_SIGMA,
  type ScatterFreedom,
  SETTLED_SIGMA,
} from './evidence';
import { MODULATION } from './linear-model';
import { fitWith, profileEdge } from './profile';

/** A retardance with what can be said of its error. `fromDeg` to `toDeg` holds the truth at `INTERVAL_SIGMA`. */
export interface RetardanceEstimate {
  readonly retardanceDeg: number;
  /** First order; where the scan is blind, half of what the interval reaches at most, so that 2σ still hold the truth. */
  readonly sigmaDeg: number;
  readonly fromDeg: number;
  readonly toDeg: number;
}

export interface LinearRetardance {
  /** The branch up to 180°. */
  readonly estimate: RetardanceEstimate;
  readonly isBlind: boolean;
  /** By how many σ the modulation exceeds that of a half-wave plate; at most 0 for one that a plate can make. */
  readonly overFullSigmas: number;
  /** The fit to show: with the modulation held at 1 where it would exceed it. */
  readonly fit: CoefficientFit;
}

/** δ up to 180° from s = sin²(δ/2), s cut to what a plate can have. */
function retardanceDegOf(modulation: number): number {
  return toDegrees(radians(2 * asin(Math.sqrt(Math.min(1, Math.max(0, modulation))))));
}

/**
 * δ and its interval from the profile of χ² in s = sin²(δ/2). Where the fitted s exceeds 1 by noise, the plate is taken as
 * 180° and the interval keeps the width that the free fit has, moved to end there: it is never tighter for a fluke, and
 * holds the truth at least as often as 95.45 % (the lower limit of a normal measurement moved inwards covers more).
 */
export function linearRetardance(
  problem: CoefficientProblem,
  free: CoefficientFit,
  freedom: ScatterFreedom,
): LinearRetardance | null {
  const covariance = parameterCovariance(free);
  if (covariance === null) return null;
  const n = free.parameters.length;
  const modulation = free.parameters[MODULATION] ?? 0;
  const sigma = Math.sqrt(covariance[MODULATION * n + MODULATION] ?? 0);
  const atHalfWave = fitWith(problem, free.parameters, MODULATION, 1);
  const fromHalfWave = asNormalSigmas(Math.sqrt(Math.max(0, atHalfWave.excess - free.excess)), freedom);
  const isOver = modulation > 1;
  const isBlind = isOver || fromHalfWave < SETTLED_SIGMA;

  const reach = asStudentSigmas(INTERVAL_SIGMA, freedom);
  const below = profileEdge(problem, free, MODULATION, -1, sigma, reach, Math.min(0, modulation));
  const above = isOver ? 1 : profileEdge(problem, free, MODULATION, 1, sigma, reach, 1);
  const fromDeg = retardanceDegOf(isOver ? 1 - (modulation - below) : below);
  const toDeg = retardanceDegOf(above);
  const retardanceDeg = retardanceDegOf(modulation);
  // dδ = ds / (½ sin δ), and ½ sin δ = √(s(1 − s)).
  const firstOrderDeg = toDegrees(radians(sigma / Math.sqrt(Math.max(modulation * (1 - modulation), 0))));
  const sigmaDeg = isBlind
    ? Math.max(retardanceDeg - fromDeg, toDeg - retardanceDeg) / INTERVAL_SIGMA
    : firstOrderDeg;
  return {
    estimate: { retardanceDeg, sigmaDeg, fromDeg, toDeg },
    isBlind,
    overFullSigmas: isOver ? fromHalfWave : -fromHalfWave,
    fit: isOver ? atHalfWave : free,
  };
}
