import { homeSchema } from '../../../shared/schemas';
import { labParams } from '../../http/lab-params';
import { noBody, nothing, type Route, route } from '../../http/route';
import { asCabinetPlate, findPlatesAtHand } from '../cabinet';
import { listBenches } from '../benches';
import { findLab } from '../labs';
import { staleVersions } from '../reliance';
import { lastRuns } from './last-made';
import { draftsAhead } from './drafts-ahead';
import { standings } from './next-settings';
import { waitingFor } from './waiting';

/** As many as one row of a desk's window holds; more only where more stand in beams. */
const PLATES_SHOWN = 12;

export function homeRoutes(): readonly Route[] {
  return [
    route({
      method: 'get',
      path: '/labs/:labId/home',
      access: { kind: 'member', action: 'lab.read', thing: findLab },
      params: labParams,
      query: nothing,
      body: noBody,
      response: homeSchema,
      handler: async ({ thing, member, labId, transaction, now }) => {
        const atHand = await findPlatesAtHand(transaction, labId, PLATES_SHOWN);
        const cabinet = atHand.map((plate) => asCabinetPlate(plate, thing, now));
        const benches = (await listBenches(transaction, labId)).filter(({ retiredAt }) => retiredAt === null);
        const runs = await lastRuns(transaction, labId);
        const unfinished = runs.unfinished.map(({ id }) => id);
        const facts = { ...runs, standings: await standings(transaction, labId, unfinished) };
        const drafts = await draftsAhead(transaction, labId);
        const stale = await staleVersions(transaction, labId);
        return {
          body: {
            waiting: waitingFor({
              lab: thing,
              member,
              plates: cabinet.filter(({ benches: theirs }) => theirs.length > 0),
              hasPlates: cabinet.length > 0,
              benches,
              ...facts,
              ...drafts,
              stale,
              now,
            }),
            lastMade: runs.worst.map(({ made }) => made),
            cabinet,
          },
        };
      },
    }),
  ];
}
