import type { Goal } from '../goal';
import type { Retarder } from '../retarder';
import { gaussLegendre } from './gauss-legendre';
import { missForms, StackJet } from './stack-jet';

/** One point of a curve. */
export interface CurvePoint {
  /** In the caller's unit: a relative error of all retardances, nanometres, … */
  readonly error: number;
  /** 1 − F: of the state, or the average gate infidelity. */
  readonly infidelity: number;
}

/** How well a setting stands an error that all its plates share. */
export interface Robustness {
  readonly infidelityAtZero: number;
  /** Mean of 1 − F over errors from −width to width, all equally likely. */
  readonly averageInfidelity: number;
  /**
   * Where the goal is met at no error, 1 − F = coefficient · error² + …: what is left of the first derivative of the
   * light, squared. Per unit of the error, squared.
   */
  readonly firstOrder: number;
  /** How many derivatives in a row vanish, from the first on: 1 − F then grows with error to the power 2(n + 1). */
  readonly cancelledOrders: number;
}

/** Points at which the average is taken; enough for six full-wave plates wrong by a fifth. */
const NODES = 20;
export const HIGHEST_ORDER = 4;
/** A squared Taylor coefficient below this share of its largest possible value is rounding. */
export const VANISHES = 1e-20;

/** Largest possible size of Taylor coefficient j of a unit quaternion: (Σ|e|/2)^j / j!. */
export function coefficientScale(errorPerUnitRad: readonly number[], j: number): number {
  const reach = errorPerUnitRad.reduce((sum, slope) => sum + Math.abs(slope), 0) / 2;
  let scale = 1;
  for (let k = 1; k <= j; k += 1) scale *= reach / k;
  return scale;
}

/** 1 − F of plates at each of these errors. @throws RangeError unless there is one slope for each plate. */
export function infidelityCurve(
  goal: Goal,
  plates: readonly Retarder[],
  errorPerUnitRad: readonly number[],
  points: readonly number[],
): readonly CurvePoint[] {
  const { erring, angles } = apart(plates, errorPerUnitRad);
  const forms = missForms(goal);
  return points.map((error) => ({
    error,
    infidelity: Math.min(1, new StackJet(erring, forms, error, 0).at(angles).squared(0)),
  }));
}

/** @param width errors from −width to width; above 0. @throws RangeError as `infidelityCurve`. */
export function robustnessOf(
  goal: Goal,
  plates: readonly Retarder[],
  errorPerUnitRad: readonly number[],
  width: number,
): Robustness {
  const { erring, angles } = apart(plates, errorPerUnitRad);
  const forms = missForms(goal);
  const jet = new StackJet(erring, forms, 0, HIGHEST_ORDER).at(angles);
  let averageInfidelity = 0;
  for (const { at, weight } of gaussLegendre(NODES)) {
    averageInfidelity += weight * new StackJet(erring, forms, at * width, 0).at(angles).squared(0);
  }
  let cancelledOrders = 0;
  const vanishes = (j: number): boolean => {
    const scale = coefficientScale(errorPerUnitRad, j);
    return jet.squared(j) <= VANISHES * scale * scale;
  };
  while (vanishes(0) && cancelledOrders < HIGHEST_ORDER && vanishes(cancelledOrders + 1))
    cancelledOrders += 1;
  return {
    infidelityAtZero: Math.min(1, jet.squared(0)),
    averageInfidelity,
    firstOrder: jet.squared(1),
    cancelledOrders,
  };
}

function apart(plates: readonly Retarder[], errorPerUnitRad: readonly number[]) {
  if (plates.length !== errorPerUnitRad.length)
    throw new RangeError(`${plates.length} plates need as many slopes, got ${errorPerUnitRad.length}`);
  const retardancesRad = plates.map(({ retardanceRad }) => retardanceRad);
  return {
    erring: { retardancesRad, errorPerUnitRad },
    angles: plates.map(({ fastAxisRad }) => fastAxisRad),
  };
}
