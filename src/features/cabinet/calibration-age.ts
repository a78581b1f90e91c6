const dayMs = 86_400_000;
const weekdays = ['Sunday', 'Monday', 'Tuesday', 'Wednesday', 'Thursday', 'Friday', 'Saturday'] as const;

/** How old a plate's newest calibration is, against the lab's own due time. */
export interface CalibrationAge {
  /** Whole days since it was measured; never below 0. */
  readonly ageDays: number;
  /** Whole days until it falls due; below 0 when it is overdue. */
  readonly daysLeft: number;
  readonly dueAt: Date;
  readonly overdue: boolean;
  /** As it stands under a ring: "38 days", "yesterday", "due Friday", "12 days over". */
  readonly words: string;
}

const days = (count: number) => (count === 1 ? '1 day' : `${count} days`);

function ageWords(ageDays: number, daysLeft: number, dueAt: Date): string {
  if (daysLeft < 0) return `${days(-daysLeft)} over`;
  if (daysLeft === 0) return 'due today';
  if (daysLeft < 7) return `due ${weekdays[dueAt.getDay()] ?? ''}`;
  if (ageDays === 0) return 'today';
  return ageDays === 1 ? 'yesterday' : days(ageDays);
}

/** Days are counted from the moment of measuring, so that a calibration of 18:00 is a day old at 18:00. */
export function calibrationAge(measuredAt: string, dueDays: number, now: Date): CalibrationAge {
  const measured = new Date(measuredAt).getTime();
  const dueAt = new Date(measured + dueDays * dayMs);
  const ageDays = Math.max(0, Math.floor((now.getTime() - measured) / dayMs));
  const daysLeft = dueDays - ageDays;
  return { ageDays, daysLeft, dueAt, overdue: daysLeft < 0, words: ageWords(ageDays, daysLeft, dueAt) };
}
