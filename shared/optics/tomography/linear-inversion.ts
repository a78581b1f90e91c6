import type { Stokes } from '../stokes';
import { type MeasuredCounts, refusalOf, type TomographyRefusal } from './measured-counts';

export type LinearInversion =
  | {
      readonly ok: true;
      /** S0 in counts per unit of exposure. */
      readonly intensity: number;
      /** S/S0, canonical frame. Noise can make it longer than 1: then no light has it. */
      readonly stokes: Stokes;
    }
  | { readonly ok: false; readonly refusal: TomographyRefusal };

/**
 * The Stokes vector by weighted least squares, for orientation: the weights are 1/n of the counts themselves (1 where nothing
 * was counted), as Poisson statistics has it, dark counts taken off. Nothing keeps it physical; `mostLikelyState` does.
 */
export function linearInversion(data: MeasuredCounts): LinearInversion {
  const refusal = refusalOf(data);
  if (refusal !== null) return { ok: false, refusal };
  // In units of the longest exposure, so that no unit overflows.
  const longest = Math.max(...data.exposures);
  const sigma = data.counts.map((n) => Math.sqrt(Math.max(n, 1)));
  const weighted = (values: readonly number[]): number[] => values.map((value, k) => value / (sigma[k] ?? 1));
  const share = data.exposures.map((exposure) => exposure / (2 * longest));
  const columns = [
    weighted(share),
    ...([0, 1, 2] as const).map((axis) =>
      weighted(data.projectors.map((projector, k) => projector[axis] * (share[k] ?? 0))),
    ),
  ];
  const light = weighted(data.counts.map((n, k) => n - (data.darkCounts[k] ?? 0)));
  const [s0 = NaN, s1 = NaN, s2 = NaN, s3 = NaN] = leastSquares(columns, light);
  if (!(s0 > 0)) {
    const message =
      'Least squares finds no light beyond the dark counts, so there is no Stokes vector to give. Measure longer, or correct the dark counts.';
    return { ok: false, refusal: { reason: 'no-light', message } };
  }
  return { ok: true, intensity: s0 / longest, stokes: [s1 / s0, s2 / s0, s3 / s0] };
}

const dot = (a: readonly number[], b: readonly number[]): number =>
  a.reduce((sum, value, k) => sum + value * (b[k] ?? 0), 0);
const less = (a: readonly number[], b: readonly number[], by: number): number[] =>
  a.map((value, k) => value - by * (b[k] ?? 0));

// Modified Gram–Schmidt, which keeps twice the digits that normal equations would.
function leastSquares(columns: readonly (readonly number[])[], right: readonly number[]): readonly number[] {
  const [first, ...others] = columns;
  if (first === undefined) return [];
  const size = dot(first, first);
  const shares = others.map((column) => dot(first, column) / size);
  const along = dot(first, right) / size;
  const rest = leastSquares(
    others.map((column, k) => less(column, first, shares[k] ?? 0)),
    less(right, first, along),
  );
  return [along - dot(shares, rest), ...rest];
}
