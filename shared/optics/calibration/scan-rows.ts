import type { DialDirection } from '../dial';
import { degrees, toRadians, wrap } from '../units';
import { type ScanRefusal, refuse, refuseRow } from './refusal';

/** One measured power, in any unit that is the same for the whole scan. σ: its standard error, or null where unknown. */
export interface PowerReading {
  readonly power: number;
  readonly sigma: number | null;
}

/** A number that is known from elsewhere, with its standard error; σ = 0 takes it as exact. */
export interface Stated {
  readonly value: number;
  readonly sigma: number;
}

/** What a lab notes for one setting of the plate between two linear polarisers; null for a port without a detector. */
export interface ScanRow {
  readonly dialDeg: number;
  readonly crossed: PowerReading | null;
  readonly parallel: PowerReading | null;
}

export type Ports = 'both' | 'crossed' | 'parallel';

/** Measured values of the rows in use, in the order of the rows. Lengths are `count`. */
export interface Samples {
  readonly count: number;
  /** Places among the rows handed in. */
  readonly rows: Int32Array;
  /** direction · dial: rises with the plate's table angle, whatever way the numbers run. */
  readonly angleRad: Float64Array;
  /** A ratio for both ports, else the power over `scale`. */
  readonly value: Float64Array;
  /** In the units of `value`; 1 throughout where none was stated. */
  readonly sigma: Float64Array;
  readonly areSigmasStated: boolean;
  /** From −½ at the scan's first row to ½ at its last, rows left out included: the order of rows is time. */
  readonly time: Float64Array;
  /** The largest power in use, for powers; 1 for ratios. */
  readonly scale: number;
}

export const MOST_ROWS = 10_000;
const LARGEST_DIAL_DEG = 1e6;
/** A dark reading may scatter below 0 by this many of its own σ; farther below, the dark level is wrong. */
const MOST_SIGMA_BELOW_ZERO = 5;
/** Where no σ is stated, by this share of the scan's largest power: our choice, a hundredth. */
const MOST_SHARE_BELOW_ZERO = 0.01;
/** Stated σ lie within these many times the largest power, or they were meant in another unit. */
const SIGMA_SPAN = 1e12;

/** Largest leak that still lets crossed polarisers be told from parallel ones. */
export const LARGEST_LEAK = 0.45;

function readingProblem({ power, sigma }: PowerReading, row: number, largest: number): ScanRefusal | null {
  if (!Number.isFinite(power))
    return refuseRow(
      'power',
      row,
      `a power is a finite number, got ${power}. Correct it or leave the row out.`,
    );
  if (sigma !== null && !(Number.isFinite(sigma) && sigma > 0)) {
    const what = `a σ is a finite number above 0, got ${sigma}. State what one reading scatters by (for counts at`;
    return refuseRow('sigma', row, `${what} least 1), or give no σ in any row.`);
  }
  const mostBelow = sigma === null ? MOST_SHARE_BELOW_ZERO * largest : MOST_SIGMA_BELOW_ZERO * sigma;
  if (power < -mostBelow) {
    const shown = String(power).replace('-', '−');
    const what = `the power ${shown} is below 0 by more than ${sigma === null ? 'scatter' : 'its σ'} explains.`;
    return refuseRow('power', row, `${what} Subtract the right dark level or leave the row out.`);
  }
  return null;
}

function listProblem(count: number, leftOut: readonly number[]): ScanRefusal | null {
  if (count > MOST_ROWS)
    return refuse(
      'rows',
      `A scan has at most ${MOST_ROWS} rows, this one has ${count}. Average or thin it out.`,
    );
  const strange = leftOut.find((row) => !(Number.isInteger(row) && row >= 0 && row < count));
  if (strange === undefined) return null;
  return refuse('left-out', `There is no row ${strange + 1} to leave out: the scan has ${count}.`);
}

interface ReadRow {
  readonly dialDeg: number;
  readonly readings: readonly PowerReading[];
}

/** Everything that can be wrong with a row by itself or against the first row in use. */
function rowProblem(
  { dialDeg, readings }: ReadRow,
  row: number,
  areSigmasStated: boolean,
  largest: number,
): ScanRefusal | null {
  if (!(Math.abs(dialDeg) <= LARGEST_DIAL_DEG))
    return refuseRow(
      'angle',
      row,
      `a dial angle is a number of degrees, got ${dialDeg}. Correct it or leave the row out.`,
    );
  for (const reading of readings) {
    const problem = readingProblem(reading, row, largest);
    if (problem !== null) return problem;
    if ((reading.sigma !== null) !== areSigmasStated)
      return refuseRow(
        'sigma',
        row,
        'some powers have a σ and others none. State it for all of them or for none.',
      );
  }
  return null;
}

/** Checks rows and puts them in arrays. @param asValue the value and its σ from readings over `scale`, or null without light. */
function gather(
  rows: readonly ReadRow[],
  direction: DialDirection,
  leftOut: readonly number[],
  asRatio: boolean,
): Samples | ScanRefusal {
  const problem = listProblem(rows.length, leftOut);
  if (problem !== null) return problem;
  const without = new Set(leftOut);
  const kept = rows.flatMap((row, index) => (without.has(index) ? [] : [{ row, index }]));
  const areSigmasStated = typeof kept[0]?.row.readings[0]?.sigma === 'number';
  let scale = 0;
  for (const { row } of kept) for (const { power } of row.readings) scale = Math.max(scale, Math.abs(power));
  for (const { row, index } of kept) {
    const wrong = rowProblem(row, index, areSigmasStated, scale);
    if (wrong !== null) return wrong;
  }
  const count = kept.length;
  if (count > 0 && scale === 0)
    return refuse(
      'flat',
      'Every power is 0. Check that the beam was open and the detector on, and scan again.',
    );
  const samples = {
    count,
    rows: Int32Array.from(kept, ({ index }) => index),
    angleRad: Float64Array.from(kept, ({ row }) => direction * toRadians(degrees(wrap(row.dialDeg, 360)))),
    value: new Float64Array(count),
    sigma: new Float64Array(count).fill(1),
    areSigmasStated,
    time: Float64Array.from(kept, ({ index }) => index / Math.max(1, rows.length - 1) - 0.5),
    scale: asRatio ? 1 : scale,
  };
  for (const [k, { row, index }] of kept.entries()) {
    const [first, second] = row.readings.map(({ power, sigma }) => ({
      power: power / scale,
      sigma: (sigma ?? scale) / scale,
    }));
    if (first === undefined) continue;
    for (const { sigma } of second === undefined ? [first] : [first, second])
      if (sigma < 1 / SIGMA_SPAN || sigma > SIGMA_SPAN)
        return refuseRow(
          'sigma',
          index,
          `the σ is out of all proportion to the powers. State it in their unit.`,
        );
    if (!asRatio || second === undefined) {
      samples.value[k] = first.power;
      samples.sigma[k] = first.sigma;
      continue;
    }
    const total = first.power + second.power;
    if (!(total > 0))
      return refuseRow('power', index, 'the two ports together have no light. Leave the row out.');
    samples.value[k] = first.power / total;
    if (!areSigmasStated) continue;
    // r = P⊥/(P⊥ + P∥): dr = (P∥ dP⊥ − P⊥ dP∥)/(P⊥ + P∥)².
    const [a, b] = [second.power * first.sigma, first.power * second.sigma];
    samples.sigma[k] = Math.sqrt(a * a + b * b) / (total * total);
  }
  return samples;
}

/** Rows of a scan between linear polarisers as samples of r (both ports) or of one port's power. */
export function scanSamples(
  rows: readonly ScanRow[],
  direction: DialDirection,
  leftOut: readonly number[],
): { readonly ok: true; readonly ports: Ports; readonly samples: Samples } | ScanRefusal {
  const without = new Set(leftOut);
  const first = rows.find((_, index) => !without.has(index));
  if (first === undefined)
    return refuse('rows', 'The scan has no rows in use. Measure some, or leave fewer out.');
  const [hasCrossed, hasParallel] = [first.crossed !== null, first.parallel !== null];
  if (!hasCrossed && !hasParallel)
    return refuseRow(
      'ports',
      rows.indexOf(first),
      'there is no power. Give the crossed port, the parallel one, or both.',
    );
  const other = rows.findIndex(
    (row, index) =>
      !without.has(index) &&
      ((row.crossed !== null) !== hasCrossed || (row.parallel !== null) !== hasParallel),
  );
  if (other >= 0)
    return refuseRow(
      'ports',
      other,
      'it has other ports than the first row. Give the same ports in every row.',
    );
  const read = rows.map(({ dialDeg, crossed, parallel }) => ({
    dialDeg,
    readings: [crossed, parallel].filter((reading) => reading !== null),
  }));
  const samples = gather(read, direction, leftOut, hasCrossed && hasParallel);
  if ('ok' in samples) return samples;
  return { ok: true, ports: !hasParallel ? 'crossed' : hasCrossed ? 'both' : 'parallel', samples };
}

/** What a lab notes for one setting of a plate in front of a fixed analyser. */
export interface RotatingRow extends PowerReading {
  readonly dialDeg: number;
}

export function rotatingSamples(
  rows: readonly RotatingRow[],
  direction: DialDirection,
  leftOut: readonly number[],
): Samples | ScanRefusal {
  if (rows.length <= new Set(leftOut).size)
    return refuse('rows', 'The scan has no rows in use. Measure some, or leave fewer out.');
  const read = rows.map(({ dialDeg, power, sigma }) => ({ dialDeg, readings: [{ power, sigma }] }));
  return gather(read, direction, leftOut, false);
}

/** 1/σ² of each sample. */
export function weightsOf({ sigma }: Samples): Float64Array {
  return sigma.map((one) => 1 / (one * one));
}

/** A stated share of leaked light, checked. */
export function leakProblem(leak: Stated | null): ScanRefusal | null {
  if (leak === null || (leak.value >= 0 && leak.value <= LARGEST_LEAK && isSigma(leak.sigma))) return null;
  const what = `The leak of crossed polarisers is a share from 0 to ${LARGEST_LEAK} with a σ from 0, got`;
  return refuse(
    'statement',
    `${what} ${leak.value} and ${leak.sigma}. State power crossed over power in both ports.`,
  );
}

export function isSigma(sigma: number): boolean {
  return Number.isFinite(sigma) && sigma >= 0;
}
