import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  append,
  type Beam,
  emptyBeam,
  moveBy,
  moveTo,
  putBack,
  spotOf,
  spotWords,
  takeOut,
} from '../../../src/features/benches/beam-order';
import { spotAt } from '../../../src/features/benches/use-beam-drag';

/** "ab|c": a and b prepare, c analyses. */
function beamOf(text: string): Beam {
  const [preparation = '', analysis = ''] = text.split('|');
  const withPrepared = Array.from(preparation).reduce(
    (beam, id) => append(beam, 'preparation', id),
    emptyBeam,
  );
  return Array.from(analysis).reduce((beam, id) => append(beam, 'analysis', id), withPrepared);
}
const textOf = ({ preparation, analysis }: Beam): string =>
  [preparation, analysis].map((part) => part.map(({ plateId }) => plateId).join('')).join('|');

const anyBeam = fc
  .uniqueArray(fc.constantFrom(...Array.from('abcdefghijkl')), { minLength: 1, maxLength: 12 })
  .chain((ids) =>
    fc
      .integer({ min: Math.max(0, ids.length - 6), max: Math.min(6, ids.length) })
      .map((border) => beamOf(`${ids.slice(0, border).join('')}|${ids.slice(border).join('')}`)),
  );
const flat = (beam: Beam) => [...beam.preparation, ...beam.analysis];

describe('the order of a beam', () => {
  it.each([
    ['ab|c', 'a', 1, 'ba|c'],
    ['ab|c', 'b', 1, 'a|bc'],
    ['ab|c', 'c', -1, 'abc|'],
    ['ab|c', 'a', -1, 'ab|c'],
    ['ab|c', 'c', 1, 'ab|c'],
    ['a|', 'a', 1, '|a'],
    ['abcdef|g', 'g', -1, 'abcdef|g'],
    ['f|abcdeg', 'f', 1, 'f|abcdeg'],
  ] as const)('moves %s, plate %s by %i, to %s', (before, key, step, after) => {
    expect(textOf(moveBy(beamOf(before), key, step))).toBe(after);
  });

  it('puts a plate before the one that stands where it is let go', () => {
    const beam = beamOf('abc|d');
    expect(textOf(moveTo(beam, 'a', { part: 'preparation', index: 3 }))).toBe('bca|d');
    expect(textOf(moveTo(beam, 'c', { part: 'preparation', index: 0 }))).toBe('cab|d');
    expect(textOf(moveTo(beam, 'a', { part: 'analysis', index: 1 }))).toBe('bc|da');
    // On either side of itself it stays.
    expect(moveTo(beam, 'b', { part: 'preparation', index: 1 })).toBe(beam);
    expect(moveTo(beam, 'b', { part: 'preparation', index: 2 })).toBe(beam);
  });

  it('loses and doubles no plate, and never fills a part beyond six, however it is moved', () => {
    const moves = fc.array(
      fc.tuple(
        fc.nat(11),
        fc.constantFrom<1 | -1>(1, -1),
        fc.constantFrom('preparation', 'analysis'),
        fc.nat(7),
      ),
      { maxLength: 20 },
    );
    fc.assert(
      fc.property(anyBeam, moves, (beam, steps) => {
        const end = steps.reduce((at, [pick, step, part, index]) => {
          const key = flat(at)[pick % flat(at).length]?.key ?? '';
          return index === 7
            ? moveBy(at, key, step)
            : moveTo(at, key, { part, index: Math.min(index, at[part].length) });
        }, beam);
        expect(
          flat(end)
            .map(({ key }) => key)
            .toSorted(),
        ).toEqual(
          flat(beam)
            .map(({ key }) => key)
            .toSorted(),
        );
        expect(Math.max(end.preparation.length, end.analysis.length)).toBeLessThanOrEqual(6);
      }),
    );
  });

  it('goes back on one step what it went on, unless it stood at an end', () => {
    fc.assert(
      fc.property(anyBeam, fc.nat(11), fc.constantFrom<1 | -1>(1, -1), (beam, pick, step) => {
        const key = flat(beam)[pick % flat(beam).length]?.key ?? '';
        const there = moveBy(beam, key, step);
        const back = there === beam ? beam : moveBy(there, key, step === 1 ? -1 : 1);
        expect(textOf(back)).toBe(textOf(beam));
      }),
    );
  });

  it('brings a plate that was taken out back to its place', () => {
    fc.assert(
      fc.property(anyBeam, fc.nat(11), (beam, pick) => {
        const key = flat(beam)[pick % flat(beam).length]?.key ?? '';
        const { beam: rest, taken } = takeOut(beam, key);
        expect(spotOf(rest, key)).toBeNull();
        expect(taken === null ? '' : textOf(putBack(rest, taken))).toBe(textOf(beam));
      }),
    );
  });

  it('keeps two places of one plate apart', () => {
    const twice = append(append(emptyBeam, 'preparation', 'a'), 'preparation', 'a');
    expect(new Set(twice.preparation.map(({ key }) => key)).size).toBe(2);
    expect(spotWords(moveBy(twice, 'a', 1), 'a')).toBe('2 of 2 in preparation');
  });
});

describe('where something lies that is dragged', () => {
  const layout = [
    { part: 'preparation' as const, topPx: 100, middlesPx: [150, 220] },
    { part: 'analysis' as const, topPx: 300, middlesPx: [360] },
  ];
  it.each([
    [20, 'preparation', 0],
    [149, 'preparation', 0],
    [151, 'preparation', 1],
    [299, 'preparation', 2],
    [301, 'analysis', 0],
    [900, 'analysis', 1],
  ] as const)('at %i px is %s, before place %i', (yPx, part, index) => {
    expect(spotAt(yPx, layout)).toEqual({ part, index });
  });
});
