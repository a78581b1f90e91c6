import { expect, test } from 'vitest';
import { analyserGoal } from '../../shared/optics/goal';
import { prepare, radians } from '../../shared/optics';
import { apply, complex, randomState, randomStream, stack, stokesOf, type Vector } from './independent';
import { missed } from './stack-search';

const DEGREE = Math.PI / 180;

function opposite([a, b]: Vector): Vector {
  return [complex(-b.re, b.im), complex(a.re, -a.im)];
}

/** The share of `state` that a polariser at `angle` passes behind the plates. */
function passed(
  state: Vector,
  retardancesRad: readonly number[],
  fastAxesRad: readonly number[],
  polariser: Vector,
): number {
  return missed({ input: state, target: opposite(polariser), retardancesRad }, fastAxesRad);
}

test('the plates and a polariser at any angle pass the state whole and block its opposite, for one to three plates', () => {
  const random = randomStream(61);
  const analysed = [0, 0, 0];
  let worst = 0;
  for (let k = 0; k < 600; k += 1) {
    const count = 1 + (k % 3);
    const angle = Math.PI * random();
    const polariser: Vector = [complex(Math.cos(angle)), complex(Math.sin(angle))];
    const retardancesRad = [88 + 4 * random(), 178 + 4 * random(), 88 + 4 * random()]
      .slice(0, count)
      .map((each) => each * DEGREE);
    // One plate analyses only what it can make: the polariser's state, sent back through it.
    const [retardance = 0] = retardancesRad;
    const state =
      count === 1 ? apply(stack([-retardance], [Math.PI * random()]), polariser) : randomState(random);
    const goal = analyserGoal(stokesOf(state), stokesOf(polariser));
    if (goal.kind !== 'prepare') throw new Error('an analyser prepares the state of its polariser');
    const { solutions, shortfallRad } = prepare({ ...goal, retardancesRad: retardancesRad.map(radians) });
    if (shortfallRad > 0) continue;
    analysed[count - 1] = (analysed[count - 1] ?? 0) + 1;
    for (const { fastAxesRad } of solutions) {
      const blocked = passed(opposite(state), retardancesRad, fastAxesRad, polariser);
      worst = Math.max(worst, blocked, Math.abs(1 - passed(state, retardancesRad, fastAxesRad, polariser)));
      expect(blocked).toBeLessThan(1e-24);
    }
  }
  expect(worst).toBeLessThan(1e-13);
  expect(analysed[0]).toBe(200);
  expect(analysed[1]).toBeGreaterThan(190);
  expect(analysed[2]).toBe(200);
});

test('the projector of a setting is |m⟩ ∝ U†|P⟩: with a quarter-wave plate at 45° and a polariser along H, circular light', () => {
  const horizontal: Vector = [complex(1), complex(0)];
  const fastAxis = Math.PI / 4;
  // U†|H⟩ for one plate is the plate with its delay undone.
  const analysed = apply(stack([-Math.PI / 2], [fastAxis]), horizontal);
  const [, , s3] = stokesOf(analysed);
  expect(Math.abs(s3)).toBeCloseTo(1, 14);
  const { solutions } = prepare({
    input: stokesOf(analysed),
    target: stokesOf(horizontal),
    retardancesRad: [radians(Math.PI / 2)],
  });
  expect(solutions.map(({ fastAxesRad: [angle = NaN] }) => angle / DEGREE)).toEqual([expect.closeTo(45, 10)]);
});
