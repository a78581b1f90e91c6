import { retardStokes, type Stokes, STOKES_H } from '../../shared/optics';
import type { LinearScan, RotatingRow, ScanRow } from '../../shared/optics/calibration';
import { NormalStream } from '../../shared/optics/normal-stream';
import { seededStream, splitmixWords } from '../../shared/optics/uniform-stream';
import { degrees, toRadians } from '../../shared/optics/units';

/** A plate in its mount, and the bench about it. */
export interface Truth {
  readonly offsetDeg: number;
  readonly retardanceDeg: number;
  readonly direction: 1 | -1;
  readonly leak: number;
  readonly power: number;
  /** Change of the source from the first row to the last. */
  readonly drift: number;
}

export const PLAIN: Truth = {
  offsetDeg: 31.7,
  retardanceDeg: 97.3,
  direction: 1,
  leak: 8e-4,
  power: 1,
  drift: 0,
};

export function readings(fromDeg: number, stepDeg: number, count: number): readonly number[] {
  return Array.from({ length: count }, (_, k) => fromDeg + k * stepDeg);
}

/** The light behind the plate, by turning the sphere: nothing of the fitted formulas. */
function behind({ offsetDeg, retardanceDeg, direction }: Truth, dialDeg: number, input: Stokes): Stokes {
  const fastAxisRad = toRadians(degrees(direction * (dialDeg - offsetDeg)));
  return retardStokes({ fastAxisRad, retardanceRad: toRadians(degrees(retardanceDeg)) }, input);
}

export interface Powers {
  readonly dialDeg: number;
  readonly crossed: number;
  readonly parallel: number;
}

export function cleanPowers(truth: Truth, dialsDeg: readonly number[]): readonly Powers[] {
  return dialsDeg.map((dialDeg, k) => {
    const [s1] = behind(truth, dialDeg, STOKES_H);
    const source = truth.power * (1 + (truth.drift * k) / Math.max(1, dialsDeg.length - 1));
    const share = truth.leak + (1 - 2 * truth.leak) * ((1 - s1) / 2);
    return { dialDeg, crossed: source * share, parallel: source * (1 - share) };
  });
}

/** Power behind an analyser at `analyserDeg`, before which the plate turns. */
export function rotatingPowers(
  truth: Truth,
  dialsDeg: readonly number[],
  input: Stokes,
  analyserDeg: number,
): readonly number[] {
  const double = 2 * toRadians(degrees(analyserDeg));
  return dialsDeg.map((dialDeg, k) => {
    const [s1, s2] = behind(truth, dialDeg, input);
    const source = truth.power * (1 + (truth.drift * k) / Math.max(1, dialsDeg.length - 1));
    const along = Math.cos(double) * s1 + Math.sin(double) * s2;
    return (source * (1 + (1 - 2 * truth.leak) * along)) / 2;
  });
}

/** Seeded numbers: even ones, normal ones, and counts. */
export class Dice {
  private readonly even: () => number;
  private readonly bell: NormalStream;
  private readonly one = new Float64Array(1);

  constructor(seed: number) {
    this.even = seededStream(seed);
    this.bell = new NormalStream(splitmixWords(seed + 1_000_003, 8));
  }

  between(low: number, high: number): number {
    return low + (high - low) * this.even();
  }

  pick<T>(choices: readonly [T, ...T[]]): T {
    return choices[Math.floor(this.even() * choices.length)] ?? choices[0];
  }

  normal(): number {
    this.bell.fill(this.one, 1);
    return this.one[0] ?? 0;
  }

  /** Poisson's: by products of even numbers; beyond 2 000 a rounded normal number has the same law for our purpose. */
  count(mean: number): number {
    if (mean > 2000) return Math.max(0, Math.round(mean + Math.sqrt(mean) * this.normal()));
    let [left, found] = [mean, 0];
    // A sum of Poisson numbers is one: 50 at a time.
    while (left > 0) {
      const part = Math.min(left, 50);
      left -= part;
      const limit = Math.exp(-part);
      let product = this.even();
      while (product > limit) {
        found += 1;
        product *= this.even();
      }
    }
    return found;
  }

  shuffled<T>(values: readonly T[]): readonly T[] {
    return values
      .map((value) => ({ value, key: this.even() }))
      .sort((a, b) => a.key - b.key)
      .map(({ value }) => value);
  }
}

export function scanOf(rows: readonly ScanRow[], changes: Partial<LinearScan> = {}): LinearScan {
  return { rows, direction: 1, leak: null, power: null, nominal: null, leftOut: [], ...changes };
}

/** Rows of both ports without noise and σ. */
export function cleanRows(truth: Truth, dialsDeg: readonly number[]): readonly ScanRow[] {
  return cleanPowers(truth, dialsDeg).map(({ dialDeg, crossed, parallel }) => ({
    dialDeg,
    crossed: { power: crossed, sigma: null },
    parallel: { power: parallel, sigma: null },
  }));
}

export function cleanRotatingRows(
  truth: Truth,
  dialsDeg: readonly number[],
  input: Stokes,
  analyserDeg: number,
  sigma: number | null,
): readonly RotatingRow[] {
  const powers = rotatingPowers(truth, dialsDeg, input, analyserDeg);
  return dialsDeg.map((dialDeg, k) => ({ dialDeg, power: powers[k] ?? 0, sigma }));
}

/** The shortest way between two angles of this period. */
export function apartBy(period: number, one: number, other: number): number {
  const apart = Math.abs(one - other) % period;
  return Math.min(apart, period - apart);
}
