import type { Course } from './stations';

/** Work (subsets × pairs of stations) up to which the exact order is sought. */
const MOST_WORK = 6e8;

/** Whether `exactOrder` takes seconds at most. */
export function isExactOrderFeasible(course: Course): boolean {
  const stations = course.rows.reduce((sum, row) => sum + row.count, 0);
  const subsets = course.rows.length < 31 ? 1 << course.rows.length : Infinity;
  return subsets * stations * stations < 4 * MOST_WORK;
}

/**
 * The cheapest order of all, by dynamic programming over subsets of rows and the station of the last (Held and Karp,
 * J. SIAM 10, 196 (1962) [from memory], with several stations a row). Yields the share of subsets done.
 */
export function* exactOrder(course: Course): Generator<number, readonly number[]> {
  const { rows, start, cost } = course;
  const count = rows.length;
  if (count === 0) return [];
  const rowOf: number[] = [];
  const own: number[] = [];
  const begin = rows.map((row, r) => {
    const at = rowOf.length;
    for (let s = 0; s < row.count; s += 1) {
      rowOf.push(r);
      own.push(s);
    }
    return at;
  });
  const total = rowOf.length;
  const pair = new Float64Array(total * total);
  for (let a = 0; a < total; a += 1) {
    for (let b = 0; b < total; b += 1) {
      const [from, to] = [rows[rowOf[a] ?? 0], rows[rowOf[b] ?? 0]];
      if (from !== undefined && to !== undefined && from !== to)
        pair[a * total + b] = cost.between(from, own[a] ?? 0, to, own[b] ?? 0);
    }
  }
  const subsets = 1 << count;
  const best = new Float64Array(subsets * total).fill(Infinity);
  const from = new Int32Array(subsets * total).fill(-1);
  for (let a = 0; a < total; a += 1) {
    const r = rowOf[a] ?? 0;
    const row = rows[r];
    if (row !== undefined)
      best[(1 << r) * total + a] = start === null ? 0 : cost.between(start, 0, row, own[a] ?? 0);
  }
  for (let subset = 1; subset < subsets; subset += 1) {
    if (subset % 64 === 0) yield subset / subsets;
    for (let a = 0; a < total; a += 1) {
      const sofar = best[subset * total + a] ?? Infinity;
      if (sofar === Infinity) continue;
      for (let r = 0; r < count; r += 1) {
        if ((subset & (1 << r)) !== 0) continue;
        const base = (subset | (1 << r)) * total;
        const first = begin[r] ?? 0;
        const end = begin[r + 1] ?? total;
        for (let b = first; b < end; b += 1) {
          const cost = sofar + (pair[a * total + b] ?? 0);
          if (cost < (best[base + b] ?? 0)) {
            best[base + b] = cost;
            from[base + b] = a;
          }
        }
      }
    }
  }
  let subset = subsets - 1;
  let here = 0;
  for (let a = 1; a < total; a += 1) {
    if ((best[subset * total + a] ?? 0) < (best[subset * total + here] ?? 0)) here = a;
  }
  const order: number[] = [];
  while (here >= 0) {
    const r = rowOf[here] ?? 0;
    order.push(r);
    const before = from[subset * total + here] ?? -1;
    subset ^= 1 << r;
    here = before;
  }
  return order.reverse();
}
