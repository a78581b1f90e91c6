import { SETTLED_SIGMA } from './evidence';
import type { FaultHarmonic } from './fault-harmonics';

export type ScanWarning =
  /** χ² is too large for the stated σ: they are too small, or the scan isn't of this form. */
  | { readonly kind: 'misfit'; readonly sigmas: number }
  /** No plate makes these powers of the light that was stated: the light, the analyser or the scan before is another. */
  | { readonly kind: 'other-light'; readonly sigmas: number }
  | { readonly kind: 'fault-harmonic'; readonly sigmas: number; readonly harmonic: FaultHarmonic }
  /** More modulation than a half-wave plate makes: ports swapped or of unequal gain, or a wrong stated power or leak. */
  | { readonly kind: 'over-full'; readonly sigmas: number }
  /** The fitted leak is below 0: a dark level taken off twice, or unequal ports. */
  | { readonly kind: 'negative-leak'; readonly sigmas: number };

/** What of these is far enough out to be told. */
export function warningsOf(
  unlike: { readonly kind: 'misfit' | 'other-light'; readonly sigmas: number },
  faults: readonly FaultHarmonic[],
  overFullSigmas: number,
  leak: { readonly value: number; readonly sigma: number | null } | null,
): readonly ScanWarning[] {
  const belowZero = typeof leak?.sigma === 'number' ? -leak.value / leak.sigma : 0;
  const all: readonly ScanWarning[] = [
    unlike,
    ...faults.map((harmonic) => ({ kind: 'fault-harmonic' as const, sigmas: harmonic.sigmas, harmonic })),
    { kind: 'over-full', sigmas: overFullSigmas },
    { kind: 'negative-leak', sigmas: belowZero },
  ];
  return all.filter(({ sigmas }) => sigmas >= SETTLED_SIGMA);
}
