import {
  circularState,
  type Convention,
  CONVENTION_SETS,
  type ConventionSet,
  DEFAULT_CONVENTION,
  type ExpressionProblem,
  type Hand,
  letterOf,
  parseState,
  showStokes,
  type Stokes,
} from '../../../shared/optics';
import { EVERY_CONVENTION, type Flag, FLAGS } from './flag-words';

/** What is known of how a colleague writes one light; null is not known. */
export interface Evidence {
  /** Their Jones vector, as they wrote it; empty where it isn't known. */
  readonly source: string;
  /** How its field was seen to turn, by the receiver. */
  readonly rotation: 'counter-clockwise' | 'clockwise' | null;
  /** What they call it. */
  readonly letter: Hand | null;
  /** The sign of their S3 for it. */
  readonly s3: '+' | '−' | null;
}

/** What a convention would have to say against the evidence. */
export type Clash = 'rotation' | 'letter' | 's3';

export interface JudgedSet {
  readonly set: ConventionSet;
  readonly fits: boolean;
  /** For one that fits only with a flag of which its sources say nothing: those flags, and the convention they make. */
  readonly otherwise: readonly Flag[];
  readonly asConvention: Convention;
  /** For one that doesn't fit. */
  readonly clashes: readonly Clash[];
}

export type Elimination =
  | { readonly kind: 'nothing' }
  | { readonly kind: 'unreadable'; readonly error: ExpressionProblem }
  /** Light without a hand is written the same by all. */
  | { readonly kind: 'linear' }
  | {
      readonly kind: 'judged';
      /** The conventions of three flags that the evidence leaves. */
      readonly remaining: readonly Convention[];
      /** Flags that are the same in all that remain, with their value in one of them. */
      readonly settled: readonly Flag[];
      readonly sets: readonly JudgedSet[];
    };

/** The light that the evidence is about, if this is the colleague's convention: seen, else read, else by its letter. */
function lightOf({ source, rotation, letter }: Evidence, convention: Convention): Stokes | null {
  if (rotation !== null) return [0, 0, rotation === 'counter-clockwise' ? 1 : -1];
  if (source.trim() !== '') {
    const reading = parseState(source, convention);
    return reading.ok ? reading.stokes : null;
  }
  return letter === null ? null : circularState(letter, convention);
}

/** What in the evidence speaks against a convention; nothing where it fits. */
export function clashesOf(evidence: Evidence, convention: Convention): readonly Clash[] {
  const light = lightOf(evidence, convention);
  if (light === null) return [];
  const { source, rotation, letter, s3 } = evidence;
  const reading = source.trim() === '' ? null : parseState(source, convention);
  const read = reading?.ok === true ? reading.stokes : null;
  const clashes: Clash[] = [];
  if (rotation !== null && read !== null && read[2] > 0 !== light[2] > 0) clashes.push('rotation');
  if (letter !== null && letterOf(light, convention) !== letter) clashes.push('letter');
  const shownPlus = showStokes(light, convention).s3 > 0;
  if (s3 !== null && shownPlus !== (s3 === '+')) clashes.push('s3');
  return clashes;
}

/**
 * Whether a set's sources leave room for a convention: every flag that they settle is theirs. Where they settle neither
 * phase nor hands, what they do fix is which letter goes with which Jones vector, so only both together may change.
 */
export function leavesRoomFor({ convention: own, notFixedBySource: open }: ConventionSet, other: Convention) {
  if (FLAGS.some((flag) => !open.includes(flag) && own[flag] !== other[flag])) return false;
  const bothOpen = open.includes('phase') && open.includes('handedness');
  return !bothOpen || (own.phase === other.phase) === (own.handedness === other.handedness);
}

const changed = (one: Convention, other: Convention): readonly Flag[] =>
  FLAGS.filter((flag) => one[flag] !== other[flag]);

function judge(set: ConventionSet, evidence: Evidence, remaining: readonly Convention[]): JudgedSet {
  const [nearest] = remaining
    .filter((convention) => leavesRoomFor(set, convention))
    .sort((one, other) => changed(set.convention, one).length - changed(set.convention, other).length);
  if (nearest === undefined) {
    return {
      set,
      fits: false,
      otherwise: [],
      asConvention: set.convention,
      clashes: clashesOf(evidence, set.convention),
    };
  }
  return { set, fits: true, otherwise: changed(set.convention, nearest), asConvention: nearest, clashes: [] };
}

/** Which published sets a colleague can be using. Never throws for any source. */
export function whichConvention(evidence: Evidence): Elimination {
  const { source, rotation, letter, s3 } = evidence;
  if (source.trim() !== '') {
    const reading = parseState(source, DEFAULT_CONVENTION);
    if (!reading.ok) return { kind: 'unreadable', error: reading.error };
    // A handless expression is so in all: a flag turns a hand round, it makes none.
    const handless = letterOf(reading.stokes, DEFAULT_CONVENTION) === null;
    if (handless) return { kind: 'linear' };
  }
  const known = [source.trim() !== '', rotation !== null, letter !== null, s3 !== null].filter(Boolean);
  // One fact alone speaks against nobody.
  if (known.length < 2) return { kind: 'nothing' };
  const remaining = EVERY_CONVENTION.filter((convention) => clashesOf(evidence, convention).length === 0);
  return {
    kind: 'judged',
    remaining,
    settled: FLAGS.filter((flag) => new Set(remaining.map((convention) => convention[flag])).size === 1),
    sets: CONVENTION_SETS.map((set) => judge(set, evidence, remaining)),
  };
}
