import { useSyncExternalStore } from 'react';

/** How the bench is laid out: by the width, as in the two pictures and on a phone. */
export type BenchShape = 'landscape' | 'portrait' | 'phone';

// bench.css has the same widths.
const landscape = '(min-width: 960px)';
const phone = '(max-width: 599px)';

function shapeNow(): BenchShape {
  if (typeof window.matchMedia !== 'function' || window.matchMedia(landscape).matches) return 'landscape';
  return window.matchMedia(phone).matches ? 'phone' : 'portrait';
}

function subscribe(onChange: () => void): () => void {
  if (typeof window.matchMedia !== 'function') return () => undefined;
  const queries = [window.matchMedia(landscape), window.matchMedia(phone)];
  for (const query of queries) query.addEventListener('change', onChange);
  return () => {
    for (const query of queries) query.removeEventListener('change', onChange);
  };
}

export function useBenchShape(): BenchShape {
  return useSyncExternalStore(subscribe, shapeNow);
}

interface RingRadii {
  readonly now: number;
  readonly other: number;
}

/** The housings of one to six plates, in px: with its arc, the one to turn stays in its row, and the row in the window. */
const radii: Readonly<Record<BenchShape, readonly RingRadii[]>> = {
  landscape: [
    { now: 124, other: 95 },
    { now: 124, other: 95 },
    { now: 118, other: 90 },
    { now: 114, other: 78 },
    { now: 110, other: 66 },
    { now: 106, other: 54 },
  ],
  portrait: [
    { now: 138, other: 58 },
    { now: 138, other: 58 },
    { now: 122, other: 46 },
    { now: 108, other: 36 },
    { now: 100, other: 30 },
    { now: 92, other: 26 },
  ],
  phone: [{ now: 58, other: 34 }],
};

/** Of the housing, in px: the plate to turn now has the larger; the more plates there are, the smaller all are. */
export function ringRadius(shape: BenchShape, plateCount: number, isNow: boolean): number {
  const row = radii[shape];
  const { now, other } = row[plateCount - 1] ?? row.at(-1) ?? { now: 58, other: 34 };
  return isNow ? now : other;
}
