import { describe, expect, test } from 'vitest';
import { dialCost, madeOf, wantedDials } from '../../../src/features/runs/dial-cost';
import { makeVersion } from './fixture';

const { content } = makeVersion();
const settings = content.targets.map((_, index) => index);

describe('what a reading costs', () => {
  test('the wanted dials make exactly the infidelity that the version froze for them', () => {
    for (const setting of settings) {
      const target = content.targets[setting];
      expect(madeOf(content, setting, wantedDials(content, setting))).toBe(
        target?.solutions[target.chosenSolution]?.dialledInfidelity,
      );
    }
  });

  test('a step short in the turn is short, a step beyond is past, whichever way the numbers run', () => {
    const [, wanted = 0] = wantedDials(content, 2);
    const cost = (typedDeg: number, fromDeg: number | null) =>
      dialCost({
        content,
        settingIndex: 2,
        plateIndex: 1,
        typedDeg,
        fromDeg,
        dialsDeg: wantedDials(content, 2),
      });
    expect(cost(wanted - 0.1, wanted - 30)?.side).toBe('short of');
    expect(cost(wanted + 0.1, wanted - 30)?.side).toBe('past');
    expect(cost(wanted + 0.1, wanted + 30)?.side).toBe('short of');
    expect(cost(wanted - 0.1, wanted + 30)?.side).toBe('past');
    expect(cost(wanted - 0.1, null)?.side).toBe('below');
    expect(cost(wanted - 0.1, wanted - 30)?.offDeg).toBeCloseTo(0.1, 9);
  });

  test('one step hardly costs anything, ten degrees are not within', () => {
    const [first = 0] = wantedDials(content, 2);
    const cost = (typedDeg: number) =>
      dialCost({
        content,
        settingIndex: 2,
        plateIndex: 0,
        typedDeg,
        fromDeg: null,
        dialsDeg: wantedDials(content, 2),
      });
    const small = cost(first + 0.1);
    const large = cost(first + 10);
    expect(small?.within).toBe(true);
    expect(large?.within).toBe(false);
    expect((large?.typedInfidelity ?? 0) - (small?.typedInfidelity ?? 1)).toBeGreaterThan(0.01);
  });

  test('too few dials have no fidelity rather than a wrong one', () => {
    expect(madeOf(content, 0, [10])).toBeNull();
    expect(madeOf(content, 99, [10, 20])).toBeNull();
  });
});
