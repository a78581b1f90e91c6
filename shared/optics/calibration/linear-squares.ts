import { symmetricEigen } from '../robust/small-matrix';

/** Least squares of a model that is linear in its coefficients. */
export interface LinearFit {
  readonly size: number;
  readonly coefficients: Float64Array;
  /** Σ w f fᵀ, rows first: the inverse covariance of the coefficients. */
  readonly normal: Float64Array;
  readonly covariance: Float64Array;
  readonly residuals: Float64Array;
  /** Weighted sum of the squared residuals. */
  readonly squares: number;
  /** Samples − coefficients. */
  readonly freedom: number;
}

/** Below this share of the largest, an eigenvalue of the scaled matrix means that the samples leave a direction open. */
const OPEN_DIRECTION = 1e-11;

/** The inverse of a symmetric positive definite matrix, or null where it has none to speak of. */
export function invertPositive(matrix: Float64Array, n: number): Float64Array | null {
  const scales = Float64Array.from({ length: n }, (_, i) => Math.sqrt(matrix[i * n + i] ?? 0));
  if (!scales.every((scale) => scale > 0 && scale < Infinity)) return null;
  const scaled = matrix.map((value, k) => value / (scales[Math.floor(k / n)] ?? 1) / (scales[k % n] ?? 1));
  const { values, vectors } = symmetricEigen(scaled, n);
  if (values.some((value) => !(value > OPEN_DIRECTION))) return null;
  const inverse = new Float64Array(n * n);
  for (let i = 0; i < n; i += 1) {
    for (let j = 0; j <= i; j += 1) {
      let sum = 0;
      for (let k = 0; k < n; k += 1)
        sum += ((vectors[i * n + k] ?? 0) * (vectors[j * n + k] ?? 0)) / (values[k] ?? 1);
      const entry = sum / (scales[i] ?? 1) / (scales[j] ?? 1);
      inverse[i * n + j] = entry;
      inverse[j * n + i] = entry;
    }
  }
  return inverse;
}

/**
 * @param design the functions' values, a row of `size` for each sample.
 * @param weight of each sample: 1/σ².
 * @returns null where the samples can't tell the coefficients apart.
 */
export function linearFit(
  design: Float64Array,
  size: number,
  value: Float64Array,
  weight: Float64Array,
): LinearFit | null {
  const count = value.length;
  if (count < size) return null;
  const normal = new Float64Array(size * size);
  for (let k = 0; k < count; k += 1) {
    const w = weight[k] ?? 0;
    for (let i = 0; i < size; i += 1) {
      const left = w * (design[k * size + i] ?? 0);
      for (let j = 0; j <= i; j += 1)
        normal[i * size + j] = (normal[i * size + j] ?? 0) + left * (design[k * size + j] ?? 0);
    }
  }
  for (let i = 0; i < size; i += 1)
    for (let j = 0; j < i; j += 1) normal[j * size + i] = normal[i * size + j] ?? 0;
  const covariance = invertPositive(normal, size);
  if (covariance === null) return null;
  const coefficients = new Float64Array(size);
  const residuals = Float64Array.from(value);
  const right = new Float64Array(size);
  // The second round takes away the rounding of the first: normal equations square the condition number.
  for (let round = 0; round < 2; round += 1) {
    right.fill(0);
    for (let k = 0; k < count; k += 1) {
      const pull = (weight[k] ?? 0) * (residuals[k] ?? 0);
      for (let i = 0; i < size; i += 1) right[i] = (right[i] ?? 0) + pull * (design[k * size + i] ?? 0);
    }
    for (let i = 0; i < size; i += 1) {
      let step = 0;
      for (let j = 0; j < size; j += 1) step += (covariance[i * size + j] ?? 0) * (right[j] ?? 0);
      coefficients[i] = (coefficients[i] ?? 0) + step;
    }
    for (let k = 0; k < count; k += 1) {
      let left = value[k] ?? 0;
      for (let i = 0; i < size; i += 1) left -= (coefficients[i] ?? 0) * (design[k * size + i] ?? 0);
      residuals[k] = left;
    }
  }
  let squares = 0;
  for (let k = 0; k < count; k += 1) squares += (weight[k] ?? 0) * (residuals[k] ?? 0) * (residuals[k] ?? 0);
  return { size, coefficients, normal, covariance, residuals, squares, freedom: count - size };
}

/** dᵀ M d. */
export function quadratic(matrix: Float64Array, d: Float64Array): number {
  const n = d.length;
  let sum = 0;
  for (let i = 0; i < n; i += 1) {
    let row = 0;
    for (let j = 0; j < n; j += 1) row += (matrix[i * n + j] ?? 0) * (d[j] ?? 0);
    sum += row * (d[i] ?? 0);
  }
  return sum;
}

/** χ² of the two coefficients from place `first` on being 0: their amplitude in units of its own covariance. */
export function pairSquares({ coefficients, covariance, size }: LinearFit, first: number): number {
  const at = (i: number, j: number) => covariance[(first + i) * size + first + j] ?? 0;
  const [a, b] = [coefficients[first] ?? 0, coefficients[first + 1] ?? 0];
  const determinant = at(0, 0) * at(1, 1) - at(0, 1) * at(0, 1);
  return (a * a * at(1, 1) - 2 * a * b * at(0, 1) + b * b * at(0, 0)) / determinant;
}
