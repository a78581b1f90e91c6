import { fitScan } from '../../shared/scan-calibration';
import type { Lab, RecordScan, ScanColumns } from '../../shared/schemas';
import type { AuditEntry } from '../../server/audit/record-event';
import type { Transaction } from '../../server/db/database';
import {
  calibrationOfScan,
  insertCalibration,
  readScan,
  rememberColumns,
  type StoredPlate,
} from '../../server/features/cabinet';
import { findFile, insertFile } from '../../server/features/files';

/** A scan between polarisers that a story tells of. */
export interface ToldScan {
  readonly name: string;
  readonly text: string;
  readonly columns: ScanColumns;
  readonly wavelengthNm: number;
  readonly temperatureC: number;
  readonly measuredAt: Date;
}

interface Place {
  readonly labId: string;
  readonly userId: string;
  readonly now: Date;
}

const bytesOf = ({ text }: ToldScan) => Buffer.from(text, 'utf8');

export async function uploadScan(
  transaction: Transaction,
  place: Place,
  scan: ToldScan,
): Promise<AuditEntry & { readonly subjectId: string }> {
  const file = { name: scan.name, mediaType: 'text/plain' as const, bytes: bytesOf(scan) };
  const fileId = await insertFile(transaction, place, file);
  const stored = await findFile(transaction, { labId: place.labId, fileId });
  if (stored === null) throw new Error('a file that was just stored is not there');
  const { labId: _labId, ...shown } = stored;
  return { kind: 'file.uploaded', subjectId: fileId, details: { file: shown } };
}

/** Records what the fit says of an uploaded scan, as its page would. */
export async function recordScan(
  transaction: Transaction,
  place: Place & { readonly lab: Lab },
  plate: StoredPlate,
  fileId: string,
  scan: ToldScan,
): Promise<AuditEntry> {
  const { seat } = plate;
  if (seat === null) throw new Error('a plate is scanned in a seat');
  const seated = { ...plate, seat };
  const request = requestOf(seated, fileId, scan);
  const read = await readScan(transaction, place.lab, seated, request);
  const { calibration, record, signature } = calibrationOfScan(read, request);
  const stored = { fileId, fit: record };
  const calibrationId = await insertCalibration(transaction, place, seat.id, calibration, stored);
  await rememberColumns(transaction, place, signature, request.columns);
  const details = { calibrationId, calibration, fileId, leftOut: [] };
  return { kind: 'plate.scanned', subjectId: plate.id, details };
}

function requestOf(
  plate: StoredPlate & { readonly seat: NonNullable<StoredPlate['seat']> },
  fileId: string,
  scan: ToldScan,
): RecordScan {
  const { columns, wavelengthNm, temperatureC } = scan;
  const light = { kind: 'linear', extinction: null, power: null } as const;
  const answer = fitScan({
    bytes: bytesOf(scan),
    plate,
    light,
    wavelengthNm,
    temperatureC,
    columns,
    leftOutLines: [],
    direction: plate.seat.mount.direction,
    measuredBefore: null,
  });
  if (answer.kind !== 'fitted') throw new Error(`${scan.name} cannot be fitted`);
  const { offsetDeg, retardance } = answer.values;
  return {
    fileId,
    columns,
    light,
    wavelengthNm,
    temperatureC,
    leftOut: [],
    measuredAt: scan.measuredAt.toISOString(),
    note: '',
    settlesId: null,
    shown: { offsetDeg, retardanceDeg: retardance?.deg ?? null },
  };
}
