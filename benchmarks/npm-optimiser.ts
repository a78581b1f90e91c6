import { seededStream } from '../shared/optics/uniform-stream';
import { levenbergMarquardt } from 'ml-levenberg-marquardt';
import { apply, type ApplyProblem } from '../shared/optics/solver/apply';
import { unitaryShortfall } from '../shared/optics/goal';
import { radians, wrap } from '../shared/optics/units';
import { forwardThree, type Angles } from './three-plates';

const EXACT = 1e-12;
const MOST_STARTS = 400;

/**
 * The same settings by a general least-squares package from npm: started at random until every setting of the solver's is
 * found, or given up. Answers how many of them it found.
 */
export function npmOptimiser(problem: ApplyProblem): { readonly wanted: number; readonly found: number } {
  const wanted = apply(problem).solutions.map(({ fastAxesRad }) => fastAxesRad);
  const left = new Set(wanted);
  const random = seededStream(11);
  for (let start = 0; start < MOST_STARTS && left.size > 0; start += 1) {
    const end = fit(problem, [Math.PI * random(), Math.PI * random(), Math.PI * random()], random() < 0.5);
    if (end === null) continue;
    for (const setting of left) {
      const same = setting.every((angle, k) => {
        const apart = wrap(angle - (end[k] ?? 0), Math.PI);
        return Math.min(apart, Math.PI - apart) < 1e-4;
      });
      if (same) left.delete(setting);
    }
  }
  return { wanted: wanted.length, found: wanted.length - left.size };
}

function fit(problem: ApplyProblem, initialValues: number[], opposite: boolean): Angles | null {
  const { w, x, y, z } = problem.target;
  const sign = opposite ? -1 : 1;
  const at = (parameters: readonly number[]): Angles => [
    radians(parameters[0] ?? 0),
    radians(parameters[1] ?? 0),
    radians(parameters[2] ?? 0),
  ];
  const { parameterValues } = levenbergMarquardt(
    { x: [0, 1, 2, 3], y: [sign * w, sign * x, sign * y, sign * z] },
    (parameters) => {
      const turn = forwardThree(problem, at(parameters));
      const parts = [turn.w, turn.x, turn.y, turn.z];
      return (part) => parts[part] ?? 0;
    },
    { initialValues, damping: 1e-2, gradientDifference: 1e-6, maxIterations: 60, errorTolerance: 1e-24 },
  );
  const end = at(parameterValues);
  return unitaryShortfall(forwardThree(problem, end), problem.target) < EXACT ? end : null;
}
