import {
  cabinetMountSchema,
  idSchema,
  mountDetailSchema,
  mountPageSchema,
  mountQuerySchema,
  writeMountSchema,
} from '../../../shared/schemas';
import type { Transaction } from '../../db/database';
import { brokenUnique } from '../../db/sql-state';
import { conflict } from '../../errors';
import { labParams } from '../../http/lab-params';
import { requireRevision } from '../../http/revision';
import { noBody, nothing, type Reply, type Route, route } from '../../http/route';
import { requestReliance } from '../beam-changes';
import { findLab } from '../labs';
import {
  asMount,
  findMount,
  findMountToChange,
  insertMount,
  listMountPage,
  setMountRetired,
  updateMount,
} from './mount-store';
import { namedOnce } from './plate-work';
import { listSeats } from './seat-store';

const mountParams = labParams.extend({ mountId: idSchema });

export function mountRoutes(): readonly Route[] {
  return [
    route({
      method: 'get',
      path: '/labs/:labId/mounts',
      access: { kind: 'member', action: 'cabinet.read', thing: findLab },
      params: labParams,
      query: mountQuerySchema,
      body: noBody,
      response: mountPageSchema,
      handler: async ({ labId, transaction, query }) => {
        const { items, nextCursor } = await listMountPage(transaction, labId, query);
        return { body: { items: items.map(asMount), nextCursor } };
      },
    }),
    route({
      method: 'post',
      path: '/labs/:labId/mounts',
      access: { kind: 'member', action: 'cabinet.write', thing: findLab },
      params: labParams,
      query: nothing,
      body: writeMountSchema,
      response: cabinetMountSchema,
      idempotent: true,
      handler: async ({ body, labId, transaction, audit, now }) => {
        const id = await namedOnce({ mount: body.name }, () =>
          insertMount(transaction, { labId, now }, body),
        );
        await audit({ kind: 'mount.added', subjectId: id, details: { mount: body } });
        return { ...(await mountReply(transaction, { labId, mountId: id })), status: 201 };
      },
    }),
    route({
      method: 'get',
      path: '/labs/:labId/mounts/:mountId',
      access: { kind: 'member', action: 'cabinet.read', thing: findMount },
      params: mountParams,
      query: nothing,
      body: noBody,
      response: mountDetailSchema,
      handler: async ({ thing, labId, transaction }) => ({
        body: { mount: asMount(thing), seats: await listSeats(transaction, labId, { mountId: thing.id }) },
        revision: thing.revision,
      }),
    }),
    route({
      method: 'put',
      path: '/labs/:labId/mounts/:mountId',
      access: { kind: 'member', action: 'cabinet.write', thing: findMountToChange },
      params: mountParams,
      query: nothing,
      body: writeMountSchema,
      response: cabinetMountSchema,
      needsMatch: true,
      handler: async ({ body, thing, labId, transaction, audit, expectedRevision }) => {
        requireRevision(expectedRevision, thing.revision, asMount(thing));
        await namedOnce({ mount: body.name }, () => updateMount(transaction, thing, body));
        if (thing.plate !== null) await requestReliance(transaction, labId, { plateId: thing.plate.id });
        const { labId: _labId, plate: _plate, ...before } = thing;
        await audit({ kind: 'mount.changed', subjectId: thing.id, details: { before, after: body } });
        return mountReply(transaction, { labId, mountId: thing.id });
      },
    }),
    route({
      method: 'post',
      path: '/labs/:labId/mounts/:mountId/retire',
      access: { kind: 'member', action: 'cabinet.write', thing: findMountToChange },
      params: mountParams,
      query: nothing,
      body: noBody,
      response: cabinetMountSchema,
      needsMatch: true,
      handler: async ({ thing, labId, transaction, audit, expectedRevision, now }) => {
        requireRevision(expectedRevision, thing.revision, asMount(thing));
        if (thing.retiredAt !== null) throw conflict('already-retired', `${thing.name} is retired already.`);
        if (thing.plate !== null) {
          throw conflict('mount-in-use', `${thing.plate.name} sits in ${thing.name}. Take it out first.`);
        }
        await setMountRetired(transaction, thing, now);
        await audit({ kind: 'mount.retired', subjectId: thing.id, details: { name: thing.name } });
        return mountReply(transaction, { labId, mountId: thing.id });
      },
    }),
    route({
      method: 'post',
      path: '/labs/:labId/mounts/:mountId/return',
      access: { kind: 'member', action: 'cabinet.write', thing: findMountToChange },
      params: mountParams,
      query: nothing,
      body: noBody,
      response: cabinetMountSchema,
      needsMatch: true,
      handler: async ({ thing, labId, transaction, audit, expectedRevision }) => {
        requireRevision(expectedRevision, thing.revision, asMount(thing));
        if (thing.retiredAt === null) {
          throw conflict('not-retired', `${thing.name} is in the cabinet already.`);
        }
        try {
          await setMountRetired(transaction, thing, null);
        } catch (error) {
          if (brokenUnique(error) !== 'mounts_one_of_a_name') throw error;
          throw conflict('name-taken', `Another mount is called ${thing.name} now. Rename that one first.`);
        }
        await audit({ kind: 'mount.returned', subjectId: thing.id, details: { name: thing.name } });
        return mountReply(transaction, { labId, mountId: thing.id });
      },
    }),
  ];
}

async function mountReply(
  transaction: Transaction,
  key: { readonly labId: string; readonly mountId: string },
): Promise<Reply> {
  const mount = await findMount(transaction, key);
  if (mount === null) throw new Error('a mount that was just looked at is not there');
  return { body: asMount(mount), revision: mount.revision };
}
