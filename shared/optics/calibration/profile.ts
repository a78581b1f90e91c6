import { type CoefficientFit, type CoefficientProblem, fitCoefficients } from './coefficient-fit';

/** The least χ² with one parameter held at `value`, started from `from`. */
export function fitWith(
  problem: CoefficientProblem,
  from: Float64Array,
  parameter: number,
  value: number,
): CoefficientFit {
  const known = problem.known.map((stated, p) => (p === parameter ? { value, sigma: 0 } : stated));
  return fitCoefficients({ ...problem, known }, from);
}

const MOST_STEPS = 40;
/** Edges are found to this share of a σ. */
const PRECISION = 1e-4;

/**
 * Where, going from the minimum towards `sign`, χ² with the other parameters refitted has risen by `reach`² for the first
 * time; `limit` where it never does before.
 */
export function profileEdge(
  problem: CoefficientProblem,
  best: CoefficientFit,
  parameter: number,
  sign: 1 | -1,
  sigma: number,
  reach: number,
  limit: number,
): number {
  const centre = best.parameters[parameter] ?? 0;
  const room = sign * (limit - centre);
  if (room <= 0) return centre;
  let [inner, innerAt] = [0, best.parameters];
  let outer: number | null = null;
  let step = Math.min(Math.max(reach * sigma, Number.MIN_VALUE), room);
  for (let k = 0; k < MOST_STEPS; k += 1) {
    const tried = fitWith(problem, innerAt, parameter, centre + sign * step);
    const risen = Math.sqrt(Math.max(0, tried.excess - best.excess));
    if (risen < reach) {
      if (step >= room) return limit;
      inner = step;
      innerAt = tried.parameters;
      step = outer === null ? Math.min(room, step * 1.5) : (inner + outer) / 2;
    } else {
      outer = step;
      // The root of the rise is nearly straight: a secant through the centre lands close, kept inside what is known.
      const guess = (step * reach) / risen;
      step = guess > inner && guess < outer ? guess : (inner + outer) / 2;
    }
    if (Math.abs(risen - reach) < PRECISION * reach)
      return centre + sign * (risen < reach ? inner : (outer ?? inner));
    if (outer !== null && outer - inner < PRECISION * sigma) break;
  }
  return centre + sign * (outer ?? inner);
}
