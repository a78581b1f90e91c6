import { type DialDirection, dialMove } from '../../shared/optics/dial';
import { degrees } from '../../shared/optics/units';
import { formatDial } from '../lib/format/angle';

export type ViewedFrom = 'receiver' | 'source';

export interface SeenMove {
  /** Signed turn as it is seen, counter-clockwise positive. The arrow's sweep and the words both come from this. */
  readonly turnDeg: number;
  readonly amountDeg: number;
  readonly sense: 'clockwise' | 'counter-clockwise' | 'none';
  readonly numbers: 'rise' | 'fall' | 'stay';
}

/** `dialMove` as someone on the receiver's or on the source's side sees it. From the source every turn runs the other way. */
export function seenMove(
  fromDeg: number,
  toDeg: number,
  direction: DialDirection,
  viewedFrom: ViewedFrom = 'receiver',
): SeenMove {
  const move = dialMove(degrees(fromDeg), degrees(toDeg), direction);
  const turnDeg = viewedFrom === 'source' ? 0 - move.turnDeg : move.turnDeg;
  return {
    turnDeg,
    amountDeg: move.amountDeg,
    sense: turnDeg === 0 ? 'none' : turnDeg > 0 ? 'counter-clockwise' : 'clockwise',
    numbers: move.numbers,
  };
}

/** Which way and how far, in the words of the bench. */
interface DialWords {
  readonly from: string;
  readonly sense: SeenMove['sense'];
  readonly amount: string;
  readonly numbers: SeenMove['numbers'];
  /** `from 156.7 clockwise by 30.3°, numbers rise`, or `stays`. */
  readonly sentence: string;
}

export function dialWords(
  fromDeg: number,
  toDeg: number,
  scale: { readonly direction: DialDirection; readonly resolutionDeg: number },
  viewedFrom: ViewedFrom = 'receiver',
): DialWords {
  const { sense, amountDeg, numbers } = seenMove(fromDeg, toDeg, scale.direction, viewedFrom);
  const from = formatDial(fromDeg, scale.resolutionDeg);
  const amount = `${formatDial(amountDeg, scale.resolutionDeg)}°`;
  const sentence = sense === 'none' ? 'stays' : `from ${from} ${sense} by ${amount}, numbers ${numbers}`;
  return { from, sense, amount, numbers, sentence };
}

/** What a ring is called: `Q-B dial, 187.0 degrees, fast axis at 114.7`. */
export function dialName(
  name: string,
  readingDeg: number,
  fastAxisDeg: number,
  resolutionDeg: number,
): string {
  return `${name} dial, ${formatDial(readingDeg, resolutionDeg)} degrees, fast axis at ${fastAxisDeg.toFixed(1)}`;
}
