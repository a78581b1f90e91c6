import { outField, type OutField, reachEdge, softened } from './reach-contour';
import {
  beltHeight,
  countAt,
  netPlace,
  reachNet,
  type ReachInput,
  type ReachNet,
  reachRows,
  type ReachRows,
} from './reach-grid';
import type { SceneTicks } from './scene';
import { cross, direction, dot, spherePoint, turnAbout, type Vec3 } from './vec';

export type { ReachInput } from './reach-grid';

/** A degree of the sphere is under three pixels of the drawing: a finer net wouldn't be seen. */
const FINEST_NET_DEG = 1;
/** Between two hatch lines, in degrees of the sphere: closer on a small region, so that it is still seen as hatched. */
const HATCH_DEG = { closest: 1.3, widest: 4, linesAcross: 7 } as const;
const HATCH_PROBE_DEG = 1;
const HATCH_STROKE_DEG = 5;
const DOT_SPACING_DEG = 4.5;
const DOT_LENGTH = 0.013;
const DEG = 180 / Math.PI;

/** What a pair reaches: hatched with an edge where in no way, lightly dotted where in just two; elsewhere nothing. */
export function reachTicks(reach: ReachInput): SceneTicks[] {
  const rows = reachRows(reach);
  const net = reachNet(reach, rows, FINEST_NET_DEG);
  const soft = softened(net);
  const all: SceneTicks[] = [
    { id: 'reach-dots', role: 'reach-dots', segments: dots(rows) },
    { id: 'reach-hatch', role: 'reach-hatch', segments: hatch(net, outField(net, soft)) },
    { id: 'reach-edge', role: 'reach-edge', segments: reachEdge(net, soft) },
  ];
  return all.filter(({ segments }) => segments.length > 0);
}

interface OutNode {
  readonly point: Vec3;
  /** Area in steradians. */
  readonly area: number;
}

function outNodes(net: ReachNet): OutNode[] {
  return net.out.flatMap((line, row) => {
    const area = (beltHeight(net, row) * 2 * Math.PI) / net.columns;
    return line.flatMap((value, column) => {
      if (value === 0) return [];
      const { latitudeDeg, longitudeDeg } = netPlace(net, row, column);
      return [{ point: spherePoint(longitudeDeg, latitudeDeg), area }];
    });
  });
}

/**
 * Circles about one point at even distances: wherever one looks they are lines at one spacing, which parallels or meridians
 * are not. The point is chosen as far as can be from what is hatched, since around it they are small circles.
 */
function hatch(net: ReachNet, out: OutField): (readonly [Vec3, Vec3])[] {
  const nodes = outNodes(net);
  if (nodes.length === 0) return [];
  const area = nodes.reduce((sum, node) => sum + node.area, 0);
  const spacingDeg = Math.min(
    HATCH_DEG.widest,
    Math.max(HATCH_DEG.closest, (Math.sqrt(area) * DEG) / HATCH_DEG.linesAcross),
  );
  const axis = hatchAxis(nodes);
  const side = direction(cross(axis, [0.6, -0.3, 0.74])) ?? [0, 0, 1];
  const count = Math.floor(180 / spacingDeg);
  return Array.from({ length: count }, (_, k) => {
    const radius = ((k + 0.5) * spacingDeg) / DEG;
    const start = turnAbout(axis, side, radius);
    return hatchCircle((turnRad) => turnAbout(start, axis, turnRad), Math.sin(radius), out);
  }).flat();
}

function hatchAxis(nodes: readonly OutNode[]): Vec3 {
  // Every few nodes do: the axis needs no more than a few degrees.
  const sample = nodes.filter((_, index) => index % Math.ceil(nodes.length / 400) === 0);
  let best: { axis: Vec3; nearest: number } | undefined;
  for (const longitudeDeg of [-13, 17, 47, 77, 107, 137]) {
    for (const latitudeDeg of [-40, -20, 0, 20, 40]) {
      const axis = spherePoint(longitudeDeg, latitudeDeg);
      const nearest = sample.reduce((most, { point }) => Math.max(most, Math.abs(dot(point, axis))), 0);
      if (best === undefined || nearest < best.nearest - 0.02) best = { axis, nearest };
    }
  }
  return best?.axis ?? [1, 0, 0];
}

function hatchCircle(
  pointAt: (turnRad: number) => Vec3,
  circleRadius: number,
  out: OutField,
): (readonly [Vec3, Vec3])[] {
  const probes = Math.max(12, Math.round((360 * circleRadius) / HATCH_PROBE_DEG));
  const turnOf = (k: number) => (k * 2 * Math.PI) / probes;
  const inside = (turnRad: number) => {
    const [s1, s2, s3] = pointAt(turnRad);
    return out(Math.asin(Math.max(-1, Math.min(1, s3))) * DEG, Math.atan2(s2, s1) * DEG) >= 0.5;
  };
  const strokes: (readonly [Vec3, Vec3])[] = [];
  const draw = (from: number, to: number) => {
    const pieces = Math.max(1, Math.ceil(((to - from) * circleRadius * DEG) / HATCH_STROKE_DEG));
    for (let k = 0; k < pieces; k += 1) {
      const [a, b] = [from + ((to - from) * k) / pieces, from + ((to - from) * (k + 1)) / pieces];
      strokes.push([pointAt(a), pointAt(b)]);
    }
  };
  let since: number | undefined = inside(0) ? 0 : undefined;
  for (let k = 1; k <= probes; k += 1) {
    const is = inside(turnOf(k));
    if (is === (since !== undefined)) continue;
    const at = boundary(turnOf(k - 1), turnOf(k), inside);
    if (since === undefined) since = at;
    else {
      draw(since, at);
      since = undefined;
    }
  }
  if (since !== undefined) draw(since, 2 * Math.PI);
  return strokes;
}

/** Where between two turns the side changes. */
function boundary(from: number, to: number, inside: (turnRad: number) => boolean): number {
  const fromSide = inside(from);
  let [low, high] = [from, to];
  for (let k = 0; k < 6; k += 1) {
    const middle = (low + high) / 2;
    if (inside(middle) === fromSide) low = middle;
    else high = middle;
  }
  return (low + high) / 2;
}

/** Dots spread evenly over the sphere, on a spiral that turns by the golden angle from each to the next. */
function dots(rows: ReachRows): (readonly [Vec3, Vec3])[] {
  const count = Math.round((4 * Math.PI) / (DOT_SPACING_DEG / DEG) ** 2);
  const golden = 180 * (3 - Math.sqrt(5));
  return Array.from({ length: count }, (_, k): readonly [Vec3, Vec3][] => {
    const latitudeDeg = Math.asin(1 - (2 * k + 1) / count) * DEG;
    const longitudeDeg = k * golden;
    if (countAt(rows, latitudeDeg, longitudeDeg) !== 2) return [];
    const point = spherePoint(longitudeDeg, latitudeDeg);
    const along = direction(cross([0, 0, 1], point));
    return along === undefined ? [] : [[point, turnAbout(point, cross(point, along), DOT_LENGTH)]];
  }).flat();
}
