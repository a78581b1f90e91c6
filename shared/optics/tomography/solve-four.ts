/**
 * Solves A x = b for a symmetric positive definite 4 × 4 matrix in place: A by rows, of which the lower triangle is read and
 * both are used up; b becomes x. Without pivots: largest scales first keep graded matrices accurate.
 */
export function solveFour(a: Float64Array, b: Float64Array): void {
  const d0 = a[0] ?? 1;
  const a10 = a[4] ?? 0;
  const a20 = a[8] ?? 0;
  const a30 = a[12] ?? 0;
  const l10 = a10 / d0;
  const l20 = a20 / d0;
  const l30 = a30 / d0;
  const d1 = (a[5] ?? 1) - l10 * a10;
  const a21 = (a[9] ?? 0) - l20 * a10;
  const a31 = (a[13] ?? 0) - l30 * a10;
  const l21 = a21 / d1;
  const l31 = a31 / d1;
  const d2 = (a[10] ?? 1) - l20 * a20 - l21 * a21;
  const a32 = (a[14] ?? 0) - l30 * a20 - l31 * a21;
  const l32 = a32 / d2;
  const d3 = (a[15] ?? 1) - l30 * a30 - l31 * a31 - l32 * a32;
  const y0 = b[0] ?? 0;
  const y1 = (b[1] ?? 0) - l10 * y0;
  const y2 = (b[2] ?? 0) - l20 * y0 - l21 * y1;
  const y3 = (b[3] ?? 0) - l30 * y0 - l31 * y1 - l32 * y2;
  const x3 = y3 / d3;
  const x2 = y2 / d2 - l32 * x3;
  const x1 = y1 / d1 - l21 * x2 - l31 * x3;
  b[0] = y0 / d0 - l10 * x1 - l20 * x2 - l30 * x3;
  b[1] = x1;
  b[2] = x2;
  b[3] = x3;
}

export function setFour(target: Float64Array, x0: number, x1: number, x2: number, x3: number): void {
  target[0] = x0;
  target[1] = x1;
  target[2] = x2;
  target[3] = x3;
}
