import { wrap } from '../units';
import { finish } from './cheapest-way';
import { type MoveCost, moveCostOf, type Stations } from './move-cost';
import { nearestReading, readingsFor } from './mount-move';
import {
  checkSequence,
  type MountMotion,
  type SequenceProblem,
  TooManyStationsError,
  UnreachableRowError,
} from './problem';

/**
 * More stations than this for one target are refused: a stage that counts on through hundreds of turns. Six rings and
 * eight solutions make 512.
 */
const MOST_STATIONS = 8192;

/** A problem made ready for the inner loops. */
export interface Course {
  readonly problem: SequenceProblem;
  readonly mountCount: number;
  readonly rows: readonly Stations[];
  /** A row of one station, or null when the start isn't known. */
  readonly start: Stations | null;
  /** What taking each target's first (or held) solution as listed dials. */
  readonly first: readonly FirstChoice[];
  /** What is to be least. */
  readonly cost: MoveCost;
  /** Degrees turned, whatever is to be least. */
  readonly travel: MoveCost;
}

interface FirstChoice {
  readonly branch: number;
  readonly dialsDeg: readonly number[];
}

/**
 * @throws RangeError for a problem that makes no sense; UnreachableRowError for a target that can't be dialled,
 * TooManyStationsError for one that can be in too many ways.
 */
export function courseOf(problem: SequenceProblem): Course {
  return finish(courseSteps(problem));
}

/** `courseOf` a row at a time. */
export function* courseSteps(problem: SequenceProblem): Generator<undefined, Course> {
  checkSequence(problem);
  const { mounts, startDialsDeg, cost, moves } = problem;
  const laid: LaidRow[] = [];
  for (const row of problem.rows.keys()) {
    laid.push(layRow(problem, row));
    yield;
  }
  return {
    problem,
    mountCount: mounts.length,
    rows: laid.map(({ stations }) => stations),
    start:
      startDialsDeg === null
        ? null
        : stationsOf([0], [mounts.map((mount, k) => [startReading(mount, startDialsDeg[k] ?? NaN)])]),
    first: laid.map(({ first }) => first),
    cost: moveCostOf(mounts, cost, moves),
    travel: moveCostOf(mounts, 'travel', moves),
  };
}

function startReading({ rangeDeg }: MountMotion, readingDeg: number): number {
  return rangeDeg === null ? wrap(readingDeg, 360) : readingDeg;
}

interface LaidRow {
  readonly stations: Stations;
  readonly first: FirstChoice;
}

function layRow({ mounts, rows }: SequenceProblem, row: number): LaidRow {
  const { branches = [], held = null } = rows[row] ?? {};
  const dialled: number[] = [];
  const lists: (readonly (readonly number[])[])[] = [];
  let first: FirstChoice | null = null;
  let blocked: number | null = null;
  let count = 0;
  for (const [branch, axes] of branches.entries()) {
    if (held !== null && branch !== held) continue;
    const readings = mounts.map((mount, k) => readingsFor(mount, axes[k] ?? NaN));
    const missing = readings.findIndex((list) => list.length === 0);
    if (missing >= 0) {
      blocked ??= missing;
      continue;
    }
    first ??= {
      branch,
      dialsDeg: mounts.map((mount, k) => nearestReading(mount, readings[k] ?? [], axes[k] ?? NaN) ?? NaN),
    };
    count += readings.reduce((product, list) => product * list.length, 1);
    if (count > MOST_STATIONS) throw new TooManyStationsError(row, MOST_STATIONS);
    dialled.push(branch);
    lists.push(readings);
  }
  if (first === null) throw new UnreachableRowError(row, blocked ?? 0);
  return { stations: stationsOf(dialled, lists), first };
}

function stationsOf(
  branches: readonly number[],
  lists: readonly (readonly (readonly number[])[])[],
): Stations {
  const places = lists.flatMap((readings, k) =>
    combinations(readings).map((dialsDeg) => ({ branch: branches[k] ?? 0, dialsDeg })),
  );
  const mountCount = lists[0]?.length ?? 0;
  const readings = Array.from({ length: mountCount }, (_, k) => [
    ...new Set(lists.flatMap((perMount) => perMount[k] ?? [])),
  ]);
  return {
    count: places.length,
    branches: Int32Array.from(places, ({ branch }) => branch),
    readingsDeg: Float64Array.from(places.flatMap(({ dialsDeg }) => dialsDeg)),
    lists,
    readings: readings.map((list) => Float64Array.from(list)),
    readingIndices: Int32Array.from(
      places.flatMap(({ dialsDeg }) => dialsDeg.map((reading, k) => readings[k]?.indexOf(reading) ?? 0)),
    ),
  };
}

function combinations(lists: readonly (readonly number[])[]): readonly (readonly number[])[] {
  return lists.reduce<readonly (readonly number[])[]>(
    (heads, list) => heads.flatMap((head) => list.map((reading) => [...head, reading])),
    [[]],
  );
}

/** The readings of one station. */
export function readingsAt({ readingsDeg }: Stations, index: number, mountCount: number): readonly number[] {
  return [...readingsDeg.subarray(index * mountCount, (index + 1) * mountCount)];
}
