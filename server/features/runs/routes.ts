import { z } from 'zod';
import {
  idSchema,
  pageQuerySchema,
  pauseRunSchema,
  recordReadingSchema,
  runPageSchema,
  runSchema,
  startRunSchema,
  type Version,
} from '../../../shared/schemas';
import type { AuditEntry } from '../../audit/record-event';
import type { Transaction } from '../../db/database';
import { refused } from '../../errors';
import { readCursor } from '../../http/cursor';
import { labParams } from '../../http/lab-params';
import { noBody, nothing, type Reply, type Route, route, type User } from '../../http/route';
import { findLab } from '../labs';
import { findVersionById } from '../protocols';
import { readingEntry, startedEntry, stateEntry } from './run-record';
import { findRun, findRunToChange, listRuns, type RunRow, runAsItStands } from './run-store';
import { changeState, isRepeat, recordReading, startRun, type StateChange } from './run-work';

/** Runs are numbered, so the last number of a page is the cursor. */
const runNumber = z
  .string()
  .regex(/^[1-9]\d{0,8}$/)
  .transform(Number);
const runParams = labParams.extend({ runId: idSchema });

export function runRoutes(): readonly Route[] {
  return [
    route({
      method: 'get',
      path: '/labs/:labId/runs',
      access: { kind: 'member', action: 'runs.read', thing: findLab },
      params: labParams,
      query: pageQuerySchema,
      body: noBody,
      response: runPageSchema,
      handler: async ({ query, labId, transaction }) => {
        const page = { before: readCursor(runNumber, query.cursor), limit: query.limit + 1 };
        const found = (await listRuns(transaction, labId, page)).map(({ summary }) => summary);
        const items = found.slice(0, query.limit);
        const last = items.at(-1);
        return {
          body: {
            items,
            nextCursor: found.length > query.limit && last !== undefined ? String(last.number) : null,
          },
        };
      },
    }),
    route({
      method: 'post',
      path: '/labs/:labId/runs',
      access: { kind: 'member', action: 'runs.record', thing: findLab },
      params: labParams,
      query: nothing,
      body: startRunSchema,
      response: runSchema,
      idempotent: true,
      handler: async ({ body, labId, user, transaction, audit, now }) => {
        const version = await findVersionById(transaction, labId, body.versionId);
        if (version === null) {
          throw refused([
            { path: 'versionId', message: 'There is no such version in this lab. Choose another.' },
          ]);
        }
        const runId = await startRun(transaction, { labId, userId: user.id, at: now }, version, body);
        const run = await runAsItStands(transaction, { labId, runId });
        await audit(startedEntry(run.summary, version));
        return { status: 201, body: run };
      },
    }),
    route({
      method: 'get',
      path: '/labs/:labId/runs/:runId',
      access: { kind: 'member', action: 'runs.read', thing: findRun },
      params: runParams,
      query: nothing,
      body: noBody,
      response: runSchema,
      handler: async ({ params, transaction }) => ({ body: await runAsItStands(transaction, params) }),
    }),
    route({
      method: 'post',
      path: '/labs/:labId/runs/:runId/readings',
      access: { kind: 'member', action: 'runs.record', thing: findRunToChange },
      params: runParams,
      query: nothing,
      body: recordReadingSchema,
      response: runSchema,
      idempotent: true,
      handler: async ({ body, params, thing, labId, user, transaction, audit, now }) => {
        const version = await versionOf(transaction, labId, thing.summary.versionId);
        const doing = { labId, userId: user.id, at: now };
        const readingId = await recordReading(transaction, doing, thing, version, body);
        await audit(readingEntry(thing.summary.id, readingId, body));
        return { status: 201, body: await runAsItStands(transaction, params) };
      },
    }),
    route({
      method: 'post',
      path: '/labs/:labId/runs/:runId/pause',
      access: { kind: 'member', action: 'runs.record', thing: findRunToChange },
      params: runParams,
      query: nothing,
      body: pauseRunSchema,
      response: runSchema,
      handler: (context) => move(context, { kind: 'pause', note: context.body.note }),
    }),
    ...(['resume', 'finish'] as const).map((kind) =>
      route({
        method: 'post',
        path: `/labs/:labId/runs/:runId/${kind}`,
        access: { kind: 'member', action: 'runs.record', thing: findRunToChange },
        params: runParams,
        query: nothing,
        body: noBody,
        response: runSchema,
        handler: (context) => move(context, { kind, note: '' }),
      }),
    ),
  ];
}

async function versionOf(transaction: Transaction, labId: string, versionId: string): Promise<Version> {
  const version = await findVersionById(transaction, labId, versionId);
  if (version === null) throw new Error("a run's version is there by foreign key");
  return version;
}

interface Moving {
  readonly thing: RunRow;
  readonly user: User;
  readonly transaction: Transaction;
  readonly now: Date;
  readonly audit: (entry: AuditEntry) => Promise<void>;
}

/** Pauses, resumes or finishes a run, once: who sends it again after a lost answer gets the run as it stands. */
async function move({ thing, user, transaction, now, audit }: Moving, change: StateChange): Promise<Reply> {
  const key = { labId: thing.labId, runId: thing.summary.id };
  const doing = { labId: thing.labId, userId: user.id, at: now };
  if (await isRepeat(transaction, doing, thing, change)) {
    return { body: await runAsItStands(transaction, key), unchanged: true };
  }
  await changeState(transaction, doing, thing, change);
  await audit(stateEntry(key.runId, change));
  return { body: await runAsItStands(transaction, key) };
}
