import {
  type Convention,
  describeState,
  type Hand,
  muellerOfJones,
  type Quaternion,
  quaternionMatrix,
  showMueller,
  type Stokes,
  stokesLength,
  toDegrees,
  translateMatrix,
} from '../../../shared/optics';
import { fixed, formatAngle, missingSign } from '../../lib/format';
import { plainComplex, plainReal, writtenComplex, writtenReal } from './written-numbers';

/** One number or word that a convention writes. */
export interface WrittenValue {
  /** What it is, for a column head: "S3". */
  readonly label: string;
  readonly shown: string;
  /** As it is copied. */
  readonly plain: string;
}

/** What is compared as one: a Jones vector, a hand, a matrix. */
export interface WrittenPart {
  readonly id: 'jones' | 'hand' | 'stokes' | 'ellipse' | 'bloch' | 'matrix' | 'mueller';
  /** As a sentence names it. */
  readonly name: string;
  /** How many stand beside each other. */
  readonly columns: number;
  readonly values: readonly WrittenValue[];
}

/** Below this degree of polarisation nothing is left that could have an ellipse. */
export const UNPOLARISED = 1e-9;

const missing = (label: string): WrittenValue => ({ label, shown: missingSign, plain: '' });
const real = (label: string, value: number): WrittenValue => ({
  label,
  shown: writtenReal(value),
  plain: plainReal(value),
});
const complex = (label: string, re: number, im: number): WrittenValue => ({
  label,
  shown: writtenComplex(re, im),
  plain: plainComplex(re, im),
});
const angle = (label: string, angleDeg: number): WrittenValue => ({
  label,
  shown: formatAngle(angleDeg),
  plain: fixed(angleDeg, 4),
});

function part(
  id: WrittenPart['id'],
  name: string,
  values: readonly WrittenValue[],
  columns = values.length,
): WrittenPart {
  return { id, name, columns, values };
}

/** "left (L)": the word and the letter of a hand. */
export function handWords(letter: Hand): string {
  return letter === 'L' ? 'left (L)' : 'right (R)';
}

/**
 * Everything that a convention writes of a state that is given in the canonical frame. Of partly polarised light, Jones
 * vector, hand and ellipse are those of its polarised part; unpolarised light has none.
 */
export function stateParts(stokes: Stokes, convention: Convention): readonly WrittenPart[] {
  if (stokesLength(stokes) < UNPOLARISED) {
    return [
      part('jones', 'Jones vector', [missing('a'), missing('b')]),
      part('hand', 'hand', [missing('hand')]),
      part('stokes', 'Stokes', [real('S1', 0), real('S2', 0), real('S3', 0)]),
      part('ellipse', 'ellipse', [missing('ψ'), missing('χ')]),
      part('bloch', 'Bloch vector', [real('x', 0), real('y', 0), real('z', 0)]),
    ];
  }
  const { jones, bloch, stokes: shown, ellipse, letter } = describeState(stokes, convention);
  const hand = letter === null ? 'linear' : handWords(letter);
  return [
    part('jones', 'Jones vector', [complex('a', jones.aRe, jones.aIm), complex('b', jones.bRe, jones.bIm)]),
    part('hand', 'hand', [{ label: 'hand', shown: hand, plain: hand }]),
    part('stokes', 'Stokes', [real('S1', shown.s1), real('S2', shown.s2), real('S3', shown.s3)]),
    part('ellipse', 'ellipse', [
      angle('ψ', toDegrees(ellipse.azimuthRad)),
      angle('χ', toDegrees(ellipse.shownEllipticityRad)),
    ]),
    part('bloch', 'Bloch vector', [real('x', bloch.x), real('y', bloch.y), real('z', bloch.z)]),
  ];
}

/** What a convention writes of a unitary: its matrix with determinant 1, and its Mueller matrix with the shown sign of S3. */
export function unitaryParts(unitary: Quaternion, convention: Convention): readonly WrittenPart[] {
  const matrix = quaternionMatrix(unitary);
  const { rows } = showMueller(muellerOfJones(matrix), convention);
  return [
    part(
      'matrix',
      'matrix',
      translateMatrix(matrix, convention).flatMap((row, i) =>
        row.map(([re, im], k) => complex(`U${i + 1}${k + 1}`, re, im)),
      ),
      2,
    ),
    part(
      'mueller',
      'Mueller matrix',
      rows.flatMap((row, i) => row.map((value, k) => real(`M${i}${k}`, value))),
      4,
    ),
  ];
}
