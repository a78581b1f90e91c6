import { cabinetPlateSchema, seatPlateSchema, takeOutSchema } from '../../../shared/schemas';
import { nothing, type Route, route } from '../../http/route';
import { plateParams, plateReply, requireNewest } from './plate-routes';
import { findPlateToChange, raiseRevision } from './plate-store';
import { seatPlate, takeOutPlate } from './plate-work';

export function seatRoutes(): readonly Route[] {
  return [
    route({
      method: 'put',
      path: '/labs/:labId/plates/:plateId/seat',
      access: { kind: 'member', action: 'cabinet.write', thing: findPlateToChange },
      params: plateParams,
      query: nothing,
      body: seatPlateSchema,
      response: cabinetPlateSchema,
      needsMatch: true,
      handler: async ({ body, thing, labId, user, transaction, audit, expectedRevision, now }) => {
        const key = { labId, plateId: thing.id };
        await requireNewest(transaction, thing, expectedRevision, now);
        const details = await seatPlate(transaction, { labId, userId: user.id, now }, thing, body);
        await raiseRevision(transaction, thing);
        await audit({ kind: 'plate.seated', subjectId: thing.id, details: { ...details } });
        return plateReply(transaction, key, now);
      },
    }),
    route({
      method: 'post',
      path: '/labs/:labId/plates/:plateId/take-out',
      access: { kind: 'member', action: 'cabinet.write', thing: findPlateToChange },
      params: plateParams,
      query: nothing,
      body: takeOutSchema,
      response: cabinetPlateSchema,
      needsMatch: true,
      handler: async ({ body, thing, labId, transaction, audit, expectedRevision, now }) => {
        const key = { labId, plateId: thing.id };
        await requireNewest(transaction, thing, expectedRevision, now);
        const details = await takeOutPlate(transaction, { labId, now }, thing, body);
        await raiseRevision(transaction, thing);
        await audit({ kind: 'plate.taken-out', subjectId: thing.id, details: { ...details } });
        return plateReply(transaction, key, now);
      },
    }),
  ];
}
