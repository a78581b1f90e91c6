import { z } from 'zod';
import {
  idSchema,
  pageQuerySchema,
  saveVersionSchema,
  versionListSchema,
  versionPageSchema,
  versionSchema,
  versionSummarySchema,
} from '../../../shared/schemas';
import { readCursor } from '../../http/cursor';
import { labParams } from '../../http/lab-params';
import { noBody, nothing, type Route, route } from '../../http/route';
import { findLab } from '../labs';
import { findProtocol, findProtocolToChange } from './draft-store';
import { protocolParams } from './protocol-params';
import { frozenFor, keepVersion, oneAtATime, readForVersion } from './save-version';
import { asVersion, findVersion, listVersions, pageOfVersions } from './version-store';

const versionParams = protocolParams.extend({
  number: z
    .string()
    .regex(/^[1-9]\d{0,6}$/)
    .transform(Number),
});

export function versionRoutes(): readonly Route[] {
  const oneEach = oneAtATime();
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
      handler: async (context) => {
        const asked = await readForVersion(context);
        return {
          outside: () =>
            oneEach(context.user.id, async () => {
              const frozen = await frozenFor(asked);
              return (last) => keepVersion(last, asked, frozen);
            }),
        };
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
