import { spawnSync } from 'node:child_process';
import { join } from 'node:path';
import { z } from 'zod';
import { type BudgetProblem, expectedInfidelity, type UncertainPlate } from '../shared/optics/budget';
import { monteCarlo } from '../shared/optics/monte-carlo';
import { retardStokes } from '../shared/optics/retarder';
import type { Stokes } from '../shared/optics/stokes';
import { radians } from '../shared/optics/units';

const DEGREE = Math.PI / 180;
const ROUNDS = 5;

export const MONTE_CARLO_DRAWS = 100_000;

/** The three plates of numpy-monte-carlo.py, with every kind of uncertainty there is. */
export function monteCarloProblem(): BudgetProblem {
  const plate = (retardanceDeg: number, fastAxisDeg: number, sigmaDeg: number): UncertainPlate => ({
    retardanceRad: radians(retardanceDeg * DEGREE),
    fastAxisRad: radians(fastAxisDeg * DEGREE),
    sigmaRetardanceRad: radians(sigmaDeg * DEGREE),
    sigmaOffsetRad: radians(0.05 * DEGREE),
    dialRepeatabilityRad: radians(0.06 * DEGREE),
    dialResolutionRad: radians(0.1 * DEGREE),
  });
  const plates = [plate(89.4, 31, 0.4), plate(178.8, 74, 0.5), plate(90.7, 118, 0.4)];
  const input: Stokes = [1, 0, 0];
  const target = plates.reduce<Stokes>((state, next) => retardStokes(next, state), input);
  return {
    goal: { kind: 'prepare', input, target },
    plates,
    sigmaPolariserRad: radians(0.05 * DEGREE),
    extinction: 1e-5,
    shared: [
      {
        kind: 'wavelength',
        sigma: 1,
        retardancePerUnitRad: [-0.11, -0.22, -0.11].map((perNm) => perNm * DEGREE),
      },
    ],
  };
}

/** Least time of five whole budgets (draws, percentiles, histogram), in seconds. */
export function monteCarloSeconds(): number {
  const problem = monteCarloProblem();
  let least = Infinity;
  for (let round = 0; round < ROUNDS; round += 1) {
    const start = performance.now();
    monteCarlo(problem, { draws: MONTE_CARLO_DRAWS, seed: 7 });
    least = Math.min(least, (performance.now() - start) / 1000);
  }
  return least;
}

/** Least time of one first-order expectation of the same setting, in nanoseconds. */
export function expectationNanoseconds(): number {
  const problem = monteCarloProblem();
  const count = 20_000;
  let least = Infinity;
  for (let round = 0; round < ROUNDS; round += 1) {
    const start = performance.now();
    for (let k = 0; k < count; k += 1) expectedInfidelity(problem);
    least = Math.min(least, ((performance.now() - start) * 1e6) / count);
  }
  return least;
}

const numpyAnswerSchema = z.object({
  draws: z.number(),
  secondsWhole: z.number(),
  secondsBlocks: z.number(),
  summary: z.object({ mean: z.number(), standardError: z.number() }),
});

/** The same in numpy, whole arrays and in blocks that stay in the cache; `null` where there is no Python with numpy. */
export function numpyMonteCarlo(): z.infer<typeof numpyAnswerSchema> | null {
  const script = join(import.meta.dirname, 'numpy-monte-carlo.py');
  const { status, stdout } = spawnSync('python3', [script, String(MONTE_CARLO_DRAWS)], { encoding: 'utf8' });
  return status === 0 ? numpyAnswerSchema.parse(JSON.parse(stdout)) : null;
}
