import {
  createProtocolSchema,
  draftSchema,
  protocolListSchema,
  protocolSchema,
  saveDraftSchema,
} from '../../../shared/schemas';
import type { Transaction } from '../../db/database';
import { newId } from '../../db/new-id';
import { refused } from '../../errors';
import { labParams } from '../../http/lab-params';
import { requireRevision } from '../../http/revision';
import { noBody, nothing, type Route, route } from '../../http/route';
import { findBench, type StoredBench } from '../benches';
import { findLab, holdLab } from '../labs';
import {
  asProtocol,
  findProtocol,
  findProtocolToChange,
  insertProtocol,
  listProtocols,
  updateDraft,
} from './draft-store';
import { draftFromVersionRoute } from './draft-from-version-route';
import { protocolParams } from './protocol-params';
import { versionRoutes } from './version-routes';

export function protocolRoutes(): readonly Route[] {
  return [
    route({
      method: 'get',
      path: '/labs/:labId/protocols',
      access: { kind: 'member', action: 'protocols.read', thing: findLab },
      params: labParams,
      query: nothing,
      body: noBody,
      response: protocolListSchema,
      handler: async ({ labId, transaction }) => ({
        body: { items: await listProtocols(transaction, labId) },
      }),
    }),
    route({
      method: 'post',
      path: '/labs/:labId/protocols',
      access: { kind: 'member', action: 'protocols.write', thing: holdLab },
      params: labParams,
      query: nothing,
      body: createProtocolSchema,
      response: protocolSchema,
      idempotent: true,
      handler: async ({ body, labId, user, transaction, audit, now }) => {
        await benchOf(transaction, labId, body.benchId);
        requireOwnIds(body.targets);
        const id = newId();
        const protocol = await insertProtocol(transaction, { labId, user, now }, id, body);
        await audit({ kind: 'protocol.begun', subjectId: id, details: { name: body.name } });
        return { status: 201, body: protocol, revision: protocol.draft.revision };
      },
    }),
    route({
      method: 'get',
      path: '/labs/:labId/protocols/:protocolId',
      access: { kind: 'member', action: 'protocols.read', thing: findProtocol },
      params: protocolParams,
      query: nothing,
      body: noBody,
      response: protocolSchema,
      handler: async ({ thing }) =>
        Promise.resolve({ body: asProtocol(thing), revision: thing.draft.revision }),
    }),
    route({
      method: 'put',
      path: '/labs/:labId/protocols/:protocolId/draft',
      access: { kind: 'member', action: 'protocols.write', thing: findProtocolToChange },
      params: protocolParams,
      query: nothing,
      body: saveDraftSchema,
      response: draftSchema,
      needsMatch: true,
      handler: async ({ body, thing, labId, user, transaction, audit, now, expectedRevision }) => {
        requireRevision(expectedRevision, thing.draft.revision, thing.draft);
        await benchOf(transaction, labId, body.benchId);
        requireOwnIds(body.targets);
        const draft = await updateDraft(transaction, { labId, user, now }, thing, body);
        await audit({
          kind: 'draft.saved',
          subjectId: thing.id,
          details: { revision: draft.revision, targetCount: body.targets.length },
        });
        return { body: draft, revision: draft.revision };
      },
    }),
    draftFromVersionRoute(),
    ...versionRoutes(),
  ];
}

/** @throws ProblemError 422 at `benchId` unless it is a bench of this lab in use. */
async function benchOf(transaction: Transaction, labId: string, benchId: string): Promise<StoredBench> {
  const bench = await findBench(transaction, { labId, benchId });
  if (bench === null) {
    throw refused([{ path: 'benchId', message: 'There is no such bench in this lab. Choose another.' }]);
  }
  if (bench.retiredAt !== null) {
    throw refused([{ path: 'benchId', message: `${bench.name} is retired. Choose a bench in use.` }]);
  }
  return bench;
}

/** Rows are told apart by their ids, in merging and in versions. */
function requireOwnIds(targets: readonly { readonly id: string }[]): void {
  const seen = new Set<string>();
  for (const [index, { id }] of targets.entries()) {
    if (seen.has(id)) {
      throw refused([
        {
          path: `targets.${index}.id`,
          message: `Row ${index + 1} has the id of another row. Give it a new one.`,
        },
      ]);
    }
    seen.add(id);
  }
}
