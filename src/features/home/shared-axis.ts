import type { LastMade } from '../../../shared/schemas/home';

/** Powers of ten at the two ends of one axis that holds every value and tolerance; better is to the right. */
export function sharedAxis(
  items: readonly Pick<LastMade, 'dialledInfidelity' | 'toleranceInfidelity'>[],
): readonly [worst: number, best: number] {
  const powers = items
    .flatMap(({ dialledInfidelity, toleranceInfidelity }) => [dialledInfidelity, toleranceInfidelity])
    .filter((value) => value > 0)
    .map(Math.log10);
  if (powers.length === 0) return [-2, -5];
  // Values far better than any tolerance stand at the right end: there is nothing to tell apart there.
  const best = Math.max(-8, Math.floor(Math.min(...powers)));
  const worst = Math.min(0, Math.ceil(Math.max(...powers)));
  return [Math.max(worst, best + 3), best];
}
