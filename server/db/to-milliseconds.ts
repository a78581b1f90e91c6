/** A moment as the database keeps it, so that an answer and the next one are the same text. */
export function toMilliseconds(timestamp: string): string {
  return new Date(timestamp).toISOString();
}
