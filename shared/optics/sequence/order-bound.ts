import type { MoveCost, Stations } from './move-cost';

/** Steps of the ascent; each is one spanning tree. */
const ASCENT_STEPS = 200;

/** The least cost of a move from any row (last: from the start) to each row, as a matrix of n + 1 rows by n columns. */
export function leastCosts(
  cost: MoveCost,
  rows: readonly Stations[],
  start: Stations | null,
): readonly Float64Array[] {
  const from = [...rows, start];
  return from.map((here) =>
    Float64Array.from(rows, (there) => (here === null || here === there ? 0 : cost.least(here, there))),
  );
}

/**
 * A cost that no order of the rows can go below. Both bounds let every move take whichever solutions are nearest:
 * each row but the first must be come to from somewhere, and a path is a spanning tree whose inner rows have two
 * neighbours (Held and Karp's ascent on trees, Oper. Res. 18, 1138 (1970) [from memory], made symmetric by taking the
 * cheaper sense of each move).
 */
export function lowerBound(least: readonly Float64Array[], startKnown: boolean): number {
  const count = least.length - 1;
  if (count === 0) return 0;
  return Math.max(0, incomingBound(least, count, startKnown), treeBound(least, count));
}

function incomingBound(least: readonly Float64Array[], count: number, startKnown: boolean): number {
  let sum = 0;
  let dearest = 0;
  for (let to = 0; to < count; to += 1) {
    let cheapest = startKnown ? (least[count]?.[to] ?? 0) : Infinity;
    for (let from = 0; from < count; from += 1) {
      if (from !== to) cheapest = Math.min(cheapest, least[from]?.[to] ?? 0);
    }
    if (cheapest === Infinity) cheapest = 0;
    sum += cheapest;
    dearest = Math.max(dearest, cheapest);
  }
  return startKnown ? sum : sum - dearest;
}

function treeBound(least: readonly Float64Array[], count: number): number {
  const edges = least
    .slice(0, count)
    .map((row, i) => row.map((cost, j) => Math.min(cost, least[j]?.[i] ?? 0)));
  const fromStart = least[count] ?? new Float64Array(count);
  const penalty = new Float64Array(count);
  const degree = new Int32Array(count);
  let best = -Infinity;
  let step = 0;
  for (let k = 0; k < ASCENT_STEPS; k += 1) {
    degree.fill(0);
    const tree = spanningTree(edges, penalty, degree);
    const ends = cheapestEnds(fromStart, penalty, degree);
    let value = tree + ends;
    let excess = 0;
    for (let i = 0; i < count; i += 1) {
      value -= 2 * (penalty[i] ?? 0);
      excess += ((degree[i] ?? 0) - 2) * ((degree[i] ?? 0) - 2);
    }
    best = Math.max(best, value);
    if (excess === 0) break;
    // A first step that could move the bound by a tenth, shrinking to nothing.
    if (k === 0) step = (0.1 * Math.max(value, 1e-6)) / excess;
    for (let i = 0; i < count; i += 1) penalty[i] = (penalty[i] ?? 0) + step * ((degree[i] ?? 0) - 2);
    step *= 0.98;
  }
  return best;
}

// Prim's algorithm on the penalised edges; counts each row's neighbours.
function spanningTree(edges: readonly Float64Array[], penalty: Float64Array, degree: Int32Array): number {
  const count = edges.length;
  const nearest = new Float64Array(count).fill(Infinity);
  const parent = new Int32Array(count).fill(-1);
  const isIn = new Uint8Array(count);
  nearest[0] = 0;
  let sum = 0;
  for (let k = 0; k < count; k += 1) {
    let next = -1;
    for (let i = 0; i < count; i += 1) {
      if (isIn[i] === 0 && (next < 0 || (nearest[i] ?? 0) < (nearest[next] ?? 0))) next = i;
    }
    isIn[next] = 1;
    sum += nearest[next] ?? 0;
    const above = parent[next] ?? -1;
    if (above >= 0) {
      degree[next] = (degree[next] ?? 0) + 1;
      degree[above] = (degree[above] ?? 0) + 1;
    }
    const row = edges[next];
    for (let i = 0; i < count; i += 1) {
      const cost = (row?.[i] ?? 0) + (penalty[next] ?? 0) + (penalty[i] ?? 0);
      if (isIn[i] === 0 && cost < (nearest[i] ?? 0)) {
        nearest[i] = cost;
        parent[i] = next;
      }
    }
  }
  return sum;
}

// The start joins one row and the free end another; in a list of one they are the same row.
function cheapestEnds(fromStart: Float64Array, penalty: Float64Array, degree: Int32Array): number {
  const count = penalty.length;
  let [first, last, least] = [0, 0, Infinity];
  for (let i = 0; i < count; i += 1) {
    for (let j = 0; j < count; j += 1) {
      if (i === j && count > 1) continue;
      const cost = (fromStart[i] ?? 0) + (penalty[i] ?? 0) + (penalty[j] ?? 0);
      if (cost < least) [first, last, least] = [i, j, cost];
    }
  }
  degree[first] = (degree[first] ?? 0) + 1;
  degree[last] = (degree[last] ?? 0) + 1;
  return least;
}
