import { z } from 'zod';
import { roles } from '../../../shared/permissions';
import { sessionSchema } from '../../../shared/schemas';
import { inTransaction } from '../../db/in-transaction';
import { newId } from '../../db/new-id';
import { noBody, nothing, type Route, route } from '../../http/route';
import { requestIdOf } from '../../http/request-id';
import { endSession } from './session';

const labRow = z.object({ id: z.string(), name: z.string(), role: z.enum(roles) });

export function sessionRoutes({ secure }: { readonly secure: boolean }): readonly Route[] {
  return [
    route({
      method: 'get',
      path: '/session',
      access: { kind: 'public' },
      params: nothing,
      query: nothing,
      body: noBody,
      response: sessionSchema,
      handler: async ({ user, database }) => {
        if (user === null) return { body: { user: null, labs: [] } };
        const labs: unknown = await inTransaction(database, { userId: user.id, labId: null }, (transaction) =>
          transaction('memberships')
            .join('labs', 'labs.id', 'memberships.lab_id')
            .where({ 'memberships.user_id': user.id })
            .orderBy('memberships.joined_at')
            .select('labs.id', 'labs.name', 'memberships.role'),
        );
        return { body: { user, labs: z.array(labRow).parse(labs) } };
      },
    }),
    route({
      method: 'post',
      path: '/session/sign-out',
      access: { kind: 'signed-in' },
      params: nothing,
      query: nothing,
      body: noBody,
      handler: async ({ user, transaction, request }) => {
        await transaction('account_events').insert({
          id: newId(),
          kind: 'signed-out',
          user_id: user.id,
          detail: 'this session',
          request_id: requestIdOf(request),
        });
        return {};
      },
      afterwards: (request, response) => endSession(request, response, secure),
    }),
    route({
      method: 'post',
      path: '/session/sign-out-everywhere',
      access: { kind: 'signed-in' },
      params: nothing,
      query: nothing,
      body: noBody,
      handler: async ({ user, transaction, request }) => {
        // The epoch ends them all at once; the rows are marked so that the list of them is true as well.
        await transaction('users').where({ id: user.id }).increment('session_epoch', 1);
        await transaction('sessions')
          .where({ user_id: user.id })
          .whereNull('ended_at')
          .update({ ended_at: transaction.fn.now(), sess: '{}' });
        await transaction('account_events').insert({
          id: newId(),
          kind: 'signed-out-everywhere',
          user_id: user.id,
          detail: 'all sessions',
          request_id: requestIdOf(request),
        });
        return {};
      },
      afterwards: (request, response) => endSession(request, response, secure),
    }),
  ];
}
