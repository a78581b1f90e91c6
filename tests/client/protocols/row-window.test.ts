import fc from 'fast-check';
import { expect, it } from 'vitest';
import { windowParts } from '../../../src/features/protocols/designer/row-window';

const heights = fc.array(fc.integer({ min: 20, max: 200 }), { maxLength: 60 });

it('a long table is its rows in the document and gaps between them: every row once, as high as the whole', () => {
  fc.assert(
    fc.property(heights, fc.array(fc.nat(59)), (heightsPx, chosen) => {
      const starts = heightsPx.map((_, place) =>
        heightsPx.slice(0, place).reduce((sum, one) => sum + one, 0),
      );
      const totalPx = heightsPx.reduce((sum, one) => sum + one, 0);
      const shown = [...new Set(chosen)].filter((place) => place < heightsPx.length).sort((a, b) => a - b);
      const rows = shown.map((index) => {
        const start = starts[index] ?? 0;
        return { index, start, end: start + (heightsPx[index] ?? 0) };
      });
      const parts = windowParts(heightsPx.length, rows, totalPx);
      const places = parts.flatMap((part) =>
        part.kind === 'row'
          ? [part.place]
          : Array.from({ length: part.count }, (_, step) => part.from + step),
      );
      expect(places).toEqual(heightsPx.map((_, place) => place));
      expect(parts.flatMap((part) => (part.kind === 'row' ? [part.place] : []))).toEqual(shown);
      const height = parts.reduce(
        (sum, part) => sum + (part.kind === 'row' ? (heightsPx[part.place] ?? 0) : part.heightPx),
        0,
      );
      expect(height).toBe(totalPx);
      // Two gaps in a row would be one.
      expect(parts.some((part, at) => part.kind === 'gap' && parts[at + 1]?.kind === 'gap')).toBe(false);
    }),
  );
});
