import { type Turn, retardStokes } from '../../shared/optics/retarder';
import { degrees, toDegrees, toRadians, wrap } from '../../shared/optics/units';
import { formatAngle } from '../lib/format';
import type { SceneHead, SceneLabel, SceneLine, SceneMark, SceneTicks, SpherePlate } from './scene';
import { add, cross, direction, dot, linearPoint, scale, type Vec3 } from './vec';

const TICK_STEP_DEG = 10;
const TICK_LENGTH = 0.034;
/** Where the one arrowhead stands along the turn, as a share of it. */
const HEAD_AT = 0.62;
/** On an arc shorter than this, in radii, the head is drawn smaller. */
const FULL_HEAD_ARC = 0.25;
/** Places of the plate's name along its turn, best first. */
const NAME_AT = [0.4, 0.72, 0.55, 0.25, 0.85, 0.12];

interface TurnDrawing {
  readonly line: readonly SceneLine[];
  readonly ticks: readonly SceneTicks[];
  readonly head: readonly SceneHead[];
  readonly axisMark: SceneMark;
  readonly labels: readonly SceneLabel[];
}

/** How one plate's turn is drawn. Light along the axis doesn't move: then only the axis is there. */
export function turnDrawing(plate: SpherePlate, turn: Turn, index: number, last: boolean): TurnDrawing {
  const pointAt = (sweptDeg: number): Vec3 =>
    retardStokes(
      {
        fastAxisRad: toRadians(degrees(plate.fastAxisDeg)),
        retardanceRad: toRadians(degrees(sweptDeg)),
      },
      turn.from,
    );
  const sweepDeg = toDegrees(turn.sweepRad);
  const axisMark: SceneMark = { id: `axis-${index}`, kind: 'axis', last, at: turn.axis };

  const circleRadius = Math.sqrt(Math.max(0, 1 - dot(turn.axis, turn.from) ** 2));
  const arcLength = Math.abs(turn.sweepRad) * circleRadius;
  if (arcLength < 0.01) return { line: [], ticks: [], head: [], axisMark, labels: [] };

  const role = last ? 'last-turn' : 'turn';
  const tickCount = Math.floor(Math.abs(sweepDeg) / TICK_STEP_DEG + 1e-9);
  const segments = Array.from({ length: tickCount }, (_, k) =>
    outwardTick(pointAt(Math.sign(sweepDeg) * TICK_STEP_DEG * (k + 1)), turn.axis),
  ).filter((segment) => segment !== undefined);
  const headAt = pointAt(sweepDeg * HEAD_AT);
  const towards = direction(scale(cross(turn.axis, headAt), Math.sign(sweepDeg)));

  return {
    line: [{ id: `turn-${index}`, role, points: turn.points }],
    ticks: [{ id: `turn-ticks-${index}`, role: last ? 'last-turn-tick' : 'turn-tick', segments }],
    head:
      towards === undefined
        ? []
        : [{ id: `head-${index}`, last, at: headAt, towards, size: Math.min(1, arcLength / FULL_HEAD_ARC) }],
    axisMark,
    labels: [
      { id: `turn-${index}`, role, text: plate.name, at: NAME_AT.map((share) => pointAt(sweepDeg * share)) },
    ],
  };
}

/** Axes nearer than this on the table are drawn at one place. */
const SAME_AXIS_DEG = 0.05;

/** The names and angles of the plates' axes; plates that stand alike share one label, since they share a place. */
export function axisLabels(plates: readonly SpherePlate[]): SceneLabel[] {
  const alike = (one: SpherePlate, other: SpherePlate) =>
    Math.abs(wrap(one.fastAxisDeg - other.fastAxisDeg + 90, 180) - 90) < SAME_AXIS_DEG;
  return plates.flatMap((plate, index): SceneLabel[] => {
    if (plates.findIndex((one) => alike(one, plate)) !== index) return [];
    const names = plates.filter((one) => alike(one, plate)).map(({ name }) => name);
    return [
      {
        id: `axis-${index}`,
        role: 'axis',
        text: `${names.join(', ')} ${formatAngle(wrap(plate.fastAxisDeg, 180))}`,
        at: [linearPoint(plate.fastAxisDeg)],
      },
    ];
  });
}

/** A short stroke along the sphere, away from the axis. */
function outwardTick(point: Vec3, axis: Vec3): readonly [Vec3, Vec3] | undefined {
  const outward = direction(add(scale(point, dot(point, axis)), scale(axis, -1)));
  if (outward === undefined) return undefined;
  const tip = add(scale(point, Math.cos(TICK_LENGTH)), scale(outward, Math.sin(TICK_LENGTH)));
  return [point, tip];
}
