import { WARNED_DAYS } from '../../../shared/calibration-due';
import type { PlateHealth } from '../../../shared/schemas';

const measured = 'p.retired_at is null and p.calibration_id is not null';
const settled = `${measured} and not p.has_open_question`;

/** When it was measured that whole days since are so many, as shared/calibration-due.ts counts them; an index can use it. */
const daysBefore = (days: string) => `cast(:now as timestamptz) - (${days}) * interval '24 hours'`;
const overdueBefore = daysBefore(':dueDays + 1');
const dueBefore = daysBefore(`:dueDays - ${WARNED_DAYS}`);

/** `plateHealth` as SQL, of a plate `p`, on the day `:now` and under the rule `:dueDays`. */
export const healthWhere: Readonly<Record<PlateHealth | 'in-use', string>> = {
  retired: 'p.retired_at is not null',
  'in-use': 'p.retired_at is null',
  'not-seated': 'p.retired_at is null and p.seat_id is null',
  'not-calibrated': 'p.retired_at is null and p.seat_id is not null and p.calibration_id is null',
  'open-question': `${measured} and p.has_open_question`,
  overdue: `${settled} and p.calibrated_at <= ${overdueBefore}`,
  due: `${settled} and p.calibrated_at > ${overdueBefore} and p.calibrated_at <= ${dueBefore}`,
  calibrated: `${settled} and p.calibrated_at > ${dueBefore}`,
};
