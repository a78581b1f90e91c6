import { expect, test } from 'vitest';
import { type Stokes, STOKES_H } from '../../shared/optics';
import { fitRotatingScan, type RotatingScan, type RotatingScanFit } from '../../shared/optics/calibration';
import { excessSigmas } from '../../shared/optics/calibration/evidence';
import { Dice, PLAIN, readings, rotatingPowers } from './calibration-scans';

const CIRCULAR: Stokes = [0, 0, 1];

/** A scan of a plate in circular light, which reads as it should or is taken for horizontal. Its σ is stated truly, too small by a factor, or not at all. */
function behindCircular(
  seed: number,
  stated: number | boolean,
  changes: Partial<RotatingScan> = {},
): RotatingScanFit {
  const dice = new Dice(seed);
  const dials = readings(0, 12, 31);
  const rows = rotatingPowers(PLAIN, dials, CIRCULAR, 0).map((power, k) => ({
    dialDeg: dials[k] ?? 0,
    power: power + 3e-3 * dice.normal(),
    sigma: stated === false ? null : 3e-3 / Number(stated),
  }));
  const leak = { value: PLAIN.leak, sigma: 0 };
  const fit = fitRotatingScan({
    rows,
    direction: 1,
    input: CIRCULAR,
    analyserDeg: 0,
    leak,
    nominal: null,
    before: null,
    leftOut: [],
    ...changes,
  });
  if (!fit.ok) throw new Error(fit.message);
  return fit;
}

test.each([true, false])('light that is not what was stated is told (σ stated: %s)', (isSigmaStated) => {
  const taken = [
    { input: STOKES_H },
    { input: [0, 0.3, Math.sqrt(1 - 0.09)] },
    { input: CIRCULAR, analyserDeg: 20 },
  ] as const;
  // The harmonics of light that is wholly circular fit any analyser: only the zero turns with it.
  const told = taken.map((changes) =>
    behindCircular(7, isSigmaStated, changes).warnings.map(({ kind }) => kind),
  );
  expect(told).toEqual([['other-light'], ['other-light'], []]);
});

test.each([true, false])('sound scans are told nothing of (σ stated: %s)', (isSigmaStated) => {
  for (let seed = 0; seed < 100; seed += 1) expect(behindCircular(seed, isSigmaStated).warnings).toEqual([]);
});

// Much smaller still, and a power a little below zero is refused by its row before anything is fitted.
test('a σ stated three times too small is a misfit of the rows, not of the light', () => {
  for (let seed = 0; seed < 40; seed += 1) {
    const kinds = behindCircular(seed, 3).warnings.map(({ kind }) => kind);
    expect(kinds).toContain('misfit');
    expect(kinds).not.toContain('other-light');
  }
});

test.each([3, 10])('other light is told also where σ is stated %i times too small', (times) => {
  expect(behindCircular(7, times, { input: STOKES_H }).warnings.map(({ kind }) => kind)).toContain(
    'other-light',
  );
});

// Upper points of χ² and of Fisher's F in the usual statistical tables, from memory, and as scipy.stats gives them; the tail of a normal pair is e^(−z²/2).
test.each([
  { count: 6, freedom: null, squares: 12.592, tail: 0.05 },
  { count: 6, freedom: null, squares: 16.812, tail: 0.01 },
  { count: 8, freedom: null, squares: 15.507, tail: 0.05 },
  { count: 6, freedom: 20, squares: 6 * 2.599, tail: 0.05 },
  { count: 6, freedom: 20, squares: 6 * 3.871, tail: 0.01 },
  { count: 8, freedom: 10, squares: 8 * 3.072, tail: 0.05 },
])('$squares for $count squares and $freedom degrees is as rare as tables have it', (row) => {
  const sigmas = excessSigmas(row.squares, row.count, row.freedom);
  expect(Math.exp((-sigmas * sigmas) / 2)).toBeCloseTo(row.tail, 4);
});
