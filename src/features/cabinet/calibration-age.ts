import { calibrationDue } from '../../../shared/calibration-due';
import { formatDays, formatWeekday } from '../../lib/format';

/** How old a plate's newest calibration is, against the lab's own due time, and in words. */
export interface CalibrationAge extends ReturnType<typeof calibrationDue> {
  /** As it stands under a ring: "38 days", "yesterday", "due Friday", "12 days over". */
  readonly words: string;
}

function ageWords({ ageDays, daysLeft, dueAt }: ReturnType<typeof calibrationDue>): string {
  if (daysLeft < 0) return `${formatDays(-daysLeft)} over`;
  if (daysLeft === 0) return 'due today';
  if (daysLeft < 7) return `due ${formatWeekday(dueAt)}`;
  if (ageDays === 0) return 'today';
  return ageDays === 1 ? 'yesterday' : formatDays(ageDays);
}

/** Counted as the server counts, so that both name the same day. */
export function calibrationAge(measuredAt: string, dueDays: number, now: Date): CalibrationAge {
  const due = calibrationDue(measuredAt, dueDays, now);
  return { ...due, words: ageWords(due) };
}
