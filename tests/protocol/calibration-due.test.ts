import { expect, test } from 'vitest';
import { calibrationDue } from '../../shared/calibration-due';

const measuredAt = '2026-03-01T18:00:00.000Z';
const after = (hours: number) =>
  calibrationDue(measuredAt, 90, new Date(Date.parse(measuredAt) + hours * 3_600_000));

test('days are counted from the moment of measuring, age and days left always making up the whole time', () => {
  expect(after(0)).toMatchObject({ ageDays: 0, daysLeft: 90, overdue: false });
  expect(after(23.9)).toMatchObject({ ageDays: 0, daysLeft: 90 });
  expect(after(24)).toMatchObject({ ageDays: 1, daysLeft: 89 });
  expect(after(90 * 24 - 0.1)).toMatchObject({ ageDays: 89, daysLeft: 1 });
  expect(after(0).dueAt.toISOString()).toBe('2026-05-30T18:00:00.000Z');
});

test('it is due, and not overdue, for the whole of the day that begins when it falls due', () => {
  expect(after(90 * 24)).toMatchObject({ daysLeft: 0, overdue: false });
  expect(after(91 * 24 - 0.1)).toMatchObject({ daysLeft: 0, overdue: false });
  expect(after(91 * 24)).toMatchObject({ daysLeft: -1, overdue: true });
});

test('a clock that is behind makes no calibration younger than new', () => {
  expect(after(-48)).toMatchObject({ ageDays: 0, daysLeft: 90 });
});
