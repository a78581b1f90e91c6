import { spawnSync } from 'node:child_process';
import { join } from 'node:path';
import { z } from 'zod';
import { type MeasuredCounts, mostLikelyState, type Stokes } from '../shared/optics';
import { BarrierPath } from '../shared/optics/tomography/barrier-path';
import { seededStream } from '../shared/optics/uniform-stream';

/** The brief's least factor between scipy's BFGS and the kernel. */
export const LEAST_BFGS_FACTOR = 300;
/** The brief's largest distance of log L from its optimum. */
export const MOST_LOG_LIKELIHOOD_GAP = 1e-9;

const PROJECTORS: readonly Stokes[] = [
  [1, 0, 0],
  [-1, 0, 0],
  [0, 1, 0],
  [0, -1, 0],
  [0, 0, 1],
  [0, 0, -1],
];
const SETTINGS = { projectors: PROJECTORS, exposures: [1, 1, 1, 1, 1, 1], darkCounts: [0, 0, 0, 0, 0, 0] };

/** Six settings, a thousand to ten thousand counts for each pair; every other state is pure. Poisson noise by its normal limit. */
export function tomographies(count: number): readonly MeasuredCounts[] {
  const random = seededStream(11);
  const normal = (): number => Math.sqrt(-2 * Math.log(1 - random())) * Math.cos(2 * Math.PI * random());
  return Array.from({ length: count }, (_, k) => {
    const degree = k % 2 === 0 ? 1 : random();
    const s3 = 2 * random() - 1;
    const azimuth = 2 * Math.PI * random();
    const linear = Math.sqrt(1 - s3 * s3);
    const state: Stokes = [linear * Math.cos(azimuth), linear * Math.sin(azimuth), s3];
    const pair = 10 ** (3 + random());
    const counts = PROJECTORS.map((m) => {
      const mean = (pair * (1 + degree * (m[0] * state[0] + m[1] * state[1] + m[2] * state[2]))) / 2;
      return Math.max(0, Math.round(mean + Math.sqrt(mean) * normal()));
    });
    return { ...SETTINGS, counts };
  });
}

/** All of them by the public function, checks and certificate included; the largest certified gap. */
export function estimateAll(list: readonly MeasuredCounts[]): number {
  return list.reduce((most, data) => {
    const estimate = mostLikelyState(data);
    return Math.max(most, estimate.ok ? estimate.gapBound : Infinity);
  }, 0);
}

/** All of them by the kernel with the settings prepared once, as a bootstrap has it. */
export function climbAll(list: readonly MeasuredCounts[]): number {
  const path = new BarrierPath(SETTINGS);
  return list.reduce((most, { counts }) => Math.max(most, path.climb(counts).gapBound), 0);
}

const searched = z.object({ secondsEach: z.number(), logLikelihoods: z.array(z.number()) });
const scipyAnswer = z.object({ differences: searched, exactGradient: searched });

export interface BfgsAnswer {
  readonly secondsEach: number;
  /** The most that log L lies below ours. */
  readonly mostBelow: number;
  /** The most that log L lies above ours. */
  readonly mostAbove: number;
}

/** The same counts by scipy.optimize.minimize(method="BFGS"); null where there is no python3 with scipy. */
export function scipyLikeliest(
  list: readonly MeasuredCounts[],
): { readonly differences: BfgsAnswer; readonly exactGradient: BfgsAnswer } | null {
  if (spawnSync('python3', ['-c', 'import scipy.optimize']).status !== 0) return null;
  const script = join(import.meta.dirname, 'scipy-likeliest-state.py');
  const { status, stdout, stderr } = spawnSync('python3', [script], {
    input: JSON.stringify(list),
    encoding: 'utf8',
  });
  if (status !== 0) throw new Error(`scipy-likeliest-state.py failed: ${stderr}`);
  const { differences, exactGradient } = scipyAnswer.parse(JSON.parse(stdout));
  const ours = list.map((data) => {
    const estimate = mostLikelyState(data);
    return estimate.ok ? estimate.logLikelihood : NaN;
  });
  const compare = ({ secondsEach, logLikelihoods }: z.infer<typeof searched>): BfgsAnswer => {
    const above = logLikelihoods.map((value, k) => value - (ours[k] ?? NaN));
    return { secondsEach, mostBelow: -Math.min(...above), mostAbove: Math.max(...above) };
  };
  return { differences: compare(differences), exactGradient: compare(exactGradient) };
}
