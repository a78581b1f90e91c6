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
import type { Transaction } from '../../db/database';
import { invalid, refused } from '../../errors';
import { noBody, nothing, type Route, route } from '../../http/route';
import { findLab } from '../labs';
import { findVersionById } from '../protocols';
import { findRun, findRunToChange, listRuns, runAsItStands } from './run-store';
import { changeState, recordReading, startRun } from './run-work';

const labParams = z.strictObject({ labId: idSchema });
const runParams = z.strictObject({ labId: idSchema, runId: idSchema });

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
        const page = { before: cursorOf(query.cursor), limit: query.limit + 1 };
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
        await audit({
          kind: 'run.started',
          subjectId: runId,
          details: { number: run.summary.number, versionId: body.versionId, cautionAcknowledged: true },
        });
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
        await audit({
          kind: 'reading.recorded',
          subjectId: thing.summary.id,
          details: { readingId, reading: body },
        });
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
      handler: async ({ body, params, thing, labId, user, transaction, audit, now }) => {
        await changeState(transaction, { labId, userId: user.id, at: now }, thing, {
          kind: 'pause',
          note: body.note,
        });
        await audit({ kind: 'run.paused', subjectId: thing.summary.id, details: { note: body.note } });
        return { body: await runAsItStands(transaction, params) };
      },
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
        handler: async ({ params, thing, labId, user, transaction, audit, now }) => {
          await changeState(transaction, { labId, userId: user.id, at: now }, thing, { kind, note: '' });
          await audit({
            kind: kind === 'resume' ? 'run.resumed' : 'run.finished',
            subjectId: thing.summary.id,
          });
          return { body: await runAsItStands(transaction, params) };
        },
      }),
    ),
  ];
}

async function versionOf(transaction: Transaction, labId: string, versionId: string): Promise<Version> {
  const version = await findVersionById(transaction, labId, versionId);
  if (version === null) throw new Error("a run's version is there by foreign key");
  return version;
}

/** @throws ProblemError 400 for a cursor that no page of ours gave. */
function cursorOf(cursor: string | undefined): number | null {
  if (cursor === undefined) return null;
  if (/^[1-9]\d{0,8}$/.test(cursor)) return Number(cursor);
  throw invalid([{ path: 'cursor', message: 'This is no cursor that a page of this list gave.' }]);
}
