import type { LabelRole, SceneLabel, SceneMark, SphereScene } from './scene';
import { add, scale } from './vec';
import { type Placement, project, type ViewFrame } from './view';

/** A label where it stands on the page: the middle of its text, in CSS pixels of the figure. */
export interface PlacedLabel {
  readonly id: string;
  readonly role: LabelRole;
  readonly text: string;
  readonly x: number;
  readonly y: number;
  readonly front: boolean;
  readonly sizePx: number;
  /** Half of the room kept for the text. */
  readonly halfWidth: number;
  readonly halfHeight: number;
}

interface Box {
  readonly x: number;
  readonly y: number;
  readonly halfWidth: number;
  readonly halfHeight: number;
}

/** Type size and a fair mean width of a character; the true width isn't known before the text is drawn. */
export const LABEL_TYPE: Readonly<
  Record<LabelRole, { readonly sizePx: number; readonly perCharacterPx: number }>
> = {
  basis: { sizePx: 14, perCharacterPx: 9 },
  target: { sizePx: 13, perCharacterPx: 7.4 },
  image: { sizePx: 13, perCharacterPx: 7.4 },
  point: { sizePx: 12, perCharacterPx: 6.6 },
  turn: { sizePx: 13, perCharacterPx: 7.4 },
  'last-turn': { sizePx: 13, perCharacterPx: 7.4 },
  axis: { sizePx: 12, perCharacterPx: 6.2 },
  degrees: { sizePx: 10.5, perCharacterPx: 6.4 },
};

/** How far a label's nearest edge keeps from its point. */
const CLEARANCE_PX: Readonly<Record<LabelRole, number>> = {
  basis: 8,
  target: 14,
  image: 8,
  point: 6,
  turn: 9,
  'last-turn': 9,
  axis: 11,
  degrees: 0,
};

/** Steps away from the point where all nearer places are taken, as beside a target that stands on a basis state. */
const FARTHER_PX = [0, 7, 14] as const;

/** Room that a mark takes: a label laid over one hides what it names. */
const MARK_HALF_PX: Readonly<Record<SceneMark['kind'], number>> = {
  basis: 7,
  axis: 9,
  between: 5,
  target: 12,
  reached: 7,
  wanted: 9,
  image: 5,
  point: 4,
};

/** Engraved numbers nearer to the limb than this are too foreshortened to be read. */
const DEGREES_MIN_DEPTH = 0.16;

/** Directions to stand in from the point, in turns of 45° counter-clockwise from the right. */
const DIRECTIONS_DEG: Readonly<Record<LabelRole, readonly number[]>> = {
  basis: [225, 90, 315, 135, 45, 270, 0, 180],
  target: [30, 0, 60, 90, 150, 180, 330, 210],
  image: [330, 30, 0, 60, 300, 90, 150, 180, 210, 270],
  point: [30, 330, 0, 60, 90, 150, 180, 210, 270, 300],
  turn: [330, 30, 0, 300, 210, 150, 180, 60, 90, 270],
  'last-turn': [330, 30, 0, 300, 210, 150, 180, 60, 90, 270],
  axis: [180, 0, 135, 45, 225, 315, 90, 270],
  degrees: [0],
};

/** What a label would rather not lie on, by how much; the graticule is faint enough. */
const INK_WEIGHT = { turn: 12, 'last-turn': 12, flag: 12, equator: 3 } as const;

interface InkPoint {
  readonly x: number;
  readonly y: number;
  readonly weight: number;
}

/** Who chooses a place first. An engraved number gives way to everything and is left out rather than moved. */
const ORDER: readonly LabelRole[] = [
  'basis',
  'target',
  'image',
  'point',
  'last-turn',
  'turn',
  'axis',
  'degrees',
];

export function placeLabels(scene: SphereScene, frame: ViewFrame, place: Placement): PlacedLabel[] {
  const taken: Box[] = scene.marks.map(({ at, kind }) => {
    const half = MARK_HALF_PX[kind];
    return { ...onPage(project(at, frame), place), halfWidth: half, halfHeight: half };
  });
  const linePoints = scene.lines.flatMap(({ role, points }) => {
    if (role !== 'turn' && role !== 'last-turn' && role !== 'equator') return [];
    return points.map((point): InkPoint => ({
      ...onPage(project(point, frame), place),
      weight: INK_WEIGHT[role],
    }));
  });
  const inkPoints = [...linePoints, ...flagPoints(scene, frame, place)];

  const placed: PlacedLabel[] = [];
  for (const role of ORDER) {
    for (const label of scene.labels.filter((one) => one.role === role)) {
      const best = bestPlace(label, frame, place, taken, inkPoints);
      if (best === undefined) continue;
      taken.push(best.box);
      placed.push({
        id: label.id,
        role,
        text: label.text,
        x: best.box.x,
        y: best.box.y,
        front: best.front,
        sizePx: typeSize(role, place),
        halfWidth: best.box.halfWidth,
        halfHeight: best.box.halfHeight,
      });
    }
  }
  return placed;
}

/** Along each pole and pennant a few points. */
function flagPoints({ flags }: SphereScene, frame: ViewFrame, place: Placement): InkPoint[] {
  return flags.flatMap(({ foot, top, tip, zero }) => {
    const ends = [foot, tip, zero].filter((end) => end !== undefined);
    return ends.flatMap((end) =>
      [0.25, 0.5, 0.75, 1].map((share): InkPoint => {
        const point = add(scale(top, 1 - share), scale(end, share));
        return { ...onPage(project(point, frame), place), weight: INK_WEIGHT.flag };
      }),
    );
  });
}

function typeSize(role: LabelRole, { smallestTypePx = 0 }: Placement): number {
  return Math.max(LABEL_TYPE[role].sizePx, smallestTypePx);
}

function onPage(point: { x: number; y: number }, place: Placement): { x: number; y: number } {
  return { x: place.centreX + point.x * place.radius, y: place.centreY + point.y * place.radius };
}

function bestPlace(
  label: SceneLabel,
  frame: ViewFrame,
  place: Placement,
  taken: readonly Box[],
  inkPoints: readonly InkPoint[],
): { box: Box; front: boolean } | undefined {
  const type = LABEL_TYPE[label.role];
  // The engraved numbers stand close under the equator on purpose.
  const turnPoints = inkPoints.filter(({ weight }) => weight > INK_WEIGHT.equator);
  const sizePx = typeSize(label.role, place);
  const halfWidth = (label.text.length * type.perCharacterPx * (sizePx / type.sizePx)) / 2;
  const halfHeight = sizePx * 0.55;
  let best: { box: Box; front: boolean; cost: number } | undefined;
  for (const [choice, at] of label.at.entries()) {
    const point = project(at, frame);
    if (label.role === 'degrees' && point.depth < DEGREES_MIN_DEPTH) return undefined;
    const anchor = onPage(point, place);
    for (const [turn, directionDeg] of DIRECTIONS_DEG[label.role].entries()) {
      for (const fartherPx of label.role === 'degrees' ? [0] : FARTHER_PX) {
        const clearance = CLEARANCE_PX[label.role] + fartherPx;
        const box = boxAt(anchor, directionDeg, clearance, halfWidth, halfHeight);
        const blocked =
          taken.reduce((sum, other) => sum + overlap(box, other), 0) +
          inkUnder(box, label.role === 'degrees' ? turnPoints : inkPoints) +
          outside(box, place);
        if (label.role === 'degrees' && blocked > 0) return undefined;
        // Behind the body a name is faint: prefer another place along the turn.
        const cost = blocked + choice * 3 + turn * 2 + fartherPx * 1.5 + (point.depth < 0 ? 25 : 0);
        if (best === undefined || cost < best.cost) best = { box, front: point.depth >= 0, cost };
      }
    }
  }
  return best;
}

/** The box whose edge stands `clearance` away from the anchor in the given direction. */
function boxAt(
  anchor: { x: number; y: number },
  directionDeg: number,
  clearance: number,
  halfWidth: number,
  halfHeight: number,
): Box {
  if (clearance === 0) return { ...anchor, halfWidth, halfHeight };
  const cos = Math.cos((directionDeg * Math.PI) / 180);
  const sin = Math.sin((directionDeg * Math.PI) / 180);
  const reach =
    clearance +
    Math.min(
      Math.abs(cos) < 1e-9 ? Infinity : halfWidth / Math.abs(cos),
      Math.abs(sin) < 1e-9 ? Infinity : halfHeight / Math.abs(sin),
    );
  return { x: anchor.x + cos * reach, y: anchor.y - sin * reach, halfWidth, halfHeight };
}

function overlap(one: Box, other: Box): number {
  const width = one.halfWidth + other.halfWidth - Math.abs(one.x - other.x);
  const height = one.halfHeight + other.halfHeight - Math.abs(one.y - other.y);
  return width > 0 && height > 0 ? 10 + width * height : 0;
}

function inkUnder(box: Box, inkPoints: readonly InkPoint[]): number {
  return inkPoints.reduce((sum, ink) => sum + (covers(box, ink) ? ink.weight : 0), 0);
}

function covers(box: Box, point: { x: number; y: number }): boolean {
  return Math.abs(point.x - box.x) < box.halfWidth + 2 && Math.abs(point.y - box.y) < box.halfHeight + 2;
}

function outside(box: Box, place: Placement): number {
  const over =
    Math.max(0, box.halfWidth - box.x) +
    Math.max(0, box.x + box.halfWidth - place.width) +
    Math.max(0, box.halfHeight - box.y) +
    Math.max(0, box.y + box.halfHeight - place.height);
  return over * 20;
}
