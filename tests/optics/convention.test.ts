import fc from 'fast-check';
import { expect, test } from 'vitest';
import {
  circularState,
  CONVENTION_SETS,
  type Convention,
  DEFAULT_CONVENTION,
  describeConvention,
  infidelityBetween,
  letterOf,
  parseState,
  readStokes,
  sameConvention,
  showEllipse,
  showStokes,
  type Stokes,
  translateJones,
} from '../../shared/optics';

const conventions: readonly Convention[] = (['kz-wt', 'wt-kz'] as const).flatMap((phase) =>
  (['receiver', 'source'] as const).flatMap((handedness) =>
    (['R', 'L'] as const).map((s3Sign) => ({ phase, handedness, s3Sign })),
  ),
);

function canonical(source: string, convention: Convention): Stokes {
  const reading = parseState(source, convention);
  if (!reading.ok) throw new Error(`${source}: ${reading.error.message}`);
  return reading.stokes;
}

const counterClockwise: Stokes = [0, 0, 1];
const clockwise: Stokes = [0, 0, -1];

test('the eight conventions are told apart in words', () => {
  expect(new Set(conventions.map(describeConvention)).size).toBe(8);
  expect(describeConvention(DEFAULT_CONVENTION)).toBe(
    'phase kz − ωt, hands as the receiver sees them, +S3 is L',
  );
});

test('Jones vectors and Stokes parameters go out and come back the same', () => {
  const part = fc.double({ min: -1, max: 1, noNaN: true }).map((value) => value + 0);
  fc.assert(
    fc.property(fc.constantFrom(...conventions), part, part, part, part, (convention, aRe, aIm, bRe, bIm) => {
      const jones = { aRe, aIm, bRe, bIm };
      expect(translateJones(translateJones(jones, convention), convention)).toEqual(jones);
      const stokes: Stokes = [aRe, bRe, bIm];
      expect(readStokes(showStokes(stokes, convention), convention)).toEqual(stokes);
    }),
  );
});

test('the receiver calls counter-clockwise L, the source calls it R, whatever the other flags', () => {
  for (const convention of conventions) {
    const letter = convention.handedness === 'receiver' ? 'L' : 'R';
    const other = letter === 'L' ? 'R' : 'L';
    expect(letterOf(counterClockwise, convention)).toBe(letter);
    expect(letterOf(clockwise, convention)).toBe(other);
    expect(circularState(letter, convention)).toEqual(counterClockwise);
    expect(infidelityBetween(canonical(letter, convention), counterClockwise)).toBeLessThan(1e-30);
    expect(infidelityBetween(canonical(`|${other}>`, convention), clockwise)).toBeLessThan(1e-30);
  }
  expect(letterOf([1, 0, 0], DEFAULT_CONVENTION)).toBeNull();
});

test('the phase flag alone decides which way (H + iV)/√2, |+i⟩ and bloch(90°, 90°) turn', () => {
  for (const convention of conventions) {
    const hand = convention.phase === 'kz-wt' ? counterClockwise : clockwise;
    for (const source of [
      '(H + i V)/sqrt(2)',
      '|+i>',
      '[1, i]',
      'bloch(90deg, 90deg)',
      'H + e^(i 90deg) V',
    ]) {
      expect(infidelityBetween(canonical(source, convention), hand), source).toBeLessThan(1e-30);
    }
  }
});

test('the letter of +S3 alone decides where stokes(0, 0, 1) and a positive ellipticity point', () => {
  for (const convention of conventions) {
    const plus = circularState(convention.s3Sign, convention);
    expect(infidelityBetween(canonical('stokes(0, 0, 1)', convention), plus)).toBeLessThan(1e-30);
    expect(infidelityBetween(canonical('ellipse(30deg, 45deg)', convention), plus)).toBeLessThan(1e-30);
    expect(showStokes(plus, convention).s3).toBe(1);
    expect(showEllipse(plus, convention).shownEllipticityRad).toBeCloseTo(Math.PI / 4, 15);
  }
});

test('linear states are the same in every convention', () => {
  for (const convention of conventions) {
    for (const source of ['H', '|1>', 'D', 'linear(30deg)', 'bloch(60deg, 180deg)', 'stokes(0.6, 0.8, 0)']) {
      expect(
        infidelityBetween(canonical(source, convention), canonical(source, DEFAULT_CONVENTION)),
      ).toBeLessThan(1e-30);
    }
  }
});

test('each ready-made set names its source, and no two share an id', () => {
  expect(new Set(CONVENTION_SETS.map(({ id }) => id)).size).toBe(CONVENTION_SETS.length);
  for (const { source, name } of CONVENTION_SETS) expect(source.length).toBeGreaterThan(name.length);
  expect(CONVENTION_SETS.some(({ convention }) => sameConvention(convention, DEFAULT_CONVENTION))).toBe(true);
});
