import { z } from 'zod';
import { type RelianceReport, relianceReportSchema } from '../../../shared/schemas';
import type { Transaction } from '../../db/database';
import { rowsOf } from '../../db/rows';
import { isNewestVersion } from '../beam-changes';

const reportRow = z.object({ signature: z.string().nullable(), report: z.string().nullable() });
const idRows = z.array(z.object({ id: z.string() }));

interface ReportKey {
  readonly labId: string;
  readonly versionId: string;
}

interface StoredReport {
  readonly signature: string | null;
  readonly report: RelianceReport | null;
}

export function readReport(text: string | null): RelianceReport | null {
  return text === null ? null : relianceReportSchema.parse(JSON.parse(text));
}

function rowOf(transaction: Transaction, { labId, versionId }: ReportKey) {
  return transaction('reliance_reports').where({ lab_id: labId, version_id: versionId });
}

/** The newest version of each protocol of a lab, or those of the versions asked for that nobody has saved another after. */
export async function newestVersionIds(
  transaction: Transaction,
  labId: string,
  among: readonly string[] | null,
): Promise<string[]> {
  const found: unknown = await transaction.raw(
    `select v.id from versions v where v.lab_id = :labId and ${isNewestVersion}
      ${among === null ? '' : 'and v.id = any(:among)'} order by v.id`,
    { labId, among: among === null ? null : [...among] },
  );
  return idRows.parse(rowsOf(found)).map(({ id }) => id);
}

/** The report as it is, and nobody else writes it until the transaction ends; makes its row where there is none. */
export async function holdReport(
  transaction: Transaction,
  key: ReportKey,
  total: number,
): Promise<StoredReport> {
  await transaction('reliance_reports')
    .insert({ lab_id: key.labId, version_id: key.versionId, waiting: true, done: 0, total })
    .onConflict('version_id')
    .ignore();
  const row = reportRow.parse(await rowOf(transaction, key).forUpdate().first('signature', 'report'));
  return { signature: row.signature, report: readReport(row.report) };
}

export async function saveProgress(transaction: Transaction, key: ReportKey, done: number): Promise<void> {
  await rowOf(transaction, key).update({ waiting: true, done });
}

/** What was worked out before holds, or a newer version stands in this one's place. */
export async function nothingToDo(transaction: Transaction, key: ReportKey): Promise<void> {
  await rowOf(transaction, key).update({ waiting: false });
}

export async function saveReport(
  transaction: Transaction,
  key: ReportKey,
  {
    report,
    ...rest
  }: {
    readonly report: RelianceReport;
    readonly signature: string;
    readonly leftBy: string | null;
    readonly at: Date;
  },
): Promise<void> {
  const total = report.targets.length;
  await rowOf(transaction, key).update({
    waiting: false,
    done: total,
    total,
    computed_at: rest.at,
    signature: rest.signature,
    report: JSON.stringify(report),
    stale: report.stale,
    left_by: rest.leftBy,
  });
}
