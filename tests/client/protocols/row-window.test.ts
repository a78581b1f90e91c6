import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { heightOf, unmeasured, withMeasured } from '../../../src/features/protocols/designer/row-heights';
import { rowsBetween, windowParts } from '../../../src/features/protocols/designer/row-window';

const heights = fc.array(fc.integer({ min: 20, max: 200 }), { minLength: 1, maxLength: 60 });

describe('the rows of a long table that are in the document', () => {
  it('cover all that is in sight, whatever the heights, and no row that lies wholly outside it', () => {
    fc.assert(
      fc.property(heights, fc.nat(4000), fc.integer({ min: 1, max: 900 }), (heightsPx, topPx, shownPx) => {
        const at = (place: number) => heightsPx[place] ?? 0;
        const { first, last } = rowsBetween(heightsPx.length, at, topPx, topPx + shownPx);
        const above = heightsPx.slice(0, first).reduce((sum, one) => sum + one, 0);
        const through = heightsPx.slice(0, last + 1).reduce((sum, one) => sum + one, 0);
        const all = heightsPx.reduce((sum, one) => sum + one, 0);
        if (topPx >= all) expect(last).toBe(heightsPx.length - 1);
        else {
          expect(above).toBeLessThanOrEqual(topPx);
          expect(above + at(first)).toBeGreaterThan(topPx);
          expect(through).toBeGreaterThanOrEqual(Math.min(topPx + shownPx, all));
          if (last > first) expect(through - at(last)).toBeLessThan(topPx + shownPx);
        }
      }),
    );
  });

  it('and the gaps between them are as high as the whole table, name every row once and hold those that must stay', () => {
    fc.assert(
      fc.property(heights, fc.nat(80), fc.nat(20), fc.array(fc.nat(59)), (heightsPx, from, more, stay) => {
        const count = heightsPx.length;
        const staying = new Set(stay.filter((place) => place < count));
        const at = (place: number) => heightsPx[place] ?? 0;
        const parts = windowParts(count, at, { first: from, last: from + more }, staying);
        const places = parts.flatMap((part) =>
          part.kind === 'row'
            ? [part.place]
            : Array.from({ length: part.count }, (_, step) => part.from + step),
        );
        expect(places).toEqual(heightsPx.map((_, place) => place));
        const total = parts.reduce(
          (sum, part) => sum + (part.kind === 'row' ? at(part.place) : part.heightPx),
          0,
        );
        expect(total).toBe(heightsPx.reduce((sum, one) => sum + one, 0));
        const shown = new Set(parts.flatMap((part) => (part.kind === 'row' ? [part.place] : [])));
        expect([...staying].every((place) => shown.has(place))).toBe(true);
        // Two gaps in a row would be one.
        expect(parts.some((part, place) => part.kind === 'gap' && parts[place + 1]?.kind === 'gap')).toBe(
          false,
        );
      }),
    );
  });
});

describe('heights of rows', () => {
  it('are taken as the middle one of those measured first, until a row is measured itself', () => {
    const first = withMeasured(
      unmeasured,
      new Map([
        ['a', 39],
        ['b', 41],
        ['c', 90],
      ]),
    );
    expect(heightOf(first, 'unseen')).toBe(41);
    expect(heightOf(first, 'c')).toBe(90);
    const later = withMeasured(first, new Map([['d', 70]]));
    expect(heightOf(later, 'd')).toBe(70);
    expect(heightOf(later, 'unseen')).toBe(41);
  });

  it('are the very same object where nothing new was learnt, so that scrolling past even rows draws nothing twice', () => {
    const known = withMeasured(unmeasured, new Map([['a', 39]]));
    expect(
      withMeasured(
        known,
        new Map([
          ['a', 39],
          ['b', 39],
        ]),
      ),
    ).toBe(known);
  });
});
