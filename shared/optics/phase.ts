import type { Convention } from './convention';
import { atan2, sincos } from './elementary';
import { type JonesVector, jonesNorm } from './jones';
import { type Retarder, retardJones, stackQuaternion } from './retarder';
import { blochToStokes, jonesToStokes, type Stokes, stokesToJones } from './stokes';
import { type Radians, radians, wrapSigned } from './units';

/*
 * Phases of a state on its way through plates: total, dynamic, geometric. Canonical frame, and plates as determinant-1
 * matrices: the phase that both components gain alike (the mean index, the air) is no part of it.
 */

/** From the input up to one place of the path; phases are modulo 2π in (−π, π] except the dynamic one. */
export interface Phases {
  /** arg⟨in|ψ⟩, Pancharatnam's relative phase; `null` where ψ is orthogonal to the input and none is defined. */
  readonly totalRad: Radians | null;
  /** −∫⟨ψ|H|ψ⟩: for each plate −(δ/2)(n·p), n its axis on the sphere and p the state. Not folded. */
  readonly dynamicRad: Radians;
  /** Total − dynamic: minus half the solid angle of the path closed by the shortest way back; `null` with the total. */
  readonly geometricRad: Radians | null;
}

/** The phases after one plate, from the input on, and what this plate alone gave dynamically. */
export interface PlatePhases extends Phases {
  readonly ownDynamicRad: Radians;
}

/** The phases of a whole path. */
export interface PathPhases extends Phases {
  readonly afterPlate: readonly PlatePhases[];
  /**
   * Of the path closed by the shortest great circle, modulo 4π in [−2π, 2π), positive where the path runs
   * counter-clockwise seen from outside the sphere; `null` where that way back isn't unique.
   */
  readonly solidAngleSr: number | null;
  /** +1 or −1 where the state comes back up to that sign, `null` elsewhere. One full turn is −1, two are +1. */
  readonly sign: 1 | -1 | null;
}

/** One point of a path, as the sphere draws it. */
export interface PhasePoint extends Phases {
  readonly stokes: Stokes;
  /** Where the flag on the state's pole points: see `flagOf`. */
  readonly flag: Stokes;
}

// Below this |⟨in|ψ⟩| rounding decides the phase to worse than 1e-7 rad.
const ORTHOGONAL = 1e-9;
const SAME_STATE = 1e-9;
// −π up to rounding is π: half a turn must not flicker between the two.
const HALF_TURN_SLACK = 1e-12;

function foldPhase(phaseRad: number): Radians {
  const folded = wrapSigned(phaseRad, 2 * Math.PI);
  return radians(folded <= HALF_TURN_SLACK - Math.PI ? Math.PI : folded);
}

function unitJones(input: JonesVector | Stokes): JonesVector {
  const jones = 'aRe' in input ? input : stokesToJones(input);
  const norm = jonesNorm(jones);
  if (!(norm > 0) || norm === Infinity) throw new RangeError('a zero or endless Jones vector is no state');
  return { aRe: jones.aRe / norm, aIm: jones.aIm / norm, bRe: jones.bRe / norm, bIm: jones.bIm / norm };
}

interface Overlap {
  readonly re: number;
  readonly im: number;
}

function overlap(bra: JonesVector, ket: JonesVector): Overlap {
  return {
    re: bra.aRe * ket.aRe + bra.aIm * ket.aIm + bra.bRe * ket.bRe + bra.bIm * ket.bIm,
    im: bra.aRe * ket.aIm - bra.aIm * ket.aRe + bra.bRe * ket.bIm - bra.bIm * ket.bRe,
  };
}

function phasesFrom(input: JonesVector, state: JonesVector, dynamicRad: number): Phases {
  const { re, im } = overlap(input, state);
  if (Math.sqrt(re * re + im * im) < ORTHOGONAL) {
    return { totalRad: null, dynamicRad: radians(dynamicRad), geometricRad: null };
  }
  const total = atan2(im, re);
  return {
    totalRad: foldPhase(total),
    dynamicRad: radians(dynamicRad),
    geometricRad: foldPhase(total - dynamicRad),
  };
}

/** −(δ/2)(n·p): p keeps its distance from the axis all along the turn, so the integral is a product. */
function dynamicPhase({ retardanceRad, fastAxisRad }: Retarder, state: JonesVector): number {
  const [s1, s2] = jonesToStokes(state);
  const axis = sincos(2 * fastAxisRad);
  return -(retardanceRad / 2) * (axis.cos * s1 + axis.sin * s2);
}

function returnSign(input: JonesVector, output: JonesVector): 1 | -1 | null {
  const { re, im } = overlap(input, output);
  if (Math.abs(im) > SAME_STATE || Math.abs(re) < 1 - SAME_STATE) return null;
  return re > 0 ? 1 : -1;
}

/**
 * The phases of a state behind plates in beam order, and after each of them. A Stokes vector gives its direction: which
 * global phase the input has changes nothing here.
 * @throws RangeError for a zero input.
 */
export function pathPhases(input: JonesVector | Stokes, plates: readonly Retarder[]): PathPhases {
  const start = unitJones(input);
  const afterPlate: PlatePhases[] = [];
  let state = start;
  let dynamicRad = 0;
  for (const plate of plates) {
    const own = dynamicPhase(plate, state);
    state = retardJones(plate, state);
    dynamicRad += own;
    afterPlate.push({ ...phasesFrom(start, state, dynamicRad), ownDynamicRad: radians(own) });
  }
  const whole = phasesFrom(start, state, dynamicRad);
  return {
    ...whole,
    afterPlate,
    solidAngleSr: whole.geometricRad === null ? null : -2 * whole.geometricRad,
    sign: returnSign(start, state),
  };
}

/**
 * The phases and the flag at every point of every plate's arc. The points are those of `path` (retarder.ts) with the same
 * step, so index k of plate j belongs to `turns[j].points[k]`.
 * @param stepRad the longest turn between two points. @throws RangeError unless it is above 0, and for a zero input.
 */
export function phaseAlong(
  input: JonesVector | Stokes,
  plates: readonly Retarder[],
  stepRad: Radians,
): readonly (readonly PhasePoint[])[] {
  if (!(stepRad > 0)) throw new RangeError('the step along an arc must be above 0');
  const start = unitJones(input);
  const arcs: (readonly PhasePoint[])[] = [];
  let state = start;
  let dynamicRad = 0;
  for (const plate of plates) {
    const from = state;
    const before = dynamicRad;
    const own = dynamicPhase(plate, from);
    const steps = Math.max(1, Math.ceil(Math.abs(plate.retardanceRad) / stepRad - 1e-9));
    const pointAt = (share: number): PhasePoint => {
      const part = { ...plate, retardanceRad: radians(plate.retardanceRad * share) };
      const here = share === 0 ? from : retardJones(part, from);
      return {
        ...phasesFrom(start, here, before + own * share),
        stokes: jonesToStokes(here),
        flag: flagOf(here),
      };
    };
    arcs.push(Array.from({ length: steps + 1 }, (_, k) => pointAt(k / steps)));
    state = retardJones(plate, from);
    dynamicRad = before + own;
  }
  return arcs;
}

/**
 * The flag of a state with its phase: a unit vector square to the state's own point, Re ψᵀ(iσy)σψ. A plate carries it
 * along rigidly with the sphere, and a phase χ turns it by −2χ about the state, so it can't tell +1 from −1: one full
 * turn brings the flag back and leaves the sign −1. H with no phase has its flag towards D. @throws RangeError for zero.
 */
export function flagOf(jones: JonesVector): Stokes {
  const { aRe, aIm, bRe, bIm } = unitJones(jones);
  return blochToStokes([
    aRe * aRe - aIm * aIm - bRe * bRe + bIm * bIm,
    -2 * (aRe * aIm + bRe * bIm),
    -2 * (aRe * bRe - aIm * bIm),
  ]);
}

/** +1 or −1 where the plates together are the identity up to that sign for every state; `null` where they are not. */
export function fullTurnSign(plates: readonly Retarder[]): 1 | -1 | null {
  const { w, x, y, z } = stackQuaternion(plates);
  if (Math.sqrt(x * x + y * y + z * z) > SAME_STATE) return null;
  return w > 0 ? 1 : -1;
}

/**
 * What projecting a state on each following one and at last on the first leaves as phase: minus half the solid angle of
 * their polygon of great circles (Pancharatnam). `null` where two neighbours are orthogonal. @throws RangeError for none.
 */
export function pancharatnamPhase(states: readonly (JonesVector | Stokes)[]): Radians | null {
  const kets = states.map(unitJones);
  const [first] = kets;
  if (first === undefined) throw new RangeError('a polygon needs at least one state');
  let re = 1;
  let im = 0;
  for (const [k, ket] of kets.entries()) {
    const step = overlap(kets[k + 1] ?? first, ket);
    if (Math.sqrt(step.re * step.re + step.im * step.im) < ORTHOGONAL) return null;
    [re, im] = [re * step.re - im * step.im, re * step.im + im * step.re];
  }
  return foldPhase(atan2(im, re));
}

/** Phases as a lab writes them: under ωt − kz every amplitude is conjugate, so every phase has the other sign. */
export function showPhases(phases: Phases, { phase }: Convention): Phases {
  const { totalRad, dynamicRad, geometricRad } = phases;
  if (phase === 'kz-wt') return { totalRad, dynamicRad, geometricRad };
  // 0 − x, since −x would make −0 of 0.
  const folded = (value: Radians | null) => (value === null ? null : foldPhase(0 - value));
  return {
    totalRad: folded(totalRad),
    dynamicRad: radians(0 - dynamicRad),
    geometricRad: folded(geometricRad),
  };
}
