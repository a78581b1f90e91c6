import type { Stokes } from '../stokes';
import { coneExcess, longestStep, turnFrame } from './light-cone';
import type { MeasuredCounts } from './measured-counts';
import { setFour, solveFour } from './solve-four';
import { TurnedLikelihood } from './turned-likelihood';

/** Where a climb ended, and its certificate. */
export interface Ascent {
  /** S0 in counts per unit of exposure. */
  readonly intensity: number;
  /** S/S0. */
  readonly stokes: Stokes;
  /** log L is nowhere in the cone higher than here by more than this. */
  readonly gapBound: number;
}

/** Wanted of the gap, in units of log L. */
const GAP = 1e-10;
/** What rounding may hide of the gap, for each count: eight steps of a number near 1. */
const ROUNDING = 8 * 2.220446049250313e-16;
/** Most climbs take 12 to 20. The longest seen in 400 000 random ones, exposures up to four decades apart, took 177. */
const MOST_STEPS = 400;

const FIRST_BARRIER = 0.1;
/** The barrier is lowered by at least this factor, near the end by its own square root. */
const LOWER_BY = 0.02;
/** A whole step's gain over μ, below which the barrier is lowered: from further off, S would meet the boundary beside its place. */
const NEAR_THE_PATH = 0.5;
/** Below this, a whole step stays inside and gains by theory, and what it gains may be too little to be seen in a sum. */
const ON_THE_PATH = 0.05;

/**
 * The maximum of log L = Σ n ln λ − λ, λ = e (S0 + S·m)/2 + d, over the cone |S| ≤ S0, along the central path of the barrier
 * μ ln(S0² − |S|²) as μ falls. On the path the gap to the maximum is 2μ at most, but the bound returned needs no path: with
 * s = −∇ log L at y, concavity gives log L(y*) − log L(y) ≤ s·y − s·y*, and −s·y* ≤ 0 where s lies in the cone (which is its
 * own dual), else at most the excess |s⃗| − s0 times the largest S0* there can be. What rounding may hide is added.
 * Source: Nesterov and Nemirovskii, Interior-Point Polynomial Algorithms in Convex Programming (1994), from memory.
 *
 * The coordinates are those of `TurnedLikelihood`, in which the barrier is μ (ln u + ln v) and a state that is pure to the last
 * bit still has a u. For one list of settings, with as many climbs as there are lists of counts; steps allocate nothing.
 */
export class BarrierPath {
  private readonly likelihood: TurnedLikelihood;
  /** Three unit vectors: S's direction and two across. */
  private readonly frame = new Float64Array(9);
  private readonly step = new Float64Array(4);
  private u = 1;
  private v = 1;

  /** @param settings that `refusalOf` finds no fault with. */
  constructor(settings: Omit<MeasuredCounts, 'counts'>) {
    this.likelihood = new TurnedLikelihood(settings);
  }

  climb(counts: readonly number[]): Ascent {
    const { likelihood, frame } = this;
    const total = likelihood.load(counts);
    const rounding = ROUNDING * likelihood.mostIntensity;
    const wanted = Math.max((0.4 * GAP) / total, rounding);
    this.startUnpolarised();
    let barrier = FIRST_BARRIER;
    for (let steps = 0; ; steps += 1) {
      likelihood.expand(this.u, this.v, frame);
      const gap = this.gap();
      if (gap <= wanted || steps === MOST_STEPS) return this.ascent(total, gap + rounding);
      const gain = this.newtonStep(barrier);
      const length = gain < ON_THE_PATH * barrier ? 1 : this.searchLine(barrier, gain);
      this.move(length);
      if (length > 0.9 && gain < NEAR_THE_PATH * barrier) {
        barrier = Math.max(0.4 * wanted, barrier * Math.min(LOWER_BY, Math.sqrt(barrier)));
      }
    }
  }

  private startUnpolarised(): void {
    const { frame } = this;
    this.u = 1;
    this.v = 1;
    frame.fill(0);
    frame[2] = 1;
    frame[3] = 1;
    frame[7] = 1;
  }

  private gap(): number {
    const { slope, mostIntensity } = this.likelihood;
    const excess = Math.max(0, coneExcess(slope));
    return (slope[0] ?? 0) * this.u + (slope[1] ?? 0) * this.v + excess * mostIntensity;
  }

  // Leaves the step in `step` and returns what it gains to first order, the squared Newton decrement.
  private newtonStep(barrier: number): number {
    const { likelihood, step, u, v } = this;
    const { slope, curvature } = likelihood;
    // The barrier's pull along u is μ/u, on the path the slope itself. Where u must still shrink, the slope says better how the
    // pull will have grown: with it, one step takes u to μ/slope, where μ/u² would overshoot.
    const pull = Math.max(barrier / u, slope[0] ?? 0);
    curvature[0] = (curvature[0] ?? 0) + pull / u;
    curvature[5] = (curvature[5] ?? 0) + barrier / v / v;
    curvature[10] = (curvature[10] ?? 0) + (2 * pull) / v;
    curvature[15] = (curvature[15] ?? 0) + (2 * pull) / v;
    const g0 = (slope[0] ?? 0) - barrier / u;
    const g1 = (slope[1] ?? 0) - barrier / v;
    const g2 = slope[2] ?? 0;
    const g3 = slope[3] ?? 0;
    setFour(step, -g0, -g1, -g2, -g3);
    solveFour(curvature, step);
    return -(g0 * (step[0] ?? 0) + g1 * (step[1] ?? 0) + g2 * (step[2] ?? 0) + g3 * (step[3] ?? 0));
  }

  // Halves the step until what is minimised still falls at its end, or rises there less than half as steeply as it fell at the
  // start: it is convex along the line, so such a step gains, and none is too short.
  private searchLine(barrier: number, gain: number): number {
    const { likelihood, step, u, v } = this;
    const x0 = step[0] ?? 0;
    const x1 = step[1] ?? 0;
    const x2 = step[2] ?? 0;
    const x3 = step[3] ?? 0;
    const across = x2 * x2 + x3 * x3;
    let length = Math.min(1, 0.98 * longestStep(u, v, x0, x1, across));
    for (; length > Number.MIN_VALUE; length /= 2) {
      const nextU = u + length * x0;
      const nextV = v + length * x1;
      const inside = nextU * nextV - length * length * across;
      const barrierSlope = (-barrier * (x0 * nextV + x1 * nextU - 2 * length * across)) / inside;
      if (likelihood.slopeAlong(step, length) + barrierSlope <= gain / 2) break;
    }
    return length;
  }

  private move(length: number): void {
    const { step } = this;
    const u = this.u + length * (step[0] ?? 0);
    const v = this.v + length * (step[1] ?? 0);
    const a2 = length * (step[2] ?? 0);
    const a3 = length * (step[3] ?? 0);
    const across = a2 * a2 + a3 * a3;
    const along = (v - u) / 2;
    const size = Math.sqrt(along * along + across);
    // S0 − |S| without the difference of near equals that it would be for nearly pure light.
    this.u = along > 0 ? u - across / (size + along) : (u + v) / 2 - size;
    this.v = this.u + 2 * size;
    if (size > 0) turnFrame(this.frame, along, a2, a3);
  }

  private ascent(total: number, gap: number): Ascent {
    const { u, v, frame, likelihood } = this;
    const degree = (v - u) / (v + u);
    return {
      intensity: (((u + v) / 2) * total) / likelihood.exposure,
      stokes: [degree * (frame[0] ?? 0), degree * (frame[1] ?? 0), degree * (frame[2] ?? 0)],
      gapBound: gap * total,
    };
  }
}
