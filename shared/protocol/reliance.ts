import type { Convention } from '../optics/convention';
import { finish } from '../optics/sequence';
import { evaluateDials } from '../optics/solve-target';
import { wrapSigned } from '../optics/units';
import { notReadySentences } from '../bench-ready';
import type { Bench } from '../schemas/benches';
import type { Plate } from '../schemas/cabinet';
import type { RelianceReport, RelianceTally, RelianceTarget } from '../schemas/reliance';
import type { FrozenPlate, FrozenTarget, VersionContent } from '../schemas/versions';
import { type ChoosingRow, chooseSolutionsSteps } from './choose-solutions';
import { benchProblem, type RowProblem, solveRow } from './solve-row';
import { usedRetardance } from './solving-plates';
import { voidsOf } from './voids';

/** What a version relies on, as it stands now. */
export interface RelianceNow {
  /** The version's bench. */
  readonly bench: Bench;
  /** The lab's: the bench's input is written in it. */
  readonly convention: Convention;
  /** Those of the version's plates that have left the seat in which the version's zero was measured. */
  readonly unseatedPlateIds: ReadonlySet<string>;
}

/**
 * What a version's dials make now and what a re-solve would: with the plates as calibrated by then and now, to the same
 * numbers as the version and its run would have (optics.md 8, stale angles).
 */
export function reliance(content: VersionContent, now: RelianceNow): RelianceReport {
  return finish(relianceSteps(content, now));
}

/** `reliance` a row at a time; yields how many rows are done. */
export function* relianceSteps(content: VersionContent, now: RelianceNow): Generator<number, RelianceReport> {
  const { bench, convention } = now;
  const voids = voidsOf(content, now);
  const frozen = content.targets.map(frozenInfidelity);
  const faced = benchProblem(bench, convention, {
    ...content,
    // The dials of other plates say nothing of where these stand.
    presentDialsDeg: voids.length === 0 ? content.presentDialsDeg : null,
  });
  const waits = notReadySentences(bench, 'preparation');
  if (!faced.ok) {
    waits.push(
      `The input of ${bench.name} cannot be read. Column ${faced.error.column}: ${faced.error.message}`,
    );
  }
  const problem = faced.ok && bench.plates.length > 0 ? faced.problem : null;
  const resolved = problem === null ? null : yield* resolve(content, problem, voids.length === 0);
  const targets = content.targets.map((target, row): RelianceTarget => {
    const again = resolved?.[row];
    return {
      label: target.label,
      frozen: frozen[row] ?? 1,
      oldDials: problem === null || voids.length > 0 ? null : dialledNow(target, problem),
      resolved: again?.infidelity ?? null,
      shortfallDeg: again?.shortfallDeg ?? null,
    };
  });
  const plates = content.bench.plates.map((plate) => plateSince(plate, now));
  return {
    stale:
      voids.length > 0 ||
      plates.some(({ change }) => change !== 'same') ||
      targets.some(({ oldDials, frozen: before }) => oldDials !== null && oldDials !== before),
    voids,
    waits,
    plates,
    toleranceInfidelity: content.toleranceInfidelity,
    frozen: tallyOf(content, frozen),
    oldDials: tallyOf(
      content,
      targets.map(({ oldDials }) => oldDials),
    ),
    resolved: tallyOf(
      content,
      targets.map(({ resolved: again }) => again),
    ),
    targets,
  };
}

function frozenInfidelity({ solutions, chosenSolution }: FrozenTarget): number {
  return solutions[chosenSolution]?.dialledInfidelity ?? 1;
}

function dialledNow(
  { goal, solutions, chosenSolution }: FrozenTarget,
  { plates, input }: RowProblem,
): number | null {
  const dialsDeg = solutions[chosenSolution]?.dialsDeg;
  if (dialsDeg === undefined) return null;
  const asked =
    goal.kind === 'state'
      ? ({ kind: 'prepare', input, target: goal.stokes } as const)
      : ({ kind: 'apply', target: unitaryOf(goal.quaternion) } as const);
  return evaluateDials({ goal: asked, plates }, dialsDeg).infidelity;
}

function unitaryOf([w, x, y, z]: readonly [number, number, number, number]) {
  return { w, x, y, z };
}

interface Resolved {
  readonly infidelity: number;
  readonly shortfallDeg: number;
}

/** The rows as a draft made of the version would be solved: by its own objective, holding what it held. */
function* resolve(
  content: VersionContent,
  problem: RowProblem,
  sameBeam: boolean,
): Generator<number, readonly (Resolved | null)[]> {
  const rows: (Extract<ReturnType<typeof solveRow>, { status: 'solved' }> & ChoosingRow)[] = [];
  for (const [row, target] of content.targets.entries()) {
    yield row;
    const held =
      sameBeam && target.held ? (target.solutions[target.chosenSolution]?.fastAxesDeg ?? null) : null;
    const result = solveRow(target.expression, problem, content.convention, held);
    // A version's expression could be read when it was saved; a later grammar may not.
    if (result.status === 'unreadable') return content.targets.map(() => null);
    rows.push({ ...result, heldFastAxesDeg: held });
  }
  const choosing = chooseSolutionsSteps(rows, problem);
  for (let step = choosing.next(); ; step = choosing.next()) {
    if (step.done === true) {
      return step.value.choices.map(({ dialledInfidelity }, place) => ({
        infidelity: dialledInfidelity,
        shortfallDeg: rows[place]?.solved.shortfallDeg ?? 0,
      }));
    }
    yield rows.length;
  }
}

function plateSince(
  frozen: FrozenPlate,
  { bench, unseatedPlateIds }: RelianceNow,
): RelianceReport['plates'][number] {
  const { id, name } = frozen;
  const nothing = {
    plateId: id,
    plateName: name,
    zeroShiftDeg: null,
    zeroShiftSigmaDeg: null,
    retardanceShiftDeg: null,
  };
  if (!bench.order.some(({ plateId, part }) => plateId === id && part === 'preparation')) {
    return { ...nothing, change: 'not-in-beam' };
  }
  if (unseatedPlateIds.has(id)) return { ...nothing, change: 'seat-ended' };
  const present = bench.plates.find((plate) => plate.id === id);
  if (present === undefined || present.calibration.id === frozen.calibration.id) {
    return { ...nothing, change: 'same' };
  }
  return { ...nothing, change: 'recalibrated', ...shiftOf(frozen, present, bench) };
}

function shiftOf(frozen: FrozenPlate, present: Plate, bench: Bench) {
  const [before, after] = [frozen.calibration, present.calibration];
  return {
    zeroShiftDeg: wrapSigned(after.offsetDeg - before.offsetDeg, 180),
    zeroShiftSigmaDeg: Math.sqrt(
      before.offsetSigmaDeg * before.offsetSigmaDeg + after.offsetSigmaDeg * after.offsetSigmaDeg,
    ),
    retardanceShiftDeg: usedRetardance(present, bench).retardanceDeg - frozen.used.retardanceDeg,
  };
}

/** @returns null where one of the values cannot be told. */
function tallyOf(content: VersionContent, values: readonly number[]): RelianceTally;
function tallyOf(content: VersionContent, values: readonly (number | null)[]): RelianceTally | null;
function tallyOf(content: VersionContent, values: readonly (number | null)[]): RelianceTally | null {
  let out = 0;
  let worst: RelianceTally['worst'] | null = null;
  for (const [index, value] of values.entries()) {
    if (value === null) return null;
    if (value > content.toleranceInfidelity) out += 1;
    if (worst === null || value > worst.infidelity) {
      worst = { row: index + 1, label: content.targets[index]?.label ?? '', infidelity: value };
    }
  }
  return worst === null ? null : { within: values.length - out, out, worst };
}
