import {
  cabinetCountsQuerySchema,
  cabinetCountsSchema,
  cabinetPlateSchema,
  createPlateSchema,
  idSchema,
  type CabinetPlate,
  plateDetailSchema,
  platePageSchema,
  plateQuerySchema,
  updatePlateSchema,
} from '../../../shared/schemas';
import type { Transaction } from '../../db/database';
import { brokenUnique } from '../../db/sql-state';
import { conflict } from '../../errors';
import { labParams } from '../../http/lab-params';
import { requireRevision } from '../../http/revision';
import { noBody, nothing, type Reply, type Route, route } from '../../http/route';
import { requestReliance } from '../beam-changes';
import { findLab } from '../labs';
import { listAttachedFiles } from './attached-files';
import { listCalibrations } from './calibration-store';
import { countPlates, listPlatePage } from './plate-list';
import { asCabinetPlate, type StoredPlate } from './plate-rows';
import { findPlate, findPlateToChange, setRetired, updatePlate } from './plate-store';
import { addPlate, namedOnce } from './plate-work';
import { listSeats } from './seat-store';

export const plateParams = labParams.extend({ plateId: idSchema });

export function plateRoutes(): readonly Route[] {
  return [
    route({
      method: 'get',
      path: '/labs/:labId/plates',
      access: { kind: 'member', action: 'cabinet.read', thing: findLab },
      params: labParams,
      query: plateQuerySchema,
      body: noBody,
      response: platePageSchema,
      handler: async ({ labId, transaction, thing, query, now }) => {
        const facts = { labId, dueDays: thing.calibrationDueDays, now };
        const { items, nextCursor } = await listPlatePage(transaction, facts, query);
        return { body: { items: items.map((plate) => asCabinetPlate(plate, thing, now)), nextCursor } };
      },
    }),
    route({
      method: 'get',
      path: '/labs/:labId/cabinet',
      access: { kind: 'member', action: 'cabinet.read', thing: findLab },
      params: labParams,
      query: cabinetCountsQuerySchema,
      body: noBody,
      response: cabinetCountsSchema,
      handler: async ({ labId, transaction, thing, query, now }) => {
        const facts = { labId, dueDays: thing.calibrationDueDays, now };
        return { body: await countPlates(transaction, facts, query.search) };
      },
    }),
    route({
      method: 'post',
      path: '/labs/:labId/plates',
      access: { kind: 'member', action: 'cabinet.write', thing: findLab },
      params: labParams,
      query: nothing,
      body: createPlateSchema,
      response: cabinetPlateSchema,
      idempotent: true,
      handler: async ({ body, labId, user, transaction, audit, now }) => {
        const mount = body.seat.kind === 'new-mount' ? { mount: body.seat.mount.name } : {};
        const id = await namedOnce(
          { plate: body.name, ...mount },
          () => addPlate(transaction, { labId, userId: user.id, now }, body),
          'seat.mount.name',
        );
        await audit({ kind: 'plate.added', subjectId: id, details: { plate: body } });
        return { ...(await plateReply(transaction, { labId, plateId: id }, now)), status: 201 };
      },
    }),
    route({
      method: 'get',
      path: '/labs/:labId/plates/:plateId',
      access: { kind: 'member', action: 'cabinet.read', thing: findPlate },
      params: plateParams,
      query: nothing,
      body: noBody,
      response: plateDetailSchema,
      handler: async ({ thing, labId, transaction, now }) => {
        const key = { labId, plateId: thing.id };
        const { body: plate } = await plateReply(transaction, key, now);
        return {
          body: {
            plate,
            seats: await listSeats(transaction, labId, { plateId: thing.id }),
            calibrations: await listCalibrations(transaction, key),
            files: await listAttachedFiles(transaction, key),
          },
          revision: thing.revision,
        };
      },
    }),
    route({
      method: 'put',
      path: '/labs/:labId/plates/:plateId',
      access: { kind: 'member', action: 'cabinet.write', thing: findPlateToChange },
      params: plateParams,
      query: nothing,
      body: updatePlateSchema,
      response: cabinetPlateSchema,
      needsMatch: true,
      handler: async ({ body, thing, labId, transaction, audit, expectedRevision, now }) => {
        const key = { labId, plateId: thing.id };
        await requireNewest(transaction, thing, expectedRevision, now);
        await namedOnce({ plate: body.name }, () => updatePlate(transaction, thing, body));
        await requestReliance(transaction, labId, { plateId: thing.id });
        const { labId: _labId, benches: _benches, seat: _seat, calibration: _calibration, ...before } = thing;
        await audit({ kind: 'plate.changed', subjectId: thing.id, details: { before, after: body } });
        return plateReply(transaction, key, now);
      },
    }),
    route({
      method: 'post',
      path: '/labs/:labId/plates/:plateId/retire',
      access: { kind: 'member', action: 'cabinet.write', thing: findPlateToChange },
      params: plateParams,
      query: nothing,
      body: noBody,
      response: cabinetPlateSchema,
      needsMatch: true,
      handler: async ({ thing, labId, transaction, audit, expectedRevision, now }) => {
        const key = { labId, plateId: thing.id };
        await requireNewest(transaction, thing, expectedRevision, now);
        if (thing.retiredAt !== null) throw conflict('already-retired', `${thing.name} is retired already.`);
        const [bench] = thing.benches;
        if (bench !== undefined) {
          throw conflict(
            'plate-in-use',
            `${thing.name} stands in the beam of ${bench.name}. Put another plate there first.`,
          );
        }
        await setRetired(transaction, thing, now);
        await audit({ kind: 'plate.retired', subjectId: thing.id, details: { name: thing.name } });
        return plateReply(transaction, key, now);
      },
    }),
    route({
      method: 'post',
      path: '/labs/:labId/plates/:plateId/return',
      access: { kind: 'member', action: 'cabinet.write', thing: findPlateToChange },
      params: plateParams,
      query: nothing,
      body: noBody,
      response: cabinetPlateSchema,
      needsMatch: true,
      handler: async ({ thing, labId, transaction, audit, expectedRevision, now }) => {
        const key = { labId, plateId: thing.id };
        await requireNewest(transaction, thing, expectedRevision, now);
        if (thing.retiredAt === null) {
          throw conflict('not-retired', `${thing.name} is in the cabinet already.`);
        }
        try {
          await setRetired(transaction, thing, null);
        } catch (error) {
          if (brokenUnique(error) !== 'plates_one_of_a_name') throw error;
          throw conflict('name-taken', `Another plate is called ${thing.name} now. Rename that one first.`);
        }
        await audit({ kind: 'plate.returned', subjectId: thing.id, details: { name: thing.name } });
        return plateReply(transaction, key, now);
      },
    }),
  ];
}

/** @throws ProblemError 412 with the plate as it is, where it was changed since it was looked at. */
export async function requireNewest(
  transaction: Transaction,
  plate: StoredPlate,
  expectedRevision: number | null,
  now: Date,
): Promise<void> {
  if (expectedRevision === plate.revision) return;
  const { body } = await plateReply(transaction, { labId: plate.labId, plateId: plate.id }, now);
  requireRevision(expectedRevision, plate.revision, body);
}

/** A plate as it stands now, under its revision. */
export async function plateReply(
  transaction: Transaction,
  key: { readonly labId: string; readonly plateId: string },
  now: Date,
): Promise<Reply & { readonly body: CabinetPlate }> {
  const [plate, lab] = [await findPlate(transaction, key), await findLab(transaction, key)];
  if (plate === null || lab === null) throw new Error('a plate that was just looked at is not there');
  return { body: asCabinetPlate(plate, lab, now), revision: plate.revision };
}
