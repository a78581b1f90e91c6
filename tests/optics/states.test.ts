import fc from 'fast-check';
import { expect, test } from 'vitest';
import {
  blochToStokes,
  compose,
  ellipseOf,
  ellipseToStokes,
  fieldAt,
  fieldTrace,
  infidelityBetween,
  type JonesVector,
  jonesNorm,
  jonesToStokes,
  normaliseJones,
  path,
  quaternionMatrix,
  radians,
  type Retarder,
  retarderMatrix,
  retarderQuaternion,
  retardJones,
  retardStokes,
  rotate,
  stackQuaternion,
  type Stokes,
  stokesToBloch,
  stokesToJones,
} from '../../shared/optics';
import { plate as plateByTheBook } from './independent';

const part = fc.double({ min: -1, max: 1, noNaN: true });
const jones = fc
  .record({ aRe: part, aIm: part, bRe: part, bIm: part })
  .filter((vector) => jonesNorm(vector) > 1e-3);
const angle = fc.double({ min: -7, max: 7, noNaN: true }).map(radians);
const retarder = fc.record({ retardanceRad: angle, fastAxisRad: angle });

function distance(a: readonly number[], b: readonly number[]): number {
  return Math.max(...a.map((value, k) => Math.abs(value - (b[k] ?? NaN))));
}

function parts({ aRe, aIm, bRe, bIm }: JonesVector): readonly number[] {
  return [aRe, aIm, bRe, bIm];
}

test('Jones to Stokes and back is the same state with the phase fixed', () => {
  fc.assert(
    fc.property(jones, (vector) => {
      const stokes = jonesToStokes(vector);
      expect(Math.hypot(...stokes)).toBeCloseTo(1, 14);
      const back = stokesToJones(stokes);
      expect(infidelityBetween(jonesToStokes(back), stokes)).toBeLessThan(1e-30);
      expect(back.aIm).toBe(0);
      expect(back.aRe).toBeGreaterThanOrEqual(0);
    }),
  );
});

test('a global phase and a length change nothing', () => {
  fc.assert(
    fc.property(
      jones,
      angle,
      fc.double({ min: 1e-200, max: 1e200, noNaN: true }),
      (vector, phase, length) => {
        const [c, s] = [Math.cos(phase) * length, Math.sin(phase) * length];
        const other = {
          aRe: vector.aRe * c - vector.aIm * s,
          aIm: vector.aRe * s + vector.aIm * c,
          bRe: vector.bRe * c - vector.bIm * s,
          bIm: vector.bRe * s + vector.bIm * c,
        };
        expect(infidelityBetween(jonesToStokes(other), jonesToStokes(vector))).toBeLessThan(1e-29);
      },
    ),
  );
});

test('the zero vector and endless parts are refused by name', () => {
  const zero = { aRe: 0, aIm: 0, bRe: 0, bIm: 0 };
  expect(() => normaliseJones(zero)).toThrow(/no state/);
  expect(() => normaliseJones({ ...zero, aRe: Infinity })).toThrow(RangeError);
  expect(() => normaliseJones({ ...zero, aRe: NaN })).toThrow(RangeError);
  expect(() => stokesToJones([0, 0, 0])).toThrow(/no direction/);
});

test('ellipse and Stokes vector are the same state', () => {
  fc.assert(
    fc.property(jones, (vector) => {
      const stokes = jonesToStokes(vector);
      const ellipse = ellipseOf(stokes);
      expect(ellipse.azimuthRad).toBeGreaterThan(-Math.PI / 2 - 1e-15);
      expect(ellipse.azimuthRad).toBeLessThanOrEqual(Math.PI / 2);
      expect(Math.abs(ellipse.ellipticityRad)).toBeLessThanOrEqual(Math.PI / 4);
      expect(infidelityBetween(ellipseToStokes(ellipse), stokes)).toBeLessThan(1e-29);
    }),
  );
});

test('at the poles the azimuth means nothing and is written as 0', () => {
  expect(ellipseOf([0, 0, 1])).toEqual({ azimuthRad: 0, ellipticityRad: Math.PI / 4 });
  expect(ellipseOf([0, 0, -1])).toEqual({ azimuthRad: 0, ellipticityRad: -Math.PI / 4 });
});

test('the field of a state with S3 above 0 turns counter-clockwise as the receiver sees it', () => {
  fc.assert(
    fc.property(jones, angle, (vector, phase) => {
      const [, , s3] = jonesToStokes(vector);
      fc.pre(Math.abs(s3) > 1e-3);
      const now = fieldAt(vector, phase);
      const soon = fieldAt(vector, radians(phase + 1e-4));
      expect(Math.sign(now.h * soon.v - now.v * soon.h)).toBe(Math.sign(s3));
    }),
  );
});

test('a trace closes after one period', () => {
  const trace = fieldTrace({ aRe: 0.6, aIm: 0.1, bRe: 0.2, bIm: -0.7 }, 48);
  expect(trace).toHaveLength(49);
  expect(trace[48]?.h).toBeCloseTo(trace[0]?.h ?? NaN, 13);
  expect(trace[48]?.v).toBeCloseTo(trace[0]?.v ?? NaN, 13);
});

test('the matrix of a retarder is the one by the book, entry by entry', () => {
  fc.assert(
    fc.property(retarder, (plate) => {
      const ours = retarderMatrix(plate).flat(2);
      const book = plateByTheBook(plate.retardanceRad, plate.fastAxisRad)
        .flat()
        .flatMap(({ re, im }) => [re, im]);
      expect(distance(ours, book)).toBeLessThan(1e-14);
    }),
  );
});

test('matrix, quaternion and rotation of the sphere take a state to the same place', () => {
  fc.assert(
    fc.property(retarder, jones, (plate, vector) => {
      const stokes = jonesToStokes(vector);
      const turned = retardStokes(plate, stokes);
      expect(distance(turned, jonesToStokes(retardJones(plate, vector)))).toBeLessThan(3e-14);
      const byQuaternion = blochToStokes(rotate(retarderQuaternion(plate), stokesToBloch(stokes)));
      expect(distance(turned, byQuaternion)).toBeLessThan(3e-14);
      expect(jonesNorm(retardJones(plate, vector))).toBeCloseTo(jonesNorm(vector), 13);
    }),
  );
});

test('a stack is the product of its plates, later plates on the left', () => {
  fc.assert(
    fc.property(fc.array(retarder, { maxLength: 6 }), jones, (plates, vector) => {
      const stokes = jonesToStokes(vector);
      const byStack = blochToStokes(rotate(stackQuaternion(plates), stokesToBloch(stokes)));
      const onePlateAfterAnother = plates.reduce<Stokes>(
        (state, plate) => retardStokes(plate, state),
        stokes,
      );
      expect(distance(byStack, onePlateAfterAnother)).toBeLessThan(1e-13);
    }),
  );
});

test('half a turn of the plate is the same plate, a full turn on the sphere is −1, two are 1', () => {
  fc.assert(
    fc.property(retarder, (plate) => {
      const half: Retarder = { ...plate, fastAxisRad: radians(plate.fastAxisRad + Math.PI) };
      expect(distance(retarderMatrix(half).flat(2), retarderMatrix(plate).flat(2))).toBeLessThan(1e-13);
      const once = retarderMatrix({ ...plate, retardanceRad: radians(plate.retardanceRad + 2 * Math.PI) });
      const minus = retarderMatrix(plate)
        .flat(2)
        .map((value) => -value);
      expect(distance(once.flat(2), minus)).toBeLessThan(1e-13);
    }),
  );
});

test('quaternions compose like their matrices', () => {
  fc.assert(
    fc.property(retarder, retarder, jones, (one, two, vector) => {
      const [[a, b], [c, d]] = quaternionMatrix(compose(retarderQuaternion(two), retarderQuaternion(one)));
      const direct = retardJones(two, retardJones(one, vector));
      const mult = (m: readonly [number, number], re: number, im: number): readonly [number, number] => [
        m[0] * re - m[1] * im,
        m[0] * im + m[1] * re,
      ];
      const [aa, bb] = [mult(a, vector.aRe, vector.aIm), mult(b, vector.bRe, vector.bIm)];
      const [cc, dd] = [mult(c, vector.aRe, vector.aIm), mult(d, vector.bRe, vector.bIm)];
      const product = [aa[0] + bb[0], aa[1] + bb[1], cc[0] + dd[0], cc[1] + dd[1]];
      expect(distance(product, parts(direct))).toBeLessThan(1e-13);
    }),
  );
});

test('a path ends where the plates end, keeps to the sphere and turns about each fast axis', () => {
  fc.assert(
    fc.property(fc.array(retarder, { minLength: 1, maxLength: 4 }), jones, (plates, vector) => {
      const input = jonesToStokes(vector);
      const { statesAfter, turns } = path(input, plates, radians(Math.PI / 36));
      expect(turns).toHaveLength(plates.length);
      let state = input;
      plates.forEach((plate, k) => {
        const turn = turns[k];
        if (turn === undefined) throw new Error('a plate without a turn');
        expect(distance(turn.from, state)).toBe(0);
        state = retardStokes(plate, state);
        expect(distance(turn.to, state)).toBe(0);
        expect(distance(turn.points.at(-1) ?? [], state)).toBeLessThan(1e-14);
        expect(turn.sweepRad).toBe(plate.retardanceRad);
        const along = (p: Stokes): number => p[0] * turn.axis[0] + p[1] * turn.axis[1] + p[2] * turn.axis[2];
        for (const point of turn.points) {
          expect(along(point)).toBeCloseTo(along(turn.from), 12);
          expect(Math.hypot(...point)).toBeCloseTo(1, 12);
        }
      });
      expect(statesAfter.at(-1)).toEqual(state);
    }),
    { numRuns: 60 },
  );
});
