import type { SettingSolution } from './row-view';

/** How the prediction stands to the tolerance, where that is worth a word. */
export function toleranceVerdict(
  { expectedLow, expectedHigh }: SettingSolution,
  toleranceInfidelity: number,
): string {
  if (expectedHigh <= toleranceInfidelity) return '.';
  return expectedLow > toleranceInfidelity
    ? ': not within the tolerance.'
    : ': the tolerance lies among them, so it is not decided.';
}
