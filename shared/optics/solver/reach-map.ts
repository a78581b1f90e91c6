import { asin, atan2, sincos } from '../elementary';
import type { Stokes } from '../stokes';
import { type Degrees, degrees, type Radians, radians, toDegrees, toRadians } from '../units';
import { distinctSettings, halfAngle } from './distinct-settings';
import { closestPair, exactPair, pairOf } from './pair';
import type { Setting } from './setting';
import { angleOfInfidelity, type AxesSetting, stateTask, type StateTask } from './state-task';

/** What two plates can do about the state at the centre of one cell of the sphere. */
export interface ReachCell {
  /** asin S3, twice the ellipticity; and the angle of (S1, S2), twice the azimuth, in [−180°, 180°). */
  readonly latitudeDeg: Degrees;
  readonly longitudeDeg: Degrees;
  /** Number of distinct settings that make it; 0 where out of reach, Infinity for a continuous family. */
  readonly settings: number;
  /** Angle on the sphere to the closest reachable state; 0 where reached. */
  readonly shortfallDeg: Degrees;
}

/** All cells of one latitude, from west to east. */
export interface ReachRow {
  readonly latitudeDeg: Degrees;
  /** Area of one cell of this row as a share of the sphere. */
  readonly cellShare: number;
  readonly cells: readonly ReachCell[];
}

/** Shares of the sphere's area by the number of settings at the cells' centres. */
export interface ReachTotals {
  readonly none: number;
  readonly two: number;
  readonly four: number;
  /** Families and the edges where settings merge. */
  readonly other: number;
  /** The largest shortfall that was met, at a cell's centre, a pole, or up the slope from the worst of those; 0 if none. */
  readonly largestShortfallDeg: Degrees;
  /** Where; null if everything that was looked at is in reach. */
  readonly worst: Stokes | null;
}

export interface ReachMap {
  readonly rows: readonly ReachRow[];
  readonly totals: ReachTotals;
}

const DEFAULT_STEP_DEG = 5;

/**
 * Yields the map of what two plates reach row by row, from S3 = −1 up, so that a worker can say how far it is and be stopped;
 * its return value is the totals. Canonical frame, plates in beam order. A hole in reach that is smaller than a cell is seen
 * only when it lies at a pole, as it does for linear light through a half- and a quarter-wave plate.
 * @throws RangeError unless 180° is a whole number of steps, and as `prepare`.
 */
export function* reachRows(
  input: Stokes,
  retardancesRad: readonly [Radians, Radians],
  stepDeg: number = DEFAULT_STEP_DEG,
): Generator<ReachRow, ReachTotals, undefined> {
  const count = Math.round(180 / stepDeg);
  if (!(count >= 1) || Math.abs(count * stepDeg - 180) > 1e-9) {
    throw new RangeError(`a step of ${stepDeg} degrees does not divide 180 degrees`);
  }
  const task = stateTask(input, [0, 0, 1], retardancesRad);
  const shares = { none: 0, two: 0, four: 0, other: 0 };
  let worst: ReachCell | null = null;
  for (let row = 0; row < count; row += 1) {
    const latitudeDeg = degrees(-90 + (row + 0.5) * stepDeg);
    const [south, north] = [latitudeDeg - stepDeg / 2, latitudeDeg + stepDeg / 2].map(
      (edge) => sincos(toRadians(degrees(edge))).sin,
    );
    const cellShare = ((north ?? 1) - (south ?? -1)) / (4 * count);
    const cells = Array.from({ length: 2 * count }, (_, column) =>
      reachAt(task, latitudeDeg, degrees(-180 + (column + 0.5) * stepDeg)),
    );
    for (const cell of cells) {
      shares[shareOf(cell)] += cellShare;
      worst = further(worst, cell);
    }
    yield { latitudeDeg, cellShare, cells };
  }
  for (const latitudeDeg of [-90, 90])
    worst = further(worst, reachAt(task, degrees(latitudeDeg), degrees(0)));
  const summit = worst === null || worst.shortfallDeg === 0 ? null : climb(task, worst, stepDeg / 2);
  return {
    ...shares,
    largestShortfallDeg: summit?.shortfallDeg ?? degrees(0),
    worst: summit === null ? null : stateOf(summit.latitudeDeg, summit.longitudeDeg),
  };
}

/** The whole map at once: some tens of milliseconds for the step of 5°. */
export function reachMap(
  input: Stokes,
  retardancesRad: readonly [Radians, Radians],
  stepDeg: number = DEFAULT_STEP_DEG,
): ReachMap {
  const steps = reachRows(input, retardancesRad, stepDeg);
  const rows: ReachRow[] = [];
  for (;;) {
    const step = steps.next();
    if (step.done === true) return { rows, totals: step.value };
    rows.push(step.value);
  }
}

function reachAt(task: StateTask, latitudeDeg: Degrees, longitudeDeg: Degrees): ReachCell {
  const pair = pairOf({ ...task, to: stateOf(latitudeDeg, longitudeDeg) });
  const exact = exactPair(pair);
  if (exact.found.length > 0) {
    const settings = exact.family ? Infinity : distinctSettings(exact.found.map(setting)).length;
    return { latitudeDeg, longitudeDeg, settings, shortfallDeg: degrees(0) };
  }
  let least = 1;
  for (const { infidelity } of closestPair(pair).found) least = Math.min(least, infidelity);
  return { latitudeDeg, longitudeDeg, settings: 0, shortfallDeg: toDegrees(angleOfInfidelity(least)) };
}

function setting({ axes, infidelity }: AxesSetting): Setting {
  return { fastAxesRad: axes.map(halfAngle), infidelity };
}

function shareOf({ settings }: ReachCell): 'none' | 'two' | 'four' | 'other' {
  if (settings === 0) return 'none';
  return settings === 2 ? 'two' : settings === 4 ? 'four' : 'other';
}

function further(one: ReachCell | null, other: ReachCell): ReachCell {
  return one === null || other.shortfallDeg > one.shortfallDeg ? other : one;
}

function stateOf(latitudeDeg: Degrees, longitudeDeg: Degrees): Stokes {
  const latitude = sincos(toRadians(latitudeDeg));
  const longitude = sincos(toRadians(longitudeDeg));
  return [latitude.cos * longitude.cos, latitude.cos * longitude.sin, latitude.sin];
}

const CLOSE_ENOUGH_DEG = 1e-5;

// The better of four neighbours on the sphere until there is none, then half the distance.
function climb(task: StateTask, from: ReachCell, stepDeg: number): ReachCell {
  let best = from;
  let step = stepDeg;
  while (step > CLOSE_ENOUGH_DEG) {
    const [s1, s2, s3] = stateOf(best.latitudeDeg, best.longitudeDeg);
    const { sin, cos } = sincos(toRadians(best.longitudeDeg));
    const by = sincos(toRadians(degrees(step)));
    const east: Stokes = [-sin, cos, 0];
    const north: Stokes = [-s3 * cos, -s3 * sin, s1 * cos + s2 * sin];
    let next = best;
    for (const [along, sign] of [
      [east, 1],
      [east, -1],
      [north, 1],
      [north, -1],
    ] as const) {
      const [t1, t2, t3] = [s1, s2, s3].map((part, k) => by.cos * part + sign * by.sin * (along[k] ?? 0));
      const latitudeDeg = toDegrees(radians(asin(t3 ?? 0)));
      next = further(next, reachAt(task, latitudeDeg, toDegrees(radians(atan2(t2 ?? 0, t1 ?? 1)))));
    }
    if (next === best) step /= 2;
    else best = next;
  }
  return best;
}
