import { netPlace, type ReachNet, wrap360 } from './reach-grid';
import { spherePoint, type Vec3 } from './vec';

/** How far out of reach a place is, 0 to 1, smooth between the nodes; its boundary is at ½. */
export type OutField = (latitudeDeg: number, longitudeDeg: number) => number;

/** How often each node takes the mean of its neighbours: a boundary then runs smoothly over about two cells. */
const SOFTENINGS = 4;
/** How far from ½ a node stays on its own side. */
const OWN_SIDE = 0.04;

/**
 * The net softened, so that a boundary doesn't follow the cells' corners. Each node keeps its side of ½, so no state that was
 * counted is drawn on the wrong side: only between the nodes, where nothing is known, does the boundary move.
 */
export function softened(net: ReachNet): readonly (readonly number[])[] {
  let soft = net.out;
  for (let round = 0; round < SOFTENINGS; round += 1) soft = softenedOnce(net, soft);
  return soft;
}

function softenedOnce(
  { columns, out }: ReachNet,
  soft: readonly (readonly number[])[],
): readonly (readonly number[])[] {
  return soft.map((line, row) => {
    const south = soft[row - 1] ?? line;
    const north = soft[row + 1] ?? line;
    const across = (values: readonly number[], west: number, column: number, east: number) =>
      ((values[west] ?? 0) + 2 * (values[column] ?? 0) + (values[east] ?? 0)) / 4;
    return line.map((_, column) => {
      const [west, east] = [(column + columns - 1) % columns, (column + 1) % columns];
      const mean =
        (across(south, west, column, east) +
          2 * across(line, west, column, east) +
          across(north, west, column, east)) /
        4;
      return out[row]?.[column] === 1 ? Math.max(0.5 + OWN_SIDE, mean) : Math.min(0.5 - OWN_SIDE, mean);
    });
  });
}

/** Between four nodes the mean by nearness. */
export function outField(net: ReachNet, soft: readonly (readonly number[])[]): OutField {
  const { latitudesDeg, firstLongitudeDeg, columns } = net;
  return (latitudeDeg, longitudeDeg) => {
    const row = rowBelow(latitudesDeg, latitudeDeg);
    const [from, to] = [latitudesDeg[row] ?? -90, latitudesDeg[row + 1] ?? 90];
    const x = (wrap360(longitudeDeg - firstLongitudeDeg) * columns) / 360;
    const column = Math.floor(x) % columns;
    const v = Math.max(0, Math.min(1, (latitudeDeg - from) / (to - from)));
    const u = x - Math.floor(x);
    const east = (column + 1) % columns;
    const [south, north] = [soft[row] ?? [], soft[row + 1] ?? []];
    return (
      (1 - v) * ((1 - u) * (south[column] ?? 0) + u * (south[east] ?? 0)) +
      v * ((1 - u) * (north[column] ?? 0) + u * (north[east] ?? 0))
    );
  };
}

/** The row at or below a latitude that has one above it. */
function rowBelow(latitudesDeg: readonly number[], latitudeDeg: number): number {
  let [low, high] = [0, latitudesDeg.length - 2];
  while (low < high) {
    const middle = Math.ceil((low + high) / 2);
    if ((latitudesDeg[middle] ?? 90) <= latitudeDeg) low = middle;
    else high = middle - 1;
  }
  return low;
}

/** The boundary of what can't be reached as short strokes on the sphere, by the sides of each square that it crosses. */
export function reachEdge(net: ReachNet, soft: readonly (readonly number[])[]): (readonly [Vec3, Vec3])[] {
  const value = (row: number, column: number): number => soft[row]?.[column % net.columns] ?? 0;
  const strokes: (readonly [Vec3, Vec3])[] = [];
  for (let row = 0; row < net.latitudesDeg.length - 1; row += 1) {
    for (let column = 0; column < net.columns; column += 1) {
      const crossings = [
        crossing(value(row, column), value(row, column + 1), (t) => [row, column + t]),
        crossing(value(row, column + 1), value(row + 1, column + 1), (t) => [row + t, column + 1]),
        crossing(value(row + 1, column), value(row + 1, column + 1), (t) => [row + 1, column + t]),
        crossing(value(row, column), value(row + 1, column), (t) => [row + t, column]),
      ].filter((one) => one !== undefined);
      const points = crossings.map(([y, x]) => {
        const { latitudeDeg, longitudeDeg } = netPlace(net, y, x);
        return spherePoint(longitudeDeg, latitudeDeg);
      });
      // Two crossings are one stroke; four are a saddle, drawn as two.
      for (let k = 0; k + 1 < points.length; k += 2) {
        const [from, to] = [points[k], points[k + 1]];
        if (from !== undefined && to !== undefined) strokes.push([from, to]);
      }
    }
  }
  return strokes;
}

function crossing(
  from: number,
  to: number,
  place: (t: number) => readonly [number, number],
): readonly [number, number] | undefined {
  if (from >= 0.5 === to >= 0.5) return undefined;
  return place((0.5 - from) / (to - from));
}
