import type { HistoryPoint, HistoryPoints } from './seat-history';
import { type PlotScale, plotScale } from './plot-scale';

/** Half the width of a 95 % interval of a normal distribution, in σ. */
export const interval95 = 1.96;

const upper = { from: 140, to: 24 } as const;
const lower = { from: 284, to: 200 } as const;
const dayMs = 86_400_000;

/** Where everything of a history plot stands, in px. */
export interface HistoryFrame {
  readonly width: number;
  readonly height: number;
  readonly left: number;
  readonly right: number;
  readonly top: number;
  /** The time axis. */
  readonly foot: number;
  readonly from: number;
  readonly to: number;
  readonly time: (at: number) => number;
  readonly retardance: PlotScale;
  readonly zero: PlotScale;
  /** Baselines of what the two parts are called. */
  readonly names: { readonly retardance: number; readonly zero: number };
}

/** Null where there is nothing to draw. */
export function historyFrame(points: HistoryPoints, width: number): HistoryFrame | null {
  const { retardances, zeros, predicted, moves } = points;
  if (retardances.length === 0) return null;
  const times = [...retardances, ...moves].map(({ at }) => at);
  const [first, last] = [least(times), most(times)];
  const span = Math.max(last - first, dayMs);
  const [from, to] = [first - span * 0.05, last + span * 0.05];
  const [left, right] = [44, 8];
  // Room for the name of the lower part under its lowest point.
  const foot = lower.from + 24;
  return {
    width,
    height: foot + 32,
    left,
    right,
    top: 6,
    foot,
    from,
    to,
    time: (at) => left + ((at - from) / (to - from)) * (width - left - right),
    retardance: bandScale(
      retardances,
      (predicted ?? []).map(({ value }) => value),
      upper,
      1,
    ),
    zero: bandScale(zeros, [0], lower, 0.5),
    names: { retardance: upper.from + 20, zero: lower.from + 16 },
  };
}

const least = (values: readonly number[]): number => values.reduce((a, b) => Math.min(a, b));
const most = (values: readonly number[]): number => values.reduce((a, b) => Math.max(a, b));

function bandScale(
  points: readonly HistoryPoint[],
  alsoShown: readonly number[],
  band: { readonly from: number; readonly to: number },
  leastSpan: number,
): PlotScale {
  const ends = [
    ...points.flatMap(({ value, sigma }) => [value - interval95 * sigma, value + interval95 * sigma]),
    ...alsoShown,
  ];
  return plotScale(least(ends), most(ends), band, leastSpan);
}
