import type { Quaternion } from '../quaternion';
import { type Radians, radians, wrap } from '../units';
import { climb, curvatureAt, polish } from './apply-newton';
import { type Candidate, EXACT_MISS, type Half, pointOf, settingOf } from './apply-stack';
import { distinctSettings } from './distinct-settings';
import type { Family, Setting } from './setting';
import { spreadAngles } from './spread-angles';
import { independentRows } from './symmetric-matrix';

// Curvature below this, of cos(ε/2) in u, is that of a level direction.
const LEVEL = 1e-6;
const STARTS = 24;

/**
 * The family of a summit that is a ridge: as many plates follow as the curvature has rank, and they climb to their optima from
 * where the summit has them and from a fixed set of starts. Null where the curvature is of full rank.
 */
export function ridgeFamily(
  halves: readonly Half[],
  target: Quaternion,
  summit: Candidate,
  limit: number,
): Family | null {
  const following = independentRows(curvatureAt(halves, summit.points, target), LEVEL);
  const freePlates = halves.map((_, k) => k).filter((k) => !following.includes(k));
  if (freePlates.length === 0) return null;
  const membersAt = (angles: readonly Radians[]): readonly Setting[] => {
    const chosen = new Map(freePlates.map((plate, k) => [plate, radians(wrap(angles[k] ?? NaN, Math.PI))]));
    const starts = [
      summit.points,
      ...spreadAngles(halves.length, STARTS).map((start) => start.map(pointOf)),
    ].map((points) =>
      points.map((point, plate) => {
        const angle = chosen.get(plate);
        return angle === undefined ? point : pointOf(angle);
      }),
    );
    const members = starts
      .map((start) => climb(halves, start, target, freePlates))
      .filter((found) => found !== null)
      .map((found) => (limit > EXACT_MISS ? found : polish(halves, found.points, target, freePlates)))
      .filter(({ miss }) => miss < limit)
      .map((found): Setting => {
        const { fastAxesRad, infidelity } = settingOf(found);
        return { fastAxesRad: fastAxesRad.map((angle, plate) => chosen.get(plate) ?? angle), infidelity };
      });
    return distinctSettings(members, SAME_RAD);
  };
  return { freePlates, membersAt };
}

// Climbs to one summit end this close to one another.
const SAME_RAD = 1e-6;
