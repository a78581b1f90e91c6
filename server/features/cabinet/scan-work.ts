import { canonicalJson } from '../../../shared/protocol/canonical-json';
import { parseState } from '../../../shared/optics/expression';
import type { LinearScanFit } from '../../../shared/optics/calibration';
import type { Stokes } from '../../../shared/optics/stokes';
import {
  asMeasuredBefore,
  fitScan,
  recordedScan,
  recordProblem,
  type ScanAnswer,
  type ScanLight,
} from '../../../shared/scan-calibration';
import { describeFault, type ScanTable } from '../../../shared/scan-file';
import {
  type CalibrationInput,
  type Lab,
  type RecordScan,
  type ScanLightInput,
  type ScanRecord,
  scanRecordSchema,
  type SeatedCalibration,
} from '../../../shared/schemas';
import type { Transaction } from '../../db/database';
import { conflict, refused } from '../../errors';
import { findFile, readBytes } from '../files';
import { findCalibration, listCalibrations } from './calibration-store';
import type { StoredPlate } from './plate-rows';

/** All that a scan's fit needs, read in one transaction; the fit itself runs in none. */
export interface ReadScan {
  readonly plate: StoredPlate;
  readonly direction: 1 | -1;
  readonly bytes: Uint8Array;
  readonly fileName: string;
  readonly light: ScanLight;
  readonly input: Stokes | null;
  readonly before: SeatedCalibration | null;
}

type Seated = StoredPlate & { readonly seat: NonNullable<StoredPlate['seat']> };

/** @throws ProblemError 422 at what of the request names nothing that can be used. */
export async function readScan(
  transaction: Transaction,
  lab: Lab,
  plate: Seated,
  scan: RecordScan,
): Promise<ReadScan> {
  const key = { labId: lab.id, fileId: scan.fileId };
  const file = await findFile(transaction, key);
  if (file === null) {
    throw refused([{ path: 'fileId', message: 'There is no such file in this lab. Upload it first.' }]);
  }
  if (file.mediaType !== 'text/plain') {
    throw refused([{ path: 'fileId', message: `${file.name} is no text. Upload the scan as CSV.` }]);
  }
  const { light, input } = await readLight(transaction, lab, plate, scan.light);
  const [before = null] = await listCalibrations(transaction, { labId: lab.id, plateId: plate.id });
  return {
    plate,
    direction: plate.seat.mount.direction,
    bytes: await readBytes(transaction, key),
    fileName: file.name,
    light,
    input,
    before,
  };
}

async function readLight(
  transaction: Transaction,
  lab: Lab,
  plate: Seated,
  light: ScanLightInput,
): Promise<{ readonly light: ScanLight; readonly input: Stokes | null }> {
  if (light.kind === 'linear') return { light, input: null };
  const read = parseState(light.inputExpression, lab.convention);
  if (!read.ok) {
    throw refused([
      { path: 'light.inputExpression', message: `Column ${read.error.column}: ${read.error.message}` },
    ]);
  }
  const before = light.beforeId === null ? null : await earlierScan(transaction, lab, plate, light.beforeId);
  const { analyserDeg, extinction } = light;
  return {
    light: { kind: 'known', input: read.stokes, analyserDeg, extinction, before },
    input: read.stokes,
  };
}

/** The fit of a recorded scan between polarisers, made again from its file: the same bits, since nothing of it is changed. */
async function earlierScan(
  transaction: Transaction,
  lab: Lab,
  plate: Seated,
  calibrationId: string,
): Promise<LinearScanFit> {
  const path = 'light.beforeId';
  const found = await findCalibration(transaction, { labId: lab.id, plateId: plate.id, calibrationId });
  if (found?.seatId !== plate.seat.id || found.fit === null || found.calibration.fileId === null) {
    throw refused([
      { path, message: 'This is no scan of the present seat. Choose one, or take this scan by itself.' },
    ]);
  }
  const record = scanRecordSchema.parse(JSON.parse(found.fit));
  if (record.light.kind !== 'linear') {
    throw refused([{ path, message: 'The scan before has to be one between polarisers. Choose another.' }]);
  }
  const bytes = await readBytes(transaction, { labId: lab.id, fileId: found.calibration.fileId });
  const answer = fitScan(recordedScan(found.calibration, record, bytes, plate));
  if (answer.kind !== 'fitted' || answer.found.kind !== 'linear') {
    throw new Error('a scan that was recorded can no longer be fitted');
  }
  return answer.found.fit;
}

/** A calibration as a scan gives it, and the record that is kept beside it. */
export interface FittedCalibration {
  readonly calibration: CalibrationInput;
  readonly record: string;
  /** Of the file's head, for the lab's memory of its columns. */
  readonly signature: string;
}

/**
 * Fits a scan.
 * @throws ProblemError 422 with the lines at fault, or where the page showed other numbers; 409 where a number is wanting.
 */
export function calibrationOfScan(read: ReadScan, scan: RecordScan): FittedCalibration {
  const { plate, before } = read;
  const answer = fitScan({
    bytes: read.bytes,
    columns: scan.columns,
    light: read.light,
    leftOutLines: scan.leftOut.map(({ line }) => line),
    plate,
    direction: read.direction,
    wavelengthNm: scan.wavelengthNm,
    temperatureC: scan.temperatureC,
    measuredBefore: before === null ? null : asMeasuredBefore(before),
  });
  if (answer.kind !== 'fitted') throw unreadable(answer);
  requireLines(answer.table, scan.leftOut);
  const problem = recordProblem(answer);
  if (problem !== null) throw refused([{ path: 'light', message: problem }]);
  const { values, found } = answer;
  const { shown } = scan;
  if (
    shown.offsetDeg !== values.offsetDeg ||
    shown.retardanceDeg !== (values.retardance === null ? null : values.retardance.deg)
  ) {
    throw refused([
      {
        path: 'shown',
        message:
          'The server fits other numbers than this page shows. Load the page again, look at the fit, and record it then.',
      },
    ]);
  }
  const taken =
    values.retardance ??
    (before === null ? null : { deg: before.retardanceDeg, sigmaDeg: before.retardanceSigmaDeg });
  if (taken === null) {
    throw conflict(
      'no-retardance',
      `This scan tells the zero only, and ${plate.name} has no earlier calibration to take the retardance from. State the power that enters, or scan both ports.`,
    );
  }
  const record: ScanRecord = {
    format: 'quarterturn.scan/1',
    columns: scan.columns,
    light: scan.light,
    inputStokes: read.input === null ? null : [...read.input],
    direction: read.direction,
    leftOut: scan.leftOut,
    retardanceFrom: values.retardance === null ? 'before' : 'scan',
    pointCount: answer.table.points.length - scan.leftOut.length,
    chiSquared: found.fit.chiSquared,
    degreesOfFreedom: found.fit.degreesOfFreedom,
    sigmaFrom: found.fit.sigmaFrom,
    parameters: found.fit.parameters,
    covarianceOf: [...found.fit.covarianceOf],
    covariance: found.fit.covariance.map((row) => [...row]),
  };
  return {
    calibration: {
      wavelengthNm: scan.wavelengthNm,
      temperatureC: scan.temperatureC,
      retardanceDeg: taken.deg,
      retardanceSigmaDeg: taken.sigmaDeg,
      offsetDeg: values.offsetDeg,
      offsetSigmaDeg: values.offsetSigmaDeg,
      method: methodOf(answer, record.pointCount),
      note: scan.note,
      openQuestions: [...values.openQuestions],
      settlesId: scan.settlesId,
      measuredAt: scan.measuredAt,
    },
    record: canonicalJson(record),
    signature: answer.table.signature,
  };
}

/** A record of lines left out is about lines that are there, each once. */
function requireLines({ points }: ScanTable, leftOut: RecordScan['leftOut']): void {
  const lines = new Set(points.map(({ line }) => line));
  const faults = leftOut.flatMap(({ line }, place) =>
    lines.delete(line)
      ? []
      : [
          {
            path: `leftOut.${place}.line`,
            message: `Line ${line} is no row of this scan, or is left out twice. Look at the lines left out again.`,
          },
        ],
  );
  if (faults.length > 0) throw refused(faults);
}

function unreadable(answer: Exclude<ScanAnswer, { kind: 'fitted' }>) {
  if (answer.kind === 'refused') return refused([{ path: 'fileId', message: answer.message }]);
  if (answer.kind === 'asks') {
    return refused(answer.questions.map((message) => ({ path: 'columns', message })));
  }
  const more = answer.moreFaults === 0 ? [] : [`And ${answer.moreFaults} more faults like these.`];
  return refused(
    [...answer.faults.map(describeFault), ...more].map((message) => ({ path: 'fileId', message })),
  );
}

const between = { both: 'crossed and parallel', crossed: 'crossed', parallel: 'parallel' } as const;

function methodOf({ found }: Extract<ScanAnswer, { kind: 'fitted' }>, count: number): string {
  return found.kind === 'linear'
    ? `scan between ${between[found.fit.ports]} polarisers, ${count} points`
    : `scan behind known light, ${count} points`;
}
