import type { Convention } from '../../shared/optics/convention';
import type { DialScale } from '../../shared/optics/dial';
import type { Stokes } from '../../shared/optics/stokes';

/** One plate as it stands on the stage; angles in degrees, dials as engraved. */
export interface StagePlate {
  readonly id: string;
  readonly name: string;
  readonly kind: 'half' | 'quarter' | 'other';
  readonly scale: DialScale;
  readonly retardanceDeg: number;
  readonly retardanceSigmaDeg: number | null;
  /** What the dial reads now, and the table angle that this puts the fast axis at. */
  readonly dialDeg: number;
  readonly fastAxisDeg: number;
  /** What the chosen solution says; where the dial reads something else, the plate was turned by hand. */
  readonly solutionDialDeg?: number | undefined;
}

/** A bench with one row's angles on it, in beam order. States are canonical. */
export interface StageData {
  readonly wavelengthNm: number;
  /** Drawn as long as the light before the first plate is linear; otherwise that light's ellipse stands there. */
  readonly polariser: { readonly axisDeg: number; readonly axisSigmaDeg: number | null };
  readonly plates: readonly StagePlate[];
  /** The light before each plate: as many as there are plates. */
  readonly before: readonly Stokes[];
  readonly output: { readonly label: string; readonly state: Stokes };
  readonly convention: Convention;
}

/** The plates that were turned away from the solution by hand. */
export function turnedByHand(plates: readonly StagePlate[]): StagePlate[] {
  return plates.filter(
    ({ dialDeg, solutionDialDeg, scale }) =>
      solutionDialDeg !== undefined && differs(dialDeg, solutionDialDeg, scale.resolutionDeg),
  );
}

function differs(oneDeg: number, otherDeg: number, resolutionDeg: number): boolean {
  const apart = Math.abs(oneDeg - otherDeg) % 360;
  // Half a step of the dial is as near as the hand can tell.
  return Math.min(apart, 360 - apart) > resolutionDeg / 2;
}
