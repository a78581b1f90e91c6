import { DEFAULT_CONVENTION } from '../../../shared/optics/convention';
import {
  createLabSchema,
  idSchema,
  labSchema,
  memberListSchema,
  memberSchema,
  updateLabSchema,
  updateMemberSchema,
} from '../../../shared/schemas';
import { seeAs } from '../../db/in-transaction';
import { newId } from '../../db/new-id';
import { conflict } from '../../errors';
import { labParams } from '../../http/lab-params';
import { noBody, nothing, type Route, route } from '../../http/route';
import { invitationRoutes } from './invitation-routes';
import { asLab, findLab, findLabToChange, insertLab, updateLab } from './lab-store';
import { translateLab } from './translate-convention';
import { addMember, asMember, countOtherLeads, findMember, listMembers } from './member-store';

const memberParams = labParams.extend({ userId: idSchema });

const firstDueDays = 90;

const keepALead = () =>
  conflict('last-lead', 'A lab keeps at least one lead. Make someone else a lead first, then change this.');

export function labRoutes(config: { readonly sessionSecret: string }): readonly Route[] {
  return [
    route({
      method: 'post',
      path: '/labs',
      access: { kind: 'signed-in' },
      params: nothing,
      query: nothing,
      body: createLabSchema,
      response: labSchema,
      idempotent: true,
      handler: async ({ body, user, transaction, audit, now }) => {
        const lab = {
          id: newId(),
          name: body.name,
          convention: DEFAULT_CONVENTION,
          calibrationDueDays: firstDueDays,
        };
        await seeAs(transaction, { userId: user.id, labId: lab.id });
        await insertLab(transaction, lab);
        await addMember(transaction, { labId: lab.id, userId: user.id, role: 'lead', joinedAt: now });
        await audit(lab.id, { kind: 'lab.created', subjectId: lab.id, details: { name: lab.name } });
        return { status: 201, body: lab };
      },
    }),
    route({
      method: 'get',
      path: '/labs/:labId',
      access: { kind: 'member', action: 'lab.read', thing: findLab },
      params: labParams,
      query: nothing,
      body: noBody,
      response: labSchema,
      handler: async ({ thing }) => Promise.resolve({ body: asLab(thing) }),
    }),
    route({
      method: 'patch',
      path: '/labs/:labId',
      access: { kind: 'member', action: 'lab.settings', thing: findLabToChange },
      params: labParams,
      query: nothing,
      body: updateLabSchema,
      response: labSchema,
      handler: async ({ body, thing, user, transaction, audit, now }) => {
        const lab = {
          id: thing.id,
          name: body.name ?? thing.name,
          convention: body.convention ?? thing.convention,
          calibrationDueDays: body.calibrationDueDays ?? thing.calibrationDueDays,
        };
        await updateLab(transaction, thing.id, body);
        const change = { labId: thing.id, userId: user.id, now };
        const translated = await translateLab(transaction, change, thing.convention, lab.convention);
        await audit({
          kind: 'lab.settings-changed',
          subjectId: lab.id,
          details: { before: asLab(thing), after: lab, translated },
        });
        return { body: lab };
      },
    }),
    route({
      method: 'get',
      path: '/labs/:labId/members',
      access: { kind: 'member', action: 'lab.read', thing: findLab },
      params: labParams,
      query: nothing,
      body: noBody,
      response: memberListSchema,
      handler: async ({ labId, transaction }) => ({
        body: { items: (await listMembers(transaction, labId)).map(asMember) },
      }),
    }),
    route({
      method: 'patch',
      path: '/labs/:labId/members/:userId',
      access: { kind: 'member', action: 'members.manage', thing: findMember },
      params: memberParams,
      query: nothing,
      body: updateMemberSchema,
      response: memberSchema,
      handler: async ({ body, thing, labId, transaction, audit }) => {
        const otherLeads = await countOtherLeads(transaction, labId, thing.userId);
        if (body.role !== 'lead' && otherLeads === 0) throw keepALead();
        await transaction('memberships')
          .where({ lab_id: labId, user_id: thing.userId })
          .update({ role: body.role });
        await audit({
          kind: 'member.role-changed',
          subjectId: thing.userId,
          details: { before: thing.role, after: body.role },
        });
        return { body: { ...asMember(thing), role: body.role } };
      },
    }),
    route({
      method: 'delete',
      path: '/labs/:labId/members/:userId',
      access: { kind: 'member', action: 'members.manage', thing: findMember },
      params: memberParams,
      query: nothing,
      body: noBody,
      handler: async ({ thing, labId, transaction, audit }) => {
        const otherLeads = await countOtherLeads(transaction, labId, thing.userId);
        if (otherLeads === 0) throw keepALead();
        await transaction('memberships').where({ lab_id: labId, user_id: thing.userId }).delete();
        await audit({ kind: 'member.removed', subjectId: thing.userId, details: { role: thing.role } });
        return {};
      },
    }),
    ...invitationRoutes(config),
  ];
}
