import { createHash } from 'node:crypto';
import {
  type CabinetDocument,
  type FileFault,
  type ImportPlan,
  type ImportRequest,
  readCabinet,
} from '../../../shared/cabinet-document';
import { canonicalJson } from '../../../shared/protocol/canonical-json';
import { type FieldFault, ProblemError } from '../../errors';

/** @throws ProblemError 422 with every fault of the file, each under its row and column. */
export function readImport({ fileText, format }: ImportRequest, now: Date): CabinetDocument {
  const reading = readCabinet(fileText, format, now);
  if (reading.ok) return reading.document;
  const fields = reading.faults.map(asField);
  const [first] = reading.faults;
  const many = reading.faults.length > 1;
  const detail = many
    ? `The file has ${reading.faults.length} faults, and nothing of it was imported.`
    : `${first?.message ?? ''} Nothing of the file was imported.`;
  throw new ProblemError('unreadable-file', 422, detail, { fields });
}

/** `rows.3.retardance_deg` for CSV, `plates.0.seats.1.leftAt` for JSON, nothing for the whole file. */
function asField({ row, column, message }: FileFault): FieldFault {
  const parts = [...(row === null ? [] : ['rows', String(row)]), ...(column === null ? [] : [column])];
  return { path: parts.join('.'), message };
}

export const sha256 = (text: string): string => createHash('sha256').update(text).digest('hex');

/** The plan that was shown, as one text: an import that would do anything else has another. */
export const planHash = (plan: ImportPlan): string => sha256(canonicalJson(plan));
