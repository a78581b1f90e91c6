import { describe, expect, it } from 'vitest';
import { plateRows } from '../../../src/features/cabinet/plate-rows';
import { monthMarks, plotScale } from '../../../src/features/cabinet/plot-scale';
import { plateFixture } from './plate-fixture';

const now = new Date('2026-04-30T10:00:00.000Z');
const older = { ...plateFixture().calibration, measuredAt: '2025-12-01T12:00:00.000Z' };
const plates = [
  plateFixture({ name: 'H-10', kind: 'half' }),
  plateFixture({ name: 'H-2', kind: 'half', calibration: older }),
  plateFixture({ name: 'T-1', retiredAt: '2026-02-01T12:00:00.000Z' }),
];
const names = (rows: readonly { name: string }[]) => rows.map(({ name }) => name);

describe('the cabinet as a table', () => {
  it('sorts names as people count, and leaves retired plates out until asked', () => {
    const byName = { column: 'name', descending: false } as const;
    expect(names(plateRows(plates, { text: '', withRetired: false }, byName, 90, now))).toEqual([
      'H-2',
      'H-10',
    ]);
    expect(names(plateRows(plates, { text: '', withRetired: true }, byName, 90, now))).toEqual([
      'H-2',
      'H-10',
      'T-1',
    ]);
  });

  it('finds by name, mount and bench, and puts the most overdue first', () => {
    const byDue = { column: 'due', descending: false } as const;
    expect(names(plateRows(plates, { text: 'SIGNAL', withRetired: false }, byDue, 90, now))).toEqual([
      'H-2',
      'H-10',
    ]);
    expect(plateRows(plates, { text: 'nowhere', withRetired: true }, byDue, 90, now)).toEqual([]);
  });
});

describe('the plot of a plate over time', () => {
  it('marks round numbers inside the range, each where it belongs', () => {
    const scale = plotScale(86.5, 89.6, { from: 100, to: 0 }, 1);
    expect(scale.marks).toEqual([87, 88, 89]);
    expect(scale.place(89)).toBeLessThan(scale.place(87));
    expect(scale.place(86.5)).toBeLessThanOrEqual(100);
  });

  it('opens a range of one value, so that the value lies in the middle', () => {
    expect(plotScale(5, 5, { from: 0, to: 100 }, 1).place(5)).toBe(50);
  });

  it('names months, and January by its year', () => {
    const marks = monthMarks(new Date(2025, 10, 15).getTime(), new Date(2026, 2, 20).getTime(), 8);
    expect(marks.map(({ label }) => label)).toEqual(['Dec', '2026', 'Feb', 'Mar']);
  });
});
