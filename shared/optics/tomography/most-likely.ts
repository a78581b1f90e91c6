import { log } from '../elementary';
import type { Stokes } from '../stokes';
import { BarrierPath } from './barrier-path';
import { type MeasuredCounts, refusalOf, type TomographyRefusal } from './measured-counts';
import { purity } from './state-quality';

export interface MostLikelyState {
  readonly ok: true;
  /** S0 in counts per unit of exposure. */
  readonly intensity: number;
  /** S/S0, canonical frame, of length 1 at most. */
  readonly stokes: Stokes;
  /** Tr ρ², from ½ to 1. */
  readonly purity: number;
  /** Σ n ln λ − λ at this state; the terms ln n! that no state changes are left out. */
  readonly logLikelihood: number;
  /**
   * No state whatever has a `logLikelihood` higher than this one's by more than this. Below 1e-10, or 4e-15 for each count where
   * there are more than some 20 000 (and that over 1 − |Σ e m|/Σ e): rounding hides what is less.
   */
  readonly gapBound: number;
}

export type StateEstimate = MostLikelyState | { readonly ok: false; readonly refusal: TomographyRefusal };

/**
 * The physical state, and the intensity, under which these Poisson counts are likeliest. log L is concave over the cone
 * |S| ≤ S0, so there is one maximum; `gapBound` certifies how near it this is (barrier-path.ts says how).
 */
export function mostLikelyState(data: MeasuredCounts): StateEstimate {
  const refusal = refusalOf(data);
  if (refusal !== null) return { ok: false, refusal };
  const { intensity, stokes, gapBound } = new BarrierPath(data).climb(data.counts);
  const logLikelihood = logLikelihoodOf(data, intensity, stokes);
  return { ok: true, intensity, stokes, purity: purity(stokes), logLikelihood, gapBound };
}

function logLikelihoodOf(data: MeasuredCounts, intensity: number, [s1, s2, s3]: Stokes): number {
  let sum = 0;
  for (const [k, [m1, m2, m3]] of data.projectors.entries()) {
    const n = data.counts[k] ?? 0;
    const passed = (1 + s1 * m1 + s2 * m2 + s3 * m3) / 2;
    const mean = (data.exposures[k] ?? 0) * intensity * passed + (data.darkCounts[k] ?? 0);
    sum += (n === 0 ? 0 : n * log(mean)) - mean;
  }
  return sum;
}
