import { fieldAt } from '../../shared/optics/ellipse';
import type { JonesVector } from '../../shared/optics/jones';
import { radians } from '../../shared/optics/units';

/** The field along the beam at one moment, seen from the side and a little from above. */
interface Wave {
  /** Curves before and behind the plane of the page, and the field's arrows from the beam to them. */
  readonly front: string;
  readonly back: string;
  readonly frontSpokes: string;
  readonly backSpokes: string;
}

interface Course {
  readonly fromX: number;
  readonly toX: number;
  readonly beamY: number;
  readonly periodX: number;
  /** Of the whole field, in units of the drawing. */
  readonly amplitude: number;
  /** Phase k·z at `fromX`. */
  readonly startPhase: number;
  readonly spokeEvery: number;
}

/**
 * The light runs to the right and V is up, so +H goes away from the reader (right-handed axes): it is drawn to the right and
 * up, shortened. What goes away is behind.
 */
const AWAY = { x: 0.33, y: -0.26 } as const;
const STEP_X = 2;

/** E(z) = Re[(a, b) e^{ikz}] at t = 0, which is the field at ωt = −kz. */
export function wave(jones: JonesVector, course: Course): Wave {
  const { fromX, toX, beamY, periodX, amplitude, startPhase, spokeEvery } = course;
  const at = (x: number) => {
    const phase = startPhase + (2 * Math.PI * (x - fromX)) / periodX;
    const { h, v } = fieldAt(jones, radians(-phase));
    return {
      x: x + AWAY.x * amplitude * h,
      y: beamY + AWAY.y * amplitude * h - amplitude * v,
      behind: h > 0,
    };
  };
  let front = '';
  let back = '';
  for (let x = fromX; x + STEP_X <= toX; x += STEP_X) {
    const [here, next] = [at(x), at(x + STEP_X)];
    const piece = `M${here.x.toFixed(1)} ${here.y.toFixed(1)}L${next.x.toFixed(1)} ${next.y.toFixed(1)}`;
    if (here.behind) back += piece;
    else front += piece;
  }
  let frontSpokes = '';
  let backSpokes = '';
  for (let x = fromX; x <= toX; x += spokeEvery) {
    const tip = at(x);
    const spoke = `M${x.toFixed(1)} ${beamY}L${tip.x.toFixed(1)} ${tip.y.toFixed(1)}`;
    if (tip.behind) backSpokes += spoke;
    else frontSpokes += spoke;
  }
  return { front, back, frontSpokes, backSpokes };
}
