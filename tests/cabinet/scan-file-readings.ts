import {
  type ColumnMapping,
  readScanFile,
  type ScanFaults,
  type ScanQuestions,
  type ScanReading,
  type ScanTable,
} from '../../shared/scan-file';
import { encoded } from './scan-file-writer';

export function read(text: string, mapping: ColumnMapping | null = null): ScanReading {
  return readScanFile(encoded(text, 'utf-8'), mapping);
}

export function tableOf(text: string, mapping: ColumnMapping | null = null): ScanTable {
  const reading = read(text, mapping);
  if (reading.kind !== 'table') throw new Error(`This is no table: ${JSON.stringify(reading)}`);
  return reading;
}

export function questionsOf(text: string, mapping: ColumnMapping | null = null): ScanQuestions {
  const reading = read(text, mapping);
  if (reading.kind !== 'asks') throw new Error(`Nothing is asked: ${JSON.stringify(reading)}`);
  return reading;
}

/** "dial crossed parallel", without the port that was not read, with the σ where there are some. */
export function rowsOf({ points }: ScanTable): string[] {
  return points.map(({ dialDeg, crossed, parallel, crossedSigma, parallelSigma }) =>
    [dialDeg, crossed, parallel, crossedSigma, parallelSigma].filter((value) => value !== null).join(' '),
  );
}

const choice = (column: number | null) => (column === null ? null : { column, unit: null });

export const chosen = (dial: number, crossed: number | null, parallel: number | null): ColumnMapping => ({
  dial: { column: dial, unit: null },
  crossed: choice(crossed),
  parallel: choice(parallel),
  crossedSigma: null,
  parallelSigma: null,
});

export function faultsOf(bytes: Uint8Array): ScanFaults {
  const reading = readScanFile(bytes);
  if (reading.kind !== 'faults') throw new Error(`This was read: ${JSON.stringify(reading)}`);
  return reading;
}
