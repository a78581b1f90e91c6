import { linearScanCurve, rotatingScanCurve } from '../../../shared/optics/calibration';
import type { ScanAnswer } from '../../../shared/scan-calibration';

export type FittedScan = Extract<ScanAnswer, { readonly kind: 'fitted' }>;

/** One row of the file beside the fit. */
export interface PlottedPoint {
  readonly line: number;
  readonly dialDeg: number;
  /** What a steady source would have given: a share of both ports, or a power. */
  readonly value: number;
  readonly fitted: number;
  readonly residualSigmas: number;
  readonly isUsed: boolean;
  readonly isSuspected: boolean;
}

export function plottedPoints({ table, found: { fit } }: FittedScan): readonly PlottedPoint[] {
  const suspected = new Set(fit.suspected);
  return fit.rows.flatMap(({ row, steadyValue, value, fitted, residualSigmas, isUsed }) => {
    const point = table.points[row];
    if (point === undefined) return [];
    const source = value === 0 ? 1 : steadyValue / value;
    return [
      {
        line: point.line,
        dialDeg: point.dialDeg,
        value: steadyValue,
        fitted: fitted * source,
        residualSigmas,
        isUsed,
        isSuspected: suspected.has(row),
      },
    ];
  });
}

/** The fitted curve for a steady source. */
export function fittedCurve({ found }: FittedScan): (dialDeg: number) => number {
  return found.kind === 'linear' ? linearScanCurve(found.fit) : rotatingScanCurve(found.fit);
}

/** A reading of the dial where the fast axis lies along H, or may. */
export interface ZeroMark {
  readonly dialDeg: number;
  /** Whether it is the zero as it is named; else the one it might be as well. */
  readonly isNamed: boolean;
}

/** The zeros that lie in a window of readings, each half turn one. */
export function zeroMarks({ values }: FittedScan, fromDeg: number, toDeg: number): readonly ZeroMark[] {
  const named = halfTurns(values.offsetDeg, fromDeg, toDeg).map((dialDeg) => ({ dialDeg, isNamed: true }));
  if (!values.openQuestions.includes('axis')) return named;
  const other = halfTurns(values.offsetDeg + 90, fromDeg, toDeg);
  return [...named, ...other.map((dialDeg) => ({ dialDeg, isNamed: false }))];
}

function halfTurns(offsetDeg: number, fromDeg: number, toDeg: number): number[] {
  const first = Math.ceil((fromDeg - offsetDeg) / 180);
  const count = Math.max(0, Math.floor((toDeg - offsetDeg) / 180) - first + 1);
  return Array.from({ length: count }, (_, k) => offsetDeg + 180 * (first + k));
}
