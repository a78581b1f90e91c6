import { measuringFault } from '../../shared/moments';
import { formatMoment } from './format';
import { isoFromLocalField } from './forms';

/** Why a typed moment can't be when a plate was measured in a seat that began at `seatedAt`; null there where nobody says. */
export function measuredAtFault(typed: string, seatedAt: string | null, now: Date): string | null {
  switch (measuringFault(isoFromLocalField(typed), seatedAt, now)) {
    case 'future':
      return 'This is in the future. Write when it was measured.';
    case 'before-seat': {
      const since = seatedAt === null ? '' : ` since ${formatMoment(new Date(seatedAt), now)}`;
      return `It sits as it does now${since}, and this is before that: its zero was another one. Write when it was measured in this seat.`;
    }
    case null:
      return null;
  }
}
