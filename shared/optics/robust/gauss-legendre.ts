import { cos } from '../elementary';

/** A point of [−1, 1] and its part of an average over that interval. */
export interface Node {
  readonly at: number;
  /** All weights sum to 1. */
  readonly weight: number;
}

/**
 * The Gauss–Legendre rule with n points: exact for polynomials of degree 2n − 1. The zeros by Newton from Tricomi's
 * estimate cos(π(k − ¼)/(n + ½)).
 */
export function gaussLegendre(n: number): readonly Node[] {
  return Array.from({ length: n }, (_, k) => {
    let x = cos((Math.PI * (n - k - 0.25)) / (n + 0.5));
    let slope = 1;
    for (let step = 0; step < 8; step += 1) {
      let [before, value] = [1, x];
      for (let j = 2; j <= n; j += 1)
        [before, value] = [value, ((2 * j - 1) * x * value - (j - 1) * before) / j];
      slope = (n * (x * value - before)) / (x * x - 1);
      x -= value / slope;
    }
    return { at: x, weight: 1 / ((1 - x * x) * slope * slope) };
  });
}
