import { z } from 'zod';
import { setImmediate } from 'node:timers/promises';
import { compareShown } from '../../../shared/protocol/compare-shown';
import { freezeSteps } from '../../../shared/protocol/freeze';
import { sameContent } from '../../../shared/protocol/same-content';
import {
  idSchema,
  pageQuerySchema,
  saveVersionSchema,
  versionListSchema,
  versionPageSchema,
  versionSchema,
  versionSummarySchema,
} from '../../../shared/schemas';
import { newId } from '../../db/new-id';
import { conflict, refused } from '../../errors';
import { readCursor } from '../../http/cursor';
import { labParams } from '../../http/lab-params';
import { requireRevision } from '../../http/revision';
import { noBody, nothing, type Route, route } from '../../http/route';
import { findBench } from '../benches';
import { findLab } from '../labs';
import { findProtocol, findProtocolToChange } from './draft-store';
import { protocolParams } from './protocol-params';
import { asVersion, findVersion, insertVersion, listVersions, pageOfVersions } from './version-store';

const versionParams = protocolParams.extend({
  number: z
    .string()
    .regex(/^[1-9]\d{0,6}$/)
    .transform(Number),
});

/** Long work in short pieces, with a turn of the event loop for everybody else between two of them. */
async function betweenTurns<Result>(steps: Generator<undefined, Result>): Promise<Result> {
  for (;;) {
    const step = steps.next();
    if (step.done === true) return step.value;
    await setImmediate();
  }
}

export function versionRoutes(): readonly Route[] {
  return [
    route({
      method: 'post',
      path: '/labs/:labId/protocols/:protocolId/versions',
      access: { kind: 'member', action: 'versions.save', thing: findProtocolToChange },
      params: protocolParams,
      query: nothing,
      body: saveVersionSchema,
      response: versionSummarySchema,
      idempotent: true,
      needsMatch: true,
      handler: async ({ body, thing, labId, user, transaction, audit, now, expectedRevision }) => {
        const { draft, latestVersion } = thing;
        requireRevision(expectedRevision, draft.revision, draft);
        const [lab, bench] = [
          await findLab(transaction, { labId }),
          await findBench(transaction, { labId, benchId: draft.content.benchId }),
        ];
        if (lab === null || bench === null)
          throw new Error("a draft's lab and bench are there by foreign key");
        if (bench.retiredAt !== null) {
          throw refused([{ path: 'benchId', message: `${bench.name} is retired. Choose a bench in use.` }]);
        }
        const frozen = await betweenTurns(
          freezeSteps({
            lab,
            protocolId: thing.id,
            draft: draft.content,
            bench,
            number: (latestVersion?.number ?? 0) + 1,
            parentHash: latestVersion?.contentHash ?? null,
            message: body.message,
            savedAt: now,
            savedBy: user,
          }),
        );
        if (!frozen.ok) throw refused(frozen.faults);
        const latest =
          latestVersion === null
            ? null
            : await findVersion(transaction, { labId, protocolId: thing.id, number: latestVersion.number });
        if (latest !== null && sameContent(frozen.content, latest.content)) {
          throw conflict(
            'nothing-new',
            `Nothing that a version holds has changed since version ${latest.summary.number} was saved: neither the draft nor its bench, its plates or the convention.`,
          );
        }
        const differences = compareShown(frozen.content, body.shown);
        if (differences.length > 0) throw refused(differences);
        const summary = await insertVersion(transaction, newId(now), frozen, draft.revision);
        await audit({
          kind: 'version.saved',
          subjectId: summary.id,
          details: {
            protocolId: thing.id,
            number: summary.number,
            contentHash: summary.contentHash,
            message: summary.message,
          },
        });
        return { status: 201, body: summary };
      },
    }),
    route({
      method: 'get',
      path: '/labs/:labId/protocols/:protocolId/versions',
      access: { kind: 'member', action: 'versions.read', thing: findProtocol },
      params: protocolParams,
      query: nothing,
      body: noBody,
      response: versionListSchema,
      handler: async ({ thing, labId, transaction }) => ({
        body: { items: await listVersions(transaction, labId, thing.id) },
      }),
    }),
    route({
      method: 'get',
      path: '/labs/:labId/protocols/:protocolId/versions/:number',
      access: { kind: 'member', action: 'versions.read', thing: findVersion },
      params: versionParams,
      query: nothing,
      body: noBody,
      response: versionSchema,
      handler: async ({ thing }) => Promise.resolve({ body: asVersion(thing) }),
    }),
    route({
      method: 'get',
      path: '/labs/:labId/versions',
      access: { kind: 'member', action: 'versions.read', thing: findLab },
      params: labParams,
      query: pageQuerySchema,
      body: noBody,
      response: versionPageSchema,
      handler: async ({ query, labId, transaction }) => ({
        body: await pageOfVersions(transaction, labId, {
          before: readCursor(idSchema, query.cursor),
          limit: query.limit,
        }),
      }),
    }),
  ];
}
