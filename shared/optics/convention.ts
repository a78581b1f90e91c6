import { ellipseOf } from './ellipse';
import type { JonesVector } from './jones';
import type { JonesMatrix } from './retarder';
import type { Stokes } from './stokes';
import { type Radians, radians } from './units';

/** What a lab writes and reads (the three flags). The canonical frame inside is kz − ωt, +S3 counter-clockwise to the receiver. */
export interface Convention {
  readonly phase: 'kz-wt' | 'wt-kz';
  /** Who names the hands: from the receiver counter-clockwise is L; from the source (along the travel) it is R. */
  readonly handedness: 'receiver' | 'source';
  /** The letter whose S3 is written with a plus. */
  readonly s3Sign: 'R' | 'L';
}

export type Hand = 'R' | 'L';

/** The one a new lab starts with: it shows the canonical frame as it is stored. */
export const DEFAULT_CONVENTION: Convention = { phase: 'kz-wt', handedness: 'receiver', s3Sign: 'L' };

/** Stokes parameters as a lab shows them. An object, so that it can't be passed for a canonical `Stokes`. */
export interface ShownStokes {
  readonly s1: number;
  readonly s2: number;
  readonly s3: number;
}

/** The ellipse as a lab shows it: the ellipticity carries the sign of the shown S3. */
export interface ShownEllipse {
  readonly azimuthRad: Radians;
  readonly shownEllipticityRad: Radians;
}

/** Canonical to written and back: complex conjugate under ωt − kz. */
export function translateJones(jones: JonesVector, convention: Convention): JonesVector {
  if (convention.phase === 'kz-wt') return jones;
  return { aRe: jones.aRe, aIm: negate(jones.aIm), bRe: jones.bRe, bIm: negate(jones.bIm) };
}

/** A Jones matrix, canonical to written and back: complex conjugate under ωt − kz, as for the vectors it acts on. */
export function translateMatrix(matrix: JonesMatrix, convention: Convention): JonesMatrix {
  if (convention.phase === 'kz-wt') return matrix;
  const [[a, b], [c, d]] = matrix;
  return [
    [conjugated(a), conjugated(b)],
    [conjugated(c), conjugated(d)],
  ];
}

function conjugated([re, im]: readonly [number, number]): readonly [number, number] {
  return [re, negate(im)];
}

// −0 would be shown as "-0" and hashed as something else than 0.
function negate(value: number): number {
  return value === 0 ? 0 : -value;
}

/** The letter that this lab gives to the field that turns counter-clockwise as the receiver sees it. */
export function counterClockwiseLetter(convention: Convention): Hand {
  return convention.handedness === 'receiver' ? 'L' : 'R';
}

/** +1 where the lab shows the canonical S3, −1 where it shows its opposite. */
export function shownS3Sign(convention: Convention): 1 | -1 {
  return counterClockwiseLetter(convention) === convention.s3Sign ? 1 : -1;
}

export function showStokes([s1, s2, s3]: Stokes, convention: Convention): ShownStokes {
  return { s1, s2, s3: shownS3Sign(convention) === 1 ? s3 : negate(s3) };
}

export function readStokes({ s1, s2, s3 }: ShownStokes, convention: Convention): Stokes {
  return [s1, s2, shownS3Sign(convention) === 1 ? s3 : negate(s3)];
}

export function showEllipse(stokes: Stokes, convention: Convention): ShownEllipse {
  const { azimuthRad, ellipticityRad } = ellipseOf(stokes);
  const shown = shownS3Sign(convention) === 1 ? ellipticityRad : negate(ellipticityRad);
  return { azimuthRad, shownEllipticityRad: radians(shown) };
}

// A light this close to linear, in |S3|, has no hand worth naming: 1e-9 is 3e-8° of ellipticity.
const LINEAR_S3 = 1e-9;

/** The hand of a state in the lab's letters, or `null` for linear light. */
export function letterOf([, , s3]: Stokes, convention: Convention): Hand | null {
  if (Math.abs(s3) < LINEAR_S3) return null;
  const counterClockwise = counterClockwiseLetter(convention);
  if (s3 > 0) return counterClockwise;
  return counterClockwise === 'L' ? 'R' : 'L';
}

/** The canonical circular state that a lab calls by this letter. */
export function circularState(hand: Hand, convention: Convention): Stokes {
  return [0, 0, hand === counterClockwiseLetter(convention) ? 1 : -1];
}

/** The six states at the ends of the sphere's axes. */
export const NAMED_STATES = ['H', 'V', 'D', 'A', 'R', 'L'] as const;
export type NamedState = (typeof NAMED_STATES)[number];

/** The canonical state of a name; R and L by the lab's letters. */
export function namedStateStokes(name: NamedState, convention: Convention): Stokes {
  switch (name) {
    case 'H':
      return [1, 0, 0];
    case 'V':
      return [-1, 0, 0];
    case 'D':
      return [0, 1, 0];
    case 'A':
      return [0, -1, 0];
    case 'R':
    case 'L':
      return circularState(name, convention);
  }
}

/** As the header of a page says it: "phase kz − ωt, hands as the receiver sees them, +S3 is L". */
export function describeConvention({ phase, handedness, s3Sign }: Convention): string {
  const phaseText = phase === 'kz-wt' ? 'kz − ωt' : 'ωt − kz';
  const handText = handedness === 'receiver' ? 'as the receiver sees them' : 'as the source sees them';
  return `phase ${phaseText}, hands ${handText}, +S3 is ${s3Sign}`;
}

export function sameConvention(one: Convention, other: Convention): boolean {
  return one.phase === other.phase && one.handedness === other.handedness && one.s3Sign === other.s3Sign;
}

/** As a file names it: "kz-wt receiver L". `readConventionTag` reads it back. */
export function conventionTag({ phase, handedness, s3Sign }: Convention): string {
  return `${phase} ${handedness} ${s3Sign}`;
}

/** Null where the words are no convention's. */
export function readConventionTag(text: string): Convention | null {
  const [phase, handedness, s3Sign, ...more] = text.trim().split(/\s+/u);
  if (more.length > 0) return null;
  if (phase !== 'kz-wt' && phase !== 'wt-kz') return null;
  if (handedness !== 'receiver' && handedness !== 'source') return null;
  return s3Sign === 'R' || s3Sign === 'L' ? { phase, handedness, s3Sign } : null;
}
