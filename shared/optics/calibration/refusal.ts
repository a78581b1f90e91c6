export type RefusalReason =
  | 'angle'
  | 'power'
  | 'sigma'
  | 'ports'
  | 'left-out'
  | 'rows'
  | 'angles'
  | 'flat'
  | 'ports-swapped'
  | 'statement'
  | 'input'
  | 'plate';

/** Why a scan gives no answer: which row where one is to blame (counted from 0), and a sentence that says what to do. */
export interface ScanRefusal {
  readonly ok: false;
  readonly reason: RefusalReason;
  /** Place among the rows handed in, counted from 0; the message counts from 1. */
  readonly row: number | null;
  readonly message: string;
}

export function refuse(reason: RefusalReason, message: string): ScanRefusal {
  return { ok: false, reason, row: null, message };
}

export function refuseRow(reason: RefusalReason, row: number, message: string): ScanRefusal {
  return { ok: false, reason, row, message: `Row ${row + 1}: ${message}` };
}
