/** A small symmetric matrix, rows first. */
export type SymmetricMatrix = readonly (readonly number[])[];

/**
 * Solves (A + damping·1) x = b by Cholesky's factors; null unless that matrix is positive definite.
 */
export function solveDamped(
  matrix: SymmetricMatrix,
  damping: number,
  right: readonly number[],
): readonly number[] | null {
  const size = right.length;
  const factor: number[][] = [];
  for (let i = 0; i < size; i += 1) {
    const row: number[] = [];
    for (let j = 0; j <= i; j += 1) {
      let sum = (matrix[i]?.[j] ?? 0) + (i === j ? damping : 0);
      for (let k = 0; k < j; k += 1) sum -= (row[k] ?? 0) * (factor[j]?.[k] ?? row[k] ?? 0);
      if (i > j) row.push(sum / (factor[j]?.[j] ?? 1));
      else if (sum > 0) row.push(Math.sqrt(sum));
      else return null;
    }
    factor.push(row);
  }
  const x = [...right];
  for (let i = 0; i < size; i += 1) {
    let sum = x[i] ?? 0;
    for (let k = 0; k < i; k += 1) sum -= (factor[i]?.[k] ?? 0) * (x[k] ?? 0);
    x[i] = sum / (factor[i]?.[i] ?? 1);
  }
  for (let i = size - 1; i >= 0; i -= 1) {
    let sum = x[i] ?? 0;
    for (let k = i + 1; k < size; k += 1) sum -= (factor[k]?.[i] ?? 0) * (x[k] ?? 0);
    x[i] = sum / (factor[i]?.[i] ?? 1);
  }
  return x;
}

/**
 * The rows that carry the rank of a positive semidefinite matrix: pivoted elimination, largest pivot first (the first of equals),
 * until what is left is below `tolerance`. In rising order.
 */
export function independentRows(matrix: SymmetricMatrix, tolerance: number): readonly number[] {
  const left = matrix.map((row) => [...row]);
  const chosen: number[] = [];
  for (;;) {
    let pivot = -1;
    let largest = tolerance;
    left.forEach((row, k) => {
      const size = row[k] ?? 0;
      if (!chosen.includes(k) && size > largest * (1 + 1e-9)) [pivot, largest] = [k, size];
    });
    const pivotRow = left[pivot];
    if (pivotRow === undefined) return chosen.sort((a, b) => a - b);
    chosen.push(pivot);
    const by = [...pivotRow];
    left.forEach((row, i) => {
      const share = (by[i] ?? 0) / largest;
      row.forEach((value, j) => (row[j] = value - share * (by[j] ?? 0)));
    });
  }
}
