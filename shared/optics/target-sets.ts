import { type Convention, shownS3Sign } from './convention';
import { sincos } from './elementary';
import { ellipseOf } from './ellipse';
import { type ExpressionProblem, formatState, formatUnitary, parseState } from './expression';
import { seededStream } from './uniform-stream';
import { normaliseStokes, type Stokes, stokesToJones } from './stokes';

/** A row of a table of targets: what a person calls it and what it is, in the lab's convention. */
export interface TargetRow {
  readonly label: string;
  readonly expression: string;
}

/** The most targets that one set makes: a protocol's most. */
export const MAX_SET = 200;

/** The two kinds of letters as rows: each is its own label. */
function named(names: readonly string[]): readonly TargetRow[] {
  return names.map((name) => ({ label: name, expression: name }));
}

/** The six Pauli states, three conjugate bases. */
export function pauliStates(): readonly TargetRow[] {
  return named(['H', 'V', 'D', 'A', 'L', 'R']);
}

export type BasisPair = 'HV/DA' | 'HV/RL' | 'DA/RL';

/** Two conjugate bases: every state of one has 1/2 of every state of the other. */
export function twoConjugateBases(pair: BasisPair): readonly TargetRow[] {
  return named(Array.from(pair.replace('/', '')));
}

export type TetrahedronOrientation = 'one at H' | 'corners of a cube';

/**
 * Four states with |⟨i|j⟩|² = 1/3 (references.md 8). One at H: |0⟩ and (|0⟩ + √2 e^{2πik/3}|1⟩)/√3. Corners of a cube: the Bloch
 * vectors (1, 1, 1), (1, −1, −1), (−1, 1, −1), (−1, −1, 1), over √3. The same light in every convention.
 */
export function tetrahedron(
  orientation: TetrahedronOrientation,
  convention: Convention,
): readonly TargetRow[] {
  return orientation === 'one at H' ? tetrahedronAtH(convention) : tetrahedronInCube(convention);
}

function tetrahedronAtH({ phase }: Convention): readonly TargetRow[] {
  const sign = phase === 'kz-wt' ? '' : '-';
  const expressions = [
    'H',
    '(H + sqrt(2) V)/sqrt(3)',
    `(H + sqrt(2) e^(${sign}i 120deg) V)/sqrt(3)`,
    `(H + sqrt(2) e^(${sign}i 240deg) V)/sqrt(3)`,
  ];
  return expressions.map((expression, k) => ({ label: `T${k + 1}`, expression }));
}

const CUBE: readonly (readonly [x: 1 | -1, y: 1 | -1, z: 1 | -1])[] = [
  [1, 1, 1],
  [1, -1, -1],
  [-1, 1, -1],
  [-1, -1, 1],
];

function tetrahedronInCube(convention: Convention): readonly TargetRow[] {
  const part = (sign: number): string => (sign > 0 ? '1/sqrt(3)' : '-1/sqrt(3)');
  // Bloch (x, y, z) is (S2, S3, S1).
  return CUBE.map(([x, y, z], k) => ({
    label: `T${k + 1}`,
    expression: `stokes(${part(z)}, ${part(x)}, ${part(y * shownS3Sign(convention))})`,
  }));
}

export interface GreatCircle {
  /** 'equator' is all linear light; or any state as an expression, whose opposite names the same circle turned the other way. */
  readonly pole: string;
  /**
   * How far the first state is turned on from the circle's linear state between −45° and 45° (H on the equator, whose circle
   * it is otherwise), as an angle on the table: 180° is once round. On the equator it is the first state's azimuth.
   */
  readonly startAzimuthDeg: number;
  readonly count: number;
}

export type TargetSet =
  | { readonly ok: true; readonly rows: readonly TargetRow[] }
  | { readonly ok: false; readonly error: ExpressionProblem };

/**
 * States evenly along a great circle, right-handed about its pole. An error only when the pole can't be read.
 * @throws RangeError for a count outside 2…200 and a start that isn't finite within ±3600°.
 */
export function greatCircle(
  { pole, startAzimuthDeg, count }: GreatCircle,
  convention: Convention,
): TargetSet {
  checkCount(count, 2);
  if (!(Math.abs(startAzimuthDeg) <= 3600)) throw new RangeError('the start must be within ±3600°');
  let axis: Stokes = [0, 0, 1];
  if (pole !== 'equator') {
    const reading = parseState(pole, convention);
    if (!reading.ok) return reading;
    axis = reading.stokes;
  }
  const first = linearOn(axis);
  const second: Stokes = [
    axis[1] * first[2] - axis[2] * first[1],
    axis[2] * first[0] - axis[0] * first[2],
    axis[0] * first[1] - axis[1] * first[0],
  ];
  const rows = Array.from({ length: count }, (_, k) => {
    const { sin, cos } = sincos((2 * startAzimuthDeg * Math.PI) / 180 + (2 * Math.PI * k) / count);
    const stokes: Stokes = [
      cos * first[0] + sin * second[0],
      cos * first[1] + sin * second[1],
      cos * first[2] + sin * second[2],
    ];
    return { label: numbered('C', k, count), expression: formatState(stokesToJones(stokes), convention) };
  });
  return { ok: true, rows };
}

/** The linear state of a circle with azimuth in (−45°, 45°]; H on the equator, where all are linear. */
function linearOn([s1, s2]: Stokes): Stokes {
  if (s1 * s1 + s2 * s2 < 1e-24) return [1, 0, 0];
  const linear = normaliseStokes([0 - s2, s1, 0]);
  const { azimuthRad } = ellipseOf(linear);
  const within = azimuthRad > -Math.PI / 4 + 1e-12 && azimuthRad <= Math.PI / 4 + 1e-12;
  return within ? linear : [0 - linear[0], 0 - linear[1], 0];
}

export interface Drawn {
  readonly count: number;
  /** A whole number from 0: the same seed draws the same states everywhere, and more of them only adds to the end. */
  readonly seed: number;
}

/** States drawn evenly over the sphere (Haar). @throws RangeError for a count outside 1…200 and a seed that is none. */
export function haarStates({ count, seed }: Drawn, convention: Convention): readonly TargetRow[] {
  const next = drawer({ count, seed });
  return Array.from({ length: count }, (_, k) => {
    // Archimedes: heights are spread evenly.
    const s1 = 2 * next() - 1;
    const { sin, cos } = sincos(2 * Math.PI * next());
    const radius = Math.sqrt((1 - s1) * (1 + s1));
    const jones = stokesToJones([s1, radius * cos, radius * sin]);
    return { label: numbered('N', k, count), expression: formatState(jones, convention) };
  });
}

/** Unitaries drawn evenly over SU(2) (Haar). @throws RangeError as `haarStates`. */
export function haarUnitaries({ count, seed }: Drawn, convention: Convention): readonly TargetRow[] {
  const next = drawer({ count, seed });
  return Array.from({ length: count }, (_, k) => {
    // The 3-sphere as two circles whose squared radii add to 1 and are spread evenly.
    const share = next();
    const [one, other] = [sincos(2 * Math.PI * next()), sincos(2 * Math.PI * next())];
    const [a, b] = [Math.sqrt(1 - share), Math.sqrt(share)];
    const turn = { w: b * other.cos, x: a * one.sin, y: a * one.cos, z: b * other.sin };
    return { label: numbered('N', k, count), expression: formatUnitary(turn, convention) };
  });
}

function drawer({ count, seed }: Drawn): () => number {
  checkCount(count, 1);
  return seededStream(seed);
}

function checkCount(count: number, least: number): void {
  if (!Number.isInteger(count) || count < least || count > MAX_SET) {
    throw new RangeError(`a set has ${least} to ${MAX_SET} targets`);
  }
}

/**
 * The 24 turns that take the six Pauli states to each other, the single-qubit Clifford group up to phase: those of a cube, by
 * 90° and 180° about its faces, 180° about its edges and 120° about its corners.
 */
export function cliffordTurns(): readonly TargetRow[] {
  const faces = ['x', 'y', 'z'];
  const edges = ['[1, 1, 0]', '[1, -1, 0]', '[1, 0, 1]', '[1, 0, -1]', '[0, 1, 1]', '[0, 1, -1]'];
  const corners = ['[1, 1, 1]', '[1, 1, -1]', '[1, -1, 1]', '[-1, 1, 1]'];
  const turns: readonly (readonly [string, number])[] = [
    ['z', 0],
    ...faces.flatMap((axis) => [90, 180, -90].map((angle) => [axis, angle] as const)),
    ...edges.map((axis) => [axis, 180] as const),
    ...corners.flatMap((axis) => [120, -120].map((angle) => [axis, angle] as const)),
  ];
  return turns.map(([axis, angle], k) => ({
    label: numbered('C', k, turns.length),
    expression: `rotate(${axis}, ${angle}deg)`,
  }));
}

/** "C01" of 24: as many digits as the last needs, so that they sort. */
function numbered(letter: string, index: number, count: number): string {
  return `${letter}${String(index + 1).padStart(String(count).length, '0')}`;
}
