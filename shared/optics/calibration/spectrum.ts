import { pairSigmas, type ScatterFreedom, SETTLED_SIGMA } from './evidence';
import { type Basis, basisSize, designOf } from './harmonic-basis';
import { type LinearFit, linearFit, pairSquares } from './linear-squares';
import { type ScanRefusal, refuse } from './refusal';
import { type Samples, weightsOf } from './scan-rows';

/** A scan taken apart into harmonics by weighted least squares, weights stated or set by the scatter. */
export interface Spectrum {
  readonly basis: Basis;
  readonly fit: LinearFit;
  /** σ of every sample where none was stated: root of the mean squared residual of this fit. */
  readonly scatter: number | null;
  readonly freedom: ScatterFreedom;
}

/** Scatter below this share of the largest value is rounding, as in powers that were computed. */
const LEAST_SCATTER = 1e-12;

/** The fit of a basis, or null where the samples are too few or too much alike for it. */
export function spectrumOf(samples: Samples, basis: Basis): Spectrum | null {
  const { count, value, areSigmasStated } = samples;
  const size = basisSize(basis);
  if (!areSigmasStated && count <= size) return null;
  const fit = linearFit(designOf(basis, samples), size, value, weightsOf(samples));
  if (fit === null) return null;
  if (areSigmasStated) return { basis, fit, scatter: null, freedom: null };
  const largest = value.reduce((most, one) => Math.max(most, Math.abs(one)), 0);
  const scatter = Math.max(Math.sqrt(fit.squares / fit.freedom), LEAST_SCATTER * largest);
  const variance = scatter * scatter;
  return {
    basis,
    fit: {
      ...fit,
      normal: fit.normal.map((entry) => entry / variance),
      covariance: fit.covariance.map((entry) => entry * variance),
      squares: fit.squares / variance,
    },
    scatter,
    freedom: fit.freedom,
  };
}

/** The same, with the reason where there is none. */
export function spectrum(samples: Samples, basis: Basis): Spectrum | ScanRefusal {
  const found = spectrumOf(samples, basis);
  if (found !== null) return found;
  const size = basisSize(basis) + (samples.areSigmasStated ? 0 : 1);
  if (samples.count < size) {
    const what = `The scan has ${samples.count} rows in use, too few for what is to be found from them.`;
    return refuse('rows', `${what} Measure at least ${size}.`);
  }
  const period = 360 / (basis.signal[0] ?? 1);
  const what = `The angles of the scan are too much alike or too few to show how the power follows the plate.`;
  return refuse(
    'angles',
    `${what} Measure at more than ${1 + 2 * basis.signal.length} angles spread over ${period}°.`,
  );
}

/** Modulation below this share of the mean is rounding. */
const LEAST_MODULATION = 1e-10;

/** A refusal where none of the harmonics whose cosine stands at these places rises out of the noise. */
export function flatProblem({ fit, freedom }: Spectrum, places: readonly number[]): ScanRefusal | null {
  const mean = Math.abs(fit.coefficients[0] ?? 0);
  const isSeen = places.some((first) => {
    const [a, b] = [fit.coefficients[first] ?? 0, fit.coefficients[first + 1] ?? 0];
    const sigmas = pairSigmas(pairSquares(fit, first), freedom);
    return sigmas >= SETTLED_SIGMA && Math.sqrt(a * a + b * b) > LEAST_MODULATION * mean;
  });
  if (isSeen) return null;
  const what = 'The power does not follow the plate: what changes with the angle is within the noise.';
  return refuse('flat', `${what} Check that the plate turns in the beam, or measure with more light.`);
}
