import type { Stokes } from '../../shared/optics/stokes';

/** A map of the sphere: in how many ways each cell's state is reached. Angles in degrees of the sphere. */
export interface ReachInput {
  readonly stepDeg: number;
  readonly cells: readonly {
    readonly centre: Stokes;
    readonly latitudeDeg: number;
    readonly longitudeDeg: number;
    readonly count: number;
  }[];
}

interface Row {
  readonly latitudeDeg: number;
  /** By rising longitude in [0, 360). */
  readonly cells: readonly { readonly longitudeDeg: number; readonly count: number }[];
}

/** The cells as rows of equal latitude from south to north; where they stand is read from their centres alone. */
export type ReachRows = readonly Row[];

const DEG = 180 / Math.PI;

export function reachRows({ cells }: ReachInput): ReachRows {
  const rows = new Map<number, { longitudeDeg: number; count: number }[]>();
  for (const { centre, count } of cells) {
    const latitudeDeg = Math.atan2(centre[2], Math.hypot(centre[0], centre[1])) * DEG;
    const key = Math.round(latitudeDeg * 1e4);
    const cell = { longitudeDeg: wrap360(Math.atan2(centre[1], centre[0]) * DEG), count };
    const row = rows.get(key);
    if (row === undefined) rows.set(key, [cell]);
    else row.push(cell);
  }
  return [...rows]
    .sort(([one], [other]) => one - other)
    .map(([key, row]) => ({
      latitudeDeg: key / 1e4,
      cells: row.sort((one, other) => one.longitudeDeg - other.longitudeDeg),
    }));
}

/** The count of the cell that a point lies in; undefined on an empty map. */
export function countAt(rows: ReachRows, latitudeDeg: number, longitudeDeg: number): number | undefined {
  const row = nearest(rows, (one) => one.latitudeDeg, latitudeDeg);
  if (row === undefined) return undefined;
  const longitude = wrap360(longitudeDeg);
  const [first, last] = [row.cells[0], row.cells.at(-1)];
  let best = nearest(row.cells, (one) => one.longitudeDeg, longitude);
  // Across 0° the first and the last cell of a row are neighbours.
  for (const end of [first, last]) {
    if (end === undefined || best === undefined) continue;
    const apart = (one: typeof end) => Math.abs(wrap180(one.longitudeDeg - longitude));
    if (apart(end) < apart(best)) best = end;
  }
  return best?.count;
}

/** The share of the sphere, by area, whose count satisfies `wanted`: each row's belt shared evenly by its cells. */
export function shareWhere(rows: ReachRows, wanted: (count: number) => boolean): number {
  return rows.reduce((sum, { latitudeDeg, cells }, index) => {
    const [below, above] = [rows[index - 1], rows[index + 1]];
    const south = below === undefined ? -90 : (below.latitudeDeg + latitudeDeg) / 2;
    const north = above === undefined ? 90 : (above.latitudeDeg + latitudeDeg) / 2;
    const belt = (Math.sin(north / DEG) - Math.sin(south / DEG)) / 2;
    return sum + (belt * cells.filter(({ count }) => wanted(count)).length) / cells.length;
  }, 0);
}

/** A net of nodes at the cells' centres and the poles: rows from south to north, columns from `firstLongitudeDeg` on. */
export interface ReachNet {
  readonly latitudesDeg: readonly number[];
  readonly firstLongitudeDeg: number;
  readonly columns: number;
  /** By row and column, 1 where a node can't be reached. */
  readonly out: readonly (readonly number[])[];
}

/** @param finestDeg a finer map is taken at every second, third, … row and column. */
export function reachNet({ stepDeg }: ReachInput, rows: ReachRows, finestDeg: number): ReachNet {
  const thin = Math.max(1, Math.ceil(finestDeg / stepDeg - 1e-9));
  const inner = rows
    .map(({ latitudeDeg }) => latitudeDeg)
    .filter((latitudeDeg, index) => index % thin === 0 && Math.abs(latitudeDeg) < 90 - 1e-3);
  const widest = rows.reduce<Row | undefined>(
    (most, row) => (most === undefined || row.cells.length > most.cells.length ? row : most),
    undefined,
  );
  const columns = Math.max(3, Math.ceil((widest?.cells.length ?? 0) / thin));
  const firstLongitudeDeg = widest?.cells[0]?.longitudeDeg ?? 0;
  const valueAt = (latitudeDeg: number, column: number) =>
    countAt(rows, latitudeDeg, firstLongitudeDeg + (column * 360) / columns) === 0 ? 1 : 0;
  const lineAt = (latitudeDeg: number) =>
    Array.from({ length: columns }, (_, column) => valueAt(latitudeDeg, column));
  // A pole is one state, whatever the longitude: it goes with most of the cells around it.
  const poleAt = (latitudeDeg: number) => {
    const around = lineAt(latitudeDeg);
    const isOut = 2 * around.filter((value) => value === 1).length > columns ? 1 : 0;
    return around.map(() => isOut);
  };
  return {
    latitudesDeg: [-90, ...inner, 90],
    firstLongitudeDeg,
    columns,
    out: [poleAt(-90), ...inner.map(lineAt), poleAt(90)],
  };
}

/** The point of the sphere at a place of the net, between its nodes too. */
export function netPlace(
  { latitudesDeg, firstLongitudeDeg, columns }: ReachNet,
  row: number,
  column: number,
): { latitudeDeg: number; longitudeDeg: number } {
  const below = Math.min(latitudesDeg.length - 2, Math.floor(row));
  const [south, north] = [latitudesDeg[below] ?? -90, latitudesDeg[below + 1] ?? 90];
  return {
    latitudeDeg: south + (row - below) * (north - south),
    longitudeDeg: firstLongitudeDeg + (column * 360) / columns,
  };
}

/** The height of the belt that a row stands for, in radii: by Archimedes its area is 2π times that. */
export function beltHeight({ latitudesDeg }: ReachNet, row: number): number {
  const here = latitudesDeg[row] ?? 0;
  const [below, above] = [latitudesDeg[row - 1] ?? here, latitudesDeg[row + 1] ?? here];
  const at = (latitudeDeg: number) => Math.sin(latitudeDeg / DEG);
  return at((here + above) / 2) - at((here + below) / 2);
}

export function wrap360(angleDeg: number): number {
  return ((angleDeg % 360) + 360) % 360;
}

function wrap180(angleDeg: number): number {
  return wrap360(angleDeg + 180) - 180;
}

/** Of a sorted list the one nearest to a place. */
function nearest<T>(sorted: readonly T[], placeOf: (one: T) => number, place: number): T | undefined {
  let [low, high] = [0, sorted.length];
  while (low < high) {
    const middle = (low + high) >> 1;
    const one = sorted[middle];
    if (one !== undefined && placeOf(one) < place) low = middle + 1;
    else high = middle;
  }
  const [before, after] = [sorted[low - 1], sorted[low]];
  if (before === undefined || after === undefined) return before ?? after;
  return place - placeOf(before) < placeOf(after) - place ? before : after;
}
