import { degrees, type Retarder, toDegrees, toRadians } from '../../../shared/optics';
import { dialFor, fastAxisFromDial } from '../../../shared/optics/dial';
import type { Goal } from '../../../shared/optics/goal';
import { infidelityCurve, type Robustness, robustnessOf } from '../../../shared/optics/robust';
import type { RobustStudy } from '../../workers/robust-study';
import type { ErrorKind } from './robust-form';
import type { AskedPlate, AskedQuestion } from './robust-question';

/** Plates at their angles, and how they err. */
interface Stack {
  readonly plates: readonly Retarder[];
  readonly errorPerUnitRad: readonly number[];
}

/** The setting to hold a composite against. */
export interface PlainDesign extends Stack {
  readonly kind: 'bench' | 'fewest' | 'one-plate';
  /** Names of its plates, in beam order. */
  readonly names: readonly string[];
  readonly robustness: Robustness;
}

/** A composite as it is looked at: one that was searched for, or one from the literature. */
export interface Design extends Stack {
  readonly id: string;
  readonly title: string;
  readonly goal: Goal;
  readonly goalWords: string;
  readonly error: ErrorKind;
  /** Of the error, in its own unit: a fraction, or nm. */
  readonly width: number;
  readonly named: readonly AskedPlate[];
  readonly robustness: Robustness;
  readonly meetsGoal: boolean;
  readonly plain: PlainDesign;
}

export interface ListedSetting {
  readonly number: number;
  readonly fastAxesDeg: readonly number[];
  /** What to dial at a bench, in beam order; null for typed plates. */
  readonly dialsDeg: readonly number[] | null;
  readonly robustness: Robustness;
  readonly meetsGoal: boolean;
  readonly isOneOfFamily: boolean;
}

export function listedSettings({ plates }: AskedQuestion, { found }: RobustStudy): readonly ListedSetting[] {
  return found.settings.map((setting, index) => {
    const fastAxesDeg = setting.fastAxesRad.map((angle) => toDegrees(angle));
    return {
      number: index + 1,
      fastAxesDeg,
      dialsDeg: dialsOf(plates, fastAxesDeg),
      robustness: setting,
      meetsGoal: setting.meetsGoal,
      isOneOfFamily: setting.isOneOfFamily,
    };
  });
}

/** What the mounts say at these table angles; null where a plate has no mount. */
export function dialsOf(
  plates: readonly AskedPlate[],
  fastAxesDeg: readonly number[],
): readonly number[] | null {
  const dials = plates.flatMap(({ scale }, k) =>
    scale === null ? [] : [dialFor(degrees(fastAxesDeg[k] ?? 0), scale, null)],
  );
  return dials.length === plates.length ? dials : null;
}

/** 1 − F at no error of the dials as their mounts can be read; null for plates without mounts. */
export function dialledInfidelity({ goal, named, plates, errorPerUnitRad }: Design): number | null {
  const dials = dialsOf(
    named,
    plates.map(({ fastAxisRad }) => toDegrees(fastAxisRad)),
  );
  if (dials === null) return null;
  const rounded = plates.map(({ retardanceRad, fastAxisRad }, k) => {
    const scale = named[k]?.scale ?? null;
    const standsAt =
      scale === null ? fastAxisRad : toRadians(fastAxisFromDial(degrees(dials[k] ?? 0), scale));
    return { retardanceRad, fastAxisRad: standsAt };
  });
  return infidelitiesAt(goal, { plates: rounded, errorPerUnitRad }, [0])[0] ?? null;
}

/** Plates in beam order, angles in degrees. */
export function platesAt(
  retardancesDeg: readonly number[],
  fastAxesDeg: readonly number[],
): readonly Retarder[] {
  return retardancesDeg.map((retardanceDeg, k) => ({
    retardanceRad: toRadians(degrees(retardanceDeg)),
    fastAxisRad: toRadians(degrees(fastAxesDeg[k] ?? 0)),
  }));
}

/** The setting of a search that is looked at. */
export function searchedDesign(asked: AskedQuestion, study: RobustStudy, setting: ListedSetting): Design {
  const { goal, errorPerUnitRad, width } = asked.question.problem;
  const { plain } = study;
  return {
    id: `setting-${setting.number}`,
    title: `Setting ${setting.number}`,
    goal,
    goalWords: asked.source,
    error: asked.error,
    width,
    named: asked.plates,
    plates: platesAt(
      asked.plates.map(({ retardanceDeg }) => retardanceDeg),
      setting.fastAxesDeg,
    ),
    errorPerUnitRad,
    robustness: setting.robustness,
    meetsGoal: setting.meetsGoal,
    plain: {
      kind: plain.kind,
      names: plain.places.map((place) => asked.plates[place]?.name ?? ''),
      plates: plain.plates,
      errorPerUnitRad: plain.errorPerUnitRad,
      robustness: robustnessOf(goal, plain.plates, plain.errorPerUnitRad, width),
    },
  };
}

/** 1 − F at each of these errors. */
export function infidelitiesAt(
  goal: Goal,
  { plates, errorPerUnitRad }: Stack,
  errors: readonly number[],
): readonly number[] {
  return infidelityCurve(goal, plates, errorPerUnitRad, errors).map(({ infidelity }) => infidelity);
}
