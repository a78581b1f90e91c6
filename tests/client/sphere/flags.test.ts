import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { pathPhases } from '../../../shared/optics/phase';
import { toDegrees } from '../../../shared/optics/units';
import { pathInWords } from '../../../src/sphere/path-words';
import { plateRetarder } from '../../../src/sphere/plate-retarder';
import { type SceneFlag, sphereScene } from '../../../src/sphere/scene';
import { add, angleBetweenDeg, cross, dot, scale } from '../../../src/sphere/vec';
import { anyInput, CONVENTION } from './support';

/** Read off the drawing: how far the pennant stands clockwise of the hairline, seen from outside. */
function shownDeg({ foot, top, zero, tip }: SceneFlag): number | undefined {
  if (zero === undefined || tip === undefined) return undefined;
  const [from, to] = [add(zero, scale(top, -1)), add(tip, scale(top, -1))];
  return (-Math.atan2(dot(foot, cross(from, to)), dot(from, to)) * 180) / Math.PI;
}

const flagsOf = (plates: Parameters<typeof sphereScene>[0]['plates']) =>
  sphereScene({ start: [1, 0, 0], plates, phase: true, convention: CONVENTION }).flags;

describe('the flags of the phase', () => {
  it('stand square on the sphere and show behind each plate the phase against the start', () => {
    fc.assert(
      fc.property(anyInput, (input) => {
        const { flags } = sphereScene({ ...input, phase: true });
        for (const { foot, top, tip } of flags) {
          expect(angleBetweenDeg(foot, top)).toBeLessThan(1e-6);
          if (tip !== undefined) expect(dot(add(tip, scale(top, -1)), foot)).toBeCloseTo(0, 9);
        }
        const phases = pathPhases(input.start, input.plates.map(plateRetarder));
        for (const [plate, { totalRad }] of phases.afterPlate.entries()) {
          const flag = flags.filter(({ id }) => id.startsWith(`flag-${plate}-`)).at(-1);
          if (flag === undefined) throw new Error('no flag behind a plate');
          const shown = shownDeg(flag);
          if (totalRad === null || shown === undefined) continue;
          const apart = toDegrees(totalRad) - shown;
          expect(Math.cos((apart * Math.PI) / 180)).toBeCloseTo(1, 9);
        }
      }),
      { numRuns: 200 },
    );
  });

  it('lies on its hairline at the start, turns the other way in a full turn, and is back after two', () => {
    const first = flagsOf([{ name: 'F', fastAxisDeg: 25, retardanceDeg: 360 }]);
    expect(shownDeg(first[0] ?? missing())).toBeCloseTo(0, 9);
    expect(Math.abs(shownDeg(first.at(-1) ?? missing()) ?? 0)).toBeCloseTo(180, 6);
    const twice = flagsOf([{ name: 'F', fastAxisDeg: 25, retardanceDeg: 720 }]);
    expect(shownDeg(twice.at(-1) ?? missing())).toBeCloseTo(0, 6);
  });

  it('has no pennant where the state is orthogonal to the start', () => {
    const flags = flagsOf([{ name: 'H', fastAxisDeg: 45, retardanceDeg: 180 }]);
    expect(flags.at(-1)?.tip).toBeUndefined();
    expect(flags.at(-2)?.tip).toBeDefined();
  });

  it('stands at the start, about each 30° of a wide turn, and at the end; a short turn has one', () => {
    expect(flagsOf([{ name: 'H', fastAxisDeg: 45, retardanceDeg: 180 }])).toHaveLength(1 + 6);
    expect(flagsOf([{ name: 'H', fastAxisDeg: 3, retardanceDeg: 180 }])).toHaveLength(1 + 1);
  });

  it('is absent unless asked for', () => {
    const plates = [{ name: 'H', fastAxisDeg: 45, retardanceDeg: 180 }];
    expect(sphereScene({ start: [1, 0, 0], plates, convention: CONVENTION }).flags).toEqual([]);
  });
});

describe('the phase in words', () => {
  const told = (plates: Parameters<typeof sphereScene>[0]['plates'], convention = CONVENTION) =>
    pathInWords({ start: [1, 0, 0], plates, phase: true, convention }).phase?.text;

  it('gives total, dynamic and geometric phase: a half-wave plate at 22.5° takes H to D with −90°', () => {
    // J(180°, 22.5°) H = −i (cos 45° H + sin 45° V): total −90°; dynamic −(180°/2) cos 45° = −63.6°; the rest is geometric.
    const plates = [{ name: 'H-1', fastAxisDeg: 22.5, retardanceDeg: 180 }];
    expect(told(plates)).toBe(
      'Phase behind the plates against the start, written kz − ωt: total −90.0°, dynamic −63.6°, geometric −26.4°.',
    );
    expect(told(plates, { ...CONVENTION, phase: 'wt-kz' })).toContain(
      'written ωt − kz: total 90.0°, dynamic 63.6°, geometric 26.4°.',
    );
  });

  it('says that the total is undefined where the state is orthogonal to the start', () => {
    expect(told([{ name: 'H-1', fastAxisDeg: 45, retardanceDeg: 180 }])).toContain(
      'total undefined, since this state is orthogonal to the start; dynamic 0.0°',
    );
  });

  it('says the sign of a full turn: −1 after 360°, +1 after 720°, and of plates that are one together', () => {
    expect(told([{ name: 'F-1', fastAxisDeg: 25, retardanceDeg: 360 }])).toContain(
      'F-1 turns the sphere by 360°: the state’s sign is −1.',
    );
    expect(told([{ name: 'F-1', fastAxisDeg: 25, retardanceDeg: 720 }])).toContain(
      'F-1 turns the sphere by 720°: the state’s sign is +1.',
    );
    const half = { fastAxisDeg: 25, retardanceDeg: 180 };
    expect(
      told([
        { name: 'H-1', ...half },
        { name: 'H-2', ...half },
      ]),
    ).toContain('The plates together bring every state back with the sign −1.');
    expect(told([{ name: 'Q', fastAxisDeg: 25, retardanceDeg: 90 }])).not.toContain('sign');
  });
});

function missing(): never {
  throw new Error('no flag');
}
