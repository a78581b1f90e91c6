import { type MountMove, mountMove } from './mount-move';
import type { SequenceProblem } from './problem';
import { type Course, readingsAt } from './stations';

/** What getting to one target takes. */
export interface SequenceStep {
  readonly travelDeg: number;
  /** Null when a mount's speed isn't stated. */
  readonly seconds: number | null;
  /** In beam order. */
  readonly perMount: readonly MountMove[];
}

/** A way through the targets in their order. */
export interface SequencePlan {
  /** Which solution of each target. */
  readonly choices: readonly number[];
  /** What to dial for each target: as displayed for a ring, on the stage's own count for a mount with a range. */
  readonly dialsDeg: readonly (readonly number[])[];
  readonly travelDeg: number;
  /** Null when a mount's speed isn't stated. */
  readonly seconds: number | null;
  /** The same for taking each target's first (or held) solution with its dials as listed. */
  readonly firstTravelDeg: number;
  readonly firstSeconds: number | null;
  /** One for each target. The first is the way from the present readings, all of it at rest if they aren't known. */
  readonly perStep: readonly SequenceStep[];
}

/** Which station of each target, in the order in which the course has them. */
export function planOf(course: Course, stations: readonly number[]): SequencePlan {
  const { problem, rows, mountCount, first } = course;
  const dialsDeg = stations.map((station, k) => {
    const row = rows[k];
    return row === undefined ? [] : readingsAt(row, station, mountCount);
  });
  const perStep = stepsThrough(problem, dialsDeg);
  const firstSteps = stepsThrough(
    problem,
    first.map((choice) => choice.dialsDeg),
  );
  return {
    choices: stations.map((station, k) => rows[k]?.branches[station] ?? 0),
    dialsDeg,
    ...totals(perStep),
    firstTravelDeg: totals(firstSteps).travelDeg,
    firstSeconds: totals(firstSteps).seconds,
    perStep,
  };
}

function stepsThrough(
  problem: SequenceProblem,
  dialsDeg: readonly (readonly number[])[],
): readonly SequenceStep[] {
  const { mounts, startDialsDeg } = problem;
  return dialsDeg.map((dials, k) => {
    const before = k === 0 ? startDialsDeg : dialsDeg[k - 1];
    const perMount = mounts.map((mount, m) => {
      const to = dials[m] ?? NaN;
      return mountMove(mount, before?.[m] ?? to, to);
    });
    return {
      travelDeg: perMount.reduce((sum, move) => sum + move.travelDeg, 0),
      seconds: stepSeconds(problem, perMount),
      perMount,
    };
  });
}

function stepSeconds({ mounts, moves }: SequenceProblem, perMount: readonly MountMove[]): number | null {
  let seconds = 0;
  for (const [m, { travelDeg }] of perMount.entries()) {
    const speed = mounts[m]?.speedDegPerS ?? null;
    if (speed === null) return null;
    const own = travelDeg / speed;
    seconds = moves === 'together' ? Math.max(seconds, own) : seconds + own;
  }
  return seconds;
}

function totals(steps: readonly SequenceStep[]): {
  readonly travelDeg: number;
  readonly seconds: number | null;
} {
  let travelDeg = 0;
  let seconds: number | null = 0;
  for (const step of steps) {
    travelDeg += step.travelDeg;
    seconds = seconds === null || step.seconds === null ? null : seconds + step.seconds;
  }
  return { travelDeg, seconds };
}
