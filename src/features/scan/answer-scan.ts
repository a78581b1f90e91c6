import type { LinearScanFit } from '../../../shared/optics/calibration';
import { fitScan, type ScanAnswer, type ScanToFit } from '../../../shared/scan-calibration';
import {
  type ColumnMapping,
  readScanFile,
  type ScanReading,
  type Understood,
} from '../../../shared/scan-file';

/** A scan to be read, and fitted where it is said how the light went. */
export interface ScanRequest {
  readonly bytes: Uint8Array;
  /** Null: as the file itself says. */
  readonly columns: ColumnMapping | null;
  /** Then a power has no port, and the one column beside the dial is it. */
  readonly isKnownLight: boolean;
  /** Null: to be read only. */
  readonly fit: Omit<ScanToFit, 'bytes' | 'columns'> | null;
  /** A recorded scan between polarisers that is taken together with this one. */
  readonly earlier: ScanToFit | null;
}

export type ScanReply = ScanReading | ScanAnswer | { readonly kind: 'failed'; readonly sentence: string };

/** What the worker answers. */
export function answerScan({ bytes, isKnownLight, fit, earlier, ...request }: ScanRequest): ScanReply {
  const columns = request.columns ?? (isKnownLight ? onePower(bytes) : null);
  if (fit === null) return readScanFile(bytes, columns);
  const { light } = fit;
  if (light.kind === 'linear') return fitScan({ ...fit, bytes, columns });
  const before = earlier === null ? null : earlierFit(earlier);
  if (before === undefined) {
    return {
      kind: 'failed',
      sentence: 'The scan of before can’t be fitted as one between polarisers. Take this scan by itself.',
    };
  }
  return fitScan({ ...fit, bytes, columns, light: { ...light, before } });
}

function earlierFit(earlier: ScanToFit): LinearScanFit | undefined {
  const answer = fitScan(earlier);
  return answer.kind === 'fitted' && answer.found.kind === 'linear' ? answer.found.fit : undefined;
}

/** The one column beside the dial as the power. Null where there is none, or several: as the file itself says. */
function onePower(bytes: Uint8Array): ColumnMapping | null {
  const reading = readScanFile(bytes);
  return reading.kind === 'asks' ? onePowerOf(reading) : null;
}

function onePowerOf({ proposal, preview }: Understood): ColumnMapping | null {
  const { dial, crossed, parallel } = proposal.columns;
  if (dial === null || crossed !== null || parallel !== null) return null;
  const taken = Object.values(proposal.columns);
  const [power, another] = preview.columns.map((_, at) => at).filter((at) => !taken.includes(at));
  if (power === undefined || another !== undefined) return null;
  return {
    dial: { column: dial, unit: null },
    crossed: { column: power, unit: null },
    parallel: null,
    crossedSigma: null,
    parallelSigma: null,
  };
}
