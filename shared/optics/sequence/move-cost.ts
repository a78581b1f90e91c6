import { moveTravelDeg, playExtrasDeg } from './mount-move';
import type { MountMotion, SequenceProblem } from './problem';

/**
 * Places where the dials can stand for one target. A station is one solution and, for each mount, one of its readings
 * for it.
 */
export interface Stations {
  readonly count: number;
  /** Which solution each station belongs to. */
  readonly branches: Int32Array;
  /** Station after station, mount after mount. */
  readonly readingsDeg: Float64Array;
  /** For each solution that can be dialled, each mount's readings: the stations are all their combinations. */
  readonly lists: readonly (readonly (readonly number[])[])[];
  /** Each mount's readings over all solutions, mount by mount, and where each station's stand in them. */
  readonly readings: readonly Float64Array[];
  readonly readingIndices: Int32Array;
}

/** What a move costs, in degrees or in seconds. */
export interface MoveCost {
  /** Between two stations. */
  readonly between: (from: Stations, fromIndex: number, to: Stations, toIndex: number) => number;
  /** The same for all moves between two targets, looked up instead of computed. */
  readonly tabled: (from: Stations, to: Stations) => MoveTable;
  /** The least between any station of one target and any of another. */
  readonly least: (from: Stations, to: Stations) => number;
}

/**
 * Every mount's cost from every reading of one target to every reading of another, in one list. A move from station a
 * to station b costs Σ (or max) over mounts k of costs[rows[a·n + k] + columns[b·n + k]], n mounts.
 */
export interface MoveTable {
  readonly costs: Float64Array;
  readonly rows: Int32Array;
  readonly columns: Int32Array;
  readonly isLongest: boolean;
}

/** One mount's move as numbers only. */
interface Mover {
  readonly isRing: boolean;
  readonly risingExtraDeg: number;
  readonly fallingExtraDeg: number;
  /** Cost of a degree: 1 for travel, seconds for time. */
  readonly perDegree: number;
}

export function moveCostOf(
  mounts: readonly MountMotion[],
  cost: SequenceProblem['cost'],
  moves: SequenceProblem['moves'],
): MoveCost {
  const movers = mounts.map((mount): Mover => {
    const extra = playExtrasDeg(mount);
    return {
      isRing: mount.rangeDeg === null,
      risingExtraDeg: extra.rising,
      fallingExtraDeg: extra.falling,
      perDegree: cost === 'travel' ? 1 : 1 / (mount.speedDegPerS ?? NaN),
    };
  });
  const isLongest = cost === 'time' && moves === 'together';
  return {
    between: (from, fromIndex, to, toIndex) => {
      const count = movers.length;
      const [a, b] = [fromIndex * count, toIndex * count];
      let total = 0;
      for (let k = 0; k < count; k += 1) {
        const mover = movers[k];
        if (mover === undefined) continue;
        const own = moverCost(mover, (to.readingsDeg[b + k] ?? 0) - (from.readingsDeg[a + k] ?? 0));
        if (!isLongest) total += own;
        else if (own > total) total = own;
      }
      return total;
    },
    tabled: (from, to) => tableOf(movers, isLongest, from, to),
    // Readings of different mounts are free of each other, so the least sum (or longest) is that of the least parts.
    least: (from, to) => {
      let least = Infinity;
      for (const here of from.lists) {
        for (const there of to.lists) {
          let total = 0;
          for (const [k, mover] of movers.entries()) {
            const own = leastMove(mover, here[k] ?? [], there[k] ?? []);
            total = isLongest ? Math.max(total, own) : total + own;
          }
          if (total < least) least = total;
        }
      }
      return least;
    },
  };
}

function moverCost(mover: Mover, changeDeg: number): number {
  const { isRing, risingExtraDeg, fallingExtraDeg, perDegree } = mover;
  return perDegree * moveTravelDeg(isRing, risingExtraDeg, fallingExtraDeg, changeDeg);
}

function leastMove(mover: Mover, from: readonly number[], to: readonly number[]): number {
  let least = Infinity;
  for (const a of from) for (const b of to) least = Math.min(least, moverCost(mover, b - a));
  return least;
}

function tableOf(movers: readonly Mover[], isLongest: boolean, from: Stations, to: Stations): MoveTable {
  const count = movers.length;
  const size = movers.reduce(
    (sum, _, k) => sum + (from.readings[k]?.length ?? 0) * (to.readings[k]?.length ?? 0),
    0,
  );
  const costs = new Float64Array(size);
  const rows = new Int32Array(from.count * count);
  let offset = 0;
  for (const [k, mover] of movers.entries()) {
    const [here, there] = [from.readings[k] ?? new Float64Array(0), to.readings[k] ?? new Float64Array(0)];
    for (let a = 0; a < from.count; a += 1) {
      rows[a * count + k] = offset + (from.readingIndices[a * count + k] ?? 0) * there.length;
    }
    for (const reading of here) {
      for (const next of there) {
        costs[offset] = moverCost(mover, next - reading);
        offset += 1;
      }
    }
  }
  return { costs, rows, columns: to.readingIndices, isLongest };
}

/** One entry of a table. */
export function tabledCost(
  { costs, rows, columns, isLongest }: MoveTable,
  mountCount: number,
  from: number,
  to: number,
): number {
  const [a, b] = [from * mountCount, to * mountCount];
  let total = 0;
  for (let k = 0; k < mountCount; k += 1) {
    const own = costs[(rows[a + k] ?? 0) + (columns[b + k] ?? 0)] ?? 0;
    if (!isLongest) total += own;
    else if (own > total) total = own;
  }
  return total;
}
