import { type Convention, shownS3Sign } from './convention';
import { retardStokes, type JonesMatrix, type Retarder } from './retarder';
import type { Stokes } from './stokes';

/** Four numbers of (S0, S1, S2, S3). */
export type StokesRow = readonly [s0: number, s1: number, s2: number, s3: number];

/** A canonical Mueller matrix, rows first: S3 > 0 turns counter-clockwise to the receiver. */
export type MuellerMatrix = readonly [StokesRow, StokesRow, StokesRow, StokesRow];

/** A Mueller matrix as a lab shows it. An object, so that it can't be passed for a canonical one. */
export interface ShownMueller {
  readonly rows: MuellerMatrix;
}

/** The turn of the sphere by a linear retarder, which keeps the intensity. */
export function muellerMatrix(plate: Retarder): MuellerMatrix {
  // Columns: where the three axes of the sphere go.
  const [x1, x2, x3] = retardStokes(plate, [1, 0, 0]);
  const [y1, y2, y3] = retardStokes(plate, [0, 1, 0]);
  const [z1, z2, z3] = retardStokes(plate, [0, 0, 1]);
  return [
    [1, 0, 0, 0],
    [0, x1, y1, z1],
    [0, x2, y2, z2],
    [0, x3, y3, z3],
  ];
}

/** Part of a 2 × 2 matrix on the Pauli basis (1, σz, σx, σy), which goes with (S0, S1, S2, S3). */
interface OnPauli {
  readonly re: StokesRow;
  readonly im: StokesRow;
}

function onPauli([[a, b], [c, d]]: JonesMatrix): OnPauli {
  // J = Σ j_k σ_k: j0 = (a + d)/2, jz = (a − d)/2, jx = (b + c)/2, jy = i(b − c)/2.
  return {
    re: [(a[0] + d[0]) / 2, (a[0] - d[0]) / 2, (b[0] + c[0]) / 2, (c[1] - b[1]) / 2],
    im: [(a[1] + d[1]) / 2, (a[1] - d[1]) / 2, (b[1] + c[1]) / 2, (b[0] - c[0]) / 2],
  };
}

/**
 * What any Jones matrix does to Stokes parameters, intensity included: M_ij = ½ tr(σ_i J σ_j J†). A polariser's first
 * row is what it lets through.
 */
export function muellerOfJones(jones: JonesMatrix): MuellerMatrix {
  const { re, im } = onPauli(jones);
  const [p0, p1, p2, p3] = re;
  const [q0, q1, q2, q3] = im;
  const norm0 = p0 * p0 + q0 * q0;
  const norm1 = p1 * p1 + q1 * q1;
  const norm2 = p2 * p2 + q2 * q2;
  const norm3 = p3 * p3 + q3 * q3;
  // 2 Re(j_m* j_n) and 2 Im(j_m* j_n).
  const re01 = 2 * (p0 * p1 + q0 * q1);
  const re02 = 2 * (p0 * p2 + q0 * q2);
  const re03 = 2 * (p0 * p3 + q0 * q3);
  const re12 = 2 * (p1 * p2 + q1 * q2);
  const re13 = 2 * (p1 * p3 + q1 * q3);
  const re23 = 2 * (p2 * p3 + q2 * q3);
  const im01 = 2 * (p0 * q1 - q0 * p1);
  const im02 = 2 * (p0 * q2 - q0 * p2);
  const im03 = 2 * (p0 * q3 - q0 * p3);
  const im12 = 2 * (p1 * q2 - q1 * p2);
  const im13 = 2 * (p1 * q3 - q1 * p3);
  const im23 = 2 * (p2 * q3 - q2 * p3);
  return [
    [norm0 + norm1 + norm2 + norm3, re01 - im23, re02 + im13, re03 - im12],
    [re01 + im23, norm0 + norm1 - norm2 - norm3, re12 + im03, re13 - im02],
    [re02 - im13, re12 - im03, norm0 - norm1 + norm2 - norm3, re23 + im01],
    [re03 + im12, re13 + im02, re23 - im01, norm0 - norm1 - norm2 + norm3],
  ];
}

/** Row and column of S3 in the lab's sign; shown twice it is what it was. */
export function showMueller(matrix: MuellerMatrix, convention: Convention): ShownMueller {
  return { rows: shownS3Sign(convention) === 1 ? matrix : withOtherS3(matrix) };
}

function withOtherS3([intensity, first, second, third]: MuellerMatrix): MuellerMatrix {
  const lastTurned = ([s0, s1, s2, s3]: StokesRow): StokesRow => [s0, s1, s2, opposite(s3)];
  const [s0, s1, s2, s3] = third;
  return [
    lastTurned(intensity),
    lastTurned(first),
    lastTurned(second),
    [opposite(s0), opposite(s1), opposite(s2), s3],
  ];
}

// −0 would be shown as "-0".
function opposite(value: number): number {
  return value === 0 ? 0 : -value;
}

/** The projector on a pure state: the Jones matrix of a polariser that lets just this state through, phase kept. */
export function polariserMatrix([s1, s2, s3]: Stokes): JonesMatrix {
  return [
    [
      [(1 + s1) / 2, 0],
      [s2 / 2, opposite(s3) / 2],
    ],
    [
      [s2 / 2, s3 / 2],
      [(1 - s1) / 2, 0],
    ],
  ];
}
