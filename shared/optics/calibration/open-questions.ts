import { wrap } from '../units';
import { SETTLED_SIGMA } from './evidence';
import { isSigma, type Stated } from './scan-rows';
import { type ScanRefusal, refuse } from './refusal';

/*
 * What a scan between linear polarisers leaves open, and how much of it is physics.
 *
 * The powers depend on sin²(δ/2) and on the axis modulo 90°, so four readings fit alike: (θ0, δ), (θ0 + 90°, δ),
 * (θ0, 360° − δ) and (θ0 + 90°, 360° − δ). A retarder turns the sphere by δ about the linear state at θ0. Turning by
 * 360° − δ about the opposite point is the same turn (up to the sign of the state, which no power shows), so
 *   (θ0, δ) ≡ (θ0 + 90°, 360° − δ)   and   (θ0 + 90°, δ) ≡ (θ0, 360° − δ).
 * The four readings are two plates, each with two names, and the two plates undo each other. Hence
 *
 * - `axis` with the name's convention fixed is the one physical question: which of the two plates is it? Only light that
 *   isn't linear answers it (or a second plate of known axis).
 * - `branch` alone is a question of naming: which of a plate's two axes is called fast. Once the nominal retardance says
 *   that δ is 89° and not 271°, a name is chosen and the physical question is `axis` alone. The nominal value can say so
 *   where δ and 360° − δ are many σ apart, as for a quarter-wave plate.
 * - For a half-wave plate the nominal value lies where the two names meet. Tolerance and dispersion put the true one on
 *   either side, so it never chooses, however exactly it was computed; 178° on one axis stays 182° on the other.
 * - `blind`: sin²(δ/2) is flat at 180°, so near there the scan tells |180° − δ| only by its square. δ then has an interval
 *   that ends at 180° where the two branches join, and a first-order σ would be a fiction.
 *
 * Choosing between branches: with distances k₁ < k₂ in σ of the prediction from δ and 360° − δ, the better is taken where
 * k₂² − k₁² ≥ 5² and k₁ ≤ 5. If the other one were true, this would take a deviation of at least (5² + D²)/(2D) ≥ 5 σ,
 * whatever their distance D = k₁ + k₂ is.
 */

/** What is known of a plate apart from its scan: its kind, and the retardance to expect where it was scanned. */
export interface NominalRetardance {
  readonly kind: 'half' | 'quarter' | 'other';
  /** In degrees, whole turns of no matter; from the dispersion model where there is one. */
  readonly retardanceDeg: number;
  readonly sigmaDeg: number;
}

export interface PlateReading {
  /** Reading of the dial with the fast axis at H, in [0, 180). */
  readonly offsetDeg: number;
  /** In [0, 360]. */
  readonly retardanceDeg: number;
}

/** One physical plate and the other name it has: the same turn, with the other axis called fast. */
export interface CandidatePlate extends PlateReading {
  readonly alsoNamed: PlateReading;
}

/**
 * Where a scan that hardly feels a retardance is blind, in degrees: at whole and half waves between polarisers, where the
 * power goes with cos δ, and at quarter waves behind circular light, where it goes with sin δ.
 */
export function blindNearDeg(retardanceDeg: number): number {
  return 90 * Math.round(retardanceDeg / 90);
}

export type BranchReason = 'no-nominal' | 'half-wave' | 'blind' | 'too-close' | 'fits-neither';

export type OpenQuestion =
  /** Fast or slow axis; `sigmas`: how far apart this scan holds the two, where it says anything about them. */
  | { readonly kind: 'axis'; readonly offsetsDeg: readonly [number, number]; readonly sigmas: number | null }
  /** δ or 360° − δ; `sigmas`: by how many the nominal retardance prefers the first. */
  | {
      readonly kind: 'branch';
      readonly retardancesDeg: readonly [number, number];
      readonly reason: BranchReason;
      readonly sigmas: number | null;
    }
  /** First-order blind at `atDeg`: all that can be said of δ is this interval (and its mirror image about `atDeg`). */
  | { readonly kind: 'blind'; readonly atDeg: number; readonly fromDeg: number; readonly toDeg: number }
  /** δ or 180° − δ, where the light's 2θ term alone tells δ. */
  | { readonly kind: 'supplement'; readonly readings: readonly PlateReading[]; readonly sigmas: number }
  /** The rows say nothing of δ until this is stated. */
  | { readonly kind: 'retardance'; readonly wants: 'power' | 'leak-or-power' };

export interface SettledQuestion {
  readonly kind: 'axis' | 'branch';
  /** At least `SETTLED_SIGMA`. */
  readonly sigmas: number;
  readonly by: 'nominal' | 'scan';
}

export function nominalProblem(nominal: NominalRetardance | null): ScanRefusal | null {
  if (nominal === null || (Number.isFinite(nominal.retardanceDeg) && isSigma(nominal.sigmaDeg))) return null;
  const what = 'A nominal retardance is a finite number of degrees with a σ from 0, got';
  return refuse(
    'statement',
    `${what} ${nominal.retardanceDeg} and ${nominal.sigmaDeg}. State both or neither.`,
  );
}

/** Rounding of degrees: two exact numbers are still compared by something. */
const LEAST_SIGMA_DEG = 1e-9;

export type BranchChoice =
  | { readonly settled: true; readonly isFirst: boolean; readonly sigmas: number }
  | { readonly settled: false; readonly reason: BranchReason; readonly sigmas: number | null };

/** Whether the nominal retardance tells `measured` (value and σ in degrees) from 360° − it. */
export function chooseBranch(
  measured: Stated,
  nominal: NominalRetardance | null,
  isBlind: boolean,
): BranchChoice {
  if (nominal === null) return { settled: false, reason: 'no-nominal', sigmas: null };
  const sigma = Math.sqrt(measured.sigma * measured.sigma + nominal.sigmaDeg * nominal.sigmaDeg);
  const away = (valueDeg: number) => {
    const apart = wrap(valueDeg - nominal.retardanceDeg, 360);
    return Math.min(apart, 360 - apart) / Math.max(sigma, LEAST_SIGMA_DEG);
  };
  const [first, second] = [away(measured.value), away(360 - measured.value)];
  const [near, far] = [Math.min(first, second), Math.max(first, second)];
  const sigmas = Math.sqrt(Math.max(0, far - near)) * Math.sqrt(far + near);
  if (nominal.kind === 'half') return { settled: false, reason: 'half-wave', sigmas };
  if (isBlind) return { settled: false, reason: 'blind', sigmas };
  if (sigmas < SETTLED_SIGMA) return { settled: false, reason: 'too-close', sigmas };
  if (near > SETTLED_SIGMA) return { settled: false, reason: 'fits-neither', sigmas };
  return { settled: true, isFirst: first < second, sigmas };
}

/** The same plate with its other axis called fast. */
export function otherName({ offsetDeg, retardanceDeg }: PlateReading): PlateReading {
  return { offsetDeg: wrap(offsetDeg + 90, 180), retardanceDeg: 360 - retardanceDeg };
}

/** A reading, and the plate that undoes it: what linear light can't tell apart. */
export function candidatePlates(reading: PlateReading): readonly [CandidatePlate, CandidatePlate] {
  const inverse = { offsetDeg: wrap(reading.offsetDeg + 90, 180), retardanceDeg: reading.retardanceDeg };
  return [
    { ...reading, alsoNamed: otherName(reading) },
    { ...inverse, alsoNamed: otherName(inverse) },
  ];
}
