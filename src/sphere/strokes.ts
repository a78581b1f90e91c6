/** The colour tokens of src/styles that the 3D drawing takes over, without their leading dashes. */
export type SphereToken = 'paper' | 'glass' | 'wash' | 'ink' | 'ink-3' | 'rule' | 'beam';

export type LineRole =
  | 'graticule'
  | 'equator'
  | 'equator-tick'
  | 'turn'
  | 'turn-tick'
  | 'last-turn'
  | 'last-turn-tick'
  | 'reach-hatch'
  | 'reach-edge'
  | 'reach-dots';

/** How one kind of line is drawn in front of the limb plane and behind it; `null`: not drawn there. */
interface Stroke {
  readonly token: SphereToken;
  readonly widthPx: number;
  readonly frontOpacity: number;
  readonly backOpacity: number | null;
  /** Behind: dotted (it belongs to the path) or a plain faint line (it belongs to the body). */
  readonly backDotted: boolean;
  /** A paper edge that keeps the line apart from what it crosses, each side. */
  readonly haloPx: number;
  /** Drawn in 3D as the card's own one-pixel lines: a pattern of thousands of strokes costs no triangles then. */
  readonly hairline?: true;
}

export const STROKES: Readonly<Record<LineRole, Stroke>> = {
  graticule: {
    token: 'rule',
    widthPx: 0.6,
    frontOpacity: 0.75,
    backOpacity: 0.35,
    backDotted: false,
    haloPx: 0,
  },
  equator: { token: 'ink', widthPx: 1, frontOpacity: 1, backOpacity: 0.35, backDotted: false, haloPx: 0 },
  'equator-tick': {
    token: 'ink',
    widthPx: 0.7,
    frontOpacity: 1,
    backOpacity: null,
    backDotted: false,
    haloPx: 0,
  },
  turn: { token: 'ink', widthPx: 2, frontOpacity: 1, backOpacity: 0.75, backDotted: true, haloPx: 1.2 },
  'turn-tick': {
    token: 'ink',
    widthPx: 0.8,
    frontOpacity: 1,
    backOpacity: 0.45,
    backDotted: false,
    haloPx: 0,
  },
  'last-turn': {
    token: 'beam',
    widthPx: 3.2,
    frontOpacity: 1,
    backOpacity: 0.85,
    backDotted: true,
    haloPx: 1.2,
  },
  'last-turn-tick': {
    token: 'beam',
    widthPx: 1,
    frontOpacity: 1,
    backOpacity: 0.45,
    backDotted: false,
    haloPx: 0,
  },
  'reach-hatch': {
    token: 'ink-3',
    widthPx: 0.8,
    frontOpacity: 0.7,
    backOpacity: 0.2,
    backDotted: false,
    haloPx: 0,
    hairline: true,
  },
  'reach-edge': {
    token: 'ink-3',
    widthPx: 1,
    frontOpacity: 1,
    backOpacity: 0.35,
    backDotted: false,
    haloPx: 0,
    hairline: true,
  },
  'reach-dots': {
    token: 'ink-3',
    widthPx: 1.3,
    frontOpacity: 0.7,
    backOpacity: null,
    backDotted: false,
    haloPx: 0,
    hairline: true,
  },
};

/** Dots of a hidden line, in pixels: mark and gap. */
export const DOTS_PX = { mark: 1.6, gap: 3.4 } as const;

/** The limb ring and its ticks, in radii of the sphere; the ring is the one thing that stays with the page. */
export const LIMB = {
  ringRadius: 1.055,
  shortTick: 1.072,
  longTick: 1.09,
  tickStepDeg: 3,
  longTickStepDeg: 15,
} as const;

/** The body's shade: glass up to `from` of the way to the edge, then towards wash; centred up and left. */
export const SHADE = { centreX: -0.3, centreY: -0.4, radius: 1.6, from: 0.62 } as const;
