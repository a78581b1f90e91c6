import type { Run } from '../../../shared/schemas/runs';
import type { BenchCursor, WaitingReading } from './kept-entry';
import { lastDone, standingDials, type TurnedSince } from './standing-dials';

/** The number of the server's last reading; 0 before the first. */
export function lastSequence({ readings }: Pick<Run, 'readings'>): number {
  return readings.reduce((newest, { sequence }) => Math.max(newest, sequence), 0);
}

/**
 * Did the server hold what this cursor was made over, and then nothing but this one reading of its own?
 * Anything else was recorded elsewhere.
 */
export function onlyOwnSince(run: Run, madeOver: number, { body }: WaitingReading): boolean {
  const since = run.readings.filter(({ sequence }) => sequence > madeOver);
  return (
    since.length === 1 &&
    since.every(({ settingIndex, outcome }) => settingIndex === body.settingIndex && outcome === body.outcome)
  );
}

/**
 * The cursor over a run that has got further elsewhere: no setting is open and nothing is confirmed, since the dials may
 * have been turned there. What was turned here is still told, for where only a skipped setting came after it.
 */
export function overtaken(cursor: BenchCursor, run: Run): BenchCursor {
  const before = run.readings.filter(({ sequence }) => sequence <= cursor.madeOver);
  const stoodDeg = standingDials(run.startDialsDeg, before, cursor.turnedSince);
  const turned: TurnedSince | null = cursor.confirmedDeg.some((dial) => dial !== null)
    ? {
        sequence: lastDone(before)?.sequence ?? 0,
        dialsDeg: stoodDeg.map((stood, plate) => cursor.confirmedDeg[plate] ?? stood),
      }
    : cursor.turnedSince;
  return {
    side: cursor.side,
    setting: null,
    confirmedDeg: cursor.confirmedDeg.map(() => null),
    note: '',
    turnedSince: turned === null ? null : { sequence: turned.sequence, dialsDeg: [...turned.dialsDeg] },
    madeOver: lastSequence(run),
  };
}
