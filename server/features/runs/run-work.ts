import { z } from 'zod';
import { dialledInfidelity } from '../../../shared/protocol/dialled';
import { type RunEvent, type RunState, transition } from '../../../shared/protocol/run-life';
import type { RecordReading, StartRun, Version } from '../../../shared/schemas';
import { listed } from '../../../shared/words';
import type { Transaction } from '../../db/database';
import { newId } from '../../db/new-id';
import { conflict, refused } from '../../errors';
import { unseatedPlateIds } from '../beam-changes';
import type { RunRow } from './run-store';

/** Who does it and when; the seeds say another time than now. */
interface Doing {
  readonly labId: string;
  readonly userId: string;
  readonly at: Date;
}

const numberRow = z.object({ runs_started: z.number() });
const benchRow = z.object({ name: z.string(), retired_at: z.date().nullable() });

/**
 * Begins a run of a version.
 * @throws ProblemError 422 where the dials do not fit its bench, or are void and nobody said that they know; 409 where that
 * bench is retired.
 */
export async function startRun(
  transaction: Transaction,
  { labId, userId, at }: Doing,
  version: Version,
  input: Pick<StartRun, 'startDialsDeg' | 'staleAcknowledged'>,
): Promise<string> {
  const plates = version.content.bench.plates.length;
  if (input.startDialsDeg.length !== plates) {
    throw refused([
      {
        path: 'startDialsDeg',
        message: `The bench has ${plates} dials. Give a reading, or nothing, for each.`,
      },
    ]);
  }
  if (!input.staleAcknowledged) await requireSeats(transaction, labId, version);
  const [counted] = z
    .array(numberRow)
    .parse(
      await transaction('labs').where({ id: labId }).increment('runs_started', 1).returning('runs_started'),
    );
  if (counted === undefined) throw new Error('the lab of a run is not there');
  await requireBenchInUse(transaction, labId, version.content.bench.id);
  const id = newId(at);
  await transaction('runs').insert({
    id,
    lab_id: labId,
    number: counted.runs_started,
    version_id: version.summary.id,
    state: 'running',
    setting_count: version.content.targets.length,
    start_dials_deg: input.startDialsDeg,
    events_recorded: 1,
    started_at: at,
    started_by: userId,
  });
  await insertEvent(transaction, { labId, userId, at }, id, 1, 'started', '');
  return id;
}

/** A zero holds for one seat: dials that were worked out with a seat that has ended point anywhere. */
async function requireSeats(transaction: Transaction, labId: string, version: Version): Promise<void> {
  const unseated = await unseatedPlateIds(transaction, labId, version.content);
  const names = version.content.bench.plates.filter(({ id }) => unseated.has(id)).map(({ name }) => name);
  if (names.length === 0) return;
  throw refused([
    {
      path: 'staleAcknowledged',
      message: `${listed(names)} ${names.length === 1 ? 'has' : 'have'} left the seat that version ${version.summary.number} was worked out for, so ${names.length === 1 ? 'its' : 'their'} dials are void. Save a new version, or say that this is known.`,
    },
  ]);
}

/** Held, so that the bench is not retired between this look and the run's own row; the lab's row is taken before it. */
async function requireBenchInUse(transaction: Transaction, labId: string, benchId: string): Promise<void> {
  const { name, retired_at } = benchRow.parse(
    await transaction('benches').where({ lab_id: labId, id: benchId }).forShare().first('name', 'retired_at'),
  );
  if (retired_at === null) return;
  throw conflict('bench-retired', `${name} is retired. Return it to use before a run is started there.`);
}

/** What a transition allows. @throws ProblemError 409 with the reason where it does not. */
function nextState(run: RunRow, event: RunEvent): RunState {
  const next = transition(run.summary.state, event);
  if (!next.ok) throw conflict('run-state', next.reason);
  return next.state;
}

/** One reading, the next of its run; the last of a setting counts. */
export async function recordReading(
  transaction: Transaction,
  { labId, userId, at }: Doing,
  run: RunRow,
  version: Version,
  reading: RecordReading,
): Promise<string> {
  nextState(run, { kind: 'record' });
  const target = version.content.targets[reading.settingIndex];
  if (target === undefined) {
    throw refused([
      {
        path: 'settingIndex',
        message: `The version has ${version.content.targets.length} settings. Choose one of them.`,
      },
    ]);
  }
  const plates = version.content.bench.plates.length;
  if (reading.outcome === 'done' && reading.dialledDeg.length !== plates) {
    throw refused([
      { path: 'dialledDeg', message: `The bench has ${plates} dials. Give what each of them says.` },
    ]);
  }
  const id = newId(at);
  const sequence = run.readingsRecorded + 1;
  await transaction('readings').insert({
    id,
    lab_id: labId,
    run_id: run.summary.id,
    sequence,
    setting_index: reading.settingIndex,
    outcome: reading.outcome,
    dialled_deg: reading.outcome === 'done' ? reading.dialledDeg : [],
    dialled_infidelity:
      reading.outcome === 'done'
        ? dialledInfidelity(version.content, reading.settingIndex, reading.dialledDeg)
        : null,
    note: reading.note,
    recorded_at: at,
    recorded_by: userId,
  });
  await transaction('runs')
    .where({ lab_id: labId, id: run.summary.id })
    .update({ readings_recorded: sequence });
  return id;
}

const eventKinds = { pause: 'paused', resume: 'resumed', finish: 'finished' } as const;

/** What is done to a run as a whole; only a pause has words. */
export interface StateChange {
  readonly kind: keyof typeof eventKinds;
  readonly note: string;
}

/** Is this the very change that the same person made last? Then its answer was lost, and it is sent again. */
export async function isRepeat(
  transaction: Transaction,
  { labId, userId }: Doing,
  run: RunRow,
  change: StateChange,
): Promise<boolean> {
  const last: unknown = await transaction('run_events')
    .where({ lab_id: labId, run_id: run.summary.id, sequence: run.eventsRecorded })
    .where({ kind: eventKinds[change.kind], note: change.note, by_user: userId })
    .first('id');
  return last !== undefined;
}

/** Pauses, resumes or finishes a run. */
export async function changeState(
  transaction: Transaction,
  doing: Doing,
  run: RunRow,
  event: StateChange,
): Promise<void> {
  const { settingCount, doneCount, skippedCount, id } = run.summary;
  const state = nextState(
    run,
    event.kind === 'finish'
      ? { kind: 'finish', open: settingCount - doneCount - skippedCount }
      : { kind: event.kind },
  );
  const sequence = run.eventsRecorded + 1;
  await transaction('runs')
    .where({ lab_id: doing.labId, id })
    .update({
      state,
      pause_note: event.kind === 'pause' ? event.note : '',
      events_recorded: sequence,
      finished_at: state === 'finished' ? doing.at : null,
    });
  await insertEvent(transaction, doing, id, sequence, eventKinds[event.kind], event.note);
}

async function insertEvent(
  transaction: Transaction,
  { labId, userId, at }: Doing,
  runId: string,
  sequence: number,
  kind: 'started' | 'paused' | 'resumed' | 'finished',
  note: string,
): Promise<void> {
  await transaction('run_events').insert({
    id: newId(at),
    lab_id: labId,
    run_id: runId,
    sequence,
    kind,
    note,
    at,
    by_user: userId,
  });
}
