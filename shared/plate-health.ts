import { calibrationDue, WARNED_DAYS } from './calibration-due';
import type { PlateHealth } from './schemas';

/** What a plate's health follows from. */
export interface HealthFacts {
  readonly retired: boolean;
  readonly seated: boolean;
  /** When the newest calibration of the present seat was measured; null where there is none. */
  readonly measuredAt: string | null;
  /** Whether that calibration left a question open. */
  readonly hasOpenQuestion: boolean;
}

/**
 * The one word for how far a plate can be trusted. Of two faults the one that makes a number wrong comes before the one
 * that makes it old. The cabinet's list filters by the same rule in SQL: server/features/cabinet/health-where.ts.
 */
export function plateHealth(facts: HealthFacts, dueDays: number, now: Date): PlateHealth {
  if (facts.retired) return 'retired';
  if (!facts.seated) return 'not-seated';
  if (facts.measuredAt === null) return 'not-calibrated';
  if (facts.hasOpenQuestion) return 'open-question';
  const { daysLeft, overdue } = calibrationDue(facts.measuredAt, dueDays, now);
  if (overdue) return 'overdue';
  return daysLeft <= WARNED_DAYS ? 'due' : 'calibrated';
}
