import { retardStokes } from '../../shared/optics/retarder';
import { type Stokes, STOKES_H } from '../../shared/optics/stokes';
import { degrees, toRadians } from '../../shared/optics/units';

/** Where things stand on the drawing, in its own units: 1440 × 900, the window it was drawn for. */
export const ARC = {
  originX: 236,
  beamY: 716,
  /** The graduated arc and the thin line inside it. */
  radius: 548,
  inner: 542,
  /** Where the numbers' arc and the numbers stand. */
  outer: 609,
  numbers: 626,
  /** The states stand on this arc; the leaders run from it to the graduation. */
  states: 452,
  leaderFrom: 487,
  leaderTo: 537,
  /** The quiet arcs of the plate below the states; the largest carries ticks. */
  plate: [96, 180, 300, 395],
} as const;

/** The fast axis that makes the light circular. */
export const CIRCULAR_AT_DEG = 45;

/** The state that a quarter-wave plate with its fast axis at this table angle makes of H. */
export function behindQuarterWave(fastAxisDeg: number): Stokes {
  return retardStokes(
    { retardanceRad: toRadians(degrees(90)), fastAxisRad: toRadians(degrees(fastAxisDeg)) },
    STOKES_H,
  );
}

/** The angles whose states are drawn: every 7.5° from level to upright. */
export const STATE_ANGLES_DEG: readonly number[] = Array.from({ length: 13 }, (_, k) => k * 7.5);

/** A point at `radius` from the origin, at a table angle from the beam upwards, in units of the drawing. */
export function arcPoint(radius: number, angleDeg: number): { readonly x: number; readonly y: number } {
  const angle = (angleDeg * Math.PI) / 180;
  return { x: ARC.originX + radius * Math.cos(angle), y: ARC.beamY - radius * Math.sin(angle) };
}

/** A stroke along the radius. */
export function radialStroke(from: number, to: number, angleDeg: number): string {
  const [start, end] = [arcPoint(from, angleDeg), arcPoint(to, angleDeg)];
  return `M${start.x.toFixed(1)} ${start.y.toFixed(1)}L${end.x.toFixed(1)} ${end.y.toFixed(1)}`;
}

/** A quarter of a circle from upright to level. */
export function quarter(radius: number): string {
  const { originX, beamY } = ARC;
  return `M${originX} ${beamY - radius}A${radius} ${radius} 0 0 1 ${originX + radius} ${beamY}`;
}

/** Ticks from `from` outwards (or inwards, for negative lengths); `lengthOf` gives each angle's, 0 for none. */
export function ticks(stepDeg: number, from: number, lengthOf: (angleDeg: number) => number): string {
  return Array.from({ length: Math.round(90 / stepDeg) + 1 }, (_, k) => {
    const angleDeg = Number((k * stepDeg).toFixed(3));
    const length = lengthOf(angleDeg);
    return length === 0 ? '' : radialStroke(from, from + length, angleDeg);
  }).join('');
}
