import {
  calibrationInputSchema,
  calibrationSchema,
  createPlateSchema,
  idSchema,
  plateDetailSchema,
  plateListSchema,
  plateSchema,
  updatePlateSchema,
} from '../../../shared/schemas';
import type { Transaction } from '../../db/database';
import { brokenUnique } from '../../db/sql-state';
import { conflict, refused } from '../../errors';
import { labParams } from '../../http/lab-params';
import { requireRevision } from '../../http/revision';
import { noBody, nothing, type Route, route } from '../../http/route';
import { findLab } from '../labs';
import {
  asPlate,
  findPlate,
  findPlateToChange,
  insertCalibration,
  insertPlate,
  listCalibrations,
  listPlates,
  raiseRevision,
  setRetired,
  type StoredPlate,
  updatePlate,
} from './plate-store';

const plateParams = labParams.extend({ plateId: idSchema });

/** A tablet's clock may be ahead of ours by this much. */
const clockSlackMs = 5 * 60 * 1000;

/** The index that keeps names apart: to look first would leave a moment between. */
const onePlateOfAName = 'plates_one_of_a_name';

export function plateRoutes(): readonly Route[] {
  return [
    route({
      method: 'get',
      path: '/labs/:labId/plates',
      access: { kind: 'member', action: 'cabinet.read', thing: findLab },
      params: labParams,
      query: nothing,
      body: noBody,
      response: plateListSchema,
      handler: async ({ labId, transaction }) => ({
        body: { items: (await listPlates(transaction, labId)).map(asPlate) },
      }),
    }),
    route({
      method: 'post',
      path: '/labs/:labId/plates',
      access: { kind: 'member', action: 'cabinet.write', thing: findLab },
      params: labParams,
      query: nothing,
      body: createPlateSchema,
      response: plateSchema,
      idempotent: true,
      handler: async ({ body, labId, user, transaction, audit, now }) => {
        requirePast(body.calibration.measuredAt, now, 'calibration.measuredAt');
        const id = await namedOnce(body.name, () =>
          insertPlate(transaction, { labId, userId: user.id, now }, body),
        );
        const plate = await stored(transaction, labId, id);
        await audit({ kind: 'plate.added', subjectId: id, details: { plate: body } });
        return { status: 201, body: asPlate(plate), revision: plate.revision };
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
      handler: async ({ thing, transaction }) => ({
        body: { plate: asPlate(thing), calibrations: await listCalibrations(transaction, thing) },
        revision: thing.revision,
      }),
    }),
    route({
      method: 'put',
      path: '/labs/:labId/plates/:plateId',
      access: { kind: 'member', action: 'cabinet.write', thing: findPlateToChange },
      params: plateParams,
      query: nothing,
      body: updatePlateSchema,
      response: plateSchema,
      needsMatch: true,
      handler: async ({ body, thing, labId, transaction, audit, expectedRevision }) => {
        requireRevision(expectedRevision, thing.revision, asPlate(thing));
        await namedOnce(body.name, () => updatePlate(transaction, thing, body));
        const plate = await stored(transaction, labId, thing.id);
        const before = { name: thing.name, kind: thing.kind, note: thing.note, mount: thing.mount };
        await audit({ kind: 'plate.changed', subjectId: thing.id, details: { before, after: body } });
        return { body: asPlate(plate), revision: plate.revision };
      },
    }),
    route({
      method: 'post',
      path: '/labs/:labId/plates/:plateId/calibrations',
      access: { kind: 'member', action: 'calibrations.record', thing: findPlateToChange },
      params: plateParams,
      query: nothing,
      body: calibrationInputSchema,
      response: calibrationSchema,
      idempotent: true,
      handler: async ({ body, thing, labId, user, transaction, audit, now }) => {
        requirePast(body.measuredAt, now, 'measuredAt');
        if (thing.retiredAt !== null) {
          throw conflict(
            'plate-retired',
            `${thing.name} is retired. Return it to the cabinet before it is calibrated.`,
          );
        }
        const id = await insertCalibration(transaction, { labId, userId: user.id, now }, thing.seatId, body);
        await raiseRevision(transaction, thing);
        await audit({
          kind: 'plate.calibrated',
          subjectId: thing.id,
          details: { calibrationId: id, calibration: body },
        });
        return {
          status: 201,
          body: { ...body, id, measuredAt: toMilliseconds(body.measuredAt), recordedBy: user.name },
        };
      },
    }),
    route({
      method: 'post',
      path: '/labs/:labId/plates/:plateId/retire',
      access: { kind: 'member', action: 'cabinet.write', thing: findPlateToChange },
      params: plateParams,
      query: nothing,
      body: noBody,
      response: plateSchema,
      needsMatch: true,
      handler: async ({ thing, labId, transaction, audit, expectedRevision, now }) => {
        requireRevision(expectedRevision, thing.revision, asPlate(thing));
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
        const plate = await stored(transaction, labId, thing.id);
        return { body: asPlate(plate), revision: plate.revision };
      },
    }),
    route({
      method: 'post',
      path: '/labs/:labId/plates/:plateId/return',
      access: { kind: 'member', action: 'cabinet.write', thing: findPlateToChange },
      params: plateParams,
      query: nothing,
      body: noBody,
      response: plateSchema,
      needsMatch: true,
      handler: async ({ thing, labId, transaction, audit, expectedRevision }) => {
        requireRevision(expectedRevision, thing.revision, asPlate(thing));
        if (thing.retiredAt === null)
          throw conflict('not-retired', `${thing.name} is in the cabinet already.`);
        try {
          await setRetired(transaction, thing, null);
        } catch (error) {
          if (brokenUnique(error) !== onePlateOfAName) throw error;
          throw conflict('name-taken', `Another plate is called ${thing.name} now. Rename that one first.`);
        }
        await audit({ kind: 'plate.returned', subjectId: thing.id, details: { name: thing.name } });
        const plate = await stored(transaction, labId, thing.id);
        return { body: asPlate(plate), revision: plate.revision };
      },
    }),
  ];
}

async function stored(transaction: Transaction, labId: string, plateId: string): Promise<StoredPlate> {
  const plate = await findPlate(transaction, { labId, plateId });
  if (plate === null) throw new Error('a plate that was just written is not there');
  return plate;
}

async function namedOnce<Result>(name: string, work: () => Promise<Result>): Promise<Result> {
  try {
    return await work();
  } catch (error) {
    if (brokenUnique(error) !== onePlateOfAName) throw error;
    throw refused([
      { path: 'name', message: `There is a plate called ${name} already. Choose another name.` },
    ]);
  }
}

function requirePast(measuredAt: string, now: Date, path: string): void {
  if (Date.parse(measuredAt) <= now.getTime() + clockSlackMs) return;
  throw refused([{ path, message: 'This is in the future. Write when it was measured.' }]);
}

/** As the database keeps it, so that this answer and the next are the same text. */
function toMilliseconds(timestamp: string): string {
  return new Date(timestamp).toISOString();
}
