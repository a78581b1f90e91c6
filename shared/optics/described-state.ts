import {
  type Convention,
  type Hand,
  letterOf,
  showEllipse,
  type ShownEllipse,
  type ShownStokes,
  showStokes,
  translateJones,
} from './convention';
import { atan2 } from './elementary';
import type { JonesVector } from './jones';
import { type Stokes, stokesToJones } from './stokes';
import { type Radians, radians } from './units';

/** Bloch coordinates of the Jones vector as written: y follows the phase flag, S3 the two others. */
export interface WrittenBloch {
  readonly x: number;
  readonly y: number;
  readonly z: number;
  /** θ in [0, π] of cos θ/2 H + e^{iφ} sin θ/2 V. */
  readonly polarRad: Radians;
  /** φ in (−π, π]; 0 by choice for H and V. */
  readonly azimuthRad: Radians;
}

/** Everything that a lab is shown of one state. */
export interface DescribedState {
  /** As written: length 1, a real and not negative, or b where a vanishes. */
  readonly jones: JonesVector;
  readonly bloch: WrittenBloch;
  readonly stokes: ShownStokes;
  readonly ellipse: ShownEllipse;
  /** The lab's letter for its hand, `null` for linear light. */
  readonly letter: Hand | null;
  /** How the field turns as the receiver sees it: the same in every convention, `null` for linear light. */
  readonly rotation: 'counter-clockwise' | 'clockwise' | null;
}

// Below this distance from the pole φ is rounding noise.
const AT_POLE = 1e-15;

function writtenBloch([s1, s2, s3]: Stokes, { phase }: Convention): WrittenBloch {
  // 0 − x, since −x would make −0 of 0.
  const y = phase === 'kz-wt' ? s3 : 0 - s3;
  const fromAxis = Math.sqrt(s2 * s2 + y * y);
  return {
    x: s2,
    y,
    z: s1,
    polarRad: radians(atan2(fromAxis, s1)),
    azimuthRad: radians(fromAxis < AT_POLE ? 0 : atan2(y, s2)),
  };
}

/**
 * One state as one convention writes it. A partly polarised one keeps its Stokes parameters and Bloch vector; its Jones
 * vector and ellipse are those of the polarised part. @throws RangeError for length 0.
 */
export function describeState(stokes: Stokes, convention: Convention): DescribedState {
  // The canonical receiver's letters, whatever the lab's.
  const canonicalLetter = letterOf(stokes, { phase: 'kz-wt', handedness: 'receiver', s3Sign: 'L' });
  return {
    jones: translateJones(stokesToJones(stokes), convention),
    bloch: writtenBloch(stokes, convention),
    stokes: showStokes(stokes, convention),
    ellipse: showEllipse(stokes, convention),
    letter: letterOf(stokes, convention),
    rotation: canonicalLetter === null ? null : canonicalLetter === 'L' ? 'counter-clockwise' : 'clockwise',
  };
}
