import { idSchema, relianceSchema } from '../../../shared/schemas';
import { labParams } from '../../http/lab-params';
import { noBody, nothing, type Route, route } from '../../http/route';
import { findPlate } from '../cabinet';
import { reliantDrafts, reliantVersions } from './reliant-versions';

const plateParams = labParams.extend({ plateId: idSchema });

export function relianceRoutes(): readonly Route[] {
  return [
    route({
      method: 'get',
      path: '/labs/:labId/plates/:plateId/reliance',
      access: { kind: 'member', action: 'versions.read', thing: findPlate },
      params: plateParams,
      query: nothing,
      body: noBody,
      response: relianceSchema,
      handler: async ({ thing, labId, transaction }) => ({
        body: {
          benches: thing.benches,
          drafts: await reliantDrafts(transaction, labId, thing.id),
          versions: await reliantVersions(transaction, labId, thing.id),
        },
      }),
    }),
  ];
}
