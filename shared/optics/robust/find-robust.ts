import type { Goal } from '../goal';
import type { Retarder } from '../retarder';
import { seededStream } from '../uniform-stream';
import { type Radians, radians, wrap } from '../units';
import { conditionsFor } from './conditions';
import { descendFrom, type Found, isOneOfFamily } from './descend';
import { type CurvePoint, infidelityCurve, type Robustness, robustnessOf, VANISHES } from './robustness';

/** What composite settings are wanted for. */
export interface RobustProblem {
  readonly goal: Goal;
  /** Two to six plates in beam order, any retardances. */
  readonly retardancesRad: readonly Radians[];
  /**
   * Change of each retardance per unit of the error: the retardance itself for a relative error common to all, rad/nm for
   * the wavelength.
   */
  readonly errorPerUnitRad: readonly number[];
  /** Errors from −width to width are to do little; in the unit of the error, above 0. */
  readonly width: number;
  /** Seeded starting points; more find more. */
  readonly starts: number;
  readonly seed: number;
  /** The setting to compare with: the plain one. Its plates need not be the same. */
  readonly plain?: PlainSetting;
  /** Errors at which the curves are wanted; 41 evenly from −2 width to 2 width when left out. */
  readonly curveAt?: readonly number[];
  /** Most results wanted; 24 when left out. */
  readonly limit?: number;
}

export interface PlainSetting {
  readonly plates: readonly Retarder[];
  readonly errorPerUnitRad: readonly number[];
}

export interface RobustSetting extends Robustness {
  /** In beam order, each in [0, π). */
  readonly fastAxesRad: readonly Radians[];
  /**
   * cancels-first-order: the goal is met at no error and the first derivative vanishes. reduces: the least average there
   * is otherwise, with the goal met where the plates can.
   */
  readonly effect: 'cancels-first-order' | 'reduces';
  /** Whether the goal is met at no error (to rounding). */
  readonly meetsGoal: boolean;
  /** One of a continuous family that does equally well; the others aren't listed. */
  readonly isOneOfFamily: boolean;
  readonly curve: readonly CurvePoint[];
}

export interface RobustResult {
  /** Least average infidelity over ±width first; equal ones by their angles. */
  readonly settings: readonly RobustSetting[];
  readonly plain: (Robustness & { readonly curve: readonly CurvePoint[] }) | null;
}

export interface RobustProgress {
  readonly startsDone: number;
  readonly starts: number;
  /** Distinct settings so far, of every kind. */
  readonly found: number;
  readonly leastAverage: number | null;
}

// Two settings closer than this in every angle are one.
const SAME_ANGLE_RAD = 2e-5;
/** About 6°. */
const SAME_VALLEY_RAD = 0.1;
const DEFAULT_LIMIT = 24;

/**
 * Composite settings that stand a common error of all plates: seeded starts, Levenberg–Marquardt with exact derivatives
 * over all angles. Other starts may find others; nothing says that the list is complete.
 * @throws RangeError for a number of plates other than two to six, slopes that don't match, a width that isn't above 0, or a seed
 * that isn't a whole number from 0.
 */
export function findRobust(problem: RobustProblem): RobustResult {
  const steps = findRobustSteps(problem);
  for (;;) {
    const step = steps.next();
    if (step.done === true) return step.value;
  }
}

/** `findRobust` one start at a time, for a worker that reports progress and can be stopped between them. */
export function* findRobustSteps(problem: RobustProblem): Generator<RobustProgress, RobustResult> {
  check(problem);
  const { goal, retardancesRad, errorPerUnitRad, width, starts, seed } = problem;
  const conditions = conditionsFor(goal, { retardancesRad, errorPerUnitRad }, width);
  const random = seededStream(seed);
  const found: Found[] = [];
  for (let start = 1; start <= starts; start += 1) {
    const angles = Float64Array.from(retardancesRad, () => Math.PI * random());
    for (const candidate of descendFrom(conditions, angles)) keep(found, candidate);
    const leastAverage = found.reduce<number | null>(
      (least, { averageInfidelity }) =>
        least === null ? averageInfidelity : Math.min(least, averageInfidelity),
      null,
    );
    yield { startsDone: start, starts, found: found.length, leastAverage };
  }
  const ranked = withoutFamilies(
    worthListing(found)
      .map((candidate) => ({ candidate, setting: settingOf(problem, candidate) }))
      .sort((a, b) => byAverage(a.setting, b.setting)),
    (candidate) => isOneOfFamily(conditions, candidate),
  );
  const plain = plainOf(problem);
  const settings = ranked.filter(
    ({ effect, averageInfidelity }) =>
      effect === 'cancels-first-order' || plain === null || averageInfidelity < plain.averageInfidelity,
  );
  return { settings: settings.slice(0, problem.limit ?? DEFAULT_LIMIT), plain };
}

function check({ retardancesRad, errorPerUnitRad, width, starts }: RobustProblem): void {
  if (retardancesRad.length < 2 || retardancesRad.length > 6)
    throw new RangeError(`A composite takes two to six plates, got ${retardancesRad.length}.`);
  if (errorPerUnitRad.length !== retardancesRad.length)
    throw new RangeError(
      `${retardancesRad.length} plates need as many slopes, got ${errorPerUnitRad.length}`,
    );
  if (![...retardancesRad, ...errorPerUnitRad].every((value) => Number.isFinite(value)))
    throw new RangeError('a retardance or its slope is not a number');
  if (!(width > 0 && width < Infinity)) throw new RangeError('the width of the error must be above 0');
  if (!(Number.isInteger(starts) && starts > 0)) throw new RangeError('a search takes at least one start');
}

// The one with more derivatives gone stands for two at the same angles, then the one with the lower average.
function keep(found: Found[], candidate: Found): void {
  const twin = found.findIndex((other) => sameAngles(other.angles, candidate.angles));
  const held = found[twin];
  if (held === undefined) found.push(candidate);
  else if (
    candidate.level > held.level ||
    (candidate.level === held.level && candidate.averageInfidelity < held.averageInfidelity)
  )
    found[twin] = candidate;
}

function sameAngles(a: Float64Array, b: Float64Array, within = SAME_ANGLE_RAD): boolean {
  return a.every((angle, k) => {
    const apart = wrap(angle - (b[k] ?? 0), Math.PI);
    return Math.min(apart, Math.PI - apart) < within;
  });
}

/**
 * A setting that misses its goal a little even at no error is worth listing where it does better over the whole width
 * than any that meets it (real plates: the exact setting may be nowhere near the robust one), but not beside a setting
 * that meets it a few degrees away.
 */
function worthListing(found: readonly Found[]): readonly Found[] {
  const meets = found.filter(({ level }) => level >= 0);
  const least = Math.min(...meets.map(({ averageInfidelity }) => averageInfidelity));
  const misses = found.filter(
    ({ level, angles, averageInfidelity }) =>
      level < 0 &&
      averageInfidelity < least &&
      !meets.some((other) => sameAngles(other.angles, angles, SAME_VALLEY_RAD)),
  );
  return [...meets, ...misses];
}

function curvePoints({ width, curveAt }: RobustProblem): readonly number[] {
  return curveAt ?? Array.from({ length: 41 }, (_, k) => ((k - 20) / 10) * width);
}

function settingOf(problem: RobustProblem, { angles }: Found): RobustSetting {
  const { goal, retardancesRad, errorPerUnitRad, width } = problem;
  const fastAxesRad = Array.from(angles, (angle) => {
    const wrapped = wrap(angle, Math.PI);
    return radians(Math.PI - wrapped < 1e-9 ? 0 : wrapped);
  });
  const plates = retardancesRad.map((retardanceRad, k) => ({
    retardanceRad,
    fastAxisRad: fastAxesRad[k] ?? radians(0),
  }));
  const robustness = robustnessOf(goal, plates, errorPerUnitRad, width);
  return {
    ...robustness,
    fastAxesRad,
    effect: robustness.cancelledOrders > 0 ? 'cancels-first-order' : 'reduces',
    meetsGoal: robustness.infidelityAtZero <= VANISHES,
    isOneOfFamily: false,
    curve: infidelityCurve(goal, plates, errorPerUnitRad, curvePoints(problem)),
  };
}

function plainOf(problem: RobustProblem): RobustResult['plain'] {
  const { goal, plain, width } = problem;
  if (plain === undefined) return null;
  const { plates, errorPerUnitRad } = plain;
  return {
    ...robustnessOf(goal, plates, errorPerUnitRad, width),
    curve: infidelityCurve(goal, plates, errorPerUnitRad, curvePoints(problem)),
  };
}

// Settings that are equal by symmetry differ in their last bits; their order is then that of their angles.
function byAverage(a: RobustSetting, b: RobustSetting): number {
  if (!sameAverage(a, b)) return a.averageInfidelity - b.averageInfidelity;
  for (const [k, angle] of a.fastAxesRad.entries()) {
    const apart = angle - (b.fastAxesRad[k] ?? angle);
    if (Math.abs(apart) > SAME_ANGLE_RAD) return apart;
  }
  return 0;
}

function sameAverage(a: Robustness, b: Robustness): boolean {
  const larger = Math.max(a.averageInfidelity, b.averageInfidelity);
  return Math.abs(a.averageInfidelity - b.averageInfidelity) <= 1e-6 * larger + 1e-18;
}

interface Ranked {
  readonly candidate: Found;
  readonly setting: RobustSetting;
}

// Of a family that was met at several of its members, the first stays.
function withoutFamilies(
  ranked: readonly Ranked[],
  isMember: (candidate: Found) => boolean,
): readonly RobustSetting[] {
  const kept: RobustSetting[] = [];
  for (const { candidate, setting } of ranked) {
    const isFamily = isMember(candidate);
    const isListed =
      isFamily &&
      kept.some(
        (other) =>
          other.isOneOfFamily &&
          other.cancelledOrders === setting.cancelledOrders &&
          sameAverage(other, setting),
      );
    if (!isListed) kept.push({ ...setting, isOneOfFamily: isFamily });
  }
  return kept;
}
