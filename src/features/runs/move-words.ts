import type { SeenMove, ViewedFrom } from '../../components/dial-words';
import { decimalsOf, type PlateStep, type StepMount } from './bench-steps';

/** One dial's number at its mount's resolution, always with that many decimals. */
export function dialText(dialDeg: number, resolutionDeg: number): string {
  return dialDeg.toFixed(decimalsOf(resolutionDeg, dialDeg));
}

export interface MoveWords {
  /** The reading it starts at. */
  readonly from: string;
  readonly sense: SeenMove['sense'];
  /** How far, in degrees, with as many decimals as both readings need. */
  readonly amount: string;
  /** What the engraved numbers do under the index. */
  readonly numbers: string;
}

/** The turn in words, or null where nobody has said how the dial stands, or nothing turns. */
export function moveWords(step: PlateStep, mount: StepMount): MoveWords | null {
  const { move, standsDeg, wantedDeg } = step;
  if (move === null || standsDeg === null || move.sense === 'none') return null;
  return {
    from: dialText(standsDeg, mount.resolutionDeg),
    sense: move.sense,
    amount: move.amountDeg.toFixed(decimalsOf(mount.resolutionDeg, standsDeg, wantedDeg)),
    numbers: `numbers ${move.numbers}`,
  };
}

/** What a screen reader says when a plate's turn comes. */
export function announcement(plateName: string, step: PlateStep, mount: StepMount, side: ViewedFrom): string {
  const words = moveWords(step, mount);
  const wanted = dialText(step.wantedDeg, mount.resolutionDeg);
  const seen = side === 'source' ? ', seen from the source side' : '';
  return words === null
    ? `${plateName}, set to ${wanted}`
    : `${plateName}, turn ${words.sense} by ${words.amount}° to ${wanted}${seen}`;
}

const places = ['first', 'second', 'third', 'fourth', 'fifth', 'sixth'] as const;

/** "second after the polariser". */
export function placeWords(plateIndex: number): string {
  return `${places[plateIndex] ?? `number ${plateIndex + 1}`} after the polariser`;
}
