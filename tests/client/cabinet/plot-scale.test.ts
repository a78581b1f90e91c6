import { describe, expect, it } from 'vitest';
import { monthMarks, plotScale } from '../../../src/features/cabinet/history/plot-scale';

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
