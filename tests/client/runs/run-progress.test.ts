import { describe, expect, test } from 'vitest';
import {
  minutesLeft,
  nextOpen,
  resumeSetting,
  settingOutcomes,
} from '../../../src/features/runs/run-progress';
import { type PassedReading, standingDials } from '../../../src/features/runs/standing-dials';

const done = (sequence: number, settingIndex: number, dialledDeg: number[] = []): PassedReading => ({
  sequence,
  settingIndex,
  outcome: 'done',
  dialledDeg,
});
const skipped = (sequence: number, settingIndex: number): PassedReading => ({
  sequence,
  settingIndex,
  outcome: 'skipped',
  dialledDeg: [],
});

describe('where a run stands', () => {
  test('a later reading of a setting takes the place of an earlier one', () => {
    expect(settingOutcomes([done(1, 0), skipped(2, 1), done(3, 1), skipped(4, 0)], 3)).toEqual([
      'skipped',
      'done',
      'open',
    ]);
  });

  test('after the last setting the ones left open come, then none', () => {
    expect(nextOpen(['done', 'open', 'done'], 2)).toBe(1);
    expect(nextOpen(['done', 'skipped', 'done'], 2)).toBeNull();
    expect(nextOpen(['open', 'open', 'open'], 0)).toBe(1);
  });

  test('a run is taken up at the open setting after its last reading', () => {
    expect(resumeSetting([], 4)).toBe(0);
    expect(resumeSetting([done(1, 0), done(2, 2)], 4)).toBe(3);
    expect(resumeSetting([done(1, 0), done(2, 3)], 4)).toBe(1);
    expect(resumeSetting([done(1, 0), skipped(2, 1)], 2)).toBe(2);
  });

  test('the dials stand as the last done reading says; a skipped setting moves nothing', () => {
    expect(standingDials([10, null], [], null)).toEqual([10, null]);
    expect(standingDials([10, null], [done(1, 0, [83.5, 187]), skipped(2, 1)], null)).toEqual([83.5, 187]);
  });

  test('a plate turned before its setting was skipped stands where it was turned to, until a later reading says otherwise', () => {
    const turned = { sequence: 1, dialsDeg: [40, 187] };
    expect(standingDials([10, null], [done(1, 0, [83.5, 187]), skipped(2, 1)], turned)).toEqual([40, 187]);
    expect(standingDials([10, null], [done(1, 0, [83.5, 187]), done(3, 2, [5, 6])], turned)).toEqual([5, 6]);
  });

  test('the time left is the median pace over the open settings, and a lunch break does not count', () => {
    const at = (minutes: number) => new Date(Date.UTC(2026, 0, 5, 9, minutes)).toISOString();
    expect(minutesLeft([at(0), at(2), at(4), at(6), at(120), at(122)], 10)).toBe(20);
    expect(minutesLeft([at(0), at(2)], 10)).toBeNull();
    expect(minutesLeft([at(0), at(2), at(4), at(6)], 0)).toBeNull();
  });
});
