import { type Convention, letterOf, showStokes } from '../../shared/optics/convention';
import { ellipseOf } from '../../shared/optics/ellipse';
import type { Stokes } from '../../shared/optics/stokes';
import { toDegrees, wrap } from '../../shared/optics/units';
import { formatAngle } from '../lib/format';
import { basisStates, type SphereInput, spherePath } from './scene';
import { angleBetweenDeg } from './vec';

/** A state nearer than this, in degrees of the sphere, is called by the basis state's letter. */
export const NAMED_WITHIN_DEG = 0.1;
/** An ellipse flatter than this is said to be linear. */
export const LINEAR_WITHIN_DEG = 0.05;

type TurnSense = 'counter-clockwise' | 'clockwise' | 'not at all';

interface PathWords {
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
}

export interface StateWords {
  readonly text: string;
  /** Stokes parameters as the lab shows them. */
  readonly shown: readonly [number, number, number];
}

/** A state in words: `H`, `linear at −37.8°`, `ellipse at −62.6°, ellipticity 27.4°, counter-clockwise to the receiver (L)`. */
export function stateInWords(state: Stokes, convention: Convention): string {
  const named = basisStates(convention).find(
    (basis) => angleBetweenDeg(basis.state, state) < NAMED_WITHIN_DEG,
  );
  if (named !== undefined) return named.letter;
  const { azimuthRad, ellipticityRad } = ellipseOf(state);
  const azimuth = formatAngle(toDegrees(azimuthRad));
  const ellipticityDeg = toDegrees(ellipticityRad);
  if (Math.abs(ellipticityDeg) < LINEAR_WITHIN_DEG) return `linear at ${azimuth}`;
  const hand = `${ellipticityDeg > 0 ? 'counter-clockwise' : 'clockwise'} to the receiver`;
  const letter = letterOf(state, convention);
  const withLetter = letter === null ? hand : `${hand} (${letter})`;
  return `ellipse at ${azimuth}, ellipticity ${formatAngle(Math.abs(ellipticityDeg))}, ${withLetter}`;
}

/** The path as the table and the figure's name tell it; from the same turns that are drawn. */
export function pathInWords(input: SphereInput): PathWords {
  const { convention, plates, target } = input;
  const way = spherePath(input);
  const words = (state: Stokes): StateWords => {
    const { s1, s2, s3 } = showStokes(state, convention);
    return { text: stateInWords(state, convention), shown: [s1, s2, s3] };
  };
  const turns = plates.flatMap((plate, index) => {
    const turn = way.turns[index];
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
  const end = way.statesAfter.at(-1) ?? input.start;
  const start = words(input.start);
  const targetWords =
    target === undefined
      ? undefined
      : { ...words(target.state), label: target.label, missDeg: angleBetweenDeg(end, target.state) };
  return {
    summary: summary(start, turns, plates.length > 0 ? words(end) : undefined, targetWords),
    start,
    turns,
    target: targetWords,
  };
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
