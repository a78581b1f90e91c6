import { radians, toDegrees, wrap, wrapSigned } from '../units';
import {
  type CoefficientFit,
  type CoefficientProblem,
  fitCoefficients,
  parameterCovariance,
} from './coefficient-fit';
import {
  asNormalSigmas,
  asStudentSigmas,
  INTERVAL_SIGMA,
  type ScatterFreedom,
  SETTLED_SIGMA,
} from './evidence';
import { profileEdge } from './profile';
import type { RetardanceEstimate } from './retardance-estimate';
import { ROTATED_LEAK, ROTATED_RETARDANCE, ROTATED_X0 } from './rotating-model';
import { descend, inStrip, type Landscape, polish, type Strip, valleys } from './rotating-search';

/** A wider or narrower interval than this share of what the first-order σ says means that δ is not a linear matter. */
const BLIND_SHARE = 1.25;
/** Where the first-order σ is of no use, edges are looked for in steps of this. */
const FIRST_GUESS = 0.1;
/** Bottoms closer than this are one valley. */
const SAME_VALLEY = 1e-3;

/** The same plate under the name given; fitted once more, which only moves it by rounding and turns its covariance. */
export function renamed(
  problem: CoefficientProblem,
  fit: CoefficientFit,
  name: { readonly x0: number; readonly retardance: number },
): CoefficientFit {
  const parameters = Float64Array.from(fit.parameters);
  parameters[ROTATED_X0] = name.x0;
  parameters[ROTATED_RETARDANCE] = name.retardance;
  return fitCoefficients(problem, parameters);
}

/** Its other name. */
export function otherInStrip(fit: CoefficientFit): { readonly x0: number; readonly retardance: number } {
  const { x0, retardance } = inStrip(fit);
  return { x0: x0 + Math.PI / 2, retardance: 2 * Math.PI - retardance };
}

/** δ with its interval from the profile of χ², and whether its first-order σ is of no use. */
export function estimateOf(
  problem: CoefficientProblem,
  fit: CoefficientFit,
  freedom: ScatterFreedom,
): { readonly estimate: RetardanceEstimate; readonly isBlind: boolean } {
  const n = fit.parameters.length;
  const retardance = fit.parameters[ROTATED_RETARDANCE] ?? 0;
  const variance = parameterCovariance(fit)?.[ROTATED_RETARDANCE * n + ROTATED_RETARDANCE];
  const firstOrder = variance === undefined ? Infinity : Math.sqrt(variance);
  const guess = Math.min(firstOrder, FIRST_GUESS);
  const reach = asStudentSigmas(INTERVAL_SIGMA, freedom);
  const edge = (sign: 1 | -1) =>
    profileEdge(problem, fit, ROTATED_RETARDANCE, sign, guess, reach, retardance + sign * Math.PI);
  const [below, above] = [edge(-1), edge(1)];
  const farther = Math.max(retardance - below, above - retardance);
  const isBlind = farther > BLIND_SHARE * reach * firstOrder || farther < (reach * firstOrder) / BLIND_SHARE;
  const inDegrees = (angleRad: number) => toDegrees(radians(angleRad));
  return {
    estimate: {
      retardanceDeg: inDegrees(retardance),
      sigmaDeg: inDegrees(isBlind ? farther / INTERVAL_SIGMA : firstOrder),
      fromDeg: inDegrees(below),
      toDeg: inDegrees(above),
    },
    isBlind,
  };
}

/** How much worse the best plate is that turns the other way, and other valleys on this side that can't be left out. */
export function rivalsOf(
  problem: CoefficientProblem,
  landscape: Landscape,
  fit: CoefficientFit,
  freedom: ScatterFreedom,
): {
  readonly acrossSigmas: number;
  readonly others: readonly { readonly x0: number; readonly retardance: number; readonly sigmas: number }[];
} {
  const own = inStrip(fit);
  const leak = fit.parameters[ROTATED_LEAK] ?? 0;
  const sigmasOf = (excess: number) => asNormalSigmas(Math.sqrt(Math.max(0, excess - fit.excess)), freedom);
  const bottoms = (fromX0: number) => {
    const strip: Strip = { fromX0, width: Math.PI / 2 };
    return valleys(landscape, strip).map((spot) => {
      const low = descend(landscape, strip, spot);
      const polished = polish(problem, low, leak);
      const there = inStrip(polished);
      const isInside = wrap(there.x0 - fromX0, Math.PI) <= strip.width && polished.excess <= low.excess;
      return isInside ? { ...there, excess: polished.excess } : low;
    });
  };
  const across = bottoms(own.x0 + Math.PI / 4).reduce(
    (least, { excess }) => Math.min(least, excess),
    Infinity,
  );
  const others = bottoms(own.x0 - Math.PI / 4)
    .map((spot) => ({ x0: spot.x0, retardance: spot.retardance, sigmas: sigmasOf(spot.excess) }))
    .filter(
      ({ x0, retardance, sigmas }) =>
        sigmas < SETTLED_SIGMA &&
        retardance > 0 &&
        retardance < Math.PI &&
        Math.max(Math.abs(wrapSigned(x0 - own.x0, Math.PI)), Math.abs(retardance - own.retardance)) >
          SAME_VALLEY,
    );
  return { acrossSigmas: sigmasOf(across), others };
}
