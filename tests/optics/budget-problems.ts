import type { BudgetProblem, SharedDrift, UncertainPlate } from '../../shared/optics/budget';
import { radians } from '../../shared/optics/units';
import { type Matrix, product, randomState, stack, stokesOf } from './independent';

/*
 * Random settings that make their goal, the goal worked out by the matrices of independent.ts: the budget's own plates have
 * no part in it.
 */

const DEGREE = Math.PI / 180;

export interface RandomOptions {
  readonly kind: 'prepare' | 'apply';
  readonly plateCount: number;
  /** Of the largest σ. */
  readonly sigmaDeg: number;
}

export function randomProblem(random: () => number, options: RandomOptions): BudgetProblem {
  const { kind, plateCount, sigmaDeg } = options;
  const sigma = (): number => random() * sigmaDeg * DEGREE;
  const plates = Array.from({ length: plateCount }, (): UncertainPlate => ({
    retardanceRad: radians((60 + 140 * random()) * DEGREE),
    fastAxisRad: radians(180 * random() * DEGREE),
    sigmaRetardanceRad: radians(sigma()),
    sigmaOffsetRad: radians(sigma() / 2),
    dialResolutionRad: radians(sigma()),
    dialRepeatabilityRad: radians(sigma() / 2),
  }));
  const drift = (which: SharedDrift['kind'], share: number): SharedDrift => ({
    kind: which,
    sigma: share,
    retardancePerUnitRad: plates.map(() => (sigma() / share) * (random() < 0.3 ? -1 : 1)),
  });
  const common = {
    plates,
    sigmaPolariserRad: radians(sigma() / 2),
    extinction: random() < 0.5 ? null : 1e-5 * random(),
    shared: [drift('wavelength', 0.5), drift('temperature', 2)],
  };
  const matrix = stack(
    plates.map(({ retardanceRad }) => retardanceRad),
    plates.map(({ fastAxisRad }) => fastAxisRad),
  );
  if (kind === 'apply') return { ...common, goal: { kind, target: quaternionOf(matrix) } };
  const input = randomState(random);
  const [[m00, m01], [m10, m11]] = product(matrix, [
    [input[0], { re: 0, im: 0 }],
    [input[1], { re: 0, im: 0 }],
  ]);
  if (m01.re !== 0 || m11.re !== 0) throw new Error('the second column is 0');
  return { ...common, goal: { kind, input: stokesOf(input), target: stokesOf([m00, m10]) } };
}

/** w·1 − i(xσx + yσy + zσz) of a matrix with determinant 1. */
export function quaternionOf([[m00, m01], [m10, m11]]: Matrix): {
  readonly w: number;
  readonly x: number;
  readonly y: number;
  readonly z: number;
} {
  return {
    w: (m00.re + m11.re) / 2,
    x: -(m01.im + m10.im) / 2,
    y: (m10.re - m01.re) / 2,
    z: (m11.im - m00.im) / 2,
  };
}
