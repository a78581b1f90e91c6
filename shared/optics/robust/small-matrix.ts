/** A symmetric matrix taken apart: column k of `vectors` (entry i at [i · n + k]) belongs to `values[k]`. */
export interface Eigen {
  readonly values: Float64Array;
  readonly vectors: Float64Array;
}

const SWEEPS = 30;

/** Jacobi's rotations, for the handful of rows that plates make. @param matrix n × n, rows first. */
export function symmetricEigen(matrix: Float64Array, n: number): Eigen {
  const a = Float64Array.from(matrix);
  const vectors = new Float64Array(n * n);
  for (let i = 0; i < n; i += 1) vectors[i * n + i] = 1;
  for (let sweep = 0; sweep < SWEEPS; sweep += 1) {
    let rotated = false;
    for (let p = 0; p < n - 1; p += 1) {
      for (let q = p + 1; q < n; q += 1) {
        const off = a[p * n + q] ?? 0;
        const [pp, qq] = [a[p * n + p] ?? 0, a[q * n + q] ?? 0];
        if (Math.abs(off) <= 1e-17 * (Math.abs(pp) + Math.abs(qq))) continue;
        rotated = true;
        const ratio = (qq - pp) / (2 * off);
        const t = (ratio < 0 ? -1 : 1) / (Math.abs(ratio) + Math.sqrt(ratio * ratio + 1));
        const c = 1 / Math.sqrt(t * t + 1);
        rotateColumns(a, n, p, q, c, t * c);
        rotateRows(a, n, p, q, c, t * c);
        rotateColumns(vectors, n, p, q, c, t * c);
      }
    }
    if (!rotated) break;
  }
  return { values: Float64Array.from({ length: n }, (_, k) => a[k * n + k] ?? 0), vectors };
}

function rotateColumns(a: Float64Array, n: number, p: number, q: number, c: number, s: number): void {
  for (let i = 0; i < n; i += 1) {
    const [x, y] = [a[i * n + p] ?? 0, a[i * n + q] ?? 0];
    a[i * n + p] = c * x - s * y;
    a[i * n + q] = s * x + c * y;
  }
}

function rotateRows(a: Float64Array, n: number, p: number, q: number, c: number, s: number): void {
  for (let i = 0; i < n; i += 1) {
    const [x, y] = [a[p * n + i] ?? 0, a[q * n + i] ?? 0];
    a[p * n + i] = c * x - s * y;
    a[q * n + i] = s * x + c * y;
  }
}

/** AᵀA of `rows` rows of n entries, and Aᵀv. */
export function normalEquations(
  a: Float64Array,
  v: Float64Array,
  rows: number,
  n: number,
): { readonly matrix: Float64Array; readonly vector: Float64Array } {
  const matrix = new Float64Array(n * n);
  const vector = new Float64Array(n);
  for (let r = 0; r < rows; r += 1) {
    for (let i = 0; i < n; i += 1) {
      const left = a[r * n + i] ?? 0;
      vector[i] = (vector[i] ?? 0) + left * (v[r] ?? 0);
      for (let j = i; j < n; j += 1) {
        matrix[i * n + j] = (matrix[i * n + j] ?? 0) + left * (a[r * n + j] ?? 0);
      }
    }
  }
  for (let i = 0; i < n; i += 1) for (let j = 0; j < i; j += 1) matrix[i * n + j] = matrix[j * n + i] ?? 0;
  return { matrix, vector };
}
