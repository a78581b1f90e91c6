import type { Stations } from './move-cost';
import type { Course } from './stations';

/** Improvements smaller than this are rounding. */
const IMPROVES = 1e-9;
const LONGEST_SEGMENT = 3;
/** Numbers kept at most: all moves between all stations. */
const MOST_MOVES = 6e6;

/** Whether a list is small enough for `improvedByTrueCost`. */
export function isTrueCostFeasible({ rows }: Course): boolean {
  const stations = rows.reduce((sum, { count }) => sum + count, 0);
  return stations * stations <= MOST_MOVES;
}

/** Least costs of being at each station of a row. */
type Front = Float64Array;

/** Moves between rows with every solution left open: fronts are carried from row to row, one way and back. */
export class OpenMoves {
  private readonly moves = new Map<number, Float64Array>();

  constructor(private readonly course: Course) {}

  /** The front of the first row of a path. */
  begin(row: number): Front {
    const { start, cost } = this.course;
    const to = this.row(row);
    return Float64Array.from({ length: to.count }, (_, s) =>
      start === null ? 0 : cost.between(start, 0, to, s),
    );
  }

  /** Costs of coming to each station of `to` through `from`. */
  onward(front: Front, from: number, to: number): Front {
    const moves = this.between(from, to);
    const width = this.row(to).count;
    const next = new Float64Array(width).fill(Infinity);
    for (let a = 0; a < front.length; a += 1) {
      const sofar = front[a] ?? 0;
      for (let b = 0; b < width; b += 1) {
        const cost = sofar + (moves[a * width + b] ?? 0);
        if (cost < (next[b] ?? 0)) next[b] = cost;
      }
    }
    return next;
  }

  /** Costs of going from each station of `from` through `to` to the end. */
  back(front: Front, from: number, to: number): Front {
    const moves = this.between(from, to);
    const width = front.length;
    return Float64Array.from({ length: this.row(from).count }, (_, a) => {
      let least = Infinity;
      for (let b = 0; b < width; b += 1) {
        const cost = (front[b] ?? 0) + (moves[a * width + b] ?? 0);
        if (cost < least) least = cost;
      }
      return least;
    });
  }

  /** The least cost of a front at `from`, a move to `to`, and what is left from there. */
  joint(front: Front, from: number, to: number, go: Front): number {
    const moves = this.between(from, to);
    const width = go.length;
    let least = Infinity;
    for (let a = 0; a < front.length; a += 1) {
      const sofar = front[a] ?? 0;
      if (sofar >= least) continue;
      for (let b = 0; b < width; b += 1) {
        const cost = sofar + (moves[a * width + b] ?? 0) + (go[b] ?? 0);
        if (cost < least) least = cost;
      }
    }
    return least;
  }

  private row(index: number): Stations {
    const row = this.course.rows[index];
    if (row === undefined) throw new RangeError(`there is no row ${index}`);
    return row;
  }

  private between(from: number, to: number): Float64Array {
    const key = from * this.course.rows.length + to;
    const known = this.moves.get(key);
    if (known !== undefined) return known;
    const [here, there] = [this.row(from), this.row(to)];
    const moves = new Float64Array(here.count * there.count);
    for (let a = 0; a < here.count; a += 1) {
      for (let b = 0; b < there.count; b += 1)
        moves[a * there.count + b] = this.course.cost.between(here, a, there, b);
    }
    this.moves.set(key, moves);
    return moves;
  }
}

/** Fronts from the beginning to each place of a path, and from each place to its end. */
function frontsOf(open: OpenMoves, path: readonly number[]) {
  const come: Front[] = [];
  path.forEach((row, k) => {
    const before = come[k - 1];
    come.push(before === undefined ? open.begin(row) : open.onward(before, path[k - 1] ?? 0, row));
  });
  const go: Front[] = [];
  for (let k = path.length - 1; k >= 0; k -= 1) {
    const after = go[k + 1];
    go[k] =
      after === undefined
        ? new Float64Array(come[k]?.length ?? 0)
        : open.back(after, path[k] ?? 0, path[k + 1] ?? 0);
  }
  return { come, go };
}

/** The cost of: `come` at `left`, then the rows of `part`, then `right` with `go` to the end. Either end may be missing. */
function joined(
  open: OpenMoves,
  left: number | undefined,
  come: Front | undefined,
  part: readonly number[],
  right: number | undefined,
  go: Front | undefined,
): number {
  let front = come;
  let here = left;
  for (const row of part) {
    front = front === undefined || here === undefined ? open.begin(row) : open.onward(front, here, row);
    here = row;
  }
  if (front === undefined || here === undefined) return Infinity;
  if (right === undefined || go === undefined) return Math.min(...front);
  return open.joint(front, here, right, go);
}

/**
 * Segments of up to three rows put elsewhere, either way round, and stretches reversed, as long as the cheapest way
 * through the whole list (over all solutions, not those at present taken) gets cheaper.
 */
export function improvedByTrueCost(open: OpenMoves, start: readonly number[]): readonly number[] {
  let path = start;
  for (;;) {
    const next = movedSegment(open, path) ?? reversedStretch(open, path);
    if (next === null) return path;
    path = next;
  }
}

function costOf(open: OpenMoves, path: readonly number[]): number {
  return joined(open, undefined, undefined, path, undefined, undefined);
}

function movedSegment(open: OpenMoves, path: readonly number[]): readonly number[] | null {
  let least = costOf(open, path) - IMPROVES;
  let best = path;
  for (let length = 1; length <= Math.min(LONGEST_SEGMENT, path.length - 1); length += 1) {
    for (let i = 0; i + length <= path.length; i += 1) {
      const segment = path.slice(i, i + length);
      const rest = path.toSpliced(i, length);
      const { come, go } = frontsOf(open, rest);
      for (let gap = 0; gap <= rest.length; gap += 1) {
        for (const part of length === 1 ? [segment] : [segment, segment.toReversed()]) {
          const cost = joined(open, rest[gap - 1], come[gap - 1], part, rest[gap], go[gap]);
          if (cost < least) {
            least = cost;
            best = rest.toSpliced(gap, 0, ...part);
          }
        }
      }
    }
    if (best !== path) return best;
  }
  return null;
}

function reversedStretch(open: OpenMoves, path: readonly number[]): readonly number[] | null {
  const limit = costOf(open, path) - IMPROVES;
  const { come, go } = frontsOf(open, path);
  for (let i = 0; i < path.length - 1; i += 1) {
    for (let j = i + 1; j < path.length; j += 1) {
      const part = path.slice(i, j + 1).reverse();
      if (joined(open, path[i - 1], come[i - 1], part, path[j + 1], go[j + 1]) < limit)
        return path.toSpliced(i, part.length, ...part);
    }
  }
  return null;
}
