/**
 * A path through n places, once each, between a fixed beginning and a free end. Costs are a square matrix of n + 1:
 * row n holds the cost from the beginning (zeros when it is free).
 */
export interface PathCosts {
  readonly places: number;
  readonly cost: Float64Array;
}

/** An improvement smaller than this is rounding. */
const IMPROVES = 1e-9;
const LONGEST_SEGMENT = 3;

export function stepCost({ places, cost }: PathCosts, from: number, to: number): number {
  return to === places ? 0 : (cost[from * (places + 1) + to] ?? 0);
}

export function pathCost(costs: PathCosts, path: readonly number[]): number {
  let sum = 0;
  let before = costs.places;
  for (const place of path) {
    sum += stepCost(costs, before, place);
    before = place;
  }
  return sum;
}

/** Always on to the nearest place not visited yet; the first of equals. */
export function nearestNeighbourPath(costs: PathCosts, first: number | null): number[] {
  const left = new Set(Array.from({ length: costs.places }, (_, k) => k));
  const path: number[] = [];
  let here = costs.places;
  if (first !== null) {
    path.push(first);
    left.delete(first);
    here = first;
  }
  while (left.size > 0) {
    let nearest = -1;
    let least = Infinity;
    for (const place of left) {
      const cost = stepCost(costs, here, place);
      if (cost < least) {
        least = cost;
        nearest = place;
      }
    }
    path.push(nearest);
    left.delete(nearest);
    here = nearest;
  }
  return path;
}

/** Reverses stretches and moves segments of up to three places until neither makes the path cheaper. */
export function improvedPath(costs: PathCosts, start: readonly number[]): number[] {
  let path = [...start];
  for (let improved = true; improved;) {
    improved = reverseStretches(costs, path);
    const moved = moveSegment(costs, path);
    if (moved !== null) {
      path = moved;
      improved = true;
    }
  }
  return path;
}

/** Running costs along a path, forwards and backwards: what a stretch costs either way round. */
function runningCosts(costs: PathCosts, path: readonly number[]) {
  const forward = new Float64Array(path.length);
  const backward = new Float64Array(path.length);
  for (let k = 1; k < path.length; k += 1) {
    const [a, b] = [path[k - 1] ?? 0, path[k] ?? 0];
    forward[k] = (forward[k - 1] ?? 0) + stepCost(costs, a, b);
    backward[k] = (backward[k - 1] ?? 0) + stepCost(costs, b, a);
  }
  return { forward, backward };
}

function reverseStretches(costs: PathCosts, path: number[]): boolean {
  const { places } = costs;
  let { forward, backward } = runningCosts(costs, path);
  let improved = false;
  for (let i = 0; i < path.length - 1; i += 1) {
    const before = path[i - 1] ?? places;
    for (let j = i + 1; j < path.length; j += 1) {
      const after = path[j + 1] ?? places;
      const [head, tail] = [path[i] ?? 0, path[j] ?? 0];
      const now =
        stepCost(costs, before, head) + stepCost(costs, tail, after) + (forward[j] ?? 0) - (forward[i] ?? 0);
      const then =
        stepCost(costs, before, tail) +
        stepCost(costs, head, after) +
        (backward[j] ?? 0) -
        (backward[i] ?? 0);
      if (then < now - IMPROVES) {
        for (let [a, b] = [i, j]; a < b; a += 1, b -= 1) {
          const kept = path[a] ?? 0;
          path[a] = path[b] ?? 0;
          path[b] = kept;
        }
        ({ forward, backward } = runningCosts(costs, path));
        improved = true;
      }
    }
  }
  return improved;
}

// The first segment found that is cheaper elsewhere, either way round; null when there is none.
function moveSegment(costs: PathCosts, path: readonly number[]): number[] | null {
  const { places } = costs;
  const { forward, backward } = runningCosts(costs, path);
  for (let length = 1; length <= LONGEST_SEGMENT; length += 1) {
    for (let i = 0; i + length <= path.length; i += 1) {
      const j = i + length - 1;
      const [before, head, tail] = [path[i - 1] ?? places, path[i] ?? 0, path[j] ?? 0];
      const after = path[j + 1] ?? places;
      const gained =
        stepCost(costs, before, head) + stepCost(costs, tail, after) - stepCost(costs, before, after);
      if (gained < IMPROVES) continue;
      const turning = (backward[j] ?? 0) - (backward[i] ?? 0) - ((forward[j] ?? 0) - (forward[i] ?? 0));
      for (let gap = -1; gap < path.length; gap += 1) {
        if (gap >= i - 1 && gap <= j) continue;
        const [left, right] = [path[gap] ?? places, path[gap + 1] ?? places];
        const link = stepCost(costs, left, right);
        const straight = stepCost(costs, left, head) + stepCost(costs, tail, right) - link;
        const turned = stepCost(costs, left, tail) + stepCost(costs, head, right) - link + turning;
        if (Math.min(straight, turned) >= gained - IMPROVES) continue;
        const segment = path.slice(i, j + 1);
        if (turned < straight) segment.reverse();
        const rest = [...path.slice(0, i), ...path.slice(j + 1)];
        rest.splice(gap < i ? gap + 1 : gap + 1 - length, 0, ...segment);
        return rest;
      }
    }
  }
  return null;
}
