import { apply, infidelity, plate, type Vector } from './independent';

/** Plates in beam order that are to take one state to another. */
export interface StackProblem {
  readonly input: Vector;
  readonly target: Vector;
  readonly retardancesRad: readonly number[];
}

export function missed(
  { input, target, retardancesRad }: StackProblem,
  fastAxesRad: readonly number[],
): number {
  let light = input;
  retardancesRad.forEach((retardance, k) => {
    light = apply(plate(retardance, fastAxesRad[k] ?? NaN), light);
  });
  return infidelity(target, light);
}

/** The least infidelity over all angles: the best of a grid, then a pattern search from the best few points of it. */
export function globalMinimum(problem: StackProblem, steps: number): number {
  const { input, target, retardancesRad } = problem;
  const angles = Array.from({ length: steps }, (_, k) => (k * Math.PI) / steps);
  let behind: readonly { readonly light: Vector; readonly at: readonly number[] }[] = [
    { light: input, at: [] },
  ];
  for (const retardance of retardancesRad) {
    const plates = angles.map((angle) => ({ angle, matrix: plate(retardance, angle) }));
    behind = behind.flatMap(({ light, at }) =>
      plates.map(({ angle, matrix }) => ({ light: apply(matrix, light), at: [...at, angle] })),
    );
  }
  const starts = behind
    .map(({ light, at }) => ({ at, value: infidelity(target, light) }))
    .sort((a, b) => a.value - b.value)
    .slice(0, 12);
  return Math.min(...starts.map(({ at }) => descend(problem, at, Math.PI / steps)));
}

// Step along the best of all directions of one or two plates; halve the step when none helps.
function descend(problem: StackProblem, start: readonly number[], step0: number): number {
  let at = start;
  let best = missed(problem, at);
  for (let step = step0; step > 1e-8; step /= 2) {
    for (let moves = 0; moves < 400; moves += 1) {
      let better: readonly number[] | null = null;
      for (const direction of directions(at.length)) {
        const tried = at.map((angle, k) => angle + step * (direction[k] ?? 0));
        const value = missed(problem, tried);
        if (value < best) [better, best] = [tried, value];
      }
      if (better === null) break;
      at = better;
    }
  }
  return best;
}

function directions(count: number): readonly (readonly number[])[] {
  let all: readonly (readonly number[])[] = [[]];
  for (let k = 0; k < count; k += 1) all = all.flatMap((head) => [-1, 0, 1].map((part) => [...head, part]));
  return all;
}
