import { complex, type Complex, exp, matrix, multiply, type Matrix } from 'mathjs';
import { afterAll, expect, test } from 'vitest';
import {
  circularState,
  type Convention,
  CONVENTION_SETS,
  type JonesMatrix,
  muellerMatrix,
  type MuellerMatrix,
  muellerOfJones,
  polariserMatrix,
  quaternionMatrix,
  radians,
  retarderMatrix,
  showMueller,
  stackQuaternion,
  type Stokes,
  translateMatrix,
} from '../../shared/optics';
import { Deviations } from './deviations';

const deviations = new Deviations();
afterAll(() => deviations.print('Element tables (references.md 3.1, 3.2), worst deviation'));

const DEGREE = Math.PI / 180;
const I = complex(0, 1);
const c = (re: number, im = 0) => complex(re, im);
const scaled = (scale: Complex | number, rows: readonly (readonly Complex[])[]): Matrix =>
  matrix(rows.map((row) => row.map((entry) => complex(String(multiply(scale, entry))))));
const phase = (deg: number): Complex => exp(complex(0, deg * DEGREE));

const plate = (retardanceDeg: number, fastAxisDeg: number) => ({
  retardanceRad: radians(retardanceDeg * DEGREE),
  fastAxisRad: radians(fastAxisDeg * DEGREE),
});
const ours = (retardanceDeg: number, fastAxisDeg: number) =>
  retarderMatrix(plate(retardanceDeg, fastAxisDeg));
const linear = (deg: number): Stokes => [Math.cos(2 * deg * DEGREE), Math.sin(2 * deg * DEGREE), 0];

function apart(found: JonesMatrix, published: Matrix, conjugated = false): number {
  return Math.max(
    ...found.flatMap((row, i) =>
      row.map(([re, im], j) => {
        const wanted: Complex = complex(String(published.get([i, j])));
        return Math.hypot(re - wanted.re, im - (conjugated ? -wanted.im : wanted.im));
      }),
    ),
  );
}

const WT_KZ: Convention = { phase: 'wt-kz', handedness: 'receiver', s3Sign: 'R' };
const wyant = CONVENTION_SETS.find(({ id }) => id === 'receiver-optics-kz')?.convention;
if (wyant === undefined) throw new Error('set missing');
const receiverR: Convention = wyant;
const half = Math.SQRT1_2;
const [zero, one] = [c(0), c(1)];
const delta = 77;
const [cd, sd] = [Math.cos((delta / 2) * DEGREE), Math.sin((delta / 2) * DEGREE)];

// references.md 3.1: Wyant, Optics 513 notes (plates, polarisers, R and L); the same in a QuTiP teaching notebook; Hecht
// ch. 8 (from memory); retarder of any δ after Chipman, Lam, Young.
const JONES_TABLE: readonly (readonly [string, JonesMatrix, Matrix])[] = [
  [
    'polariser 0°',
    polariserMatrix(linear(0)),
    scaled(1, [
      [one, zero],
      [zero, zero],
    ]),
  ],
  [
    'polariser 45°',
    polariserMatrix(linear(45)),
    scaled(0.5, [
      [one, one],
      [one, one],
    ]),
  ],
  [
    'polariser 90°',
    polariserMatrix(linear(90)),
    scaled(1, [
      [zero, zero],
      [zero, one],
    ]),
  ],
  [
    'QWP 0°',
    ours(90, 0),
    scaled(phase(-45), [
      [one, zero],
      [zero, I],
    ]),
  ],
  [
    'QWP 45°',
    ours(90, 45),
    scaled(half, [
      [one, c(0, -1)],
      [c(0, -1), one],
    ]),
  ],
  [
    'QWP 90°',
    ours(90, 90),
    scaled(phase(45), [
      [one, zero],
      [zero, c(0, -1)],
    ]),
  ],
  [
    'HWP 0°',
    ours(180, 0),
    scaled(c(0, -1), [
      [one, zero],
      [zero, c(-1)],
    ]),
  ],
  [
    'HWP 45°',
    ours(180, 45),
    scaled(c(0, -1), [
      [zero, one],
      [one, zero],
    ]),
  ],
  [
    'HWP 90°',
    ours(180, 90),
    scaled(I, [
      [one, zero],
      [zero, c(-1)],
    ]),
  ],
  [
    'retarder δ 0°',
    ours(delta, 0),
    scaled(phase(-delta / 2), [
      [one, zero],
      [zero, phase(delta)],
    ]),
  ],
  [
    'retarder δ 45°',
    ours(delta, 45),
    scaled(1, [
      [c(cd), c(0, -sd)],
      [c(0, -sd), c(cd)],
    ]),
  ],
  [
    'retarder δ 90°',
    ours(delta, 90),
    scaled(phase(delta / 2), [
      [one, zero],
      [zero, phase(-delta)],
    ]),
  ],
  [
    'circular polariser R',
    polariserMatrix(circularState('R', receiverR)),
    scaled(0.5, [
      [one, I],
      [c(0, -1), one],
    ]),
  ],
  [
    'circular polariser L',
    polariserMatrix(circularState('L', receiverR)),
    scaled(0.5, [
      [one, c(0, -1)],
      [I, one],
    ]),
  ],
];

test.each(JONES_TABLE)(
  'Jones table 3.1, %s, and its complex conjugate under ωt − kz',
  (_, found, published) => {
    expect(deviations.note('Wyant, Chipman: Jones table 3.1, kz − ωt', apart(found, published))).toBeLessThan(
      2e-16,
    );
    const conjugate = apart(translateMatrix(found, WT_KZ), published, true);
    expect(deviations.note('Jones table 3.1, conjugate under ωt − kz', conjugate)).toBeLessThan(2e-16);
    expect(translateMatrix(found, receiverR)).toEqual(found);
  },
);

// 3.1: a rotator φ turns E counter-clockwise. Two half-wave plates, the second φ/2 further on, are one up to −1.
test('two half-wave plates make the rotator of table 3.1, up to the sign −1', () => {
  for (const phi of [10, 45, 90, 133]) {
    const found = quaternionMatrix(stackQuaternion([plate(180, 12), plate(180, 12 + phi / 2)]));
    const [co, si] = [Math.cos(phi * DEGREE), Math.sin(phi * DEGREE)];
    const published = scaled(-1, [
      [c(co), c(-si)],
      [c(si), c(co)],
    ]);
    expect(deviations.note('Rotator of 3.1 from two half-wave plates', apart(found, published))).toBeLessThan(
      1e-15,
    );
  }
});

function muellerApart(found: MuellerMatrix, published: readonly (readonly number[])[]): number {
  return Math.max(
    ...found.flatMap((row, i) => row.map((entry, j) => Math.abs(entry - (published[i]?.[j] ?? NaN)))),
  );
}

const MUELLER_TABLE: readonly (readonly [string, MuellerMatrix, readonly (readonly number[])[]])[] = [
  [
    'QWP 0°',
    muellerMatrix(plate(90, 0)),
    [
      [1, 0, 0, 0],
      [0, 1, 0, 0],
      [0, 0, 0, 1],
      [0, 0, -1, 0],
    ],
  ],
  [
    'QWP 45°',
    muellerMatrix(plate(90, 45)),
    [
      [1, 0, 0, 0],
      [0, 0, 0, -1],
      [0, 0, 1, 0],
      [0, 1, 0, 0],
    ],
  ],
  [
    'QWP 90°',
    muellerMatrix(plate(90, 90)),
    [
      [1, 0, 0, 0],
      [0, 1, 0, 0],
      [0, 0, 0, -1],
      [0, 0, 1, 0],
    ],
  ],
  [
    'HWP 0°',
    muellerMatrix(plate(180, 0)),
    [
      [1, 0, 0, 0],
      [0, 1, 0, 0],
      [0, 0, -1, 0],
      [0, 0, 0, -1],
    ],
  ],
  [
    'HWP 45°',
    muellerMatrix(plate(180, 45)),
    [
      [1, 0, 0, 0],
      [0, -1, 0, 0],
      [0, 0, 1, 0],
      [0, 0, 0, -1],
    ],
  ],
];

// references.md 3.2, computed there; +sin δ in element (3,4) of a fast-x retarder seen in course file TFY4200 lab1_8.m.
test.each(MUELLER_TABLE)('Mueller table 3.2, %s, S3 > 0 for R to the receiver', (_, found, published) => {
  const note = (value: number) => deviations.note('Mueller table 3.2, S3 > 0 for R', value);
  expect(note(muellerApart(showMueller(found, receiverR).rows, published))).toBeLessThan(3e-16);
  // The other sign of S3: row and column 4 flipped, (4,4) not.
  const flipped = published.map((row, i) =>
    row.map((entry, j) => ((i === 3) !== (j === 3) ? -entry : entry)),
  );
  const other = showMueller(found, { ...receiverR, s3Sign: 'L' }).rows;
  expect(note(muellerApart(other, flipped))).toBeLessThan(3e-16);
});

test('the general Mueller matrix of 3.2 holds for any retardance and axis', () => {
  for (let deltaDeg = -200; deltaDeg <= 400; deltaDeg += 23) {
    for (let axis = -90; axis <= 180; axis += 11) {
      const [co, si] = [Math.cos(2 * axis * DEGREE), Math.sin(2 * axis * DEGREE)];
      const [C, S] = [Math.cos(deltaDeg * DEGREE), Math.sin(deltaDeg * DEGREE)];
      const published = [
        [1, 0, 0, 0],
        [0, co * co + si * si * C, co * si * (1 - C), -si * S],
        [0, co * si * (1 - C), si * si + co * co * C, co * S],
        [0, si * S, -co * S, C],
      ];
      const direct = showMueller(muellerMatrix(plate(deltaDeg, axis)), receiverR).rows;
      const byJones = showMueller(muellerOfJones(ours(deltaDeg, axis)), receiverR).rows;
      const note = (value: number) =>
        deviations.note('Mueller matrix of a retarder, general form of 3.2', value);
      expect(note(muellerApart(direct, published))).toBeLessThan(1e-15);
      expect(note(muellerApart(byJones, published))).toBeLessThan(1e-15);
    }
  }
});

test('a polariser at α is ½ [1, cos 2α, sin 2α, 0]ᵀ [1, cos 2α, sin 2α, 0]', () => {
  for (let alpha = -90; alpha <= 90; alpha += 7.5) {
    const row = [1, Math.cos(2 * alpha * DEGREE), Math.sin(2 * alpha * DEGREE), 0];
    const published = row.map((x) => row.map((y) => (x * y) / 2));
    const deviation = muellerApart(muellerOfJones(polariserMatrix(linear(alpha))), published);
    expect(deviations.note('Mueller matrix of a polariser, 3.2', deviation)).toBeLessThan(3e-16);
  }
});
