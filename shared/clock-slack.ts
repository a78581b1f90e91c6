/** A tablet's clock may be ahead of ours by this much, and a field of dates takes whole minutes. */
export const clockSlackMs = 5 * 60 * 1000;
