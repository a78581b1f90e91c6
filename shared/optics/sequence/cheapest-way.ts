import { type Stations, tabledCost } from './move-cost';
import type { Course } from './stations';

/** Costs this close are equal, and the tie goes to less travel, then to solutions further up their lists. */
const TIE = 1e-9;
/** Weight of a place further down a target's list, in degrees of travel: a tie-breaker and nothing else. */
const RANK_WEIGHT = 1e-6;

/** The stations passed, one for each row, and what the way costs. */
export interface Way {
  readonly stations: readonly number[];
  readonly cost: number;
}

/** The best way to every station of one row. */
interface Front {
  readonly cost: Float64Array;
  readonly second: Float64Array;
  /** Station of the row before. */
  readonly from: Int32Array;
  /** Stations by rising cost: a search among them can stop at the first that is too dear by itself. */
  readonly byCost: Int32Array;
}

/**
 * The cheapest way through rows in a given order (indices into the course's rows): dynamic programming over all their
 * stations, exact. Yields the number of rows done.
 */
export function* cheapestWay(course: Course, order: readonly number[]): Generator<number, Way> {
  const fronts: Front[] = [];
  let before: Stations | null = course.start;
  for (const index of order) {
    const row = course.rows[index];
    if (row === undefined) throw new RangeError(`there is no row ${index}`);
    fronts.push(advance(course, before, fronts.at(-1) ?? null, row));
    before = row;
    yield fronts.length;
  }
  const last = fronts.at(-1);
  if (last === undefined) return { stations: [], cost: 0 };
  let station = last.byCost[0] ?? 0;
  const lowest = last.cost[station] ?? 0;
  for (const other of last.byCost) {
    if ((last.cost[other] ?? 0) > lowest + TIE) break;
    const apart = (last.second[other] ?? 0) - (last.second[station] ?? 0);
    if (apart < -TIE || (Math.abs(apart) <= TIE && other < station)) station = other;
  }
  const stations: number[] = [];
  for (const front of fronts.toReversed()) {
    stations.push(station);
    station = front.from[station] ?? 0;
  }
  return { stations: stations.reverse(), cost: lowest };
}

function advance(course: Course, before: Stations | null, front: Front | null, row: Stations): Front {
  const cost = new Float64Array(row.count);
  const second = new Float64Array(row.count);
  const from = new Int32Array(row.count);
  if (before !== null) {
    const candidates = front ?? atStart();
    const { mountCount } = course;
    const table = course.cost.tabled(before, row);
    // Only a tie in time is broken by travel; where travel is the cost, there is nothing more to compare.
    const travel = course.problem.cost === 'time' ? course.travel.tabled(before, row) : null;
    for (let to = 0; to < row.count; to += 1) {
      let best = Infinity;
      let bestSecond = Infinity;
      let bestFrom = 0;
      for (const station of candidates.byCost) {
        const sofar = candidates.cost[station] ?? 0;
        if (sofar > best + TIE) break;
        const total = sofar + tabledCost(table, mountCount, station, to);
        if (total > best + TIE) continue;
        const also = travel === null ? 0 : tabledCost(travel, mountCount, station, to);
        const totalSecond = (candidates.second[station] ?? 0) + also;
        if (total < best - TIE || totalSecond < bestSecond - TIE) {
          best = total;
          bestSecond = totalSecond;
          bestFrom = station;
        }
      }
      cost[to] = best;
      second[to] = bestSecond;
      from[to] = bestFrom;
    }
  }
  for (let to = 0; to < row.count; to += 1) {
    second[to] = (second[to] ?? 0) + RANK_WEIGHT * (row.branches[to] ?? 0);
  }
  const byCost = Int32Array.from({ length: row.count }, (_, k) => k).sort(
    (a, b) => (cost[a] ?? 0) - (cost[b] ?? 0) || a - b,
  );
  return { cost, second, from, byCost };
}

// The one station where the dials stand before the first target.
function atStart(): Omit<Front, 'from'> {
  return { cost: new Float64Array(1), second: new Float64Array(1), byCost: new Int32Array(1) };
}

/** Runs a generator to its end. */
export function finish<Result>(steps: Generator<unknown, Result>): Result {
  for (;;) {
    const step = steps.next();
    if (step.done === true) return step.value;
  }
}
