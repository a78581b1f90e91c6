import fc from 'fast-check';
import { expect, test } from 'vitest';
import {
  degrees,
  dialFor,
  dialFromFastAxis,
  type DialScale,
  fastAxisFromDial,
  roundDial,
} from '../../shared/optics';
import { type MountMotion, readingsFor } from '../../shared/optics/sequence';

const resolution = fc.constantFrom(0.1, 0.25, 0.5, 0.7, 1, 2, 5 / 60, 7, 10);
const angle = fc.double({ min: 0, max: 179.999, noNaN: true });
const scales = fc.record({
  offsetDeg: fc.double({ min: 0, max: 359.99, noNaN: true }),
  direction: fc.constantFrom<1 | -1>(1, -1),
  resolutionDeg: resolution,
});
const ranges = fc
  .tuple(fc.double({ min: -400, max: 400, noNaN: true }), fc.double({ min: 180, max: 700, noNaN: true }))
  .map(([from, length]) => ({ from, to: from + length }));
const present = fc.option(fc.double({ min: -400, max: 760, noNaN: true }));

const asMount = ({ rangeDeg, ...scale }: DialScale): MountMotion => ({
  ...scale,
  rangeDeg: rangeDeg === null ? null : [rangeDeg.from, rangeDeg.to],
  speedDegPerS: null,
  backlashDeg: 0,
  approach: 'either',
});

// A step of 5/60 of a degree is written to five decimals, so a reading is on its mark to half of the last one.
const WRITTEN = 1e-5;

function expectSettable(reading: number, resolutionDeg: number) {
  const steps = reading / resolutionDeg;
  expect(Math.abs(steps - Math.round(steps)) * resolutionDeg).toBeLessThan(WRITTEN);
}

function axisApart(one: number, other: number): number {
  const apart = Math.abs(one - other) % 180;
  return Math.min(apart, 180 - apart);
}

test('a ring is always dialled to a mark of its own, at most half a step from the angle', () => {
  fc.assert(
    fc.property(scales, angle, present, (engraving, fastAxisDeg, presentDeg) => {
      const scale = { ...engraving, rangeDeg: null };
      const dial = dialFor(degrees(fastAxisDeg), scale, presentDeg);
      expect(dial >= 0 && dial < 360).toBe(true);
      expectSettable(dial, scale.resolutionDeg);
      expect(axisApart(fastAxisFromDial(dial, scale), fastAxisDeg)).toBeLessThan(
        scale.resolutionDeg / 2 + WRITTEN,
      );
      const readings = readingsFor(asMount(scale), fastAxisDeg);
      expect(readings).toContain(dial);
      for (const reading of readings) expectSettable(reading, scale.resolutionDeg);
      if (presentDeg === null) expect(dial).toBe(readings[0]);
    }),
  );
});

test('a mount with a range is always dialled to a mark within it, less than a step from the angle, and to the nearest', () => {
  fc.assert(
    fc.property(scales, ranges, angle, present, (engraving, rangeDeg, fastAxisDeg, presentDeg) => {
      const scale = { ...engraving, rangeDeg };
      const dial = dialFor(degrees(fastAxisDeg), scale, presentDeg);
      expect(dial).toBeGreaterThanOrEqual(rangeDeg.from - WRITTEN);
      expect(dial).toBeLessThanOrEqual(rangeDeg.to + WRITTEN);
      expectSettable(dial, scale.resolutionDeg);
      expect(axisApart(fastAxisFromDial(dial, scale), fastAxisDeg)).toBeLessThan(
        scale.resolutionDeg + WRITTEN,
      );
      const readings = readingsFor(asMount(scale), fastAxisDeg);
      expect(readings).toEqual([...new Set(readings)].toSorted((a, b) => a - b));
      expect(readings).toContain(dial);
      if (presentDeg === null) expect(dial).toBe(readings[0]);
      else {
        const nearest = Math.min(...readings.map((reading) => Math.abs(reading - presentDeg)));
        expect(Math.abs(dial - presentDeg)).toBe(nearest);
      }
      // Whatever mark within the range is at most half a step from the angle is one of them.
      const listed = dialFromFastAxis(degrees(fastAxisDeg), scale);
      for (let turn = -6; turn <= 6; turn += 1) {
        const step = Math.round((listed + 180 * turn) / scale.resolutionDeg);
        const mark = step * scale.resolutionDeg;
        if (mark < rangeDeg.from || mark > rangeDeg.to) continue;
        expect(readings.some((reading) => Math.abs(reading - mark) < WRITTEN)).toBe(true);
      }
    }),
  );
});

test('where rounding would leave the range, the mark half a turn on or the last one inside is taken', () => {
  const one = { offsetDeg: 0, direction: 1, resolutionDeg: 1, rangeDeg: { from: 0.6, to: 180.6 } } as const;
  // 180.55 would be 181, which the mount does not reach; 0.55 is 1.
  expect(dialFor(degrees(0.55), one, null)).toBe(1);
  // 0.45 is 0 and 180.45 is 180.
  expect(dialFor(degrees(0.45), one, null)).toBe(180);
  const odd = { ...one, resolutionDeg: 0.7, rangeDeg: { from: 0.4, to: 180.4 } };
  // Neither 0 nor 180.6 is within: 0.7 is 0.4 off, 179.9 is 0.4 off; of 0.32 the first is nearer.
  expect(dialFor(degrees(0.32), odd, null)).toBe(0.7);
});

test('on a ring whose step does not divide a turn, half a turn on is rounded to its own marks', () => {
  const odd = { offsetDeg: 33.4, direction: 1, resolutionDeg: 0.7, rangeDeg: null } as const;
  // 33.4 is 33.6 = 48 · 0.7; half a turn on is 213.4, which is 213.5 = 305 · 0.7 and not 213.6.
  expect(dialFor(degrees(0), odd, null)).toBe(33.6);
  expect(dialFor(degrees(0), odd, 200)).toBe(213.5);
  // The last mark is 359.8; from 359.95 it is further than 0 is.
  expect(roundDial(degrees(359.95), 0.7)).toBe(0);
  expect(roundDial(degrees(359.85), 0.7)).toBe(359.8);
  expect(roundDial(degrees(-0.05), 0.7)).toBe(0);
});
