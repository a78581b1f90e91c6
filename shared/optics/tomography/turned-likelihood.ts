import type { MeasuredCounts } from './measured-counts';
import { setFour } from './solve-four';

/** Of each setting: its row e (1, m)/2, then d. */
const SETTING = 5;
/** Of each setting as the light stands: its row by (u, v, across, across), λ, n and d. */
const LOCAL = 7;
const MEAN = 4;
const SHARE = 5;
const DARK = 6;

/**
 * −log L = Σ λ − n ln λ, its slope and its curvature in coordinates that turn with S: u = S0 − |S|, v = S0 + |S| and two
 * directions across. In units of Σ e/2 = 1 and Σ n = 1. One object serves many lists of counts and allocates for none.
 */
export class TurnedLikelihood {
  /** Σ e/2, the unit of exposure. */
  readonly exposure: number;
  /** S0 at the maximum is not above this. */
  readonly mostIntensity: number;
  /** By (u, v, across, across). */
  readonly slope = new Float64Array(4);
  /** 4 × 4 by rows, of which the lower triangle is kept. */
  readonly curvature = new Float64Array(16);
  private readonly size: number;
  private readonly settings: Float64Array;
  private readonly local: Float64Array;

  /** @param measured settings that `refusalOf` finds no fault with. */
  constructor({ projectors, exposures, darkCounts }: Omit<MeasuredCounts, 'counts'>) {
    this.size = projectors.length;
    this.exposure = exposures.reduce((sum, each) => sum + each / 2, 0);
    this.settings = new Float64Array(SETTING * this.size);
    this.local = new Float64Array(LOCAL * this.size);
    let [x, y, z] = [0, 0, 0];
    for (const [k, [m1, m2, m3]] of projectors.entries()) {
      const half = (exposures[k] ?? 0) / 2 / this.exposure;
      const by = half / Math.sqrt(m1 * m1 + m2 * m2 + m3 * m3);
      const at = SETTING * k;
      this.settings[at] = half;
      this.settings[at + 1] = by * m1;
      this.settings[at + 2] = by * m2;
      this.settings[at + 3] = by * m3;
      this.settings[at + 4] = darkCounts[k] ?? 0;
      x += by * m1;
      y += by * m2;
      z += by * m3;
    }
    // At the maximum Σ λ without the dark counts is Σ n at most, and it is S0 (1 − |Σ e m|/Σ e) at least.
    this.mostIntensity = 1 / (1 - Math.sqrt(x * x + y * y + z * z));
  }

  /** Returns Σ n, the unit of counts, over the settings that were on: a port that was off says nothing about the light. */
  load(counts: readonly number[]): number {
    const { settings, local, size } = this;
    let total = 0;
    for (let k = 0; k < size; k += 1) if ((settings[SETTING * k] ?? 0) > 0) total += counts[k] ?? 0;
    for (let k = 0; k < size; k += 1) {
      const isOn = (settings[SETTING * k] ?? 0) > 0;
      local[LOCAL * k + SHARE] = isOn ? (counts[k] ?? 0) / total : 0;
      local[LOCAL * k + DARK] = (settings[SETTING * k + 4] ?? 0) / total;
    }
    return total;
  }

  /** Fills `slope` and `curvature`. @param frame S's unit vector, then two across. */
  expand(u: number, v: number, frame: Float64Array): void {
    const { settings, local, slope, curvature } = this;
    const n1 = frame[0] ?? 0;
    const n2 = frame[1] ?? 0;
    const n3 = frame[2] ?? 0;
    const f1 = frame[3] ?? 0;
    const f2 = frame[4] ?? 0;
    const f3 = frame[5] ?? 0;
    const g1 = frame[6] ?? 0;
    const g2 = frame[7] ?? 0;
    const g3 = frame[8] ?? 0;
    let s0 = 0;
    let s1 = 0;
    let s2 = 0;
    let s3 = 0;
    let h00 = 0;
    let h10 = 0;
    let h11 = 0;
    let h20 = 0;
    let h21 = 0;
    let h22 = 0;
    let h30 = 0;
    let h31 = 0;
    let h32 = 0;
    let h33 = 0;
    for (let k = 0; k < this.size; k += 1) {
      const from = SETTING * k;
      const r0 = settings[from] ?? 0;
      const r1 = settings[from + 1] ?? 0;
      const r2 = settings[from + 2] ?? 0;
      const r3 = settings[from + 3] ?? 0;
      const along = r1 * n1 + r2 * n2 + r3 * n3;
      // Rounding may take |along| past r0, and no state has a negative rate.
      const b0 = Math.max(0, r0 - along) / 2;
      const b1 = Math.max(0, r0 + along) / 2;
      const b2 = r1 * f1 + r2 * f2 + r3 * f3;
      const b3 = r1 * g1 + r2 * g2 + r3 * g3;
      const at = LOCAL * k;
      local[at] = b0;
      local[at + 1] = b1;
      local[at + 2] = b2;
      local[at + 3] = b3;
      const n = local[at + SHARE] ?? 0;
      const mean = b0 * u + b1 * v + (local[at + DARK] ?? 0);
      local[at + MEAN] = mean;
      // Without counts λ alone is left, which doesn't bend.
      const ratio = n > 0 ? n / mean : 0;
      const rest = 1 - ratio;
      s0 += b0 * rest;
      s1 += b1 * rest;
      s2 += b2 * rest;
      s3 += b3 * rest;
      if (n === 0) continue;
      const bend = ratio / mean;
      const q1 = bend * b1;
      const q2 = bend * b2;
      const q3 = bend * b3;
      h00 += bend * b0 * b0;
      h10 += q1 * b0;
      h11 += q1 * b1;
      h20 += q2 * b0;
      h21 += q2 * b1;
      h22 += q2 * b2;
      h30 += q3 * b0;
      h31 += q3 * b1;
      h32 += q3 * b2;
      h33 += q3 * b3;
    }
    setFour(slope, s0, s1, s2, s3);
    curvature[0] = h00;
    curvature[4] = h10;
    curvature[5] = h11;
    curvature[8] = h20;
    curvature[9] = h21;
    curvature[10] = h22;
    curvature[12] = h30;
    curvature[13] = h31;
    curvature[14] = h32;
    curvature[15] = h33;
  }

  /** The slope of −log L along a straight `step`, at `length` times it from where it was expanded. */
  slopeAlong(step: Float64Array, length: number): number {
    const { local } = this;
    const x0 = step[0] ?? 0;
    const x1 = step[1] ?? 0;
    const x2 = step[2] ?? 0;
    const x3 = step[3] ?? 0;
    let sum = 0;
    for (let k = 0; k < this.size; k += 1) {
      const at = LOCAL * k;
      const b0 = local[at] ?? 0;
      const b1 = local[at + 1] ?? 0;
      const b2 = local[at + 2] ?? 0;
      const b3 = local[at + 3] ?? 0;
      const change = b0 * x0 + b1 * x1 + b2 * x2 + b3 * x3;
      const n = local[at + SHARE] ?? 0;
      sum += n > 0 ? change * (1 - n / ((local[at + MEAN] ?? 1) + length * change)) : change;
    }
    return sum;
  }
}
