import { wrap } from '../../../shared/optics/units';
import type { PlottedPoint } from './scan-points';

/** Where everything of a scan's plot stands, in px. */
export interface ScanFrame {
  readonly width: number;
  readonly height: number;
  readonly left: number;
  readonly right: number;
  readonly upper: Band;
  readonly lower: Band;
  /** Readings from which and to which the plot goes; beyond 360 they are written less a turn. */
  readonly fromDeg: number;
  readonly toDeg: number;
  /** A reading in the window, from any reading of the dial. */
  readonly unwrapped: (dialDeg: number) => number;
  readonly x: (windowDeg: number) => number;
  readonly dialMarks: readonly number[];
}

interface Band {
  readonly top: number;
  readonly foot: number;
  readonly marks: readonly number[];
  readonly decimals: number;
  readonly y: (value: number) => number;
}

const LEFT = 46;
const RIGHT = 10;
const TOP = 36;
const UPPER_HEIGHT = 190;
const LOWER_HEIGHT = 74;
const BETWEEN = 18;
const FOOT = 26;
/** Of every plot, whatever it shows: its place can be kept before it is drawn. */
export const SCAN_FRAME_HEIGHT = TOP + UPPER_HEIGHT + BETWEEN + LOWER_HEIGHT + FOOT;
const LABEL_WIDTH = 52;
const DIAL_STEPS = [1, 2, 5, 10, 15, 30, 45, 90];
const MARGIN_SHARE = 0.02;
const FULL_TURN = 360;

/** @param curve the smallest and the largest value of the fitted curve. */
export function scanFrame(
  points: readonly PlottedPoint[],
  curve: { readonly least: number; readonly most: number },
  width: number,
): ScanFrame {
  const start = windowStart(points.map(({ dialDeg }) => dialDeg));
  const unwrapped = (dialDeg: number) => start + wrap(dialDeg - start, FULL_TURN);
  const reach = points.reduce((most, { dialDeg }) => Math.max(most, unwrapped(dialDeg) - start), 1);
  const margin = reach * MARGIN_SHARE;
  const [fromDeg, toDeg] = [start - margin, start + reach + margin];
  const right = width - RIGHT;
  const x = (windowDeg: number) => LEFT + ((windowDeg - fromDeg) / (toDeg - fromDeg)) * (right - LEFT);
  const values = points.map(({ value }) => value);
  const lowest = values.reduce((low, value) => Math.min(low, value), Math.min(0, curve.least));
  const highest = values.reduce((high, value) => Math.max(high, value), curve.most);
  const farthest = points.reduce(
    (far, { residualSigmas, isUsed }) => (isUsed ? Math.max(far, Math.abs(residualSigmas)) : far),
    2,
  );
  const upperFoot = TOP + UPPER_HEIGHT;
  const lowerTop = upperFoot + BETWEEN;
  const step = DIAL_STEPS.find((one) => ((toDeg - fromDeg) / one) * LABEL_WIDTH <= right - LEFT) ?? 90;
  // To an even σ as long as the marks are 2 σ apart, so that the axis ends in a mark.
  const sigmas = farthest > 4 ? Math.ceil(farthest) : 2 * Math.ceil(farthest / 2);
  return {
    width,
    height: SCAN_FRAME_HEIGHT,
    left: LEFT,
    right,
    upper: band(lowest, lowest + (highest - lowest) * 1.08, TOP, upperFoot, 6),
    lower: band(-sigmas, sigmas, lowerTop, lowerTop + LOWER_HEIGHT, sigmas <= 4 ? sigmas : 4),
    fromDeg,
    toDeg,
    unwrapped,
    x,
    dialMarks: multiples(step, fromDeg, toDeg),
  };
}

/** The reading behind the widest gap that the scan leaves on the circle: from there it goes on without a break. */
function windowStart(dialsDeg: readonly number[]): number {
  const onCircle = dialsDeg.map((dialDeg) => wrap(dialDeg, FULL_TURN)).toSorted((a, b) => a - b);
  const first = onCircle[0] ?? 0;
  let [start, widest] = [first, first + FULL_TURN - (onCircle.at(-1) ?? first)];
  for (let at = 1; at < onCircle.length; at += 1) {
    const gap = (onCircle[at] ?? 0) - (onCircle[at - 1] ?? 0);
    // Equal gaps, but for rounding, keep the smallest reading first.
    if (gap > widest * (1 + 1e-9)) [start, widest] = [onCircle[at] ?? 0, gap];
  }
  return start;
}

function band(low: number, high: number, top: number, foot: number, most: number): Band {
  const span = high > low ? high - low : 1;
  const power = 10 ** Math.floor(Math.log10(span / most));
  const step = [1, 2, 5, 10].map((one) => one * power).find((one) => span / one <= most) ?? 10 * power;
  return {
    top,
    foot,
    marks: multiples(step, low, high),
    decimals: Math.max(0, -Math.floor(Math.log10(step) + 1e-9)),
    y: (value) => foot - ((value - low) / span) * (foot - top),
  };
}

function multiples(step: number, low: number, high: number): readonly number[] {
  const first = Math.ceil(low / step - 1e-9);
  const count = Math.max(0, Math.floor(high / step + 1e-9) - first + 1);
  return Array.from({ length: count }, (_, k) => (first + k) * step);
}

/** A reading as it is engraved: from 0 up to 360. */
export function engraved(windowDeg: number): number {
  return wrap(windowDeg, FULL_TURN);
}
