import { sincos } from './elementary';
import { chiSquareQuantile } from './quantile';
import { type Retarder, retardStokes } from './retarder';
import { infidelityBetween, type Stokes } from './stokes';
import { type Radians, radians } from './units';

/** A plate at an angle with everything that is known only to a σ. All σ in radians of the table (or of retardance). */
export interface UncertainPlate extends Retarder {
  readonly sigmaRetardanceRad: Radians;
  /** Of the mount's zero (the offset's calibration). */
  readonly sigmaOffsetRad: Radians;
  /** Step of the dial; what is set lies evenly anywhere within one step, a variance of step²/12. */
  readonly dialResolutionRad: Radians;
  /** σ of setting the same reading again. */
  readonly dialRepeatabilityRad: Radians;
}

export type ParameterKind = 'retardance' | 'zero' | 'dial' | 'polariser';

/** What one parameter adds to the expected infidelity. */
export interface Contribution {
  readonly kind: ParameterKind;
  /** Index in beam order; `null` for the polariser. */
  readonly plate: number | null;
  readonly sigmaRad: Radians;
  /** ¼ σ² |∂p/∂parameter|². */
  readonly infidelity: number;
  /** Of the expected infidelity, 0 to 1. */
  readonly share: number;
  /** Share of the expected infidelity that would go if σ were halved: three quarters of `share`. */
  readonly gainIfHalved: number;
}

export interface Budget {
  /** 1 − F of the setting itself plus the sum of all contributions. */
  readonly expectedInfidelity: number;
  /** 5 % and 95 % points of the first-order distribution of 1 − F. */
  readonly expectedLow: number;
  readonly expectedHigh: number;
  /** Largest first; equal ones in beam order. */
  readonly contributions: readonly Contribution[];
}

/**
 * First-order error budget of one setting, canonical frame. With p the state reached and J = ∂p/∂parameters by exact
 * derivatives, E[1 − F] = 1 − F(setting) + ¼ tr(J Σ Jᵀ) for independent parameters (a pure state's 1 − F is ¼|δp|²).
 * @throws RangeError for a negative σ.
 */
export function errorBudget(
  input: Stokes,
  target: Stokes,
  plates: readonly UncertainPlate[],
  sigmaPolariserRad: Radians,
): Budget {
  const parameters = uncertainParameters(input, plates, sigmaPolariserRad);
  const reached = plates.reduce<Stokes>((state, plate) => retardStokes(plate, state), input);
  const ownInfidelity = infidelityBetween(reached, target);
  const contributed = parameters.map(
    ({ sigmaRad, derivative }) => 0.25 * sigmaRad * sigmaRad * dot(derivative, derivative),
  );
  const expectedInfidelity = contributed.reduce((sum, part) => sum + part, ownInfidelity);
  const share = (part: number): number => (expectedInfidelity > 0 ? part / expectedInfidelity : 0);
  const contributions = parameters
    .map(({ kind, plate, sigmaRad }, k): Contribution => {
      const infidelity = contributed[k] ?? 0;
      return {
        kind,
        plate,
        sigmaRad,
        infidelity,
        share: share(infidelity),
        gainIfHalved: 0.75 * share(infidelity),
      };
    })
    .sort((a, b) => b.infidelity - a.infidelity);
  const spread = tangentSpread(reached, target, parameters);
  return {
    expectedInfidelity,
    expectedLow: chiSquareQuantile(spread, 0.05),
    expectedHigh: chiSquareQuantile(spread, 0.95),
    contributions,
  };
}

/**
 * Share of the expected infidelity that would go if one parameter were known to `newSigmaRad` instead: the number in "a
 * retardance of Q-B known to 0.1° would gain 31 %". Negative if that is worse than today.
 */
export function gainFromSigma({ sigmaRad, share }: Contribution, newSigmaRad: Radians): number {
  if (sigmaRad === 0) return 0;
  const ratio = newSigmaRad / sigmaRad;
  return share * (1 - ratio * ratio);
}

interface UncertainParameter {
  readonly kind: ParameterKind;
  readonly plate: number | null;
  readonly sigmaRad: Radians;
  /** ∂p/∂parameter of the state behind the last plate. */
  readonly derivative: Stokes;
}

function uncertainParameters(
  input: Stokes,
  plates: readonly UncertainPlate[],
  sigmaPolariserRad: Radians,
): readonly UncertainParameter[] {
  const parameters: UncertainParameter[] = [];
  const add = (kind: ParameterKind, plate: number | null, sigmaRad: Radians, change: Stokes): void => {
    if (!(sigmaRad >= 0)) throw new RangeError(`the σ of a ${kind} must not be negative, got ${sigmaRad}`);
    // A small change travels through the plates behind it like a state: they are rotations.
    const behind = plates.slice(plate === null ? 0 : plate + 1);
    const derivative = behind.reduce<Stokes>((vector, next) => retardStokes(next, vector), change);
    parameters.push({ kind, plate, sigmaRad, derivative });
  };
  let before = input;
  plates.forEach((plate, index) => {
    const after = retardStokes(plate, before);
    const axis = sincos(2 * plate.fastAxisRad);
    const byRetardance = cross([axis.cos, axis.sin, 0], after);
    // Turning the plate by dθ turns the whole picture by 2dθ about S3, except for the light that comes in.
    const carried = retardStokes(plate, aboutS3(before));
    const here = aboutS3(after);
    const byAngle: Stokes = [
      2 * (here[0] - carried[0]),
      2 * (here[1] - carried[1]),
      2 * (here[2] - carried[2]),
    ];
    add('retardance', index, plate.sigmaRetardanceRad, byRetardance);
    add('zero', index, plate.sigmaOffsetRad, byAngle);
    add('dial', index, dialSigma(plate), byAngle);
    before = after;
  });
  const [t1, t2, t3] = aboutS3(input);
  add('polariser', null, sigmaPolariserRad, [2 * t1, 2 * t2, 2 * t3]);
  return parameters;
}

function dialSigma({ dialResolutionRad, dialRepeatabilityRad }: UncertainPlate): Radians {
  const variance = (dialResolutionRad * dialResolutionRad) / 12 + dialRepeatabilityRad * dialRepeatabilityRad;
  return radians(Math.sqrt(variance));
}

function aboutS3([s1, s2]: Stokes): Stokes {
  return [-s2, s1, 0];
}

function cross([a1, a2, a3]: Stokes, [b1, b2, b3]: Stokes): Stokes {
  return [a2 * b3 - a3 * b2, a3 * b1 - a1 * b3, a1 * b2 - a2 * b1];
}

function dot([a1, a2, a3]: Stokes, [b1, b2, b3]: Stokes): number {
  return a1 * b1 + a2 * b2 + a3 * b3;
}

/** A Gaussian cloud in a plane: ¼|δp|² is the square of the distance from (0, 0). */
export interface PlaneSpread {
  /** Standard deviations along the cloud's own axes, and where its centre lies in them. */
  readonly sigma: readonly [number, number];
  readonly centre: readonly [number, number];
}

// Changes of a pure state are tangent to the sphere, so JΣJᵀ has rank 2: its two eigenvalues are all there is.
function tangentSpread(
  reached: Stokes,
  target: Stokes,
  parameters: readonly UncertainParameter[],
): PlaneSpread {
  const [east, north] = tangentAxes(reached);
  let [ee, en, nn] = [0, 0, 0];
  for (const { sigmaRad, derivative } of parameters) {
    const alongEast = (dot(derivative, east) * sigmaRad) / 2;
    const alongNorth = (dot(derivative, north) * sigmaRad) / 2;
    ee += alongEast * alongEast;
    en += alongEast * alongNorth;
    nn += alongNorth * alongNorth;
  }
  const middle = (ee + nn) / 2;
  const radius = Math.sqrt(((ee - nn) / 2) * ((ee - nn) / 2) + en * en);
  const sigma: [number, number] = [Math.sqrt(middle + radius), Math.sqrt(Math.max(0, middle - radius))];
  const miss: Stokes = [reached[0] - target[0], reached[1] - target[1], reached[2] - target[2]];
  // The chord of the miss, in the plane's axes, keeps its length: half of it squared is the setting's own 1 − F.
  const [missEast, missNorth] = stretched(dot(miss, east), dot(miss, north), Math.sqrt(dot(miss, miss)));
  const [c, s] = majorAxis(ee, en, nn, radius);
  return { sigma, centre: [(c * missEast + s * missNorth) / 2, (c * missNorth - s * missEast) / 2] };
}

function stretched(east: number, north: number, length: number): readonly [number, number] {
  const own = Math.sqrt(east * east + north * north);
  if (own === 0) return [length, 0];
  return [(east * length) / own, (north * length) / own];
}

function majorAxis(ee: number, en: number, nn: number, radius: number): readonly [number, number] {
  if (radius === 0) return [1, 0];
  const cos2 = (ee - nn) / (2 * radius);
  const sin2 = en / radius;
  const c = Math.sqrt(Math.max(0, (1 + cos2) / 2));
  const s = Math.sqrt(Math.max(0, (1 - cos2) / 2));
  return [c, sin2 < 0 ? -s : s];
}

function tangentAxes(state: Stokes): readonly [Stokes, Stokes] {
  const [s1, s2, s3] = state;
  // Any axis well away from the state will do to start from.
  const helper: Stokes = Math.abs(s3) < 0.7 ? [0, 0, 1] : Math.abs(s1) < 0.7 ? [1, 0, 0] : [0, 1, 0];
  const [x, y, z] = cross(helper, [s1, s2, s3]);
  const length = Math.sqrt(x * x + y * y + z * z);
  const east: Stokes = [x / length, y / length, z / length];
  return [east, cross(state, east)];
}
