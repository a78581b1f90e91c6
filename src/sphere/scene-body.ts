import { formatAngle } from '../lib/format';
import type { SceneLabel, SceneLine, SceneTicks } from './scene';
import { spherePoint, type Vec3 } from './vec';

const GRATICULE_STEP_DEG = 30;
const DRAWN_STEP_DEG = 6;

function every(fromDeg: number, toDeg: number, stepDeg: number): number[] {
  return Array.from({ length: Math.round((toDeg - fromDeg) / stepDeg) + 1 }, (_, k) => fromDeg + k * stepDeg);
}

/** Parallels and half-meridians each 30° of the sphere, the equator left out: it is a scale of its own. */
export function graticule(): SceneLine[] {
  const parallels = [-60, -30, 30, 60].map((latitudeDeg): SceneLine => ({
    id: `parallel-${latitudeDeg}`,
    role: 'graticule',
    points: every(0, 360, DRAWN_STEP_DEG).map((longitudeDeg) => spherePoint(longitudeDeg, latitudeDeg)),
  }));
  const meridians = every(0, 330, GRATICULE_STEP_DEG).map((longitudeDeg): SceneLine => ({
    id: `meridian-${longitudeDeg}`,
    role: 'graticule',
    points: every(-90, 90, DRAWN_STEP_DEG).map((latitudeDeg) => spherePoint(longitudeDeg, latitudeDeg)),
  }));
  return [...parallels, ...meridians];
}

/** Height of an engraved tick above the equator, in degrees of the sphere. */
function tickHeightDeg(tableDeg: number): number {
  if (tableDeg % 15 === 0) return 4.6;
  return tableDeg % 7.5 === 0 ? 2.9 : 1.7;
}

/** The equator as a scale in table degrees: a tick each 2.5° of the table, a number each 15°; 0 at H, 45 at D, 90 at V. */
export function equatorScale(): { line: SceneLine; ticks: SceneTicks; labels: SceneLabel[] } {
  const segments = every(-87.5, 90, 2.5).map((tableDeg): readonly [Vec3, Vec3] => [
    spherePoint(2 * tableDeg, 0),
    spherePoint(2 * tableDeg, tickHeightDeg(tableDeg)),
  ]);
  return {
    line: {
      id: 'equator',
      role: 'equator',
      points: every(0, 360, 2.5).map((longitudeDeg) => spherePoint(longitudeDeg, 0)),
    },
    ticks: { id: 'equator-ticks', role: 'equator-tick', segments },
    labels: every(-75, 90, 15).map((tableDeg): SceneLabel => ({
      id: `degrees-${tableDeg}`,
      role: 'degrees',
      text: formatAngle(tableDeg, 0),
      at: [spherePoint(2 * tableDeg, -5.5)],
    })),
  };
}
