import { circularState, type Convention, type Hand } from '../../shared/optics/convention';
import { path, type Path } from '../../shared/optics/retarder';
import type { Stokes } from '../../shared/optics/stokes';
import { degrees, toRadians } from '../../shared/optics/units';
import { plateRetarder } from './plate-retarder';
import { sameState } from './same-state';
import { equatorScale, graticule } from './scene-body';
import { phaseFlags } from './scene-flags';
import { imageMarks } from './scene-images';
import { pointMarks } from './scene-points';
import { type ReachInput, reachTicks } from './scene-reach';
import { axisLabels, turnDrawing } from './scene-turn';
import type { LineRole } from './strokes';
import { linearPoint, type Vec3 } from './vec';

/** A plate as the light meets it: fast axis on the table and retardance, both in degrees. */
export interface SpherePlate {
  readonly name: string;
  readonly fastAxisDeg: number;
  readonly retardanceDeg: number;
}

/** Where a unitary takes one reference state, and where it should. */
export interface SphereImage {
  /** The reference state's letter; its image is called by it with a prime. */
  readonly label: string;
  readonly from: Stokes;
  readonly wanted: Stokes;
  readonly reached: Stokes;
}

/** One state of a set that is looked at before anything is solved. */
export interface SpherePointInput {
  readonly label: string;
  readonly state: Stokes;
}

/** What the sphere shows. States are canonical; the convention only letters them. */
export interface SphereInput {
  /** The light before the first plate. */
  readonly start: Stokes;
  /** In beam order. Without plates only the target is shown. */
  readonly plates: readonly SpherePlate[];
  readonly target?: { readonly label: string; readonly state: Stokes } | undefined;
  readonly convention: Convention;
  /** For plates that are to apply a unitary: where reference states go. */
  readonly images?: readonly SphereImage[] | undefined;
  /** Flags along the path that show the state's phase against the start's. */
  readonly phase?: boolean | undefined;
  /** What a pair of plates reaches and what it doesn't. */
  readonly reach?: ReachInput | undefined;
  /** A set of states, a dot each. */
  readonly points?: readonly SpherePointInput[] | undefined;
}

export interface SceneLine {
  readonly id: string;
  readonly role: LineRole;
  readonly points: readonly Vec3[];
}

/** Short straight strokes of one kind, drawn as one thing. */
export interface SceneTicks {
  readonly id: string;
  readonly role: LineRole;
  readonly segments: readonly (readonly [Vec3, Vec3])[];
}

/** An arrowhead on a turn. It keeps its shape on the page: lying on the sphere it would vanish near the limb. */
export interface SceneHead {
  readonly id: string;
  readonly last: boolean;
  readonly at: Vec3;
  /** Unit vector along the turn, the way that the light is turned. */
  readonly towards: Vec3;
  /** 1 for a full-sized head, less on a short arc. */
  readonly size: number;
}

/** A pole along the outward normal with a pennant; what it shows is seen in perspective, so it is projected, not a sign. */
export interface SceneFlag {
  readonly id: string;
  readonly foot: Vec3;
  readonly top: Vec3;
  /** Where the pennant's lower edge meets the pole. */
  readonly hoist: Vec3;
  /** Where the pennant would point in phase with the start, and where it does; none where no phase is defined. */
  readonly zero: Vec3 | undefined;
  readonly tip: Vec3 | undefined;
  /** The flag of the state that leaves the last plate. */
  readonly last: boolean;
}

export type BasisPair = 'hv' | 'da' | 'rl';

/** A mark of a fixed size on the page, standing at a point of the sphere. */
export type SceneMark = { readonly id: string; readonly at: Vec3 } & (
  | { readonly kind: 'basis'; readonly pair: BasisPair; readonly filled: boolean }
  | { readonly kind: 'axis'; readonly last: boolean }
  | { readonly kind: 'between' }
  | { readonly kind: 'target'; readonly onBasis: boolean }
  | { readonly kind: 'reached' }
  | { readonly kind: 'wanted' }
  | { readonly kind: 'image' }
  | { readonly kind: 'point' }
);

export type LabelRole = 'basis' | 'target' | 'image' | 'point' | 'turn' | 'last-turn' | 'axis' | 'degrees';

/** Words that belong to a point; where exactly they stand is found on the page (labels.ts). */
export interface SceneLabel {
  readonly id: string;
  readonly role: LabelRole;
  readonly text: string;
  /** Places it may stand at, best first. */
  readonly at: readonly Vec3[];
}

export interface SphereScene {
  readonly path: Path;
  readonly lines: readonly SceneLine[];
  readonly ticks: readonly SceneTicks[];
  readonly heads: readonly SceneHead[];
  readonly flags: readonly SceneFlag[];
  readonly marks: readonly SceneMark[];
  readonly labels: readonly SceneLabel[];
}

/** Between two drawn points of a turn: under a third of a pixel from the true arc at the largest zoom. */
const STEP_RAD = toRadians(degrees(3));

/** The six basis states with the lab's letters; the first of each pair is filled. North is always canonical +S3. */
export function basisStates(
  convention: Convention,
): readonly { letter: 'H' | 'V' | 'D' | 'A' | Hand; pair: BasisPair; filled: boolean; state: Stokes }[] {
  return [
    { letter: 'H', pair: 'hv', filled: true, state: linearPoint(0) },
    { letter: 'V', pair: 'hv', filled: false, state: linearPoint(90) },
    { letter: 'D', pair: 'da', filled: true, state: linearPoint(45) },
    { letter: 'A', pair: 'da', filled: false, state: linearPoint(-45) },
    { letter: 'R', pair: 'rl', filled: true, state: circularState('R', convention) },
    { letter: 'L', pair: 'rl', filled: false, state: circularState('L', convention) },
  ];
}

/** The way of the light through the plates, by the same function as the solver's. */
export function spherePath({ start, plates }: Pick<SphereInput, 'start' | 'plates'>): Path {
  return path(start, plates.map(plateRetarder), STEP_RAD);
}

/**
 * The whole drawing in Stokes space, before it is looked at from anywhere. Pure.
 * @param reachDrawn the drawn map, where the caller has kept it from an input with the same map: it takes a while.
 */
export function sphereScene(
  input: SphereInput,
  reachDrawn: readonly SceneTicks[] = input.reach === undefined ? [] : reachTicks(input.reach),
): SphereScene {
  const { plates, target, convention } = input;
  const way = spherePath(input);
  const turns = plates.flatMap((plate, index) => {
    const turn = way.turns[index];
    return turn === undefined ? [] : [turnDrawing(plate, turn, index, index === plates.length - 1)];
  });
  const basis = basisStates(convention);
  const equator = equatorScale();
  const images = imageMarks(input.images ?? []);
  const points = pointMarks(input.points ?? [], basis);
  // What a pair reaches depends on the light before it, so that light is marked although no plate stands there yet.
  const between =
    plates.length === 0 && input.reach !== undefined
      ? [input.start]
      : [input.start, ...way.statesAfter].slice(0, -1);
  const end = way.statesAfter.at(-1);

  const marks: SceneMark[] = [
    ...basis.map(({ letter, pair, filled, state }): SceneMark => ({
      id: `basis-${letter}`,
      kind: 'basis',
      pair,
      filled,
      at: state,
    })),
    ...turns.map(({ axisMark }) => axisMark),
    // The start stands on its basis mark where it is one; a second ring on top would hide it.
    ...between
      .map((at, index): SceneMark => ({ id: `between-${index}`, kind: 'between', at }))
      .filter(({ at }) => !basis.some(({ state }) => sameState(state, at))),
    ...points.marks,
    ...images.marks,
    ...(target === undefined
      ? []
      : [
          {
            id: 'target',
            kind: 'target',
            onBasis: basis.some(({ state }) => sameState(state, target.state)),
            at: target.state,
          } as const,
        ]),
    ...(end === undefined ? [] : [{ id: 'reached', kind: 'reached', at: end } as const]),
  ];

  return {
    path: way,
    lines: [...graticule(), equator.line, ...turns.flatMap(({ line }) => line)],
    ticks: [...reachDrawn, equator.ticks, ...turns.flatMap(({ ticks }) => ticks)],
    heads: turns.flatMap(({ head }) => head),
    flags: input.phase === true ? phaseFlags(input) : [],
    marks,
    labels: [
      ...basis
        // A target that stands on a basis state and bears its letter says it once.
        .filter(({ letter, state }) => target?.label !== letter || !sameState(state, target.state))
        .map(({ letter, state }): SceneLabel => ({
          id: `basis-${letter}`,
          role: 'basis',
          text: letter,
          at: [state],
        })),
      ...(target === undefined
        ? []
        : [{ id: 'target', role: 'target', text: target.label, at: [target.state] } as const]),
      ...images.labels,
      ...points.labels,
      ...turns.flatMap(({ labels }) => labels),
      ...axisLabels(plates),
      ...equator.labels,
    ],
  };
}
