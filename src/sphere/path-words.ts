import type { Stokes } from '../../shared/optics/stokes';
import { toDegrees, wrap } from '../../shared/optics/units';
import { formatAngle } from '../lib/format';
import { type ImageWords, imagesInWords, imagesSummary } from './image-words';
import { phaseInWords, type PhaseWords } from './phase-words';
import { pointsSummary } from './point-words';
import { reachInWords, type ReachWords } from './reach-words';
import { type SphereInput, spherePath } from './scene';
import { type StateWords, stateWords } from './state-words';
import { angleBetweenDeg } from './vec';

export { LINEAR_WITHIN_DEG, NAMED_WITHIN_DEG, stateInWords } from './state-words';

type TurnSense = 'counter-clockwise' | 'clockwise' | 'not at all';

export interface PathWords {
  /** The figure's name: the whole path in one sentence. */
  readonly summary: string;
  readonly start: StateWords;
  readonly turns: readonly {
    readonly plate: string;
    readonly axisDeg: number;
    /** Size of the turn on the sphere. */
    readonly amountDeg: number;
    /** Seen from outside the sphere, looking at the fast axis's point. */
    readonly sense: TurnSense;
    /** Light along the axis is not moved by the turn. */
    readonly moves: boolean;
    readonly after: StateWords;
  }[];
  readonly target: (StateWords & { readonly label: string; readonly missDeg: number }) | undefined;
  readonly images: readonly ImageWords[];
  readonly phase: PhaseWords | undefined;
  readonly reach: ReachWords | undefined;
}

/** The path as the table and the figure's name tell it; from the same turns that are drawn. */
export function pathInWords(input: SphereInput, reach: ReachWords | undefined = reachOf(input)): PathWords {
  const { convention, plates, target } = input;
  const drawn = spherePath(input);
  const words = (state: Stokes): StateWords => stateWords(state, convention);
  const turns = plates.flatMap((plate, index) => {
    const turn = drawn.turns[index];
    if (turn === undefined) return [];
    const sweepDeg = toDegrees(turn.sweepRad);
    return [
      {
        plate: plate.name,
        axisDeg: wrap(plate.fastAxisDeg, 180),
        amountDeg: Math.abs(sweepDeg),
        sense: senseOf(sweepDeg),
        moves: angleBetweenDeg(turn.from, turn.to) > 0.05 || Math.abs(sweepDeg) > 359,
        after: words(turn.to),
      },
    ];
  });
  const end = drawn.statesAfter.at(-1) ?? input.start;
  const start = words(input.start);
  const targetWords =
    target === undefined
      ? undefined
      : { ...words(target.state), label: target.label, missDeg: angleBetweenDeg(end, target.state) };
  const images = imagesInWords(input.images ?? [], convention);
  const phase = input.phase === true && plates.length > 0 ? phaseInWords(input) : undefined;
  const parts = [
    ...pointsSummary(input.points ?? [], convention),
    ...(reach === undefined ? [] : [reach.text]),
    ...imagesSummary(images),
    ...(phase === undefined ? [] : [phase.text]),
  ];
  const way =
    plates.length > 0 || target !== undefined || parts.length === 0
      ? summary(start, turns, plates.length > 0 ? words(end) : undefined, targetWords)
      : 'Sphere of states.';
  return { summary: [way, ...parts].join(' '), start, turns, target: targetWords, images, phase, reach };
}

/** The map in words; it takes a while, so a caller keeps it while map and convention stay. */
export function reachOf({
  reach,
  convention,
}: Pick<SphereInput, 'reach' | 'convention'>): ReachWords | undefined {
  return reach === undefined ? undefined : reachInWords(reach, convention);
}

/** A right-handed turn about a point of the sphere looks counter-clockwise from above that point. */
function senseOf(sweepDeg: number): TurnSense {
  if (sweepDeg === 0) return 'not at all';
  return sweepDeg > 0 ? 'counter-clockwise' : 'clockwise';
}

/** How near the end comes to the target, in words. */
export function missInWords(label: string, missDeg: number): string {
  return missDeg < 0.01
    ? `on ${label} within 0.01°`
    : `${formatAngle(missDeg, 2)} from ${label} on the sphere`;
}

function summary(
  start: StateWords,
  turns: PathWords['turns'],
  end: StateWords | undefined,
  target: PathWords['target'],
): string {
  if (end === undefined) {
    return target === undefined
      ? `Sphere of states with ${start.text}.`
      : `Sphere of states with ${target.label}: ${target.text}.`;
  }
  const steps = turns.map(
    ({ plate, axisDeg, amountDeg, sense }) =>
      `${plate} turns it by ${formatAngle(amountDeg)} ${sense} about ${formatAngle(axisDeg)}`,
  );
  const close = target === undefined ? '' : `, ${missInWords(target.label, target.missDeg)}`;
  return `Path on the sphere. The light starts at ${start.text}; ${steps.join('; ')}. It ends at ${end.text}${close}.`;
}
