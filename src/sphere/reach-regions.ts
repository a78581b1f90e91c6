import type { Stokes } from '../../shared/optics/stokes';
import { beltHeight, netPlace, type ReachNet } from './reach-grid';
import { angleBetweenDeg, direction, spherePoint } from './vec';

/** One piece of what can't be reached, as told: around a state, and how far from it its boundary runs. */
export interface OutRegion {
  readonly around: Stokes;
  readonly nearestDeg: number;
  readonly farthestDeg: number;
  /** Share of the sphere. */
  readonly share: number;
}

/** Pieces that hang together, largest first. A piece with one pole in it is told from there, another from its middle. */
export function outRegions(net: ReachNet): OutRegion[] {
  const seen = new Set<number>();
  const idOf = (row: number, column: number) => row * net.columns + column;
  const regions: OutRegion[] = [];
  for (let row = 0; row < net.out.length; row += 1) {
    for (let column = 0; column < net.columns; column += 1) {
      if (net.out[row]?.[column] !== 1 || seen.has(idOf(row, column))) continue;
      regions.push(regionOf(net, pieceFrom(net, row, column, seen, idOf)));
    }
  }
  return regions.sort((one, other) => other.share - one.share);
}

interface Node {
  readonly row: number;
  readonly column: number;
}

function neighbours(net: ReachNet, { row, column }: Node): Node[] {
  const sides = [
    { row: row - 1, column },
    { row: row + 1, column },
    { row, column: (column + 1) % net.columns },
    { row, column: (column + net.columns - 1) % net.columns },
  ];
  return sides.filter((one) => one.row >= 0 && one.row < net.out.length);
}

function pieceFrom(
  net: ReachNet,
  row: number,
  column: number,
  seen: Set<number>,
  idOf: (row: number, column: number) => number,
): Node[] {
  const piece: Node[] = [];
  const waiting: Node[] = [{ row, column }];
  seen.add(idOf(row, column));
  for (let node = waiting.pop(); node !== undefined; node = waiting.pop()) {
    piece.push(node);
    for (const next of neighbours(net, node)) {
      if (net.out[next.row]?.[next.column] !== 1 || seen.has(idOf(next.row, next.column))) continue;
      seen.add(idOf(next.row, next.column));
      waiting.push(next);
    }
  }
  return piece;
}

function regionOf(net: ReachNet, piece: readonly Node[]): OutRegion {
  const pointOf = ({ row, column }: Node) => {
    const { latitudeDeg, longitudeDeg } = netPlace(net, row, column);
    return spherePoint(longitudeDeg, latitudeDeg);
  };
  const weightOf = ({ row }: Node) => beltHeight(net, row) / (2 * net.columns);
  const sum = piece.reduce<[number, number, number]>(
    ([x, y, z], node) => {
      const [s1, s2, s3] = pointOf(node);
      const weight = weightOf(node);
      return [x + s1 * weight, y + s2 * weight, z + s3 * weight];
    },
    [0, 0, 0],
  );
  const [south, north] = [
    piece.some(({ row }) => row === 0),
    piece.some(({ row }) => row === net.out.length - 1),
  ];
  const middle = direction(sum) ?? [0, 0, 1];
  const around: Stokes = south === north ? middle : [0, 0, north ? 1 : -1];
  // The boundary runs between a node inside and its neighbour outside.
  const edges = piece.flatMap((node) =>
    neighbours(net, node)
      .filter((next) => net.out[next.row]?.[next.column] !== 1)
      .map((next) => (angleBetweenDeg(around, pointOf(node)) + angleBetweenDeg(around, pointOf(next))) / 2),
  );
  return {
    around,
    nearestDeg: edges.reduce((least, one) => Math.min(least, one), 180),
    farthestDeg: edges.reduce((most, one) => Math.max(most, one), 0),
    share: piece.reduce((total, node) => total + weightOf(node), 0),
  };
}
