import { phaseAlong, type PhasePoint } from '../../shared/optics/phase';
import { degrees, toRadians } from '../../shared/optics/units';
import { plateRetarder } from './plate-retarder';
import type { SceneFlag, SphereInput } from './scene';
import { add, angleBetweenDeg, scale, turnAbout } from './vec';

/** Lengths in radii of the sphere. */
const POLE = 0.15;
const HOIST = 0.07;
const PENNANT = 0.13;
const FLAG_EACH_DEG = 30;
/** Flags nearer than this along the path would stand in each other's way. */
const NEAREST = 0.22;

/** Between two computed points of a turn; a divisor of the flags' 30°. */
const STEP_RAD = toRadians(degrees(3));

/**
 * A flag at the start, after each plate and about each 30° of turn between. About its pole, clockwise seen from outside,
 * the pennant has turned by the canonical (kz − ωt) phase arg⟨start|state⟩ from where it would point in phase with the start.
 */
export function phaseFlags({ start, plates }: Pick<SphereInput, 'start' | 'plates'>): SceneFlag[] {
  const arcs = phaseAlong(start, plates.map(plateRetarder), STEP_RAD);
  const first = arcs[0]?.[0];
  if (first === undefined) return [];
  return [
    flagAt(first, 'flag-start', false),
    ...arcs.flatMap((points, plate) => {
      const sweepDeg = Math.abs(plates[plate]?.retardanceDeg ?? 0);
      const count = flagsAlong(points, sweepDeg);
      return Array.from({ length: count }, (_, k) => {
        const point = points[Math.round(((k + 1) / count) * (points.length - 1))];
        const last = plate === arcs.length - 1 && k === count - 1;
        return point === undefined ? [] : [flagAt(point, `flag-${plate}-${k + 1}`, last)];
      }).flat();
    }),
  ];
}

/** How many flags a turn carries, the one at its end counted: as many as its length on the sphere has room for. */
function flagsAlong(points: readonly PhasePoint[], sweepDeg: number): number {
  const length = points.slice(1).reduce((sum, { stokes }, index) => {
    const before = points[index];
    return sum + (before === undefined ? 0 : toRadians(degrees(angleBetweenDeg(before.stokes, stokes))));
  }, 0);
  return Math.max(1, Math.min(Math.round(sweepDeg / FLAG_EACH_DEG), Math.floor(length / NEAREST)));
}

function flagAt({ stokes, flag, totalRad }: PhasePoint, id: string, last: boolean): SceneFlag {
  const top = scale(stokes, 1 + POLE);
  const base = { id, foot: stokes, top, hoist: scale(stokes, 1 + POLE - HOIST), last };
  if (totalRad === null) return { ...base, zero: undefined, tip: undefined };
  // The spinor's own flag turns by −2χ for a phase χ: taken back twice it is the start's, taken back once it shows χ.
  return {
    ...base,
    zero: add(top, scale(turnAbout(flag, stokes, 2 * totalRad), PENNANT)),
    tip: add(top, scale(turnAbout(flag, stokes, totalRad), PENNANT)),
  };
}
