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

/** Of the housings, in px: the one to turn, and the others. */
export const ringRadii: Readonly<Record<BenchShape, { readonly now: number; readonly other: number }>> = {
  landscape: { now: 128, other: 95 },
  portrait: { now: 138, other: 58 },
  phone: { now: 58, other: 34 },
};
