import {
  degrees,
  radians,
  type Radians,
  type Retarder,
  stackQuaternion,
  type Stokes,
  toRadians,
} from '../../../shared/optics';
import type { Goal } from '../../../shared/optics/goal';
import { type PublishedComposite, robustnessOf } from '../../../shared/optics/robust';
import { fewestPlates } from '../../workers/robust-study';
import { type Design, type PlainDesign, platesAt } from './design';

// A squared miss below this is rounding: the search's own measure (shared/optics/robust).
const MEETS = 1e-20;

/** A composite from the literature against a common relative error of its retardances. */
export function publishedDesign(composite: PublishedComposite, width: number): Design {
  const { plates: published, makes } = composite;
  const plates = platesAt(
    published.map(({ retardanceDeg }) => retardanceDeg),
    published.map(({ fastAxisDeg }) => fastAxisDeg),
  );
  const errorPerUnitRad = plates.map(({ retardanceRad }) => retardanceRad);
  const goal = goalOf(makes, plates);
  const robustness = robustnessOf(goal, plates, errorPerUnitRad, width);
  return {
    id: composite.id,
    title: composite.name,
    goal,
    goalWords: madeWords(makes),
    error: 'retardance',
    width,
    named: published.map(({ retardanceDeg }, k) => ({ name: `plate ${k + 1}`, retardanceDeg, scale: null })),
    plates,
    errorPerUnitRad,
    robustness,
    meetsGoal: robustness.infidelityAtZero <= MEETS,
    plain: publishedPlain(goal, makes, plates, width),
  };
}

function goalOf(makes: PublishedComposite['makes'], plates: readonly Retarder[]): Goal {
  switch (makes.kind) {
    case 'prepare':
      return makes;
    case 'apply':
      return { kind: 'apply', target: stackQuaternion(platesAt([makes.retardanceDeg], [makes.fastAxisDeg])) };
    case 'flat-retardance':
      // The plate that it stands for, along the axis that it has itself at no error.
      return {
        kind: 'apply',
        target: stackQuaternion([
          { retardanceRad: toRadians(degrees(makes.retardanceDeg)), fastAxisRad: axisOf(plates) },
        ]),
      };
  }
}

/** The fast axis of a stack that is nearly one plate of less than half a wave. */
function axisOf(plates: readonly Retarder[]): Radians {
  const { w, x, z } = stackQuaternion(plates);
  const sign = w < 0 ? -1 : 1;
  return radians(Math.atan2(sign * x, sign * z) / 2);
}

function publishedPlain(
  goal: Goal,
  makes: PublishedComposite['makes'],
  plates: readonly Retarder[],
  width: number,
): PlainDesign {
  const stack = makes.kind === 'prepare' ? plainStack(goal, plates, width) : onePlate(makes, plates);
  return { ...stack, robustness: robustnessOf(goal, stack.plates, stack.errorPerUnitRad, width) };
}

function plainStack(goal: Goal, plates: readonly Retarder[], width: number): Omit<PlainDesign, 'robustness'> {
  const retardancesRad = plates.map(({ retardanceRad }) => retardanceRad);
  const plain = fewestPlates({ goal, retardancesRad, errorPerUnitRad: retardancesRad, width });
  return { ...plain, names: plain.places.map((place) => `plate ${place + 1}`) };
}

function onePlate(
  makes: Exclude<PublishedComposite['makes'], { kind: 'prepare' }>,
  plates: readonly Retarder[],
): Omit<PlainDesign, 'robustness'> {
  const retardanceRad = toRadians(degrees(makes.retardanceDeg));
  const fastAxisRad = makes.kind === 'apply' ? toRadians(degrees(makes.fastAxisDeg)) : axisOf(plates);
  return {
    kind: 'one-plate',
    names: [`one plate of ${makes.retardanceDeg}°`],
    plates: [{ retardanceRad, fastAxisRad }],
    errorPerUnitRad: [retardanceRad],
  };
}

const STATES: readonly (readonly [string, Stokes])[] = [
  ['H', [1, 0, 0]],
  ['V', [-1, 0, 0]],
  ['clockwise circular', [0, 0, -1]],
  ['counter-clockwise circular', [0, 0, 1]],
];

function stateWords(state: readonly number[]): string {
  return STATES.find(([, stokes]) => stokes.every((part, k) => part === state[k]))?.[0] ?? state.join(', ');
}

/** What a published composite makes; hands as the receiver sees them. */
export function madeWords(makes: PublishedComposite['makes']): string {
  switch (makes.kind) {
    case 'apply':
      return `a plate of ${makes.retardanceDeg}° at ${makes.fastAxisDeg}°`;
    case 'prepare':
      return `${stateWords(makes.target)} from ${stateWords(makes.input)}`;
    case 'flat-retardance':
      return `nearly a plate of ${makes.retardanceDeg}°, its axis drifting`;
  }
}
