/**
 * Moves the value of rank `rank` (0 the smallest) to that place among the places `from` to `to` inclusive, nothing larger before
 * it and nothing smaller behind it, and returns it. Hoare's selection with the median of three as pivot: no randomness.
 */
export function selectRank(values: Float64Array, rank: number, from = 0, to = values.length - 1): number {
  let low = from;
  let high = to;
  while (low < high) {
    const pivot = medianOfThree(values[low] ?? 0, values[(low + high) >>> 1] ?? 0, values[high] ?? 0);
    let i = low;
    let j = high;
    while (i <= j) {
      while ((values[i] ?? Infinity) < pivot) i += 1;
      while ((values[j] ?? -Infinity) > pivot) j -= 1;
      if (i > j) break;
      const kept = values[i] ?? 0;
      values[i] = values[j] ?? 0;
      values[j] = kept;
      i += 1;
      j -= 1;
    }
    if (rank <= j) high = j;
    else if (rank >= i) low = i;
    else break;
  }
  return values[rank] ?? NaN;
}

function medianOfThree(a: number, b: number, c: number): number {
  return Math.max(Math.min(a, b), Math.min(Math.max(a, b), c));
}
