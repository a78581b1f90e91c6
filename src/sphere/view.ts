import { dot, type Vec3 } from './vec';

/**
 * Where the sphere is looked at from, orthographically: `longitudeDeg` along the equator from H and
 * `latitudeDeg` towards +S3, both in degrees of the sphere (twice the table's along the equator).
 */
export interface SphereView {
  readonly longitudeDeg: number;
  readonly latitudeDeg: number;
  /** Magnification; 1 shows the whole sphere. */
  readonly zoom: number;
}

export const HOME_VIEW: SphereView = { longitudeDeg: -58, latitudeDeg: 24, zoom: 1 };
export const ZOOM_LIMITS = { min: 1, max: 4 } as const;

/** The three unit vectors of a view: `right` and `up` lie in the page, `toViewer` comes out of it. */
export interface ViewFrame {
  readonly right: Vec3;
  readonly up: Vec3;
  readonly toViewer: Vec3;
}

export function viewFrame(view: SphereView): ViewFrame {
  const longitude = (view.longitudeDeg * Math.PI) / 180;
  const latitude = (view.latitudeDeg * Math.PI) / 180;
  const [sinLon, cosLon, sinLat, cosLat] = [
    Math.sin(longitude),
    Math.cos(longitude),
    Math.sin(latitude),
    Math.cos(latitude),
  ];
  return {
    right: [-sinLon, cosLon, 0],
    up: [-sinLat * cosLon, -sinLat * sinLon, cosLat],
    toViewer: [cosLat * cosLon, cosLat * sinLon, sinLat],
  };
}

/** A point on the page: x to the right and y down in radii of the sphere, depth towards the viewer. */
interface Projected {
  readonly x: number;
  readonly y: number;
  readonly depth: number;
}

export function project(point: Vec3, frame: ViewFrame): Projected {
  return { x: dot(point, frame.right), y: -dot(point, frame.up), depth: dot(point, frame.toViewer) };
}

/** Where the drawing stands in its box, in CSS pixels. */
export interface Placement {
  readonly width: number;
  readonly height: number;
  readonly centreX: number;
  readonly centreY: number;
  readonly radius: number;
  /** Where the theme allows no smaller type: the dark room. */
  readonly smallestTypePx?: number;
}

/** The limb ring's outer edge with its ticks, in radii of the sphere. */
export const RING_REACH = 1.1;

/** The largest sphere that fits its box with the limb ring and its ticks around it. */
export function placement(width: number, height: number, zoom: number, smallestTypePx = 0): Placement {
  const fit = Math.max(20, Math.min(width / 2, height / 2) / RING_REACH - 2);
  return { width, height, centreX: width / 2, centreY: height / 2, radius: fit * zoom, smallestTypePx };
}

/** A stretch of a line that lies wholly on one side of the limb. */
export interface Run {
  readonly front: boolean;
  readonly points: readonly Projected[];
}

/**
 * Cuts a line where it crosses the limb plane (depth 0), at the crossing itself, so that the drawn and the
 * dotted part meet on the limb.
 */
export function splitAtLimb(points: readonly Vec3[], frame: ViewFrame): Run[] {
  const runs: Run[] = [];
  let current: Projected[] = [];
  let front: boolean | undefined;
  let previous: Projected | undefined;
  for (const point of points) {
    const here = project(point, frame);
    // A point exactly on the limb belongs to either side: it must not open a run of its own.
    const side = here.depth === 0 ? (front ?? true) : here.depth > 0;
    if (previous !== undefined && front !== undefined && side !== front) {
      const t = previous.depth / (previous.depth - here.depth);
      const crossing = {
        x: previous.x + t * (here.x - previous.x),
        y: previous.y + t * (here.y - previous.y),
        depth: 0,
      };
      current.push(crossing);
      runs.push({ front, points: current });
      current = [crossing];
    }
    current.push(here);
    front = side;
    previous = here;
  }
  if (front !== undefined && current.length > 1) runs.push({ front, points: current });
  return runs;
}

export function clampLatitude(latitudeDeg: number): number {
  return Math.max(-90, Math.min(90, latitudeDeg));
}

/** Longitudes are kept in (−180, 180], so that the words of a view stay short. */
export function wrapLongitude(longitudeDeg: number): number {
  const wrapped = ((longitudeDeg % 360) + 360) % 360;
  return wrapped > 180 ? wrapped - 360 : wrapped;
}

/** What stands in the middle of the drawing: the table angle below or above which the viewer is, and how far. */
export function ellipseAt(view: SphereView): { azimuthDeg: number; side: string } {
  const { longitudeDeg, latitudeDeg } = view;
  const height = Math.abs(latitudeDeg).toFixed(0);
  const side =
    latitudeDeg === 0
      ? 'on the equator'
      : `seen from ${height}° ${latitudeDeg > 0 ? 'above' : 'below'} the equator`;
  return { azimuthDeg: longitudeDeg / 2, side };
}
