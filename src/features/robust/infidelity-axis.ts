/** A log axis of 1 − F in whole powers of ten. */
export interface InfidelityAxis {
  /** Power of ten at the foot. */
  readonly worst: number;
  /** Power of ten at the head. */
  readonly best: number;
  /** Powers that get a number, worst first. */
  readonly numbered: readonly number[];
}

const LOWEST = -12;
const MOST_NUMBERS = 6;

/**
 * The axis for these curves: the worst value stands on its foot or above, and it reaches one power past the tolerance at
 * least, further where the better curve is that good an eighth of the way out. Never past 1e-12: at no error a curve has no foot there.
 */
export function infidelityAxis(shown: {
  readonly worst: number;
  readonly better: number;
  readonly tolerance: number;
}): InfidelityAxis {
  const power = (value: number): number => Math.log10(Math.max(value, 1e-300));
  const worst = Math.min(0, Math.ceil(power(Math.max(shown.worst, shown.tolerance))));
  const wanted = Math.min(power(shown.better), power(shown.tolerance) - 1);
  const best = Math.min(worst - 2, Math.max(LOWEST, Math.floor(wanted)));
  const step = Math.ceil((worst - best) / MOST_NUMBERS);
  const numbered = Array.from({ length: worst - best + 1 }, (_, k) => worst - k).filter(
    (exponent) => exponent % step === 0,
  );
  return { worst, best, numbered };
}

/** From 0 at the foot to 1 at the head; beyond where the value is. */
export function shareOfAxis({ worst, best }: InfidelityAxis, infidelity: number): number {
  return (worst - Math.log10(Math.max(infidelity, 1e-300))) / (worst - best);
}

/** Moves labels apart by at least `gap`, each as little as may be, in their order; kept between `top` and `foot`. */
export function apartLabels(
  wanted: readonly number[],
  gap: number,
  [top, foot]: readonly [number, number],
): readonly number[] {
  const order = wanted.map((_, k) => k).sort((a, b) => (wanted[a] ?? 0) - (wanted[b] ?? 0));
  const placed = [...wanted];
  let above = top - gap;
  for (const k of order) {
    placed[k] = Math.max(wanted[k] ?? 0, above + gap);
    above = placed[k] ?? above;
  }
  let below = foot + gap;
  for (const k of [...order].reverse()) {
    placed[k] = Math.min(placed[k] ?? 0, below - gap);
    below = placed[k] ?? below;
  }
  return placed;
}
