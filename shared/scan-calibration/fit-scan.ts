import {
  distanceFromModel,
  fitLinearScan,
  fitRotatingScan,
  type LinearScanFit,
  type OpenQuestion as ScanQuestion,
  type Prediction,
  type RetardanceDistance,
  type RotatingScanFit,
  type ScanRefusal,
  type Stated,
} from '../optics/calibration';
import type { Stokes } from '../optics/stokes';
import {
  type ColumnMapping,
  readScanFile,
  type ScanPoint,
  type ScanReading,
  type ScanTable,
} from '../scan-file';
import type { OpenQuestion } from '../schemas/calibrations';
import { type DescribedPlate, type MeasuredBefore, nominalRetardance, predictedRetardance } from './nominal';

/** How the light went when a plate was scanned, as far as a fit needs it. */
export type ScanLight =
  | {
      readonly kind: 'linear';
      /** Power let through crossed over parallel, without a plate; null where nobody stated it. */
      readonly extinction: Stated | null;
      /** Of both ports together, in the file's unit; of use where only one was read. */
      readonly power: Stated | null;
    }
  | {
      readonly kind: 'known';
      /** Canonical. */
      readonly input: Stokes;
      /** Of the analyser behind the plate, counter-clockwise from H. */
      readonly analyserDeg: number;
      readonly extinction: Stated | null;
      /** A scan between polarisers of the same seat, to be taken together with this one. */
      readonly before: LinearScanFit | null;
    };

export interface ScanToFit {
  readonly bytes: Uint8Array;
  /** Null: as the file itself says. */
  readonly columns: ColumnMapping | null;
  readonly light: ScanLight;
  /** Lines of the file that a person left out. */
  readonly leftOutLines: readonly number[];
  readonly plate: DescribedPlate;
  readonly direction: 1 | -1;
  readonly wavelengthNm: number;
  readonly temperatureC: number | null;
  /** The plate's newest calibration in whatever seat, for a plate that is neither half nor quarter wave. */
  readonly measuredBefore: MeasuredBefore | null;
}

export type ScanFit =
  | { readonly kind: 'linear'; readonly fit: LinearScanFit }
  | { readonly kind: 'known'; readonly fit: RotatingScanFit };

/** The numbers of a calibration as a scan gives them. */
export interface ScanValues {
  readonly offsetDeg: number;
  readonly offsetSigmaDeg: number;
  /** Null where the scan cannot tell it. */
  readonly retardance: { readonly deg: number; readonly sigmaDeg: number } | null;
  readonly openQuestions: readonly OpenQuestion[];
}

export type ScanAnswer =
  | Exclude<ScanReading, ScanTable>
  | {
      readonly kind: 'refused';
      readonly table: ScanTable;
      /** The line of the file that is to blame, where one is. */
      readonly line: number | null;
      readonly message: string;
    }
  | {
      readonly kind: 'fitted';
      readonly table: ScanTable;
      readonly found: ScanFit;
      readonly values: ScanValues;
      readonly prediction: Prediction;
      /** Null where there is no prediction or no retardance. */
      readonly distance: RetardanceDistance | null;
    };

/** A scan's file read and fitted for a plate in its mount: what page and server both show and record. Never throws. */
export function fitScan(scan: ScanToFit): ScanAnswer {
  const table = readScanFile(scan.bytes, scan.columns);
  if (table.kind !== 'table') return table;
  const found = fitPoints(table.points, scan);
  if (!('fit' in found)) {
    const at = found.row === null ? undefined : table.points[found.row];
    return { kind: 'refused', table, line: at?.line ?? null, message: inLines(found, at) };
  }
  const { fit } = found;
  const prediction = predictedRetardance(scan.plate, scan);
  const values: ScanValues = {
    offsetDeg: fit.offset.offsetDeg,
    offsetSigmaDeg: fit.offset.sigmaDeg,
    retardance:
      fit.retardance === null
        ? null
        : { deg: fit.retardance.retardanceDeg, sigmaDeg: fit.retardance.sigmaDeg },
    openQuestions: recorded(fit.open),
  };
  const { retardance } = values;
  const distance =
    prediction.ok && retardance !== null
      ? distanceFromModel(
          { value: retardance.deg, sigma: retardance.sigmaDeg },
          { value: prediction.retardanceDeg, sigma: prediction.sigmaDeg },
          values.openQuestions.includes('branch'),
        )
      : null;
  return { kind: 'fitted', table, found, values, prediction, distance };
}

function fitPoints(points: readonly ScanPoint[], scan: ScanToFit): ScanFit | ScanRefusal {
  const { light, direction, plate } = scan;
  const without = new Set(scan.leftOutLines);
  const leftOut = points.flatMap(({ line }, row) => (without.has(line) ? [row] : []));
  const nominal = nominalRetardance(plate, scan, scan.measuredBefore);
  if (light.kind === 'linear') {
    const rows = points.map(({ dialDeg, crossed, parallel, crossedSigma, parallelSigma }) => ({
      dialDeg,
      crossed: crossed === null ? null : { power: crossed, sigma: crossedSigma },
      parallel: parallel === null ? null : { power: parallel, sigma: parallelSigma },
    }));
    const leak = light.extinction === null ? null : leakOf(light.extinction);
    const fit = fitLinearScan({ rows, direction, leak, power: light.power, nominal, leftOut });
    return fit.ok ? { kind: 'linear', fit } : fit;
  }
  const rows = points.map((point) => ({
    dialDeg: point.dialDeg,
    power: point.crossed ?? point.parallel ?? Number.NaN,
    sigma: point.crossed === null ? point.parallelSigma : point.crossedSigma,
  }));
  const { input, analyserDeg, before, extinction } = light;
  const fit = fitRotatingScan({
    rows,
    direction,
    input,
    analyserDeg,
    leak: extinction,
    before,
    nominal,
    leftOut,
  });
  return fit.ok ? { kind: 'known', fit } : fit;
}

/** The crossed port's share of both, ε/(1 + ε), of an extinction ε = P⊥/P∥. */
function leakOf({ value, sigma }: Stated): Stated {
  return { value: value / (1 + value), sigma: sigma / ((1 + value) * (1 + value)) };
}

/** The library counts rows; a person looks for a line of the file. */
function inLines({ row, message }: ScanRefusal, point: ScanPoint | undefined): string {
  return row === null || point === undefined
    ? message
    : message.replace(`Row ${row + 1}:`, `Line ${point.line}:`);
}

/** The questions that a calibration carries; one that leaves the retardance untold is no calibration by itself. */
function recorded(open: readonly ScanQuestion[]): OpenQuestion[] {
  return (['axis', 'branch', 'blind'] as const).filter((kind) => open.some((one) => one.kind === kind));
}

/** Whether a scan's answer can be recorded, or why not in a sentence. */
export function recordProblem(answer: Extract<ScanAnswer, { kind: 'fitted' }>): string | null {
  const supplement = answer.found.fit.open.some(({ kind }) => kind === 'supplement');
  return supplement
    ? 'This light tells δ from 180° − δ by nothing. Scan behind elliptical light, or take a scan between polarisers together with this one.'
    : null;
}
