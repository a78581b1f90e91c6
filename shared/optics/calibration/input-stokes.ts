import type { DialDirection } from '../dial';
import { sincos } from '../elementary';
import type { StokesRow } from '../mueller';
import { degrees, toRadians } from '../units';
import { misfitSigmas } from './evidence';
import { linearFit } from './linear-squares';
import { type ScanRefusal, refuse } from './refusal';
import { rotatingPlateRow } from './rotating-model';
import { type RotatingRow, rotatingSamples, weightsOf } from './scan-rows';

const LARGEST_DEG = 1e6;
/** A plate with a smaller sin δ or sin²(δ/2) hides a parameter behind any noise. */
const LEAST_SINE = 1e-6;

function hidesAParameter(retardanceRad: number): boolean {
  const half = sincos(retardanceRad / 2);
  return Math.min(Math.abs(2 * half.sin * half.cos), half.sin * half.sin) < LEAST_SINE;
}

/** The other way round: unknown light through a known plate that turns in front of a fixed linear analyser. */
export interface InputScan {
  readonly rows: readonly RotatingRow[];
  readonly direction: DialDirection;
  readonly offsetDeg: number;
  readonly retardanceDeg: number;
  readonly analyserDeg: number;
  /** Share of the blocked polarisation that the analyser passes; 0 for an ideal one. */
  readonly leak: number;
  readonly leftOut: readonly number[];
}

export interface InputStokes {
  readonly ok: true;
  /** Canonical, in the unit of the powers, and not forced to be physical: noise may make it longer than S0. */
  readonly stokes: StokesRow;
  readonly sigmas: StokesRow;
  /** Of S0, S1, S2, S3, rows first. */
  readonly covariance: readonly (readonly number[])[];
  readonly degreeOfPolarisation: number;
  readonly chiSquared: number;
  readonly degreesOfFreedom: number;
  readonly sigmaFrom: 'rows' | 'scatter';
  /** By how many σ χ² is too large; 0 where the scatter set σ. */
  readonly misfitSigmas: number;
}

/** Rows that are Mueller's first of plate and analyser, times the input: four unknowns, linear, weighted. */
export function fitInputStokes(scan: InputScan): InputStokes | ScanRefusal {
  const { direction, offsetDeg, retardanceDeg, analyserDeg, leak } = scan;
  if (![offsetDeg, retardanceDeg, analyserDeg].every((value) => Math.abs(value) <= LARGEST_DEG))
    return refuse(
      'plate',
      'Offset, retardance and azimuth are finite numbers of degrees. State the plate anew.',
    );
  if (!(leak >= 0 && leak < 0.5))
    return refuse('statement', `A leak is a share from 0 to below ½, not ${leak}.`);
  if (Math.abs(direction) !== 1)
    return refuse('statement', `A dial runs in direction 1 or −1, not ${direction}.`);
  const samples = rotatingSamples(scan.rows, direction, scan.leftOut);
  if ('ok' in samples) return samples;
  const { count, scale, areSigmasStated } = samples;
  const x0 = direction * toRadians(degrees(offsetDeg));
  const needed = areSigmasStated ? 4 : 5;
  if (count < needed) {
    const what = `The scan has ${count} rows in use, and four Stokes parameters are to be found from them.`;
    return refuse('rows', `${what} Measure at least ${needed}.`);
  }
  const seen = 1 - 2 * leak;
  const design = Array.from(samples.angleRad).flatMap((angleRad) => {
    const retardanceRad = toRadians(degrees(retardanceDeg));
    const [a, b, c, d] = rotatingPlateRow(angleRad - x0, retardanceRad, toRadians(degrees(analyserDeg)));
    return [a, seen * b, seen * c, seen * d];
  });
  const fit = hidesAParameter(toRadians(degrees(retardanceDeg)))
    ? null
    : linearFit(Float64Array.from(design), 4, samples.value, weightsOf(samples));
  if (fit === null) {
    const what = `These angles of a plate of ${retardanceDeg}° leave a Stokes parameter open: a half-wave plate never shows`;
    return refuse(
      'plate',
      `${what} S3, a whole-wave one nothing but the analyser. Use another plate or more angles.`,
    );
  }
  const variance = areSigmasStated ? 1 : fit.squares / fit.freedom;
  const at = (i: number, j: number) => (fit.covariance[4 * i + j] ?? 0) * variance * scale * scale;
  const four = (of: (i: number) => number): StokesRow => [of(0), of(1), of(2), of(3)];
  const stokes = four((i) => (fit.coefficients[i] ?? 0) * scale);
  const [s0, s1, s2, s3] = stokes;
  if (!(s0 > 0))
    return refuse('flat', 'The fitted intensity is not above 0. Check the dark level of the powers.');
  return {
    ok: true,
    stokes,
    sigmas: four((i) => Math.sqrt(at(i, i))),
    covariance: four((i) => i).map((i) => four((j) => at(i, j))),
    degreeOfPolarisation: Math.sqrt(s1 * s1 + s2 * s2 + s3 * s3) / s0,
    chiSquared: fit.squares / variance,
    degreesOfFreedom: fit.freedom,
    sigmaFrom: areSigmasStated ? 'rows' : 'scatter',
    misfitSigmas: areSigmasStated ? misfitSigmas(fit.squares, fit.freedom) : 0,
  };
}

/** The harmonics of N powers at plate angles spaced evenly over half a turn, the first at 0 (fast axis at H). */
export interface EvenHarmonics {
  readonly mean: number;
  readonly cos2: number;
  readonly sin2: number;
  readonly cos4: number;
  readonly sin4: number;
}

/**
 * The closed form for even angles, (1/N)ΣI and (2/N)ΣI times each cosine and sine; exact for clean powers from N = 5 on.
 * It agrees with weighted least squares where all weights are equal.
 * @throws RangeError for fewer than five powers.
 */
export function evenHarmonics(powers: readonly number[]): EvenHarmonics {
  const count = powers.length;
  if (count < 5) throw new RangeError(`five harmonics take at least five powers, got ${count}`);
  const sums = { mean: 0, cos2: 0, sin2: 0, cos4: 0, sin4: 0 };
  powers.forEach((power, k) => {
    const two = sincos((2 * Math.PI * k) / count);
    const four = sincos((4 * Math.PI * k) / count);
    sums.mean += power / count;
    sums.cos2 += (2 * power * two.cos) / count;
    sums.sin2 += (2 * power * two.sin) / count;
    sums.cos4 += (2 * power * four.cos) / count;
    sums.sin4 += (2 * power * four.sin) / count;
  });
  return sums;
}

/**
 * The light that makes these harmonics behind an ideal analyser along H, canonical S3 (the 2θ term has its sign; texts that
 * count S3 positive for R have the other). Null where the plate hides a parameter: sin δ or sin(δ/2) is 0.
 */
export function stokesOfHarmonics(
  { mean, sin2, cos4, sin4 }: EvenHarmonics,
  retardanceRad: number,
): StokesRow | null {
  const half = sincos(retardanceRad / 2);
  const s = half.sin * half.sin;
  const sinRetardance = 2 * half.sin * half.cos;
  if (hidesAParameter(retardanceRad)) return null;
  const s1 = (2 * cos4) / s;
  return [2 * mean - s1 * (1 - s), s1, (2 * sin4) / s, (2 * sin2) / sinRetardance];
}
