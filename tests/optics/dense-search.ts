import { apply, complex, infidelity, missAmplitude, plate, type Vector } from './independent';

export interface Found {
  readonly fastAxesRad: readonly [number, number];
  readonly infidelity: number;
}

export interface SearchProblem {
  readonly input: Vector;
  readonly target: Vector;
  readonly retardancesRad: readonly [number, number];
}

function reached({ input, retardancesRad }: SearchProblem, a: number, b: number): Vector {
  return apply(plate(retardancesRad[1], b), apply(plate(retardancesRad[0], a), input));
}

function wrapped(angle: number): number {
  return ((angle % Math.PI) + Math.PI) % Math.PI;
}

export function apart(one: readonly number[], other: readonly number[]): number {
  return Math.max(
    ...one.map((angle, k) => {
      const difference = wrapped(angle - (other[k] ?? NaN));
      return Math.min(difference, Math.PI - difference);
    }),
  );
}

function addDistinct(list: Found[], candidate: Found, closerThan: number): void {
  if (!list.some((known) => apart(known.fastAxesRad, candidate.fastAxesRad) < closerThan))
    list.push(candidate);
}

interface Grid {
  readonly steps: number;
  readonly values: readonly number[];
}

function infidelityGrid(problem: SearchProblem, steps: number): Grid {
  const { input, target, retardancesRad } = problem;
  const angles = Array.from({ length: steps }, (_, k) => (k * Math.PI) / steps);
  const behindFirst = angles.map((a) => apply(plate(retardancesRad[0], a), input));
  const seconds = angles.map((b) => plate(retardancesRad[1], b));
  return {
    steps,
    values: behindFirst.flatMap((state) => seconds.map((second) => infidelity(target, apply(second, state)))),
  };
}

function slope(
  ahead: readonly [number, number],
  behind: readonly [number, number],
  step: number,
): readonly [number, number] {
  return [(ahead[0] - behind[0]) / step, (ahead[1] - behind[1]) / step];
}

/** Newton with a numerical Jacobian on ⟨t⊥|ψ⟩ = 0, two real equations in two angles. */
function refineZero(problem: SearchProblem, a0: number, b0: number): Found | null {
  const miss = (a: number, b: number): readonly [number, number] => {
    const { re, im } = missAmplitude(problem.target, reached(problem, a, b));
    return [re, im];
  };
  let [a, b] = [a0, b0];
  const h = 1e-6;
  for (let step = 0; step < 40; step += 1) {
    const [f, g] = miss(a, b);
    if (f * f + g * g < 1e-26) {
      return { fastAxesRad: [wrapped(a), wrapped(b)], infidelity: f * f + g * g };
    }
    const [fa, ga] = slope(miss(a + h, b), miss(a - h, b), 2 * h);
    const [fb, gb] = slope(miss(a, b + h), miss(a, b - h), 2 * h);
    const det = fa * gb - fb * ga;
    const [da, db] = [-(gb * f - fb * g) / det, -(fa * g - ga * f) / det];
    const size = Math.hypot(da, db);
    if (!(size < 1e6)) return null;
    const scale = Math.min(1, 0.2 / size);
    a += da * scale;
    b += db * scale;
  }
  return null;
}

/** Every setting with zero infidelity that a grid of starting points leads to. */
export function denseZeros(problem: SearchProblem, steps: number): readonly Found[] {
  const { values } = infidelityGrid(problem, steps);
  const found: Found[] = [];
  const cell = Math.PI / steps;
  values.forEach((value, k) => {
    // Turning both plates by half a cell moves the state by at most four half cells each: 1 − F ≤ (4 cell)²/4.
    if (value > 4 * cell * cell) return;
    const zero = refineZero(problem, Math.floor(k / steps) * cell, (k % steps) * cell);
    if (zero !== null) addDistinct(found, zero, 1e-5);
  });
  return found;
}

/** Pattern search: step to the best of eight neighbours, halve the step when there is none better. */
function refineMinimum(problem: SearchProblem, a0: number, b0: number, step0: number): Found {
  let [a, b, step] = [a0, b0, step0];
  let best = infidelity(problem.target, reached(problem, a, b));
  while (step > 1e-9) {
    let moved = false;
    for (const [da, db] of [
      [1, 0],
      [-1, 0],
      [0, 1],
      [0, -1],
      [1, 1],
      [1, -1],
      [-1, 1],
      [-1, -1],
    ] as const) {
      const value = infidelity(problem.target, reached(problem, a + da * step, b + db * step));
      if (value < best) {
        best = value;
        a += da * step;
        b += db * step;
        moved = true;
        break;
      }
    }
    if (!moved) step /= 2;
  }
  return { fastAxesRad: [wrapped(a), wrapped(b)], infidelity: best };
}

/** Every local minimum of the infidelity that a grid shows. */
export function denseMinima(problem: SearchProblem, steps: number): readonly Found[] {
  const { values } = infidelityGrid(problem, steps);
  const at = (row: number, column: number): number =>
    values[((row + steps) % steps) * steps + ((column + steps) % steps)] ?? Infinity;
  const found: Found[] = [];
  for (let row = 0; row < steps; row += 1) {
    for (let column = 0; column < steps; column += 1) {
      const here = at(row, column);
      let lowest = true;
      for (let dr = -1; dr <= 1; dr += 1)
        for (let dc = -1; dc <= 1; dc += 1) lowest &&= here <= at(row + dr, column + dc);
      if (!lowest) continue;
      const cell = Math.PI / steps;
      addDistinct(found, refineMinimum(problem, row * cell, column * cell, cell), 1e-3);
    }
  }
  return found;
}

export const inputH: Vector = [complex(1), complex(0)];
