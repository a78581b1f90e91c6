import { atan2, sincos } from '../elementary';
import type { CoefficientModel } from './coefficient-fit';
import type { Ports, Stated } from './scan-rows';

/*
 * A plate between two linear polarisers, the first along H. With s = sin²(δ/2), leak b and h = (1 − 2b)s/2
 *   r(x) = b + (1 − 2b) s sin²2(x − x0) = B0 + B1 cos4x + B2 sin4x,  B0 = b + h, B1 = −h cos4x0, B2 = −h sin4x0,
 * the crossed port gets P(1 + dt) r and the parallel one P(1 + dt)(1 − r), t from 0 at the first row to 1 at the last.
 * x is direction · dial, so x0 is direction · offset. s is fitted without its limits: it is what the powers are linear
 * in, and its law stays normal where that of δ does not.
 */

export const X0 = 0;
export const MODULATION = 1;
export const LEAK = 2;
export const POWER = 3;
export const DRIFT = 4;
const PARAMETERS = 5;

/** Coefficients of 1, cos4x, sin4x; for a single port those three again, times the time counted from the middle. */
export function linearModel(ports: Ports): CoefficientModel {
  const size = ports === 'both' ? 3 : 6;
  const sign = ports === 'parallel' ? -1 : 1;
  return {
    size,
    evaluate: (parameters, coefficients, jacobian) => {
      const [x0 = 0, s = 0, b = 0, power = 1, drift = 0] = parameters;
      const { sin, cos } = sincos(4 * x0);
      const half = (1 - 2 * b) / 2;
      const h = half * s;
      const shape = [sign * (b + h) + (sign < 0 ? 1 : 0), -sign * h * cos, -sign * h * sin];
      const slopes = [
        [0, sign * half, sign * (1 - s)],
        [4 * sign * h * sin, -sign * half * cos, sign * s * cos],
        [-4 * sign * h * cos, -sign * half * sin, sign * s * sin],
      ];
      jacobian.fill(0);
      for (let block = 0; block < size / 3; block += 1) {
        const factor = block === 0 ? 1 + drift / 2 : drift;
        for (let i = 0; i < 3; i += 1) {
          const value = shape[i] ?? 0;
          const row = (block * 3 + i) * PARAMETERS;
          coefficients[block * 3 + i] = power * factor * value;
          for (let p = 0; p < 3; p += 1) jacobian[row + p] = power * factor * (slopes[i]?.[p] ?? 0);
          jacobian[row + POWER] = factor * value;
          jacobian[row + DRIFT] = power * (block === 0 ? 0.5 : 1) * value;
        }
      }
    },
  };
}

/** Without a stated power or leak a single port tells the zero only; then its power is a mere unit that makes b + h this. */
const UNIT_MEAN = 1 / 4;

export interface LinearStart {
  readonly start: Float64Array;
  /** The power that stands for the unit where the retardance can't be told. */
  readonly unitPower: number;
}

/** Parameters from the fitted harmonics, exact where the harmonics are: the search starts in the right valley. */
export function linearStart(
  ports: Ports,
  c: Float64Array,
  leak: Stated | null,
  power: Stated | null,
): LinearStart {
  const [mean = 0, cos4 = 0, sin4 = 0] = c;
  const amplitude = Math.sqrt(cos4 * cos4 + sin4 * sin4);
  const x0 = (ports === 'parallel' ? atan2(sin4, cos4) : atan2(-sin4, -cos4)) / 4;
  const along = [0, 1, 2].reduce((sum, i) => sum + (c[i] ?? 0) * (c[i + 3] ?? 0), 0);
  const ratio = ports === 'both' ? 0 : along / (mean * mean + amplitude * amplitude);
  const drift = ratio / (1 - ratio / 2);
  const middle = 1 + drift / 2;
  const unitPower = mean / (ports === 'parallel' ? 1 - UNIT_MEAN : UNIT_MEAN) / middle;
  let source = unitPower;
  if (ports === 'both') source = 1;
  else if (power !== null) source = power.value;
  else if (ports === 'parallel' && leak !== null) source = (mean + amplitude) / (1 - leak.value) / middle;
  const h = amplitude / (source * middle);
  const part = mean / (source * middle);
  const b = leak?.value ?? (ports === 'parallel' ? 1 - part : part) - h;
  return { start: Float64Array.of(x0, (2 * h) / (1 - 2 * b), b, source, drift), unitPower };
}
