import type { PassedReading } from './standing-dials';

export type SettingOutcome = 'open' | 'done' | 'skipped';

/** The newest reading of each setting; undefined where there is none. A later one takes an earlier one's place. */
export function newestReadings<Reading extends PassedReading>(
  readings: readonly Reading[],
  settingCount: number,
): (Reading | undefined)[] {
  const newest: (Reading | undefined)[] = Array.from({ length: settingCount }, () => undefined);
  for (const reading of readings) {
    const standing = newest[reading.settingIndex];
    if (
      reading.settingIndex < settingCount &&
      (standing === undefined || reading.sequence > standing.sequence)
    ) {
      newest[reading.settingIndex] = reading;
    }
  }
  return newest;
}

/** How each setting stands, in the order of the version. */
export function settingOutcomes(readings: readonly PassedReading[], settingCount: number): SettingOutcome[] {
  return newestReadings(readings, settingCount).map((reading) => reading?.outcome ?? 'open');
}

/** The next setting that nothing was recorded for: after `from`, then from the start; null when there is none left. */
export function nextOpen(outcomes: readonly SettingOutcome[], from: number): number | null {
  const after = outcomes.findIndex((outcome, index) => index > from && outcome === 'open');
  if (after !== -1) return after;
  const before = outcomes.findIndex((outcome, index) => index < from && outcome === 'open');
  return before === -1 ? null : before;
}

/** Where a run is taken up again: the open setting after the last reading; `settingCount` when all are passed. */
export function resumeSetting(readings: readonly PassedReading[], settingCount: number): number {
  const last = readings.reduce<PassedReading | null>(
    (newest, reading) => (newest === null || reading.sequence > newest.sequence ? reading : newest),
    null,
  );
  return nextOpen(settingOutcomes(readings, settingCount), last?.settingIndex ?? -1) ?? settingCount;
}

/** A pause longer than this says nothing about the pace. */
const longestGapMinutes = 20;

/**
 * Minutes that the open settings will take at the pace of the last readings: the median time between two.
 * Null with fewer than three times to go by.
 */
export function minutesLeft(recordedAt: readonly string[], openCount: number): number | null {
  const minutes = recordedAt.map((time) => Date.parse(time) / 60_000).sort((a, b) => a - b);
  const gaps = minutes
    .slice(1)
    .map((time, index) => time - (minutes[index] ?? time))
    .filter((gap) => gap > 0 && gap <= longestGapMinutes)
    .slice(-12)
    .sort((a, b) => a - b);
  if (gaps.length < 3 || openCount === 0) return null;
  const upper = gaps[Math.floor(gaps.length / 2)] ?? 0;
  const lower = gaps[Math.ceil(gaps.length / 2) - 1] ?? upper;
  return Math.max(1, Math.round(((upper + lower) / 2) * openCount));
}
