import type { Design } from './design';
import { infidelitiesAt } from './design';
import { type MeasuredPower, measuredPower, withinTolerance } from './error-power';

/** The plot goes twice as far as the range that was asked about. */
const DRAWN_WIDTHS = 2;
/** Even, so that one point stands at no error. */
const DRAWN_STEPS = 400;
const LISTED_STEPS = 20;

export interface DesignCurves {
  readonly errors: readonly number[];
  readonly composite: readonly number[];
  readonly plain: readonly number[];
}

function evenly(width: number, steps: number): readonly number[] {
  return Array.from({ length: steps + 1 }, (_, k) => ((2 * k) / steps - 1) * DRAWN_WIDTHS * width);
}

export function drawnCurves(design: Design): DesignCurves {
  return curvesAt(design, evenly(design.width, DRAWN_STEPS));
}

/** As the table beside the plot lists them. */
export function listedCurves(design: Design): DesignCurves {
  return curvesAt(design, evenly(design.width, LISTED_STEPS));
}

export function curvesAt(design: Design, errors: readonly number[]): DesignCurves {
  return {
    errors,
    composite: infidelitiesAt(design.goal, design, errors),
    plain: infidelitiesAt(design.goal, design.plain, errors),
  };
}

type Which = 'composite' | 'plain';

/** The measured power of the error of one curve; see `measuredPower`. */
export function powerOf(design: Design, which: Which): MeasuredPower | null {
  const stack = which === 'composite' ? design : design.plain;
  return measuredPower((error) => infidelitiesAt(design.goal, stack, [error])[0] ?? 0, design.width);
}

/** Where a drawn curve stays within the tolerance. */
export function heldOver(
  curves: DesignCurves,
  which: Which,
  tolerance: number,
): ReturnType<typeof withinTolerance> {
  return withinTolerance(
    curves.errors.map((error, k) => ({ error, infidelity: curves[which][k] ?? 1 })),
    tolerance,
  );
}
