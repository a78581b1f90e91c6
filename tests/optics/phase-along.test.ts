import fc from 'fast-check';
import { expect, test } from 'vitest';
import { flagOf, pancharatnamPhase, pathPhases, phaseAlong, showPhases } from '../../shared/optics/phase';
import { path, retardJones, retardStokes } from '../../shared/optics/retarder';
import { jonesToStokes, type Stokes, stokesToJones } from '../../shared/optics/stokes';
import { radians } from '../../shared/optics/units';
import {
  anyPlate,
  chord,
  CLOCKWISE,
  cross,
  D,
  direction,
  dot,
  evenly,
  H,
  phased,
  plate,
  stack,
} from './on-the-sphere';

test('behind plates that make the opposite state there is no total phase, and nothing is ever NaN', () => {
  const opposite = pathPhases(H, [plate(180, 45)]);
  expect(opposite).toMatchObject({ totalRad: null, geometricRad: null, solidAngleSr: null, sign: null });
  expect(opposite.dynamicRad).toBeCloseTo(0, 15);
  expect(pancharatnamPhase([H, D, [-1, 0, 0]])).toBeNull();
  const step = fc.integer({ min: -8, max: 8 }).map((k) => 45 * k);
  fc.assert(
    fc.property(
      fc.constantFrom<Stokes>(H, D, CLOCKWISE, [-1, 0, 0], [0, -1, 0], [0, 0, 1]),
      fc.array(
        fc.tuple(step, step).map(([delta, axis]) => plate(delta, axis)),
        { maxLength: 4 },
      ),
      (input, plates) => {
        for (const point of phaseAlong(input, plates, radians(0.3)).flat()) {
          for (const value of [
            point.totalRad ?? 0,
            point.dynamicRad,
            point.geometricRad ?? 0,
            ...point.flag,
          ]) {
            expect(Number.isFinite(value)).toBe(true);
          }
          if (point.totalRad !== null) expect(Math.abs(point.totalRad)).toBeLessThanOrEqual(Math.PI);
        }
      },
    ),
  );
});

test('the points along the path are those that the sphere draws, and end where the plates do', () => {
  fc.assert(
    fc.property(direction, stack, evenly(0.02, 2), (input, plates, step) => {
      const arcs = phaseAlong(input, plates, radians(step));
      const drawn = path(input, plates, radians(step));
      const after = pathPhases(input, plates).afterPlate;
      arcs.forEach((points, k) => {
        const turn = drawn.turns[k];
        expect(points.length).toBe(turn?.points.length);
        points.forEach(({ stokes, flag }, j) => {
          const there = turn?.points[j] ?? [NaN, NaN, NaN];
          expect(chord(stokes, there)).toBeLessThan(1e-12);
          expect(Math.abs(dot(flag, stokes))).toBeLessThan(1e-13);
          expect(dot(flag, flag)).toBeCloseTo(1, 12);
        });
        expect(points.at(-1)?.dynamicRad).toBe(after[k]?.dynamicRad);
        expect(points.at(-1)?.totalRad).toBe(after[k]?.totalRad);
      });
    }),
    { numRuns: 60 },
  );
  expect(() => phaseAlong(H, [], radians(0))).toThrow(RangeError);
});

test('a plate carries the flag rigidly with the sphere; a phase turns it twice as far, backwards', () => {
  fc.assert(
    fc.property(direction, anyPlate, evenly(-3, 3), (input, one, chi) => {
      const jones = phased(stokesToJones(input), 0.7);
      const carried = retardStokes(one, flagOf(jones));
      const found = flagOf(retardJones(one, jones));
      expect(chord(found, carried)).toBeLessThan(1e-13);
      const p = jonesToStokes(jones);
      const flag = flagOf(jones);
      const side = cross(p, flag);
      const turned = flagOf(phased(jones, chi));
      expect(dot(turned, flag)).toBeCloseTo(Math.cos(2 * chi), 12);
      expect(dot(turned, side)).toBeCloseTo(-Math.sin(2 * chi), 12);
    }),
  );
  expect(flagOf({ aRe: 1, aIm: 0, bRe: 0, bIm: 0 })).toEqual([-0, 1, -0]);
  expect(() => flagOf({ aRe: 0, aIm: 0, bRe: 0, bIm: 0 })).toThrow(RangeError);
});

test('under ωt − kz every phase is shown with the other sign, and half a turn stays half a turn', () => {
  const other = { phase: 'wt-kz', handedness: 'receiver', s3Sign: 'R' } as const;
  const own = { ...other, phase: 'kz-wt' } as const;
  const phases = pathPhases(H, [plate(90, 45), plate(90, 0)]);
  const { totalRad, dynamicRad, geometricRad } = phases;
  expect(showPhases(phases, own)).toEqual({ totalRad, dynamicRad, geometricRad });
  expect((showPhases(phases, other).totalRad ?? NaN) + (totalRad ?? NaN)).toBe(0);
  const round = showPhases(pathPhases(D, [plate(360, 0)]), other);
  expect(round.totalRad).toBeCloseTo(Math.PI, 12);
  const still = showPhases(pathPhases(H, []), other);
  expect([still.totalRad, still.dynamicRad, still.geometricRad]).toEqual([0, 0, 0]);
});
