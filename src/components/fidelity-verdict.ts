export type Verdict = 'within' | 'not decided' | 'not within';

/** 1 − F with the two ends of its interval: 95 % for a measured one, 5 % to 95 % for a predicted one. */
export interface InfidelityInterval {
  readonly value: number;
  readonly low: number;
  readonly high: number;
}

/** Decided only when the whole interval lies on one side of the tolerance. */
export function fidelityVerdict({ low, high }: InfidelityInterval, tolerance: number): Verdict {
  if (high <= tolerance) return 'within';
  return low > tolerance ? 'not within' : 'not decided';
}
