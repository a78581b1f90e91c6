import type { Stokes } from '../../shared/optics';
import { cleanPowers, Dice, PLAIN, readings, rotatingPowers, type Truth } from '../optics/calibration-scans';

/* Files as a lab's program would write them, from a plate that is known, with seeded noise. */

export interface WrittenScan {
  readonly truth?: Partial<Truth>;
  readonly fromDeg?: number;
  readonly stepDeg?: number;
  readonly count?: number;
  readonly seed?: number;
  /** Standard deviation of a reading as a share of the full power. */
  readonly noise?: number;
  readonly ports?: 'both' | 'crossed' | 'parallel';
}

/** Of a reading, when nothing else is said. */
export const NOISE = 0.002;

const DIGITS = 6;

function rowsOf(
  scan: WrittenScan,
  powersAt: (truth: Truth, dialsDeg: readonly number[]) => readonly (readonly number[])[],
) {
  const { fromDeg = 0, stepDeg = 6, count = 41, seed = 1, noise = NOISE } = scan;
  const truth = { ...PLAIN, ...scan.truth };
  const dialsDeg = readings(fromDeg, stepDeg, count);
  const dice = new Dice(seed);
  return powersAt(truth, dialsDeg).map((powers, at) => [
    dialsDeg[at] ?? 0,
    ...powers.map((power) => Math.abs(power + noise * truth.power * dice.normal())),
  ]);
}

/** Rows of dial and powers between linear polarisers: crossed, parallel, or both in this order. */
export function linearRows(scan: WrittenScan = {}): readonly (readonly number[])[] {
  const { ports = 'both' } = scan;
  return rowsOf(scan, (truth, dialsDeg) =>
    cleanPowers(truth, dialsDeg).map(({ crossed, parallel }) =>
      ports === 'both' ? [crossed, parallel] : [ports === 'crossed' ? crossed : parallel],
    ),
  );
}

/** Rows of dial and power behind known light, in front of an analyser. */
export function knownLightRows(input: Stokes, analyserDeg: number, scan: WrittenScan = {}) {
  return rowsOf(scan, (truth, dialsDeg) =>
    rotatingPowers(truth, dialsDeg, input, analyserDeg).map((power) => [power]),
  );
}

const NAMES = { both: 'crossed (mW);parallel (mW)', crossed: 'crossed (mW)', parallel: 'parallel (mW)' };

/** Rows as text with semicolons and decimal points. */
export function textOf(rows: readonly (readonly number[])[], header: string): string {
  const lines = rows.map((row) => row.map((value) => value.toFixed(DIGITS)).join(';'));
  return `${header}\n${lines.join('\n')}\n`;
}

export function linearScanText(scan: WrittenScan = {}): string {
  return textOf(linearRows(scan), `dial (deg);${NAMES[scan.ports ?? 'both']}`);
}

export function knownLightText(input: Stokes, analyserDeg: number, scan: WrittenScan = {}): string {
  return textOf(knownLightRows(input, analyserDeg, scan), 'dial (deg);power (mW)');
}
