/** A tablet's clock may be ahead of ours by this much, and a field of dates takes whole minutes. */
export const clockSlackMs = 5 * 60 * 1000;

/** A moment later by `ms`, written as moments are. */
export const later = (moment: string, ms: number): string => new Date(Date.parse(moment) + ms).toISOString();

/** A moment as a sentence says it to a person of any time zone. */
export const utcWords = (moment: string): string => `${moment.slice(0, 16).replace('T', ' ')} UTC`;

/**
 * Why a plate can't have been measured at a moment: it has not come yet, or the seat had not begun, so that its zero was
 * another one. Null where it can, and where the moment is none.
 */
export function measuringFault(
  measuredAt: string,
  seatedAt: string | null,
  now: Date,
): 'future' | 'before-seat' | null {
  const measuredMs = Date.parse(measuredAt);
  if (measuredMs > now.getTime() + clockSlackMs) return 'future';
  return seatedAt !== null && measuredMs < Date.parse(seatedAt) - clockSlackMs ? 'before-seat' : null;
}
