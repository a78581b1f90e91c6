import { clockSlackMs } from '../../../shared/clock-slack';
import { formatMoment } from '../../lib/format';
import { isoFromLocalField } from '../../lib/forms';

/** Why a typed moment can't be when a plate was measured in a seat that began at `seatedAt`, or in one that is still to be entered. */
export function measuredAtFault(typed: string, seatedAt: string | null, now: Date): string | null {
  const measuredMs = Date.parse(isoFromLocalField(typed));
  if (measuredMs > now.getTime() + clockSlackMs) return 'This is in the future. Write when it was measured.';
  if (seatedAt === null || !(measuredMs < Date.parse(seatedAt) - clockSlackMs)) return null;
  const since = formatMoment(new Date(seatedAt), now);
  return `It sits as it does now since ${since}, and this is before that: its zero was another one.`;
}
