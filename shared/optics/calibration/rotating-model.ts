import { cos, sin, sincos, sincosInto } from '../elementary';
import type { StokesRow } from '../mueller';
import type { Stokes } from '../stokes';
import { wrapSigned } from '../units';
import type { CoefficientModel } from './coefficient-fit';

/*
 * Known light, then the plate, then a fixed linear analyser at α. Canonical S3 (positive counter-clockwise to the
 * receiver); texts that count S3 positive for R have the sign of the 2θ term turned. With the input's Stokes vector
 * turned into the analyser's frame, S1' = S1 cos2α + S2 sin2α, S2' = S2 cos2α − S1 sin2α, and θ' = θ − α,
 *   I = P/2 · [S0 + S1' cos²(δ/2) + S3 sinδ sin2θ' + sin²(δ/2) (S1' cos4θ' + S2' sin4θ')].
 * An analyser that leaks b of the other polarisation shows 1 − 2b of everything but S0. The 2θ term has the sign of
 * S3 sinδ: it alone tells a plate from the one that undoes it.
 */

/** How much of S0, S1, S2, S3 the analyser passes behind the plate: the power is this times the input. */
export function rotatingPlateRow(fastAxisRad: number, retardanceRad: number, analyserRad: number): StokesRow {
  const half = sincos(retardanceRad / 2);
  const [c, s] = [half.cos * half.cos, half.sin * half.sin];
  const turned = sincos(2 * analyserRad);
  const four = sincos(4 * fastAxisRad - 2 * analyserRad);
  const circular = sin(retardanceRad) * sin(2 * fastAxisRad - 2 * analyserRad);
  // cos²(δ/2) cos2α + sin²(δ/2) cos(4θ − 2α), and the same with sines.
  return [0.5, (c * turned.cos + s * four.cos) / 2, (c * turned.sin + s * four.sin) / 2, circular / 2];
}

export interface KnownInput {
  readonly stokes: Stokes;
  readonly analyserRad: number;
}

export const ROTATED_X0 = 0;
export const ROTATED_RETARDANCE = 1;
export const ROTATED_LEAK = 2;
export const ROTATED_POWER = 3;
export const ROTATED_DRIFT = 4;
const PARAMETERS = 5;
export const SHAPE = 5;

/**
 * Coefficients of 1, cos2x, sin2x, cos4x, sin4x for power 1, and (when asked) their derivatives by x0, δ and the leak,
 * a row of three for each. x = direction · dial, x0 = direction · offset.
 */
export function rotatingShape(
  { stokes: [s1, s2, s3], analyserRad }: KnownInput,
  x0: number,
  retardanceRad: number,
  leak: number,
  out: Float64Array,
  slopes: Float64Array | null,
): void {
  const trig = { sin: 0, cos: 0 };
  sincosInto(2 * analyserRad, trig);
  const t1 = s1 * trig.cos + s2 * trig.sin;
  const t2 = s2 * trig.cos - s1 * trig.sin;
  const q = (1 - 2 * leak) / 2;
  sincosInto(retardanceRad, trig);
  const sinD = trig.sin;
  const cosD = trig.cos;
  const s = (1 - cosD) / 2;
  sincosInto(2 * (x0 + analyserRad), trig);
  const sin2 = trig.sin;
  const cos2 = trig.cos;
  const sin4 = 2 * sin2 * cos2;
  const cos4 = (cos2 - sin2) * (cos2 + sin2);
  const u = t1 * cos4 - t2 * sin4;
  const v = t1 * sin4 + t2 * cos4;
  out[0] = 0.5 + q * t1 * (1 - s);
  out[1] = -q * s3 * sinD * sin2;
  out[2] = q * s3 * sinD * cos2;
  out[3] = q * s * u;
  out[4] = q * s * v;
  if (slopes === null) return;
  const byX0 = [0, -2 * s3 * sinD * cos2, -2 * s3 * sinD * sin2, -4 * s * v, 4 * s * u];
  const half = sinD / 2;
  const byRetardance = [-t1 * half, -s3 * cosD * sin2, s3 * cosD * cos2, half * u, half * v];
  for (let i = 0; i < SHAPE; i += 1) {
    slopes[3 * i] = q * (byX0[i] ?? 0);
    slopes[3 * i + 1] = q * (byRetardance[i] ?? 0);
    // All but the mean of ½ is proportional to 1 − 2b.
    slopes[3 * i + 2] = (-2 * ((out[i] ?? 0) - (i === 0 ? 0.5 : 0))) / (1 - 2 * leak);
  }
}

/** What a scan between linear polarisers told: the offset modulo 90°, and sin²(δ/2) where it told it. */
export interface LinearPrior {
  readonly x0: number;
  readonly x0Sigma: number;
  readonly modulation: { readonly value: number; readonly sigma: number } | null;
}

/** How far x0 lies from the nearest axis that the prior allows. */
export function offPrior(x0: number, prior: LinearPrior): number {
  return wrapSigned(x0 - prior.x0, Math.PI / 2);
}

export function priorSize(prior: LinearPrior | null): number {
  return prior === null ? 0 : prior.modulation === null ? 1 : 2;
}

/**
 * The five coefficients of a steady source and five times the time for its drift; behind them what the prior measured,
 * as if it were two coefficients more: x0's distance from the prior (target 0) and sin²(δ/2).
 */
export function rotatingModel(input: KnownInput, prior: LinearPrior | null): CoefficientModel {
  const shape = new Float64Array(SHAPE);
  const slopes = new Float64Array(3 * SHAPE);
  const extra = priorSize(prior);
  return {
    size: 2 * SHAPE + extra,
    evaluate: (parameters, coefficients, jacobian) => {
      const [x0 = 0, retardanceRad = 0, leak = 0, power = 1, drift = 0] = parameters;
      rotatingShape(input, x0, retardanceRad, leak, shape, slopes);
      jacobian.fill(0);
      for (let block = 0; block < 2; block += 1) {
        const factor = block === 0 ? 1 + drift / 2 : drift;
        for (let i = 0; i < SHAPE; i += 1) {
          const value = shape[i] ?? 0;
          const row = (block * SHAPE + i) * PARAMETERS;
          coefficients[block * SHAPE + i] = power * factor * value;
          for (let p = 0; p < 3; p += 1) jacobian[row + p] = power * factor * (slopes[3 * i + p] ?? 0);
          jacobian[row + ROTATED_POWER] = factor * value;
          jacobian[row + ROTATED_DRIFT] = power * (block === 0 ? 0.5 : 1) * value;
        }
      }
      if (prior === null) return;
      const first = 2 * SHAPE;
      coefficients[first] = offPrior(x0, prior);
      jacobian[first * PARAMETERS + ROTATED_X0] = 1;
      if (prior.modulation === null) return;
      coefficients[first + 1] = (1 - cos(retardanceRad)) / 2;
      jacobian[(first + 1) * PARAMETERS + ROTATED_RETARDANCE] = sin(retardanceRad) / 2;
    },
  };
}

/** Target and normal matrix of the model: the scan's, and the prior's on the diagonal. */
export function withPrior(
  target: Float64Array,
  normal: Float64Array,
  prior: LinearPrior | null,
): { readonly target: Float64Array; readonly normal: Float64Array } {
  if (prior === null) return { target, normal };
  const inner = target.length;
  const size = inner + priorSize(prior);
  const wider = new Float64Array(size * size);
  for (let i = 0; i < inner; i += 1) wider.set(normal.subarray(i * inner, (i + 1) * inner), i * size);
  const goal = new Float64Array(size);
  goal.set(target);
  wider[inner * size + inner] = 1 / (prior.x0Sigma * prior.x0Sigma);
  if (prior.modulation !== null) {
    goal[inner + 1] = prior.modulation.value;
    wider[(inner + 1) * size + inner + 1] = 1 / (prior.modulation.sigma * prior.modulation.sigma);
  }
  return { target: goal, normal: wider };
}
