import { seededStream } from '../uniform-stream';
import { cheapestWay, finish, type Way } from './cheapest-way';
import type { Stations } from './move-cost';
import type { Course } from './stations';
import { improvedByTrueCost, isTrueCostFeasible, OpenMoves } from './true-moves';
import { improvedPath, nearestNeighbourPath, pathCost, type PathCosts } from './visiting-order';

const IMPROVES = 1e-9;
const KICKS = 400;
/** Solutions are chosen anew after every kick in lists of up to this many targets … */
const CHOOSES_ALWAYS_UP_TO = 40;
/** … and after this many kicks in longer ones, where choosing takes longer than a kick is worth. */
const KICKS_BETWEEN_CHOICES = 40;
/** The same with every solution open, which is dear: as many as this work allows, a kick costing the square of the rows. */
const TRUE_KICK_WORK = 4000;
const MOST_TRUE_KICKS = 20;
/** First rows tried for the nearest-neighbour order when the start isn't known. */
const FREE_STARTS = 8;
const SEED = 20_011;

/** An order with the stations that are cheapest in it. */
interface Candidate extends Way {
  readonly order: readonly number[];
}

/**
 * A good order, never dearer than the present one: from the present and the nearest-neighbour orders, stretches
 * reversed, segments moved, single rows put elsewhere with another solution, and the solutions chosen anew by dynamic
 * programming, until nothing helps; then seeded kicks (three cuts, middle parts swapped) in the same way, and in lists of
 * tens the same moves with every solution left open. The number of kicks depends on the list only, so the same input
 * gives the same order. Yields the share done.
 * @param least `leastCosts` of the course.
 */
export function* improvedOrder(
  course: Course,
  least: readonly Float64Array[],
): Generator<number, readonly number[]> {
  const present = course.rows.map((_, k) => k);
  let best = settle(course, least, present);
  yield 0.05;
  const firsts =
    course.start === null ? present.filter((k) => k % Math.ceil(present.length / FREE_STARTS) === 0) : [null];
  for (const first of firsts) {
    const order = nearestNeighbourPath(leastAsPath(least), first);
    const found = settle(course, least, order);
    if (found.cost < best.cost - IMPROVES) best = found;
    yield 0.1;
  }
  const random = seededStream(SEED);
  let costs = fixedCosts(course, best);
  let path: readonly number[] = best.order;
  const kicksBetween = present.length <= CHOOSES_ALWAYS_UP_TO ? 1 : KICKS_BETWEEN_CHOICES;
  for (let kick = 1; kick <= KICKS; kick += 1) {
    const tried = improvedPath(costs, kicked(path, random));
    // With the solutions as they are, only what is cheaper helps; where they are chosen anew at once, anything may.
    if (kicksBetween === 1 || pathCost(costs, tried) < pathCost(costs, path) - IMPROVES) path = tried;
    if (kick % kicksBetween === 0 && path !== best.order) {
      const found = settle(course, least, path);
      if (found.cost < best.cost - IMPROVES) {
        best = found;
        costs = fixedCosts(course, best);
      }
      path = best.order;
    }
    yield 0.1 + (0.5 * kick) / KICKS;
  }
  if (!isTrueCostFeasible(course)) return best.order;
  const open = new OpenMoves(course);
  const trueKicks = Math.min(MOST_TRUE_KICKS, Math.floor(TRUE_KICK_WORK / (present.length * present.length)));
  for (let kick = 0; kick <= trueKicks; kick += 1) {
    const order = improvedByTrueCost(open, kick === 0 ? best.order : kicked(best.order, random));
    const found: Candidate = { order, ...finish(cheapestWay(course, order)) };
    if (found.cost < best.cost - IMPROVES) best = found;
    yield 0.6 + (0.4 * kick) / Math.max(1, trueKicks);
  }
  return best.order;
}

function leastAsPath(least: readonly Float64Array[]): PathCosts {
  const places = least.length - 1;
  const cost = new Float64Array((places + 1) * (places + 1));
  least.forEach((row, i) => cost.set(row, i * (places + 1)));
  return { places, cost };
}

/** The costs between rows when each stands at the station that a way gives it. */
function fixedCosts({ rows, start, cost }: Course, { order, stations }: Candidate): PathCosts {
  const places = rows.length;
  const station = new Int32Array(places);
  order.forEach((row, k) => (station[row] = stations[k] ?? 0));
  const costs = new Float64Array((places + 1) * (places + 1));
  rows.forEach((to, j) => {
    const at = station[j] ?? 0;
    rows.forEach((from, i) => {
      if (i !== j) costs[i * (places + 1) + j] = cost.between(from, station[i] ?? 0, to, at);
    });
    if (start !== null) costs[places * (places + 1) + j] = cost.between(start, 0, to, at);
  });
  return { places, cost: costs };
}

// Every improvement there is, until none is left.
function settle(course: Course, least: readonly Float64Array[], order: readonly number[]): Candidate {
  let best: Candidate = { order, ...finish(cheapestWay(course, order)) };
  for (;;) {
    const improved = improvedPath(fixedCosts(course, best), best.order);
    const next = moveOneRow(course, least, improved, best) ?? improved;
    const found: Candidate = { order: next, ...finish(cheapestWay(course, next)) };
    if (found.cost >= best.cost - IMPROVES) return best;
    best = found;
  }
}

/**
 * One row taken out and put where it is cheapest with whichever of its stations, the others staying at theirs; every
 * row in turn. Null when none gained.
 */
function moveOneRow(
  { rows, start, cost }: Course,
  least: readonly Float64Array[],
  improved: readonly number[],
  { order, stations }: Candidate,
): readonly number[] | null {
  const station = new Int32Array(rows.length);
  order.forEach((row, k) => (station[row] = stations[k] ?? 0));
  const between = (from: number | undefined, to: number | undefined): number => {
    const there = to === undefined ? undefined : rows[to];
    const here = from === undefined ? start : (rows[from] ?? null);
    if (here === null || there === undefined || to === undefined) return 0;
    return cost.between(here, from === undefined ? 0 : (station[from] ?? 0), there, station[to] ?? 0);
  };
  const through = (from: number | undefined, row: Stations, at: number, to: number | undefined): number => {
    const here = from === undefined ? start : (rows[from] ?? null);
    const there = to === undefined ? undefined : rows[to];
    const come =
      here === null ? 0 : cost.between(here, from === undefined ? 0 : (station[from] ?? 0), row, at);
    return (
      come + (there === undefined || to === undefined ? 0 : cost.between(row, at, there, station[to] ?? 0))
    );
  };
  let path = [...improved];
  let gained = false;
  for (const moving of improved) {
    const row = rows[moving];
    const at = path.indexOf(moving);
    if (row === undefined) continue;
    const [before, after] = [path[at - 1], path[at + 1]];
    let least2 = between(before, moving) + between(moving, after) - between(before, after) - IMPROVES;
    let place: { readonly gap: number; readonly station: number } | null = null;
    const rest = path.toSpliced(at, 1);
    for (let gap = 0; gap <= rest.length; gap += 1) {
      const [left, right] = [rest[gap - 1], rest[gap]];
      const link = between(left, right);
      const floor =
        (least[left ?? rows.length]?.[moving] ?? 0) +
        (right === undefined ? 0 : (least[moving]?.[right] ?? 0));
      if (floor - link >= least2) continue;
      for (let s = 0; s < row.count; s += 1) {
        const added = through(left, row, s, right) - link;
        if (added < least2) {
          least2 = added;
          place = { gap, station: s };
        }
      }
    }
    if (place !== null) {
      path = rest.toSpliced(place.gap, 0, moving);
      station[moving] = place.station;
      gained = true;
    }
  }
  return gained ? path : null;
}

// Cut in four at three seeded places near each other; the two middle parts change places.
function kicked(path: readonly number[], random: () => number): readonly number[] {
  const window = Math.min(path.length, 50);
  const from = Math.floor(random() * (path.length - window + 1));
  const [a, b, c] = [0, 1, 2].map(() => from + Math.floor(random() * (window + 1))).sort((x, y) => x - y);
  return [...path.slice(0, a), ...path.slice(b, c), ...path.slice(a, b), ...path.slice(c)];
}
