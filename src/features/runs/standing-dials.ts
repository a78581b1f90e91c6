import { wrap } from '../../../shared/optics/units';

/** What the bench needs of one recorded, or still waiting, reading. */
export interface PassedReading {
  readonly sequence: number;
  readonly settingIndex: number;
  readonly outcome: 'done' | 'skipped';
  readonly dialledDeg: readonly number[];
}

/** Dials that were turned at this device after a reading, with nothing recorded since: a setting that was then skipped. */
export interface TurnedSince {
  /** Sequence of the last done reading when they were turned; 0 before the first. */
  readonly sequence: number;
  /** In beam order; null where nobody said. */
  readonly dialsDeg: readonly (number | null)[];
}

/** The last reading with dials in it; a skipped setting says nothing of where they stand. */
export function lastDone<Reading extends PassedReading>(readings: readonly Reading[]): Reading | null {
  return readings.reduce<Reading | null>(
    (last, reading) =>
      reading.outcome === 'done' && (last === null || reading.sequence > last.sequence) ? reading : last,
    null,
  );
}

/**
 * Where each dial stands, in degrees on its own scale and in beam order; null where nobody has said.
 * The last done reading counts, and what this device saw turned since; before both, what was said at the start.
 */
export function standingDials(
  startDialsDeg: readonly (number | null)[],
  readings: readonly PassedReading[],
  turnedSince: TurnedSince | null,
): (number | null)[] {
  const last = lastDone(readings);
  const turnedAfter = turnedSince !== null && turnedSince.sequence >= (last?.sequence ?? 0);
  if (turnedAfter) return [...turnedSince.dialsDeg];
  return startDialsDeg.map((start, plate) => last?.dialledDeg[plate] ?? start);
}

/** A typed reading as the dial has it, in [0, 360): 360 is the same mark as 0. */
export function onDial(dialDeg: number): number {
  return wrap(dialDeg, 360);
}
