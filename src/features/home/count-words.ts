const words = [
  'No',
  'One',
  'Two',
  'Three',
  'Four',
  'Five',
  'Six',
  'Seven',
  'Eight',
  'Nine',
  'Ten',
  'Eleven',
  'Twelve',
] as const;

/** A count as it begins a sentence: in words up to twelve, in digits from there on. */
export function countWord(count: number): string {
  return words[count] ?? String(count);
}

/** The title of home. */
export function waitingTitle(count: number): string {
  if (count === 0) return 'Nothing waits for you';
  return count === 1 ? 'One thing waits for you' : `${countWord(count)} things wait for you`;
}
