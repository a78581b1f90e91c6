import { type Radians, radians } from '../units';

// The real root of x^(m+1) = x + 1 for m = 1 to 6: the steps 1/x, 1/x², … spread points evenly over m dimensions.
const ROOTS = [
  1.618033988749895, 1.324717957244746, 1.2207440846057596, 1.1673039782614187, 1.1347241384015194,
  1.1127756842787055,
] as const;

/**
 * `count` points of a fixed low-discrepancy sequence, each with one angle in [0, π) for each of up to six plates. In general
 * position: no plate stands at a round angle, where ideal plates are degenerate.
 */
export function spreadAngles(plates: number, count: number): readonly (readonly Radians[])[] {
  const root = ROOTS[plates - 1] ?? 2;
  const steps: number[] = [];
  let step = 1;
  for (let plate = 0; plate < plates; plate += 1) {
    step /= root;
    steps.push(step);
  }
  return Array.from({ length: count }, (_, k) =>
    steps.map((each) => {
      const turns = 0.37 + k * each;
      return radians((turns - Math.floor(turns)) * Math.PI);
    }),
  );
}

const EIGHTH_RAD = Math.PI / 8;
// Halving intervals, so that any first few are spread evenly.
const ORDER = [0, 4, 2, 6, 1, 5, 3, 7] as const;
// Odd steps mod 8 visit every eighth in every plate.
const STRIDES = [1, 3, 5, 7, 3, 5] as const;

/** Eight points with round angles (multiples of 22.5°), each plate at each of them once. One point for no plates. */
export function roundAngles(plates: number): readonly (readonly Radians[])[] {
  if (plates === 0) return [[]];
  return ORDER.map((k) =>
    Array.from({ length: plates }, (_, plate) => radians((((STRIDES[plate] ?? 1) * k) % 8) * EIGHTH_RAD)),
  );
}
