import { monthNames } from '../../../../shared/words';

/** A linear scale for one band of a plot, with round marks. */
export interface PlotScale {
  readonly marks: readonly number[];
  /** Decimals that every mark is written with. */
  readonly decimals: number;
  readonly place: (value: number) => number;
}

const steps = [1, 2, 5, 10] as const;

function niceStep(span: number, count: number): number {
  const rough = span / count;
  const power = 10 ** Math.floor(Math.log10(rough));
  return power * (steps.find((step) => step * power >= rough) ?? 10);
}

/**
 * From a range of values to pixels between `from` and `to` (which may run downwards). A range of no width is opened up by
 * `leastSpan`, so that one repeated value lies in the middle.
 */
export function plotScale(
  low: number,
  high: number,
  pixels: { readonly from: number; readonly to: number },
  leastSpan: number,
): PlotScale {
  const middle = (low + high) / 2;
  const span = Math.max((high - low) * 1.15, leastSpan);
  const [start, end] = [middle - span / 2, middle + span / 2];
  const step = niceStep(span, 4);
  const first = Math.ceil(start / step);
  const last = Math.floor(end / step);
  return {
    marks: Array.from({ length: Math.max(0, last - first + 1) }, (_, k) => (first + k) * step),
    decimals: Math.max(0, -Math.floor(Math.log10(step) + 1e-9)),
    place: (value) => pixels.from + ((value - start) / (end - start)) * (pixels.to - pixels.from),
  };
}

/** A moment of time with its label. */
export interface TimeMark {
  readonly at: number;
  readonly label: string;
}

/** The first days of months between two moments, thinned to about `count`; January is written as its year. */
export function monthMarks(fromMs: number, toMs: number, count: number): readonly TimeMark[] {
  const from = new Date(fromMs);
  const months: Date[] = [];
  for (let month = 1; months.length < 1200; month += 1) {
    const first = new Date(from.getFullYear(), from.getMonth() + month, 1);
    if (first.getTime() > toMs) break;
    months.push(first);
  }
  const gap =
    [1, 2, 3, 4, 6, 12].find((step) => months.length / step <= count) ??
    Math.ceil(months.length / count / 12) * 12;
  return months
    .filter((month) => (month.getFullYear() * 12 + month.getMonth()) % gap === 0)
    .map((month) => ({
      at: month.getTime(),
      label:
        month.getMonth() === 0
          ? String(month.getFullYear())
          : (monthNames[month.getMonth()]?.slice(0, 3) ?? ''),
    }));
}
