import { describe, expect, it } from 'vitest';
import { findTargets, firstFound, nextFound } from '../../../src/features/protocols/designer/find-targets';
import { target } from '../../support/plates';

const targets = [
  target({ label: 't1', expression: 'D' }),
  target({ label: 'check', expression: 'bloch(10deg, 3deg)' }),
  target({ label: 't10', expression: 'linear(30deg)' }),
  target({ label: '2', expression: 'BLOCH(20deg, 0deg)' }),
];

describe('finding a target', () => {
  it('goes by label, expression or number of the row, in any case, and by nothing for no text', () => {
    expect(findTargets(targets, ' Bloch ')).toEqual([1, 3]);
    expect(findTargets(targets, 't1')).toEqual([0, 2]);
    expect(findTargets(targets, '4')).toEqual([3]);
    expect(findTargets(targets, '  ')).toEqual([]);
    expect(findTargets(targets, 'hadamard')).toEqual([]);
  });

  it('goes first to the row that is called so, then to the row of that number, then to the next one from here', () => {
    const first = (text: string, here: number) => firstFound(targets, text, findTargets(targets, text), here);
    expect(first('T10', 0)).toBe(2);
    expect(first('2', 0)).toBe(3);
    expect(first('3', 0)).toBe(2);
    expect(first('bloch', 2)).toBe(3);
    expect(first('check', 3)).toBe(1);
    expect(first('nothing', 0)).toBeUndefined();
  });

  it('goes on and back from row to row, round at the ends', () => {
    expect(nextFound([1, 3], 1, 1)).toBe(3);
    expect(nextFound([1, 3], 3, 1)).toBe(1);
    expect(nextFound([1, 3], 1, -1)).toBe(3);
    expect(nextFound([1, 3], 2, -1)).toBe(1);
    expect(nextFound([], 2, 1)).toBeUndefined();
  });
});
