import fc from 'fast-check';
import { add, type Complex, complex, conj, cos, exp, type MathType, multiply, sin } from 'mathjs';
import { afterAll, expect, test } from 'vitest';
import { fullTurnSign, pancharatnamPhase, pathPhases } from '../../shared/optics/phase';
import { path, type Retarder } from '../../shared/optics/retarder';
import { type Stokes, stokesToJones } from '../../shared/optics/stokes';
import { radians } from '../../shared/optics/units';
import { Deviations } from '../reference/deviations';
import {
  apart,
  CLOCKWISE,
  D,
  DEGREE,
  direction,
  dot,
  enclosed,
  evenly,
  H,
  phased,
  plate,
  stack,
  triangle,
} from './on-the-sphere';

const deviations = new Deviations();
afterAll(() => deviations.print('Phases of a path, worst deviation'));

const pointsOf = (input: Stokes, plates: readonly Retarder[], step: number): readonly Stokes[] =>
  path(input, plates, radians(step)).turns.flatMap(({ points }) => points);

// S. Pancharatnam, Proc. Indian Acad. Sci. A44, 247 (1956): the phase is half the solid angle; an octant has π/2.
test('Pancharatnam’s octant H → D → R → H gives a phase of π/4, by polygon and by two quarter-wave plates', () => {
  expect(Math.abs(triangle(H, D, CLOCKWISE))).toBeCloseTo(Math.PI / 2, 15);
  const polygon = pancharatnamPhase([H, D, CLOCKWISE]);
  const note = (deviation: number) =>
    deviations.note('Pancharatnam 1956: octant, phase π/4 for solid angle π/2', deviation);
  expect(note(apart(polygon, -triangle(H, D, CLOCKWISE) / 2))).toBeLessThan(1e-15);
  expect(note(Math.abs(Math.abs(polygon ?? NaN) - Math.PI / 4))).toBeLessThan(1e-15);
  expect(note(apart(pancharatnamPhase([H, CLOCKWISE, D]), -(polygon ?? NaN)))).toBeLessThan(1e-15);

  // H → R → D along great circles, then D → H by the shortest way: the octant the other way round, nothing dynamic.
  const turned = pathPhases(H, [plate(90, 45), plate(90, 0)]);
  expect(Math.abs(turned.dynamicRad)).toBeLessThan(1e-15);
  expect(note(apart(turned.geometricRad, -triangle(H, CLOCKWISE, D) / 2))).toBeLessThan(1e-15);
  expect(turned.solidAngleSr).toBeCloseTo(Math.PI / 2, 14);
});

test('a polygon of states has minus half its solid angle, whatever their own phases', () => {
  fc.assert(
    fc.property(direction, direction, direction, evenly(0, 6), (a, b, c, chi) => {
      fc.pre(Math.min(dot(a, b), dot(b, c), dot(c, a)) > -0.999);
      const wanted = -triangle(a, b, c) / 2;
      const found = pancharatnamPhase([a, phased(stokesToJones(b), chi), c]);
      expect(
        deviations.note('Van Oosterom & Strackee 1983: triangles of states', apart(found, wanted)),
      ).toBeLessThan(1e-12);
    }),
  );
});

test('once round a small circle: −π(1 − cos of its radius), the solid angle of a cap being 2π(1 − cos)', () => {
  for (const axisDeg of [0, 20, 71.5]) {
    for (const radiusDeg of [5, 30, 60, 90, 120, 179]) {
      // A linear state at this distance from the axis on the sphere.
      const azimuth = (2 * axisDeg + radiusDeg) * DEGREE;
      const state: Stokes = [Math.cos(azimuth), Math.sin(azimuth), 0];
      const round = pathPhases(state, [plate(360, axisDeg)]);
      const cap = 2 * Math.PI * (1 - Math.cos(radiusDeg * DEGREE));
      expect(
        deviations.note('Small circles: −Ω/2 with Ω = 2π(1 − cos)', apart(round.geometricRad, -cap / 2)),
      ).toBeLessThan(1e-13);
      expect(apart(round.solidAngleSr, cap, 4 * Math.PI)).toBeLessThan(1e-12);
      expect(round.dynamicRad).toBeCloseTo(-Math.PI * Math.cos(radiusDeg * DEGREE), 13);
      expect(round.totalRad).toBeCloseTo(Math.PI, 12);
      expect(round.sign).toBe(-1);
    }
  }
});

test('any path: the geometric phase is minus half the solid angle, closed by the shortest great circle', () => {
  fc.assert(
    fc.property(direction, stack, (input, plates) => {
      const coarse = pointsOf(input, plates, 0.02);
      fc.pre(coarse.every((point) => dot(point, input) > -0.98));
      // A polygon within the arcs misses its area by the square of the step: one step of Richardson takes that away.
      const area =
        (4 * enclosed(pointsOf(input, plates, 0.005)) - enclosed(pointsOf(input, plates, 0.01))) / 3;
      const { geometricRad, solidAngleSr } = pathPhases(input, plates);
      expect(
        deviations.note(
          'Arcs of 1 to 4 plates: −Ω/2 by triangles (Van Oosterom & Strackee)',
          apart(geometricRad, -area / 2),
        ),
      ).toBeLessThan(1e-7);
      expect(apart(solidAngleSr, area, 4 * Math.PI)).toBeLessThan(2e-7);
    }),
    { numRuns: 60 },
  );
});

/** ψ after a part of a plate, and ⟨ψ|H|ψ⟩ per radian of turn, in mathjs's complex numbers. */
function byTheBook(state: readonly Complex[], { retardanceRad, fastAxisRad }: Retarder, share: number) {
  const [c, s] = [cos(fastAxisRad), sin(fastAxisRad)];
  const delay = (sign: 1 | -1) => exp(complex(0, (sign * retardanceRad * share) / 2));
  const [a = complex(0, 0), b = complex(0, 0)] = state;
  const along = multiply(delay(-1), sum(multiply(c, a), multiply(s, b)));
  const across = multiply(delay(1), sum(multiply(-s, a), multiply(c, b)));
  const after = [sum(multiply(c, along), multiply(-s, across)), sum(multiply(s, along), multiply(c, across))];
  // H = (cos 2θ σz + sin 2θ σx)/2 per radian.
  const [x = complex(0, 0), y = complex(0, 0)] = after;
  const [c2, s2] = [Math.cos(2 * fastAxisRad), Math.sin(2 * fastAxisRad)];
  const energy = 0.5 * (c2 * (abs2(x) - abs2(y)) + 2 * s2 * toComplex(multiply(conj(x), y)).re);
  return { after, energy };
}
const toComplex = (value: MathType): Complex => {
  if (typeof value === 'number') return complex(value, 0);
  if (typeof value === 'object' && 're' in value && 'im' in value) return complex(value.re, value.im);
  throw new Error('not a complex number');
};
const sum = (a: MathType, b: MathType): Complex => toComplex(add(toComplex(a), toComplex(b)));
const abs2 = (z: Complex): number => z.re * z.re + z.im * z.im;

test('total and dynamic phase are those of a numerical integration in mathjs', () => {
  fc.assert(
    fc.property(direction, stack, (input, plates) => {
      const { aRe, aIm, bRe, bIm } = stokesToJones(input);
      const start = [complex(aRe, aIm), complex(bRe, bIm)];
      let state: readonly Complex[] = start;
      let dynamic = 0;
      for (const one of plates) {
        // Simpson's rule; the integrand is constant but the integration doesn't know.
        const [begin, middle, end] = [0, 0.5, 1].map((share) => byTheBook(state, one, share));
        if (begin === undefined || middle === undefined || end === undefined) throw new Error('no steps');
        dynamic -= (one.retardanceRad * (begin.energy + 4 * middle.energy + end.energy)) / 6;
        state = end.after;
      }
      const inner = start.reduce(
        (total, part, k) => sum(total, multiply(conj(part), state[k] ?? 0)),
        complex(0, 0),
      );
      fc.pre(Math.sqrt(abs2(inner)) > 1e-3);
      const found = pathPhases(input, plates);
      expect(
        deviations.note('Total phase against mathjs', apart(found.totalRad, Math.atan2(inner.im, inner.re))),
      ).toBeLessThan(1e-11);
      expect(
        deviations.note('Dynamic phase against mathjs', Math.abs(found.dynamicRad - dynamic)),
      ).toBeLessThan(1e-12);
      expect(apart(found.geometricRad, Math.atan2(inner.im, inner.re) - dynamic)).toBeLessThan(1e-11);
    }),
    { numRuns: 200 },
  );
});

test('a turn of 360° gives −1, of 720° gives +1, for every state and axis', () => {
  fc.assert(
    fc.property(direction, evenly(-180, 180), (state, axisDeg) => {
      const once = pathPhases(state, [plate(360, axisDeg)]);
      expect(once.sign).toBe(-1);
      expect(once.totalRad).toBeCloseTo(Math.PI, 9);
      for (const plates of [[plate(720, axisDeg)], [plate(360, axisDeg), plate(360, axisDeg + 30)]]) {
        const twice = pathPhases(state, plates);
        expect(twice.sign).toBe(1);
        expect(twice.totalRad).toBeCloseTo(0, 9);
      }
    }),
  );
  expect(fullTurnSign([plate(180, 10), plate(180, 10)])).toBe(-1);
  expect(fullTurnSign([plate(360, 10), plate(360, 80)])).toBe(1);
  expect(fullTurnSign([])).toBe(1);
  expect(fullTurnSign([plate(90, 10)])).toBeNull();
  // An eigenstate comes back with a phase that is neither sign.
  expect(pathPhases(H, [plate(90, 0)]).sign).toBeNull();
});

test('a plate cut in two, or a path gone back, changes nothing that it shouldn’t', () => {
  fc.assert(
    fc.property(direction, stack, (input, plates) => {
      const whole = pathPhases(input, plates);
      const halves = plates.flatMap((one) => {
        const half = { ...one, retardanceRad: radians(one.retardanceRad / 2) };
        return [half, half];
      });
      const cut = pathPhases(input, halves);
      expect(Math.abs(cut.dynamicRad - whole.dynamicRad)).toBeLessThan(1e-12);
      const back = [...plates]
        .reverse()
        .map((one) => ({ ...one, retardanceRad: radians(0 - one.retardanceRad) }));
      const home = pathPhases(input, [...plates, ...back]);
      expect(home.sign).toBe(1);
      expect(Math.abs(home.dynamicRad)).toBeLessThan(1e-12);
      expect(apart(home.geometricRad, 0)).toBeLessThan(1e-12);
      whole.afterPlate.forEach((after, k) => {
        const prefix = pathPhases(input, plates.slice(0, k + 1));
        expect(after.totalRad).toBe(prefix.totalRad);
        expect(after.dynamicRad).toBe(prefix.dynamicRad);
      });
      const own = whole.afterPlate.reduce((total, { ownDynamicRad }) => total + ownDynamicRad, 0);
      expect(own).toBeCloseTo(whole.dynamicRad, 12);
    }),
  );
});

test('the input’s own global phase and length are no part of any phase', () => {
  fc.assert(
    fc.property(direction, stack, evenly(-6, 6), evenly(0.01, 100), (input, plates, chi, length) => {
      const plain = pathPhases(input, plates);
      fc.pre(plain.totalRad !== null);
      const { aRe, aIm, bRe, bIm } = phased(stokesToJones(input), chi);
      const scaled = { aRe: length * aRe, aIm: length * aIm, bRe: length * bRe, bIm: length * bIm };
      const turned = pathPhases(scaled, plates);
      fc.pre(Math.abs(dot(input, path(input, plates, radians(9)).statesAfter.at(-1) ?? input) + 1) > 1e-6);
      expect(
        deviations.note(
          'Geometric phase under a global phase',
          apart(turned.geometricRad, plain.geometricRad ?? NaN),
        ),
      ).toBeLessThan(1e-11);
      expect(turned.dynamicRad).toBeCloseTo(plain.dynamicRad, 12);
    }),
  );
});
