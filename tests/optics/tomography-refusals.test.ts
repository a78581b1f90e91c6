import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { type MeasuredCounts, mostLikelyState, type Stokes, stokesLength } from '../../shared/optics';
import { randomState, randomStream, stokesOf } from './independent';
import { lightOf, logLikelihood, plainPath } from './plain-tomography';
import { plainly, poisson, SIX } from './random-tomography';

const sum = (values: readonly number[]): number => values.reduce((total, value) => total + value, 0);
const apart = (a: Stokes, b: Stokes): number => stokesLength([a[0] - b[0], a[1] - b[1], a[2] - b[2]]);

describe('refusals', () => {
  const good = plainly(SIX, [985, 15, 640, 360, 520, 480]);
  const without = (k: number, value: number, list: readonly number[]): number[] =>
    list.map((old, j) => (j === k ? value : old));
  const refused = (change: Partial<MeasuredCounts>) => {
    const result = mostLikelyState({ ...good, ...change });
    if (result.ok) throw new Error('not refused');
    return result.refusal;
  };

  it.each([
    ['counts below 0', { counts: without(2, -1, good.counts) }, 'counts', 2],
    ['counts that are no number', { counts: without(0, NaN, good.counts) }, 'counts', 0],
    ['a rate in place of counts', { counts: without(5, 12.5, good.counts) }, 'counts', 5],
    ['counts past every whole number', { counts: without(5, Infinity, good.counts) }, 'counts', 5],
    ['an exposure below 0', { exposures: without(1, -1, good.exposures) }, 'exposure', 1],
    ['an endless exposure', { exposures: without(1, Infinity, good.exposures) }, 'exposure', 1],
    ['an exposure out of every unit', { exposures: without(1, 1e31, good.exposures) }, 'exposure', 1],
    [
      'an endless number of dark counts',
      { darkCounts: without(3, Infinity, good.darkCounts) },
      'dark-counts',
      3,
    ],
    ['dark counts below 0', { darkCounts: without(3, -0.5, good.darkCounts) }, 'dark-counts', 3],
    ['dark counts that are no number', { darkCounts: without(3, NaN, good.darkCounts) }, 'dark-counts', 3],
    ['counts from nothing', { exposures: without(4, 0, good.exposures) }, 'impossible', 4],
  ] as const)('names the setting with %s', (_, change, reason, setting) => {
    const refusal = refused(change);
    expect(refusal).toMatchObject({ reason, setting });
    expect(refusal.message).toContain(`Setting ${setting + 1} `);
  });

  it('answers or refuses the oddest numbers that are let in, and never with a number that is none', () => {
    const odd = fc.constantFrom(0, 1e-30, 1e-9, 1, 1e9, 1e30);
    const six = <T>(entry: fc.Arbitrary<T>) => fc.array(entry, { minLength: 6, maxLength: 6 });
    const count = fc.constantFrom(0, 1, 1000, Number.MAX_SAFE_INTEGER);
    const dark = fc.constantFrom(0, 1e-300, 1, 1e6, Number.MAX_SAFE_INTEGER);
    fc.assert(
      fc.property(
        six(count),
        fc.oneof(six(fc.constant(1)), six(odd)),
        six(dark),
        (counts, exposures, darkCounts) => {
          const result = mostLikelyState({ projectors: SIX, counts, exposures, darkCounts });
          if (!result.ok) return;
          const { intensity, stokes, gapBound, logLikelihood: value } = result;
          for (const each of [intensity, ...stokes, gapBound, value])
            expect(Number.isFinite(each)).toBe(true);
          // The value is that of the light returned, as near as sums of such numbers show it.
          const best = logLikelihood(
            { projectors: SIX, counts, exposures, darkCounts },
            lightOf(intensity, stokes),
          );
          expect(Math.abs(best - value)).toBeLessThanOrEqual(
            1e-12 * (1 + Math.abs(value)) + 1e-14 * sum(counts.map((n) => 40 * n)),
          );
        },
      ),
      { numRuns: 2000 },
    );
  });

  it('names a projector that is none', () => {
    const projectors: readonly Stokes[] = [...SIX.slice(0, 5), [0, 0, -0.9]];
    expect(refused({ projectors })).toMatchObject({ reason: 'projector', setting: 5 });
    expect(refused({ projectors: [[NaN, 0, 0], ...SIX.slice(1)] })).toMatchObject({
      reason: 'projector',
      setting: 0,
    });
  });

  it('refuses lists of different lengths, no settings, and no counts at all', () => {
    expect(refused({ counts: [1, 2] }).reason).toBe('lengths');
    expect(refused({ projectors: [], counts: [], exposures: [], darkCounts: [] }).reason).toBe('incomplete');
    expect(refused({ counts: [0, 0, 0, 0, 0, 0] }).reason).toBe('no-counts');
  });

  it('refuses counts that dark counts explain, exactly where no light is likeliest', () => {
    const random = randomStream(12);
    let dark = 0;
    for (let k = 0; k < 200; k += 1) {
      const darkCounts = SIX.map(() => 20 + 10 * random());
      const counts = darkCounts.map((d) => poisson(d + 1, random));
      const data = { projectors: SIX, counts, exposures: SIX.map(() => 1), darkCounts };
      const result = mostLikelyState(data);
      const faint = plainPath(data, 1e-6);
      const gain = logLikelihood(data, faint) - logLikelihood(data, [0, 0, 0, 0]);
      if (result.ok) expect(gain).toBeGreaterThan(-3e-6);
      else {
        dark += 1;
        expect(result.refusal.reason).toBe('no-light');
        expect(gain).toBeLessThan(1e-9);
      }
    }
    expect(dark).toBeGreaterThan(10);
    expect(dark).toBeLessThan(190);
  });
});

describe('settings that leave something out', () => {
  const missing = (projectors: readonly Stokes[]) => {
    const result = mostLikelyState(
      plainly(
        projectors,
        projectors.map(() => 10),
      ),
    );
    if (result.ok || result.refusal.reason !== 'incomplete') throw new Error('not refused as incomplete');
    return result.refusal;
  };

  it.each([
    ['S1', SIX.slice(2)],
    ['S2', [...SIX.slice(0, 2), ...SIX.slice(4)]],
    ['S3', SIX.slice(0, 4)],
  ] as const)('names %s', (name, projectors) => {
    const { message, missing: found } = missing(projectors);
    expect(message).toContain(`nothing about ${name}.`);
    expect(found).toHaveLength(1);
    expect(found[0]?.intensity).toBe(0);
  });

  it('names both of two', () => {
    const { message, missing: found } = missing(SIX.slice(0, 2));
    expect(found.map(({ stokes }) => stokes.map(Math.round))).toEqual([
      [0, 1, 0],
      [0, 0, 1],
    ]);
    expect(message).toContain('S2; S3');
  });

  it('names a direction between the axes, across from every projector', () => {
    const half = Math.SQRT1_2;
    const { message, missing: found } = missing([
      [half, half, 0],
      [-half, -half, 0],
      [0, 0, 1],
      [0, 0, -1],
    ]);
    expect(found).toHaveLength(1);
    expect(apart(found[0]?.stokes ?? [0, 0, 0], [half, -half, 0])).toBeLessThan(1e-9);
    expect(message).toContain('(0.707, -0.707, 0.000)');
  });

  it('says of three settings that the intensity and a part of S look the same', () => {
    const { missing: found, message } = missing([
      [1, 0, 0],
      [0, 1, 0],
      [0, 0, 1],
    ]);
    expect(found).toHaveLength(1);
    expect(found[0]?.intensity).toBeCloseTo(0.5, 12);
    found[0]?.stokes.forEach((part) => expect(part).toBeCloseTo(-0.5, 12));
    expect(message).toContain('the intensity S0');
  });

  it('finds directions that no setting notices, as many as are missing, at right angles', () => {
    fc.assert(
      fc.property(fc.nat(), fc.integer({ min: 1, max: 7 }), fc.boolean(), (seed, count, isFlat) => {
        const random = randomStream(seed);
        const projectors = Array.from({ length: count }, (): Stokes => {
          const angle = 2 * Math.PI * random();
          return isFlat ? [Math.cos(angle), 0, Math.sin(angle)] : stokesOf(randomState(random));
        });
        // Settings nearly the same count as one, and how near that is, is not what this is about.
        const isNear = projectors.some((one, k) =>
          projectors.slice(0, k).some((other) => apart(one, other) < 0.1),
        );
        fc.pre(!isNear);
        const wanted = 4 - Math.min(count, isFlat ? 3 : 4);
        const result = mostLikelyState(
          plainly(
            projectors,
            projectors.map(() => 10),
          ),
        );
        if (wanted === 0) {
          expect(result.ok).toBe(true);
          return;
        }
        const found = missing(projectors).missing.map(({ intensity, stokes }) => [intensity, ...stokes]);
        expect(found).toHaveLength(wanted);
        const dot = (a: readonly number[], b: readonly number[]) =>
          sum(a.map((value, k) => value * (b[k] ?? NaN)));
        for (const [i, one] of found.entries()) {
          for (const m of projectors) expect(Math.abs(dot([1, ...m], one))).toBeLessThan(1e-4);
          for (const [j, other] of found.entries()) expect(dot(one, other)).toBeCloseTo(i === j ? 1 : 0, 9);
        }
      }),
      { numRuns: 200 },
    );
  });

  it('does not count a setting that was off', () => {
    const data = { ...plainly(SIX, [985, 15, 640, 360, 0, 0]), exposures: [1, 1, 1, 1, 0, 0] };
    expect(mostLikelyState(data)).toMatchObject({ ok: false, refusal: { reason: 'incomplete' } });
  });
});
