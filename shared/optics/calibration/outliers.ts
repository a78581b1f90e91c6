import { selectRank } from '../order-statistic';
import { type Basis, basisSize, designOf } from './harmonic-basis';
import { linearFit } from './linear-squares';
import { type Samples, weightsOf } from './scan-rows';

/** A residual beyond this many robust σ is suspected. */
export const SUSPECT_SIGMA = 4;
/** Median of the size of a standard normal number. */
const MEDIAN_OF_NORMAL = 0.6744897501960817;
const ROUNDS = 12;
/** Residuals below this share of the largest value count as rounding. */
const ROUNDING = 1e-10;

/**
 * Rows that lie off the curve that most rows agree on, as places among the rows handed in. The curve has the least sum of
 * absolute residuals (iterated reweighting), so that a few wild rows don't bend it; the scale is the median of the
 * residuals' sizes. Only a suggestion: no fit leaves a row out by itself. The cut at 4 is common practice.
 */
export function suspectedRows(samples: Samples, basis: Basis): readonly number[] {
  const { count, value, sigma } = samples;
  const size = basisSize(basis);
  if (count < size + 2) return [];
  const least = ROUNDING * value.reduce((most, one, k) => Math.max(most, Math.abs(one) / (sigma[k] ?? 1)), 0);
  const design = designOf(basis, samples);
  const weights = weightsOf(samples);
  const weight = Float64Array.from(weights);
  const residual = new Float64Array(count);
  for (let round = 0; round < ROUNDS; round += 1) {
    const fit = linearFit(design, size, value, weight);
    if (fit === null) return [];
    for (let k = 0; k < count; k += 1) {
      residual[k] = Math.abs(fit.residuals[k] ?? 0) / (sigma[k] ?? 1);
      weight[k] = (weights[k] ?? 0) / Math.max(residual[k] ?? 0, least, Number.MIN_VALUE);
    }
  }
  // This curve passes through as many samples as it has coefficients: the median is that of the others.
  const rank = Math.min(count - 1, Math.floor((count + size) / 2));
  const scale = Math.max(selectRank(Float64Array.from(residual), rank) / MEDIAN_OF_NORMAL, least);
  return Array.from(samples.rows).filter((_, k) => (residual[k] ?? 0) > SUSPECT_SIGMA * scale);
}
