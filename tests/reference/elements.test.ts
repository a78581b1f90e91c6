import { matrix, type Matrix, multiply } from 'mathjs';
import { afterAll, expect, test } from 'vitest';
import {
  CONVENTION_SETS,
  infidelityBetween,
  type JonesMatrix,
  letterOf,
  parseState,
  radians,
  readStokes,
  retarderMatrix,
  retardStokes,
  showStokes,
  type Stokes,
} from '../../shared/optics';
import { type C, complex, type Matrix as Entries, times } from '../optics/independent';
import { Deviations } from './deviations';

const deviations = new Deviations();
afterAll(() => deviations.print('Elements against published tables, worst deviation'));

const DEGREE = Math.PI / 180;
const ROOT_HALF = Math.SQRT1_2;

function ours(retardanceDeg: number, fastAxisDeg: number): JonesMatrix {
  return retarderMatrix({
    retardanceRad: radians(retardanceDeg * DEGREE),
    fastAxisRad: radians(fastAxisDeg * DEGREE),
  });
}

function difference(found: JonesMatrix, published: Entries): number {
  return Math.max(
    ...[0, 1].flatMap((row) =>
      [0, 1].map((column) => {
        const [re, im] = found[row]?.[column] ?? [NaN, NaN];
        const wanted = published[row]?.[column] ?? complex(NaN, NaN);
        return Math.hypot(re - wanted.re, im - wanted.im);
      }),
    ),
  );
}

const c = complex;
const phase = (angle: number): C => complex(Math.cos(angle), Math.sin(angle));
const diagonal = (scale: C, a: C, b: C): Entries => [
  [times(scale, a), c(0)],
  [c(0), times(scale, b)],
];

// J. C. Wyant, Optics 513 "Jones calculus" notes: kz − ωt, R = (1, −i)/√2, fast axis at 0°, 45°, 90°.
test('Jones matrices of quarter- and half-wave plates are those of Wyant’s Optics 513 notes', () => {
  const source = 'Wyant, Optics 513 notes: quarter- and half-wave Jones matrices';
  const table: readonly (readonly [number, number, Entries])[] = [
    [90, 0, diagonal(phase(-Math.PI / 4), c(1), c(0, 1))],
    [
      90,
      45,
      [
        [c(ROOT_HALF), c(0, -ROOT_HALF)],
        [c(0, -ROOT_HALF), c(ROOT_HALF)],
      ],
    ],
    [90, 90, diagonal(phase(Math.PI / 4), c(1), c(0, -1))],
    [180, 0, diagonal(c(0, -1), c(1), c(-1))],
    [
      180,
      45,
      [
        [c(0), c(0, -1)],
        [c(0, -1), c(0)],
      ],
    ],
    [180, 90, diagonal(c(0, 1), c(1), c(-1))],
  ];
  for (const [retardance, axis, published] of table) {
    expect(deviations.note(source, difference(ours(retardance, axis), published))).toBeLessThan(1e-15);
  }
});

// Chipman, Lam, Young, Polarized Light and Optical Systems (CRC 2018), pp. 134–135, as quoted in a public file.
test('a retarder is e^{−iδ/2} diag(1, e^{iδ}) with its fast axis along x (Chipman, Lam, Young)', () => {
  for (const delta of [10, 77, 91.5, 170.4, 200]) {
    const rad = delta * DEGREE;
    const published = diagonal(phase(-rad / 2), c(1), phase(rad));
    const deviation = difference(ours(delta, 0), published);
    expect(deviations.note('Chipman, Lam, Young 2018: retarder of any δ at 0°', deviation)).toBeLessThan(
      1e-15,
    );
  }
});

// A quarter-wave plate at θ as in a QuTiP teaching notebook (amcdawes/qutip-book, JonesCalculus), up to its phase e^{iπ/4}.
test('a quarter-wave plate at any angle is [[cos² + i sin², (1−i) sin cos], […, sin² + i cos²]]', () => {
  for (let axis = -90; axis <= 180; axis += 7.5) {
    const [sin, cos] = [Math.sin(axis * DEGREE), Math.cos(axis * DEGREE)];
    const quarter = phase(-Math.PI / 4);
    const off = times(quarter, c(sin * cos, -sin * cos));
    const published: Entries = [
      [times(quarter, c(cos * cos, sin * sin)), off],
      [off, times(quarter, c(sin * sin, cos * cos))],
    ];
    const deviation = difference(ours(90, axis), published);
    expect(deviations.note('QuTiP teaching notebook: quarter-wave plate at θ', deviation)).toBeLessThan(
      1e-15,
    );
  }
});

const wyant = CONVENTION_SETS.find(({ id }) => id === 'receiver-optics-kz')?.convention;
const ieee = CONVENTION_SETS.find(({ id }) => id === 'ieee-source')?.convention;

// Hands: Wyant, R = (1, −i)/√2 with kz − ωt; CIE e-ILV 177: right is clockwise as seen by an observer receiving the light;
// IEEE Std 149-1979, 11.1: right is clockwise for an observer looking along the propagation.
test('a quarter-wave plate at +45° makes H right-handed to the receiver and left-handed to the IEEE’s source', () => {
  if (wyant === undefined || ieee === undefined) throw new Error('sets missing');
  const H: Stokes = [1, 0, 0];
  for (const [axis, receiverLetter, sourceLetter] of [
    [45, 'R', 'L'],
    [-45, 'L', 'R'],
  ] as const) {
    const made = retardStokes(
      { retardanceRad: radians(Math.PI / 2), fastAxisRad: radians(axis * DEGREE) },
      H,
    );
    expect(letterOf(made, wyant)).toBe(receiverLetter);
    expect(letterOf(made, ieee)).toBe(sourceLetter);
    const named = parseState(receiverLetter === 'R' ? '(H - i V)/sqrt(2)' : '(H + i V)/sqrt(2)', wyant);
    if (!named.ok) throw new Error(named.error.message);
    const deviation = infidelityBetween(made, named.stokes);
    expect(
      deviations.note('Wyant, CIE 177, IEEE 149: hand of H through a quarter-wave plate at ±45°', deviation),
    ).toBeLessThan(1e-30);
  }
});

test('a half-wave plate at 22.5° takes H to D, and a quarter-wave plate at 0° takes D to L (Wyant’s matrices)', () => {
  if (wyant === undefined) throw new Error('set missing');
  const half = retardStokes(
    { retardanceRad: radians(Math.PI), fastAxisRad: radians(22.5 * DEGREE) },
    [1, 0, 0],
  );
  expect(
    deviations.note('Wyant: half-wave plate at 22.5° on H', infidelityBetween(half, [0, 1, 0])),
  ).toBeLessThan(1e-30);
  const quarter = retardStokes({ retardanceRad: radians(Math.PI / 2), fastAxisRad: radians(0) }, [0, 1, 0]);
  expect(letterOf(quarter, wyant)).toBe('L');
});

// Mueller matrix of a linear retarder with S3 = +1 for R, clockwise to the receiver (+sin δ in element (3,4) for a fast-x
// retarder: public course file TFY4200 lab1_8.m; the whole matrix from memory).
function publishedMueller(deltaRad: number, axisRad: number): Matrix {
  const [co, si] = [Math.cos(2 * axisRad), Math.sin(2 * axisRad)];
  const [C, S] = [Math.cos(deltaRad), Math.sin(deltaRad)];
  return matrix([
    [1, 0, 0, 0],
    [0, co * co + si * si * C, co * si * (1 - C), -si * S],
    [0, co * si * (1 - C), si * si + co * co * C, co * S],
    [0, si * S, -co * S, C],
  ]);
}

test('the published Mueller matrix of a retarder moves shown Stokes parameters as the library does', () => {
  if (wyant === undefined) throw new Error('set missing');
  const states: readonly Stokes[] = [
    [1, 0, 0],
    [0, 1, 0],
    [0, 0, 1],
    [0.48, -0.6, 0.64],
    [-0.36, 0.48, -0.8],
  ];
  for (const delta of [0, 37, 90, 170.4, 180, 251]) {
    for (let axis = -80; axis <= 170; axis += 12.5) {
      for (const shown of states) {
        const published = multiply(publishedMueller(delta * DEGREE, axis * DEGREE), [1, ...shown]).toArray();
        const plate = { retardanceRad: radians(delta * DEGREE), fastAxisRad: radians(axis * DEGREE) };
        const [s1, s2, s3] = shown;
        const found = showStokes(retardStokes(plate, readStokes({ s1, s2, s3 }, wyant)), wyant);
        const deviation = Math.max(
          ...[found.s1, found.s2, found.s3].map((value, k) => Math.abs(value - Number(published[k + 1]))),
        );
        expect(
          deviations.note('Mueller matrix of a retarder, S3 > 0 for R to the receiver', deviation),
        ).toBeLessThan(2e-15);
      }
    }
  }
});

// James, Kwiat, Munro, White, Phys. Rev. A 64, 052312 (2001), from memory; Born & Wolf and Jackson, from memory.
test('each ready-made set gives R the Jones vector and the sign of S3 that its source prints', () => {
  for (const [id, rightJones, s3OfRight] of [
    ['receiver-optics-kz', '(H - i V)/sqrt(2)', 1],
    ['receiver-optics-wt', '(H + i V)/sqrt(2)', 1],
    ['qubit-measurement-2001', '(H - i V)/sqrt(2)', 1],
    ['positive-helicity', '(H - i V)/sqrt(2)', -1],
    // IEEE right is counter-clockwise to the receiver: (1, −i) with e^{+iωt}. V > 0 for it with the IAU.
    ['ieee-source', '(H - i V)/sqrt(2)', 1],
    ['iau-1974', '(H - i V)/sqrt(2)', 1],
  ] as const) {
    const convention = CONVENTION_SETS.find((set) => set.id === id)?.convention;
    if (convention === undefined) throw new Error(`${id} is missing`);
    const [byLetter, byVector] = ['R', rightJones].map((text) => parseState(text, convention));
    if (byLetter?.ok !== true || byVector?.ok !== true) throw new Error('unreadable');
    const deviation = infidelityBetween(byLetter.stokes, byVector.stokes);
    expect(deviations.note('Ready-made conventions: Jones vector of R', deviation), id).toBeLessThan(1e-30);
    expect(showStokes(byLetter.stokes, convention).s3, id).toBeCloseTo(s3OfRight, 15);
  }
});
