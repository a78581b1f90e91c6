import fc from 'fast-check';
import { complex, type Complex, conj, matrix, type Matrix, multiply, trace, transpose } from 'mathjs';
import { expect, test } from 'vitest';
import {
  circularState,
  type Convention,
  describeState,
  infidelityBetween,
  type JonesMatrix,
  jonesToStokes,
  type JonesVector,
  type MuellerMatrix,
  muellerMatrix,
  muellerOfJones,
  parseState,
  polariserMatrix,
  readStokes,
  retarderMatrix,
  retardJones,
  retardStokes,
  showMueller,
  type ShownMueller,
  showStokes,
  type Stokes,
  stokesToJones,
  translateJones,
  translateMatrix,
} from '../../shared/optics';
import { anyPlate, direction, evenly } from './on-the-sphere';

const convention: fc.Arbitrary<Convention> = fc.record({
  phase: fc.constantFrom('kz-wt' as const, 'wt-kz' as const),
  handedness: fc.constantFrom('receiver' as const, 'source' as const),
  s3Sign: fc.constantFrom('R' as const, 'L' as const),
});
const entry = fc.tuple(evenly(-1, 1), evenly(-1, 1));
const anyMatrix: fc.Arbitrary<JonesMatrix> = fc.tuple(entry, entry, entry, entry).map(([a, b, c, d]) => [
  [a, b],
  [c, d],
]);

function act([[a, b], [c, d]]: JonesMatrix, { aRe, aIm, bRe, bIm }: JonesVector): JonesVector {
  return {
    aRe: a[0] * aRe - a[1] * aIm + b[0] * bRe - b[1] * bIm,
    aIm: a[0] * aIm + a[1] * aRe + b[0] * bIm + b[1] * bRe,
    bRe: c[0] * aRe - c[1] * aIm + d[0] * bRe - d[1] * bIm,
    bIm: c[0] * aIm + c[1] * aRe + d[0] * bIm + d[1] * bRe,
  };
}

const jonesApart = (one: JonesVector, other: JonesVector) =>
  Math.hypot(one.aRe - other.aRe, one.aIm - other.aIm, one.bRe - other.bRe, one.bIm - other.bIm);

function through(rows: MuellerMatrix, stokes: readonly number[]): readonly number[] {
  return rows.map((row) => row.reduce((sum, value, k) => sum + value * (stokes[k] ?? NaN), 0));
}
const apart = (one: readonly number[], other: readonly number[]) =>
  Math.hypot(...one.map((value, k) => value - (other[k] ?? NaN)));
const shownRow = (stokes: Stokes, how: Convention) => {
  const { s1, s2, s3 } = showStokes(stokes, how);
  return [1, s1, s2, s3];
};

test('matrices go out and come back in the same bits, Jones and Mueller', () => {
  fc.assert(
    fc.property(anyMatrix, convention, (jones, how) => {
      expect(translateMatrix(translateMatrix(jones, how), how)).toEqual(jones);
      const mueller = muellerOfJones(jones);
      expect(showMueller(showMueller(mueller, how).rows, how).rows).toEqual(mueller);
    }),
  );
});

test('a written matrix on a written vector is the written result', () => {
  fc.assert(
    fc.property(anyMatrix, direction, convention, (jones, state, how) => {
      const vector = stokesToJones(state);
      const inside = translateJones(act(jones, vector), how);
      const written = act(translateMatrix(jones, how), translateJones(vector, how));
      expect(jonesApart(inside, written)).toBeLessThan(1e-15);
    }),
  );
});

test('in every convention a Mueller matrix as shown acts on Stokes parameters as shown as the plate acts on the light', () => {
  fc.assert(
    fc.property(anyPlate, direction, convention, (plate, state, how) => {
      const shown: ShownMueller = showMueller(muellerMatrix(plate), how);
      const after = retardStokes(plate, state);
      expect(apart(through(shown.rows, shownRow(state, how)), shownRow(after, how))).toBeLessThan(1e-14);
      const byJones = jonesToStokes(retardJones(plate, stokesToJones(state)));
      expect(apart(through(shown.rows, shownRow(state, how)), shownRow(byJones, how))).toBeLessThan(1e-14);
      const viaMatrix = showMueller(muellerOfJones(retarderMatrix(plate)), how);
      viaMatrix.rows.forEach((row, k) => expect(apart(row, shown.rows[k] ?? [])).toBeLessThan(1e-14));
    }),
  );
});

const PAULI: readonly Matrix[] = [
  matrix([
    [complex(1, 0), complex(0, 0)],
    [complex(0, 0), complex(1, 0)],
  ]),
  matrix([
    [complex(1, 0), complex(0, 0)],
    [complex(0, 0), complex(-1, 0)],
  ]),
  matrix([
    [complex(0, 0), complex(1, 0)],
    [complex(1, 0), complex(0, 0)],
  ]),
  matrix([
    [complex(0, 0), complex(0, -1)],
    [complex(0, 1), complex(0, 0)],
  ]),
];

test('the Mueller matrix of any Jones matrix is ½ tr(σ J σ J†), by mathjs', () => {
  fc.assert(
    fc.property(anyMatrix, (jones) => {
      const found = muellerOfJones(jones);
      const J = matrix(jones.map((row) => row.map(([re, im]): Complex => complex(re, im))));
      const dagger = conj(transpose(J));
      PAULI.forEach((left, i) =>
        PAULI.forEach((right, j) => {
          const value = complex(String(trace(multiply(multiply(multiply(left, J), right), dagger))));
          expect(Math.abs(value.re / 2 - (found[i]?.[j] ?? NaN))).toBeLessThan(1e-14);
          expect(Math.abs(value.im)).toBeLessThan(1e-14);
        }),
      );
    }),
    { numRuns: 100 },
  );
});

test('a polariser passes its own state and nothing of the opposite one', () => {
  fc.assert(
    fc.property(direction, direction, (passed, state) => {
      const out = act(polariserMatrix(passed), stokesToJones(state));
      const intensity = out.aRe ** 2 + out.aIm ** 2 + out.bRe ** 2 + out.bIm ** 2;
      expect(intensity).toBeCloseTo(1 - infidelityBetween(state, passed), 13);
      if (intensity > 1e-6) expect(infidelityBetween(jonesToStokes(out), passed)).toBeLessThan(1e-20);
    }),
  );
});

// Fixed digits: an expression takes no exponents from a value near 0.
const digits = (value: number) => value.toFixed(16);

test('whatever a lab is shown of a state, typed back in its convention, is the same light', () => {
  fc.assert(
    fc.property(direction, convention, (state, how) => {
      const shown = describeState(state, how);
      const { jones, bloch, stokes, ellipse } = shown;
      const texts = [
        `[${digits(jones.aRe)} + i ${digits(jones.aIm)}, ${digits(jones.bRe)} + (${digits(jones.bIm)}) i]`,
        `bloch(${digits(bloch.polarRad)} rad, ${digits(bloch.azimuthRad)} rad)`,
        `stokes(${digits(stokes.s1)}, ${digits(stokes.s2)}, ${digits(stokes.s3)})`,
        `ellipse(${digits(ellipse.azimuthRad)} rad, ${digits(ellipse.shownEllipticityRad)} rad)`,
      ];
      for (const text of texts) {
        const reading = parseState(text, how);
        if (!reading.ok) throw new Error(`${text}: ${reading.error.message}`);
        expect(infidelityBetween(reading.stokes, state), text).toBeLessThan(1e-28);
      }
      expect(readStokes(stokes, how)).toEqual(state);
      // The letter is that of the circular state on the same side.
      if (shown.letter !== null) {
        expect(Math.sign(circularState(shown.letter, how)[2])).toBe(Math.sign(state[2]));
        expect(shown.rotation).toBe(state[2] > 0 ? 'counter-clockwise' : 'clockwise');
      } else expect(shown.rotation).toBeNull();
    }),
  );
});

test('the Bloch vector as written is that of the Jones vector as written', () => {
  fc.assert(
    fc.property(direction, convention, (state, how) => {
      const { jones, bloch } = describeState(state, how);
      const { aRe, aIm, bRe, bIm } = jones;
      expect(bloch.x).toBeCloseTo(2 * (aRe * bRe + aIm * bIm), 13);
      expect(bloch.y).toBeCloseTo(2 * (aRe * bIm - aIm * bRe), 13);
      expect(bloch.z).toBeCloseTo(aRe ** 2 + aIm ** 2 - bRe ** 2 - bIm ** 2, 13);
    }),
  );
  const wtKz: Convention = { phase: 'wt-kz', handedness: 'receiver', s3Sign: 'R' };
  expect(describeState([-1, 0, 0], wtKz)).toMatchObject({
    bloch: { x: 0, y: 0, z: -1, azimuthRad: 0 },
    letter: null,
    rotation: null,
  });
  expect(() => describeState([0, 0, 0], wtKz)).toThrow(RangeError);
});
