import { complex as mathComplex, expm, matrix } from 'mathjs';
import { afterAll, expect, test } from 'vitest';
import { type Convention, DEFAULT_CONVENTION, type JonesMatrix, parseUnitary } from '../../shared/optics';
import { type C, complex as c, type Matrix, product, randomStream, times } from '../optics/independent';
import { Deviations } from './deviations';

const deviations = new Deviations();
afterAll(() => deviations.print('Gates against published matrices, worst deviation'));

const OTHER_PHASE: Convention = { ...DEFAULT_CONVENTION, phase: 'wt-kz' };
/** What is written is the same matrix in both phase conventions: only the light it stands for differs. */
const PHASES = [DEFAULT_CONVENTION, OTHER_PHASE];
const TOLERANCE = 1e-14;
const DEGREE = Math.PI / 180;

const e = (angle: number): C => c(Math.cos(angle), Math.sin(angle));
const scaled = (by: C, m: Matrix): Matrix => [
  [times(by, m[0][0]), times(by, m[0][1])],
  [times(by, m[1][0]), times(by, m[1][1])],
];
const conjugate = (m: Matrix): Matrix => [
  [c(m[0][0].re, -m[0][0].im), c(m[0][1].re, -m[0][1].im)],
  [c(m[1][0].re, -m[1][0].im), c(m[1][1].re, -m[1][1].im)],
];
const ONE: Matrix = [
  [c(1), c(0)],
  [c(0), c(1)],
];
const X: Matrix = [
  [c(0), c(1)],
  [c(1), c(0)],
];
const Y: Matrix = [
  [c(0), c(0, -1)],
  [c(0, 1), c(0)],
];
const Z: Matrix = [
  [c(1), c(0)],
  [c(0), c(-1)],
];

function entries(m: Matrix): readonly C[] {
  return [...m[0], ...m[1]];
}

function asMatrix(m: JonesMatrix): Matrix {
  const [[[a, b], [d, f]], [[g, h], [k, l]]] = m;
  return [
    [c(a, b), c(d, f)],
    [c(g, h), c(k, l)],
  ];
}

/** The written matrix of an expression, determinant 1 up to sign. */
function written(source: string, convention: Convention): Matrix {
  const reading = parseUnitary(source, convention);
  if (!reading.ok) throw new Error(`${source}: column ${reading.error.column}: ${reading.error.message}`);
  return asMatrix(reading.matrix);
}

/** The largest difference of an entry when the global phase of the first is turned to that of the second. */
function apart(found: Matrix, published: Matrix): number {
  const [a, b] = [entries(found), entries(published)];
  let overlap = c(0);
  a.forEach(({ re, im }, k) => {
    const other = b[k] ?? c(NaN);
    overlap = c(overlap.re + re * other.re + im * other.im, overlap.im + re * other.im - im * other.re);
  });
  const size = Math.hypot(overlap.re, overlap.im);
  const phase = c(overlap.re / size, overlap.im / size);
  return Math.max(
    ...a.map((part, k) => {
      const turned = times(phase, part);
      const other = b[k] ?? c(NaN);
      return Math.hypot(turned.re - other.re, turned.im - other.im);
    }),
  );
}

function check(source: string, expression: string, published: Matrix): void {
  for (const convention of PHASES) {
    const deviation = deviations.note(source, apart(written(expression, convention), published));
    expect(deviation, `${expression} against ${source}`).toBeLessThan(TOLERANCE);
  }
}

const degrees = (random: () => number): number => (2 * random() - 1) * 360;

// M. A. Nielsen, I. L. Chuang, Quantum Computation and Quantum Information (2000), section 4.2; equation numbers from memory.
test('rotations about x, y and z are Nielsen and Chuang’s (4.4) to (4.6), about any axis (4.8)', () => {
  const source = 'Nielsen and Chuang 2000, (4.4)–(4.6): Rx, Ry, Rz';
  const general = 'Nielsen and Chuang 2000, (4.8): R_n = cos − i sin n·σ';
  const random = randomStream(41);
  for (let k = 0; k < 500; k += 1) {
    const angle = degrees(random);
    const [cos, sin] = [Math.cos((angle * DEGREE) / 2), Math.sin((angle * DEGREE) / 2)];
    check(source, `rotate(x, ${angle}deg)`, [
      [c(cos), c(0, -sin)],
      [c(0, -sin), c(cos)],
    ]);
    check(source, `rotate(y, ${angle}deg)`, [
      [c(cos), c(-sin)],
      [c(sin), c(cos)],
    ]);
    check(source, `rotate(z, ${angle}deg)`, [
      [e((-angle * DEGREE) / 2), c(0)],
      [c(0), e((angle * DEGREE) / 2)],
    ]);
    const [a, b, d] = [2 * random() - 1, 2 * random() - 1, 2 * random() - 1];
    const length = Math.hypot(a, b, d);
    const [x, y, z] = [a / length, b / length, d / length];
    check(general, `rotate([${a}, ${b}, ${d}], ${angle}deg)`, [
      [c(cos, -sin * z), c(-sin * y, -sin * x)],
      [c(sin * y, -sin * x), c(cos, sin * z)],
    ]);
  }
});

test('zyz is Nielsen and Chuang’s (4.12) without its phase', () => {
  const source = 'Nielsen and Chuang 2000, (4.12): e^{iα} Rz(β) Ry(γ) Rz(δ)';
  const random = randomStream(42);
  for (let k = 0; k < 500; k += 1) {
    const [alpha, beta, gamma, delta] = [degrees(random), degrees(random), degrees(random), degrees(random)];
    const [p, b, g, d] = [alpha, beta, gamma, delta].map((angle) => angle * DEGREE);
    if (p === undefined || b === undefined || g === undefined || d === undefined) throw new Error('no angle');
    const [cos, sin] = [c(Math.cos(g / 2)), c(Math.sin(g / 2))];
    const published: Matrix = [
      [times(e(p - b / 2 - d / 2), cos), times(c(-1), times(e(p - b / 2 + d / 2), sin))],
      [times(e(p + b / 2 - d / 2), sin), times(e(p + b / 2 + d / 2), cos)],
    ];
    check(source, `zyz(${beta}deg, ${gamma}deg, ${delta}deg)`, published);
    check(
      source,
      `e^(i (${alpha}deg)) rotate(z, ${beta}deg) rotate(y, ${gamma}deg) rotate(z, ${delta}deg)`,
      published,
    );
  }
});

test('named gates are the published matrices, and the published identities hold', () => {
  const source = 'Nielsen and Chuang 2000, section 4.2: H, S, T, √X and identities';
  const root = c(Math.SQRT1_2);
  const hadamard = scaled(root, [
    [c(1), c(1)],
    [c(1), c(-1)],
  ]);
  const t: Matrix = [
    [c(1), c(0)],
    [c(0), e(Math.PI / 4)],
  ];
  check(source, 'identity', ONE);
  check(source, 'X', X);
  check(source, 'Y', Y);
  check(source, 'Z', Z);
  check(source, 'hadamard', hadamard);
  check(source, '(X + Z)/sqrt(2)', hadamard);
  // H = e^{iπ/2} Ry(π/2) Rz(π), T = e^{iπ/8} Rz(π/4), HTH = e^{iπ/8} Rx(π/4), √X = e^{iπ/4} Rx(π/2).
  check(source, 'rotate(y, pi/2) rotate(z, pi)', hadamard);
  check(source, 'S', [
    [c(1), c(0)],
    [c(0), c(0, 1)],
  ]);
  check(source, 'T', t);
  check(source, 'rotate(z, pi/4)', t);
  check(source, 'hadamard T hadamard', written('rotate(x, pi/4)', DEFAULT_CONVENTION));
  check(source, 'rotate(x, pi/4)', product(product(hadamard, t), hadamard));
  check(
    source,
    'sqrtX',
    scaled(c(0.5), [
      [c(1, 1), c(1, -1)],
      [c(1, -1), c(1, 1)],
    ]),
  );
  check(source, 'rotate(x, pi/2)', written('sqrtX', DEFAULT_CONVENTION));
  check(source, 'X Y X', scaled(c(-1), Y));
  check(source, 'X rotate(y, 50deg) X', written('rotate(y, -50deg)', DEFAULT_CONVENTION));
  check(source, 'hadamard X hadamard', Z);
  check(source, 'hadamard Y hadamard', scaled(c(-1), Y));
  check(source, 'hadamard Z hadamard', X);
  check(source, 'sqrtY^2', Y);
  check(source, 'sqrtZ^2', Z);
});

test('what is written by its entries is that matrix: U3 and the built-in U of OpenQASM 2 and 3, up to their phases', () => {
  const random = randomStream(43);
  for (let k = 0; k < 500; k += 1) {
    const [theta, phi, lambda] = [degrees(random), degrees(random), degrees(random)];
    const [t, f, l] = [theta * DEGREE, phi * DEGREE, lambda * DEGREE];
    const [cos, sin] = [c(Math.cos(t / 2)), c(Math.sin(t / 2))];
    const u3: Matrix = [
      [cos, times(c(-1), times(e(l), sin))],
      [times(e(f), sin), times(e(f + l), cos)],
    ];
    const [plus, minus] = [c(1 + Math.cos(t), Math.sin(t)), c(1 - Math.cos(t), -Math.sin(t))];
    const three = scaled(c(0.5), [
      [plus, times(c(0, -1), times(e(l), minus))],
      [times(c(0, 1), times(e(f), minus)), times(e(f + l), plus)],
    ]);
    const turns = `zyz(${phi}deg, ${theta}deg, ${lambda}deg)`;
    const half = `${theta}deg/2`;
    const typed = `matrix [[cos(${half}), -e^(i (${lambda}deg)) sin(${half})], [e^(i (${phi}deg)) sin(${half}), e^(i (${phi}deg + (${lambda}deg))) cos(${half})]]`;
    check('U3(θ, φ, λ), Qiskit’s documentation of the gate', typed, u3);
    check('OpenQASM 2, U = Rz(φ) Ry(θ) Rz(λ)', turns, u3);
    check('OpenQASM 3, built-in U, language specification', turns, three);
    check('OpenQASM 3, built-in U, language specification', typed, three);
  }
});

// references.md 3.1, convention W = kz − ωt: J. C. Wyant, Optics 513 notes; Hecht, Optics, chapter 8 (from memory).
test('plates are those of the table, conjugated under ωt − kz', () => {
  const source = 'references.md 3.1 (Wyant, Optics 513): plates at 0°, 45°, 90°';
  const root = c(Math.SQRT1_2);
  const diagonal = (a: C, d: C): Matrix => [
    [a, c(0)],
    [c(0), d],
  ];
  const table: (readonly [string, Matrix])[] = [
    ['qwp(0deg)', scaled(e(-Math.PI / 4), diagonal(c(1), c(0, 1)))],
    [
      'qwp(45deg)',
      scaled(root, [
        [c(1), c(0, -1)],
        [c(0, -1), c(1)],
      ]),
    ],
    ['qwp(90deg)', scaled(e(Math.PI / 4), diagonal(c(1), c(0, -1)))],
    ['hwp(0deg)', scaled(c(0, -1), Z)],
    ['hwp(45deg)', scaled(c(0, -1), X)],
    ['hwp(90deg)', scaled(c(0, 1), Z)],
  ];
  for (const delta of [1, 30, 100, 179, 200, 359]) {
    const half = (delta * DEGREE) / 2;
    table.push([`plate(${delta}deg, 0deg)`, diagonal(e(-half), e(half))]);
    table.push([`plate(${delta}deg, 90deg)`, diagonal(e(half), e(-half))]);
    table.push([
      `plate(${delta}deg, 45deg)`,
      [
        [c(Math.cos(half)), c(0, -Math.sin(half))],
        [c(0, -Math.sin(half)), c(Math.cos(half))],
      ],
    ]);
  }
  const general = 'references.md 3.1 (qutip-book): quarter-wave plate at θ';
  for (let theta = -180; theta <= 180; theta += 7) {
    const [cos, sin] = [Math.cos(theta * DEGREE), Math.sin(theta * DEGREE)];
    const across = c(sin * cos, -sin * cos);
    const published: Matrix = [
      [c(cos * cos, sin * sin), across],
      [across, c(sin * sin, cos * cos)],
    ];
    for (const [convention, wanted] of [
      [DEFAULT_CONVENTION, published],
      [OTHER_PHASE, conjugate(published)],
    ] as const) {
      expect(deviations.note(general, apart(written(`qwp(${theta}deg)`, convention), wanted))).toBeLessThan(
        TOLERANCE,
      );
    }
  }
  for (const [expression, published] of table) {
    const found = deviations.note(source, apart(written(expression, DEFAULT_CONVENTION), published));
    expect(found, expression).toBeLessThan(TOLERANCE);
    const other = deviations.note(source, apart(written(expression, OTHER_PHASE), conjugate(published)));
    expect(other, `${expression}, ωt − kz`).toBeLessThan(TOLERANCE);
  }
});

// references.md 1.6 [computed there]: three plates in beam order make the named gates.
test('three plates in beam order make the named gates of the table', () => {
  const source = 'references.md 1.6: gates from quarter-, half- and quarter-wave plate';
  for (const [gate, a, b, d] of [
    ['identity', 0, 0, 0],
    ['X', 90, 135, 90],
    ['Y', 45, 0, 135],
    ['Z', 45, 90, 45],
    ['hadamard', 67.5, 112.5, 67.5],
    ['S', 45, 67.5, 45],
    ['dagger(S)', 135, 157.5, 135],
    ['T', 45, 56.25, 45],
    ['dagger(T)', 135, 146.25, 135],
    ['sqrtX', 90, 112.5, 90],
    ['dagger(sqrtX)', 0, 22.5, 0],
    ['rotate(x, 30deg)', 90, 97.5, 90],
    ['rotate(y, 45deg)', 11.25, 0, 168.75],
    ['rotate(z, 60deg)', 45, 60, 45],
  ] as const) {
    // There the product is Q(a) H(b) Q(c): the last acts first.
    const plates = written(`qwp(${d}deg) hwp(${b}deg) qwp(${a}deg)`, DEFAULT_CONVENTION);
    const deviation = deviations.note(source, apart(plates, written(gate, DEFAULT_CONVENTION)));
    expect(deviation, gate).toBeLessThan(TOLERANCE);
  }
});

test('exponentials of Pauli sums are mathjs’ matrix exponential', () => {
  const source = 'mathjs expm: exp(−i angle (aX + bY + cZ))';
  const random = randomStream(44);
  for (let k = 0; k < 300; k += 1) {
    const angle = degrees(random) / 2;
    const [a, b, d] = [2 * random() - 1, 2 * random() - 1, 2 * random() - 1];
    // −i angle (aX + bY + dZ), entry by entry.
    const size = angle * DEGREE;
    const exponent = [
      [mathComplex(0, -size * d), mathComplex(-size * b, -size * a)],
      [mathComplex(size * b, -size * a), mathComplex(0, size * d)],
    ];
    const reference = expm(matrix(exponent));
    const entry = (row: number, column: number): C => {
      const found = mathComplex(String(reference.get([row, column])));
      return c(found.re, found.im);
    };
    const published: Matrix = [
      [entry(0, 0), entry(0, 1)],
      [entry(1, 0), entry(1, 1)],
    ];
    const text = (part: number): string => `${part < 0 ? '-' : '+'} ${Math.abs(part)}`;
    for (const convention of PHASES) {
      const found = written(`exp(-i (${angle}deg) (${a} X ${text(b)} Y ${text(d)} Z))`, convention);
      expect(deviations.note(source, apart(found, published))).toBeLessThan(1e-11);
    }
  }
});
