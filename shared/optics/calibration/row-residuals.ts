import type { Samples } from './scan-rows';

/** One row beside the fit. Values are a share of both ports, or a power in the rows' unit. */
export interface RowResidual {
  /** Place among the rows handed in. */
  readonly row: number;
  readonly isUsed: boolean;
  readonly value: number;
  readonly fitted: number;
  /** What a steady source would have given: value/(1 + drift). */
  readonly steadyValue: number;
  readonly sigma: number;
  readonly residualSigmas: number;
}

/** The model's value over its scale, and the source's power at that time over that at the first row. */
export type FittedValue = (
  angleRad: number,
  time: number,
) => { readonly value: number; readonly source: number };

/**
 * Residuals of all rows, those left out included where they can be read.
 * @param readAlone one row by itself, or null where it can't be read; its time is its place among all.
 */
export function residualsOf(
  count: number,
  samples: Samples,
  scatter: number | null,
  readAlone: (row: number) => Samples | null,
  fitted: FittedValue,
): readonly RowResidual[] {
  const residual = (from: Samples, k: number, row: number, time: number, isUsed: boolean): RowResidual => {
    const { value, source } = fitted(from.angleRad[k] ?? 0, time);
    const measured = (from.value[k] ?? 0) * from.scale;
    const sigma = scatter === null ? (from.sigma[k] ?? 1) * from.scale : scatter * samples.scale;
    return {
      row,
      isUsed,
      value: measured,
      fitted: value * samples.scale,
      steadyValue: measured / source,
      sigma,
      residualSigmas: (measured - value * samples.scale) / sigma,
    };
  };
  const all: RowResidual[] = [];
  let next = 0;
  for (let row = 0; row < count; row += 1) {
    if (samples.rows[next] === row) {
      all.push(residual(samples, next, row, samples.time[next] ?? 0, true));
      next += 1;
      continue;
    }
    const alone = readAlone(row);
    if (alone !== null) all.push(residual(alone, 0, row, row / Math.max(1, count - 1) - 0.5, false));
  }
  return all;
}
