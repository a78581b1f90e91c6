/** The most that a request's body may be: room for a protocol of 200 targets at the longest expression. */
export const bodyLimitMb = 4;
