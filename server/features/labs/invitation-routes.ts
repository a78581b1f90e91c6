import { z } from 'zod';
import {
  acceptedInvitationSchema,
  createdInvitationSchema,
  createInvitationSchema,
  idSchema,
  invitationListSchema,
  invitationPreviewSchema,
  invitationSchema,
} from '../../../shared/schemas';
import type { Transaction } from '../../db/database';
import { seeAs } from '../../db/in-transaction';
import { newId } from '../../db/new-id';
import { conflict, notFound } from '../../errors';
import { labParams } from '../../http/lab-params';
import { noBody, nothing, type Route, route } from '../../http/route';
import {
  asInvitation,
  findAccepted,
  findByToken,
  findOpenInvitation,
  listOpenInvitations,
  markAccepted,
  type StoredInvitation,
} from './invitation-store';
import { invitationToken, tokenHash } from './invitation-token';
import { findLab, type StoredLab } from './lab-store';
import { addMember, findMember } from './member-store';

const invitationParams = labParams.extend({ invitationId: idSchema });
const tokenParams = z.strictObject({ token: z.string().regex(/^[\w-]{43}$/) });
const days = 24 * 3600 * 1000;
const validForDays = 7;
const createdBody = z.strictObject({ invitation: invitationSchema });

export function invitationRoutes({ sessionSecret }: { readonly sessionSecret: string }): readonly Route[] {
  return [
    route({
      method: 'get',
      path: '/labs/:labId/invitations',
      access: { kind: 'member', action: 'invitations.manage', thing: findLab },
      params: labParams,
      query: nothing,
      body: noBody,
      response: invitationListSchema,
      handler: async ({ labId, transaction }) => ({
        body: { items: (await listOpenInvitations(transaction, labId)).map(asInvitation) },
      }),
    }),
    route({
      method: 'post',
      path: '/labs/:labId/invitations',
      access: { kind: 'member', action: 'invitations.manage', thing: findLab },
      params: labParams,
      query: nothing,
      body: createInvitationSchema,
      response: createdInvitationSchema,
      idempotent: true,
      present: (body) => {
        const { invitation } = createdBody.parse(body);
        return { invitation, token: invitationToken(sessionSecret, invitation.id) };
      },
      handler: async ({ body, labId, user, transaction, audit, now }) => {
        const id = newId();
        const invitation = {
          id,
          role: body.role,
          note: body.note,
          createdAt: now.toISOString(),
          expiresAt: new Date(now.getTime() + validForDays * days).toISOString(),
        };
        await transaction('invitations').insert({
          id,
          lab_id: labId,
          role: body.role,
          note: body.note,
          token_hash: tokenHash(invitationToken(sessionSecret, id)),
          created_by: user.id,
          created_at: invitation.createdAt,
          expires_at: invitation.expiresAt,
        });
        await audit({
          kind: 'invitation.made',
          subjectId: id,
          details: { role: body.role, note: body.note },
        });
        return { status: 201, body: { invitation } };
      },
    }),
    route({
      method: 'delete',
      path: '/labs/:labId/invitations/:invitationId',
      access: { kind: 'member', action: 'invitations.manage', thing: findOpenInvitation },
      params: invitationParams,
      query: nothing,
      body: noBody,
      handler: async ({ thing, labId, transaction, audit, now }) => {
        await transaction('invitations').where({ lab_id: labId, id: thing.id }).update({ revoked_at: now });
        await audit({
          kind: 'invitation.revoked',
          subjectId: thing.id,
          details: { role: thing.role, note: thing.note },
        });
        return {};
      },
    }),
    route({
      method: 'get',
      path: '/invitations/:token',
      access: { kind: 'signed-in' },
      params: tokenParams,
      query: nothing,
      body: noBody,
      response: invitationPreviewSchema,
      handler: async ({ params, user, transaction }) => {
        const { invitation, lab } = await openInvitation(transaction, params.token, user.id);
        return { body: { labName: lab.name, role: invitation.role, expiresAt: invitation.expiresAt } };
      },
    }),
    route({
      method: 'post',
      path: '/invitations/:token/accept',
      access: { kind: 'signed-in' },
      params: tokenParams,
      query: nothing,
      body: noBody,
      response: acceptedInvitationSchema,
      handler: async ({ params, user, transaction, audit, now }) => {
        const before = await acceptedBefore(transaction, params.token, user.id);
        if (before !== null) return { body: before };
        const { invitation, lab } = await openInvitation(transaction, params.token, user.id);
        if (!(await markAccepted(transaction, invitation, user.id))) {
          // Someone was quicker: perhaps this very person, whose first press is answered only now.
          const meanwhile = await acceptedBefore(transaction, params.token, user.id);
          if (meanwhile === null) throw notFound();
          return { body: meanwhile };
        }
        const joined = await addMember(transaction, {
          labId: lab.id,
          userId: user.id,
          role: invitation.role,
          joinedAt: now,
        });
        if (!joined) {
          throw conflict('already-member', `You belong to ${lab.name} already. A lead can change your role.`);
        }
        await audit(lab.id, {
          kind: 'invitation.accepted',
          subjectId: invitation.id,
          details: { userId: user.id, role: invitation.role },
        });
        return { body: { labId: lab.id, role: invitation.role } };
      },
    }),
  ];
}

/** The membership that this person has by this invitation already; null where they have none. */
async function acceptedBefore(transaction: Transaction, token: string, userId: string) {
  const invitation = await findAccepted(transaction, tokenHash(token), userId);
  if (invitation === null) return null;
  await seeAs(transaction, { userId, labId: invitation.labId });
  const member = await findMember(transaction, { labId: invitation.labId, userId });
  return member === null ? null : { labId: member.labId, role: member.role };
}

async function openInvitation(
  transaction: Transaction,
  token: string,
  userId: string,
): Promise<{ readonly invitation: StoredInvitation; readonly lab: StoredLab }> {
  const invitation = await findByToken(transaction, tokenHash(token));
  if (invitation === null) throw notFound();
  await seeAs(transaction, { userId, labId: invitation.labId });
  const lab = await findLab(transaction, invitation);
  if (lab === null) throw notFound();
  return { invitation, lab };
}
