import { WARNED_DAYS } from '../../../shared/calibration-due';
import type { PlateHealth } from '../../../shared/schemas';

const measured = 'p.retired_at is null and p.calibration_id is not null';
const settled = `${measured} and not p.has_open_question`;

/** Whole days since the measurement, as shared/calibration-due.ts counts them. */
const ageDays = `greatest(0, floor(extract(epoch from cast(:now as timestamptz) - p.calibrated_at) / 86400))`;

/** `plateHealth` as SQL, of a plate `p`, on the day `:now` and under the rule `:dueDays`. */
export const healthWhere: Readonly<Record<PlateHealth | 'in-use', string>> = {
  retired: 'p.retired_at is not null',
  'in-use': 'p.retired_at is null',
  'not-seated': 'p.retired_at is null and p.seat_id is null',
  'not-calibrated': 'p.retired_at is null and p.seat_id is not null and p.calibration_id is null',
  'open-question': `${measured} and p.has_open_question`,
  overdue: `${settled} and ${ageDays} > :dueDays`,
  due: `${settled} and ${ageDays} between :dueDays - ${WARNED_DAYS} and :dueDays`,
  calibrated: `${settled} and ${ageDays} < :dueDays - ${WARNED_DAYS}`,
};
