import { z } from 'zod';
import type { Thing } from '../../../shared/permissions';
import { voidsOf } from '../../../shared/protocol/voids';
import { type Reading, type Run, runStates, type RunSummary, type VoidDials } from '../../../shared/schemas';
import type { Transaction } from '../../db/database';
import { rowsOf } from '../../db/rows';
import { unseatedPlateIds } from '../beam-changes';
import { findBench } from '../benches';
import { findVersionById } from '../protocols';

const runRow = z.object({
  id: z.string(),
  lab_id: z.string(),
  number: z.number(),
  state: z.enum(runStates),
  protocol_id: z.string(),
  protocol_name: z.string(),
  version_id: z.string(),
  version_number: z.number(),
  bench_name: z.string(),
  setting_count: z.number(),
  done_count: z.number(),
  skipped_count: z.number(),
  pause_note: z.string(),
  start_dials_deg: z.array(z.number().nullable()),
  events_recorded: z.number(),
  readings_recorded: z.number(),
  started_at: z.date(),
  started_by_name: z.string(),
  finished_at: z.date().nullable(),
});
const readingRow = z.object({
  id: z.string(),
  sequence: z.number(),
  setting_index: z.number(),
  outcome: z.enum(['done', 'skipped']),
  dialled_deg: z.array(z.number()),
  note: z.string(),
  recorded_at: z.date(),
  recorded_by_name: z.string(),
});
/** A run with what its next event or reading is numbered after. */
export interface RunRow extends Thing {
  readonly summary: RunSummary;
  readonly startDialsDeg: readonly (number | null)[];
  readonly eventsRecorded: number;
  readonly readingsRecorded: number;
}

function mapRow(unread: unknown): RunRow {
  const row = runRow.parse(unread);
  return {
    labId: row.lab_id,
    startDialsDeg: row.start_dials_deg,
    eventsRecorded: row.events_recorded,
    readingsRecorded: row.readings_recorded,
    summary: {
      id: row.id,
      number: row.number,
      state: row.state,
      protocolId: row.protocol_id,
      protocolName: row.protocol_name,
      versionId: row.version_id,
      versionNumber: row.version_number,
      benchName: row.bench_name,
      settingCount: row.setting_count,
      doneCount: row.done_count,
      skippedCount: row.skipped_count,
      pauseNote: row.pause_note,
      startedAt: row.started_at.toISOString(),
      startedBy: row.started_by_name,
      finishedAt: row.finished_at?.toISOString() ?? null,
    },
  };
}

// The last reading of a setting is the one that counts. The bench goes by the name it had in the version.
const runQuery = `
  select r.id, r.lab_id, r.number, r.state, v.protocol_id, v.protocol_name, r.version_id, v.number as version_number,
    v.bench_name, r.setting_count, r.pause_note, r.start_dials_deg,
    r.events_recorded, r.readings_recorded, r.started_at, u.name as started_by_name, r.finished_at,
    coalesce(counted.done, 0) as done_count, coalesce(counted.skipped, 0) as skipped_count
  from runs r
  join versions v on v.lab_id = r.lab_id and v.id = r.version_id
  join users u on u.id = r.started_by
  left join lateral (
    select (count(*) filter (where outcome = 'done'))::integer as done,
      (count(*) filter (where outcome = 'skipped'))::integer as skipped
    from (select distinct on (setting_index) outcome from readings
      where lab_id = r.lab_id and run_id = r.id order by setting_index, sequence desc) last
  ) counted on true
  where r.lab_id = ?`;

/** A lab's runs, newest first; with a limit, one more than it is asked for tells whether there are others. */
export async function listRuns(
  transaction: Transaction,
  labId: string,
  page: { readonly before: number | null; readonly limit: number },
): Promise<RunRow[]> {
  const found: unknown = await transaction.raw(
    `${runQuery} and r.number < ? order by r.number desc limit ?`,
    [labId, page.before ?? 2_147_483_647, page.limit],
  );
  return rowsOf(found).map(mapRow);
}

export async function findRun(
  transaction: Transaction,
  { labId, runId }: { readonly labId: string; readonly runId: string },
): Promise<RunRow | null> {
  const found: unknown = await transaction.raw(`${runQuery} and r.id = ?`, [labId, runId]);
  const [row] = rowsOf(found);
  return row === undefined ? null : mapRow(row);
}

/** As `findRun`, and nobody else records or changes anything of it until the transaction ends. */
export async function findRunToChange(
  transaction: Transaction,
  key: { readonly labId: string; readonly runId: string },
): Promise<RunRow | null> {
  await transaction('runs').where({ lab_id: key.labId, id: key.runId }).forUpdate().select('id');
  return findRun(transaction, key);
}

async function listReadings(transaction: Transaction, labId: string, runId: string): Promise<Reading[]> {
  const rows: unknown[] = await transaction('readings')
    .join('users', 'users.id', 'readings.recorded_by')
    .where({ 'readings.lab_id': labId, 'readings.run_id': runId })
    .orderBy('readings.sequence')
    .select('readings.*', 'users.name as recorded_by_name');
  return z
    .array(readingRow)
    .parse(rows)
    .map((row) => ({
      id: row.id,
      sequence: row.sequence,
      settingIndex: row.setting_index,
      outcome: row.outcome,
      dialledDeg: row.dialled_deg,
      note: row.note,
      recordedAt: row.recorded_at.toISOString(),
      recordedBy: row.recorded_by_name,
    }));
}

/** The run as it stands now, with all its readings and what became void of its dials. */
export async function runAsItStands(
  transaction: Transaction,
  key: { readonly labId: string; readonly runId: string },
): Promise<Run> {
  const run = await findRun(transaction, key);
  if (run === null) throw new Error('a run that was just written is not there');
  return {
    summary: run.summary,
    startDialsDeg: [...run.startDialsDeg],
    readings: await listReadings(transaction, key.labId, key.runId),
    voids: run.summary.state === 'finished' ? [] : await voidsOfRun(transaction, run),
  };
}

async function voidsOfRun(transaction: Transaction, { labId, summary }: RunRow): Promise<VoidDials[]> {
  const version = await findVersionById(transaction, labId, summary.versionId);
  const bench =
    version === null ? null : await findBench(transaction, { labId, benchId: version.content.bench.id });
  if (version === null || bench === null)
    throw new Error("a run's version and bench are there by foreign key");
  const { content } = version;
  return voidsOf(content, { bench, unseatedPlateIds: await unseatedPlateIds(transaction, labId, content) });
}
