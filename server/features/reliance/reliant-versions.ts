import { z } from 'zod';
import type { RelianceReport, ReliantVersion } from '../../../shared/schemas';
import type { Transaction } from '../../db/database';
import { rowsOf } from '../../db/rows';
import { isNewestVersion } from '../beam-changes';
import { readReport } from './report-store';

const versionRow = z.object({
  id: z.string(),
  protocol_id: z.string(),
  protocol_name: z.string(),
  number: z.number(),
  bench_name: z.string(),
  draft_revision: z.number(),
  waiting: z.boolean().nullable(),
  done: z.number().nullable(),
  total: z.number().nullable(),
  report: z.string().nullable(),
});
const staleRow = z.object({ bench_id: z.string(), bench_name: z.string(), report: z.string() });
const draftRow = z.object({
  protocol_id: z.string(),
  name: z.string(),
  bench_name: z.string(),
  target_count: z.number(),
});
/** Most that one page shows of a plate. */
const mostShown = 200;

/** The newest versions that name a plate, the stale ones first. */
export async function reliantVersions(
  transaction: Transaction,
  labId: string,
  plateId: string,
): Promise<ReliantVersion[]> {
  const found: unknown = await transaction.raw(
    `select v.id, v.protocol_id, v.protocol_name, v.number, v.bench_name, d.revision as draft_revision,
        r.waiting, r.done, r.total, r.report
      from version_plates vp
      join versions v on v.lab_id = vp.lab_id and v.id = vp.version_id
      join drafts d on d.lab_id = v.lab_id and d.protocol_id = v.protocol_id
      left join reliance_reports r on r.lab_id = v.lab_id and r.version_id = v.id
      where vp.lab_id = ? and vp.plate_id = ? and ${isNewestVersion}
      order by coalesce(r.stale, false) desc, v.protocol_name, v.id limit ${mostShown}`,
    [labId, plateId],
  );
  return z
    .array(versionRow)
    .parse(rowsOf(found))
    .map((row) => ({
      versionId: row.id,
      protocolId: row.protocol_id,
      protocolName: row.protocol_name,
      number: row.number,
      benchName: row.bench_name,
      draftRevision: row.draft_revision,
      progress: row.waiting === true ? { done: row.done ?? 0, total: row.total ?? 0 } : null,
      report: readReport(row.report),
    }));
}

/** Protocols whose draft is for a bench that has a plate in its beam. */
export async function reliantDrafts(transaction: Transaction, labId: string, plateId: string) {
  const found: unknown = await transaction.raw(
    `select d.protocol_id, d.name, b.name as bench_name, d.target_count from drafts d
      join benches b on b.lab_id = d.lab_id and b.id = d.bench_id
      where d.lab_id = ? and exists (select 1 from bench_plates bp where bp.lab_id = d.lab_id
        and bp.bench_id = d.bench_id and bp.plate_id = ? and bp.live and bp.part = 'preparation')
      order by d.name, d.protocol_id limit ${mostShown}`,
    [labId, plateId],
  );
  return z
    .array(draftRow)
    .parse(rowsOf(found))
    .map((row) => ({
      protocolId: row.protocol_id,
      protocolName: row.name,
      benchName: row.bench_name,
      targetCount: row.target_count,
    }));
}

/** A newest version that something it relies on has left behind. */
export interface StaleVersion {
  readonly bench: { readonly id: string; readonly name: string };
  readonly report: RelianceReport;
}

export async function staleVersions(transaction: Transaction, labId: string): Promise<StaleVersion[]> {
  const found: unknown = await transaction.raw(
    `select v.bench_id, v.bench_name, r.report from reliance_reports r
      join versions v on v.lab_id = r.lab_id and v.id = r.version_id
      where r.lab_id = ? and r.stale and ${isNewestVersion} order by v.protocol_name, v.id limit ${mostShown}`,
    [labId],
  );
  return z
    .array(staleRow)
    .parse(rowsOf(found))
    .flatMap(({ bench_id, bench_name, report }) => {
      const read = readReport(report);
      return read === null ? [] : [{ bench: { id: bench_id, name: bench_name }, report: read }];
    });
}
