import { describe, expect, it } from 'vitest';
import { calibrationAge } from '../../../src/features/cabinet/calibration-age';

const measured = '2026-03-01T12:00:00.000Z';
const at = (days: number) => new Date(new Date(measured).getTime() + days * 86_400_000);

describe('the age of a calibration', () => {
  it('says its days while it is far from due', () => {
    expect(calibrationAge(measured, 90, at(0)).words).toBe('today');
    expect(calibrationAge(measured, 90, at(1)).words).toBe('yesterday');
    expect(calibrationAge(measured, 90, at(38.4))).toMatchObject({
      words: '38 days',
      ageDays: 38,
      daysLeft: 52,
    });
  });

  it('names the weekday in the last week, and today on the day', () => {
    // 1 March 2026 + 90 days is 30 May 2026, a Saturday.
    expect(calibrationAge(measured, 90, at(86)).words).toBe('due Saturday');
    expect(calibrationAge(measured, 90, at(90))).toMatchObject({ words: 'due today', overdue: false });
  });

  it('is over from the day after, and says by how much', () => {
    expect(calibrationAge(measured, 90, at(91))).toMatchObject({ words: '1 day over', overdue: true });
    expect(calibrationAge(measured, 90, at(102))).toMatchObject({ words: '12 days over', daysLeft: -12 });
  });

  it('never has a negative age when a clock is ahead', () => {
    expect(calibrationAge(measured, 90, at(-2))).toMatchObject({ ageDays: 0, daysLeft: 90 });
  });
});
