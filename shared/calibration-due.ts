const dayMs = 86_400_000;

/** A calibration is called due this many days before it is. */
export const WARNED_DAYS = 7;

/** How old a calibration is, against the lab's own due time. */
export interface CalibrationDue {
  /** Whole days since it was measured; never below 0. */
  readonly ageDays: number;
  /** Whole days until it falls due, 0 on the day it does; below 0 when it is overdue. */
  readonly daysLeft: number;
  readonly dueAt: Date;
  readonly overdue: boolean;
}

/**
 * Days are counted from the moment of measuring, so that a calibration of 18:00 is a day old at 18:00, wherever the
 * one who reads it is. Server and pages both ask this.
 */
export function calibrationDue(measuredAt: string, dueDays: number, now: Date): CalibrationDue {
  const measured = Date.parse(measuredAt);
  const ageDays = Math.max(0, Math.floor((now.getTime() - measured) / dayMs));
  const daysLeft = dueDays - ageDays;
  return { ageDays, daysLeft, dueAt: new Date(measured + dueDays * dayMs), overdue: daysLeft < 0 };
}
