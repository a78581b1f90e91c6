import type { Request } from 'express';
import { z } from 'zod';
import { can, type Member, roles, type Thing } from '../../shared/permissions';
import { recordEvent, type AuditEntry } from '../audit/record-event';
import { recordAccountEvent } from '../audit/record-account-event';
import type { Transaction } from '../db/database';
import { inTransaction } from '../db/in-transaction';
import { forbidden, notFound, ProblemError, unauthenticated } from '../errors';
import { idempotencyKey, once, requestHash } from './idempotency';
import { readInput, readParams } from './read-input';
import { requestIdOf } from './request-id';
import { etagOf, expectedRevision } from './revision';
import type {
  Answer,
  Exchange,
  MemberContext,
  MemberDefinition,
  PublicDefinition,
  Reply,
  SignedInDefinition,
  User,
} from './route';

const personRow = z.object({
  id: z.string(),
  name: z.string(),
  login: z.string(),
  email: z.string().nullable(),
  role: z.enum(roles).nullable(),
});

/** Who asks, and what they are in the lab, read now and not from the session: a changed role holds at once. */
async function whoAsks(
  transaction: Transaction,
  request: Request,
  labId: string | null,
): Promise<{ readonly user: User; readonly member: Member | null } | null> {
  const { userId, epoch } = request.session;
  if (userId === undefined || epoch === undefined) return null;
  const found: unknown = await transaction('users')
    .leftJoin('memberships', (join) => {
      join.on('memberships.user_id', 'users.id').andOnVal('memberships.lab_id', labId);
    })
    .where({ 'users.id': userId, 'users.session_epoch': epoch })
    .whereNull('users.disabled_at')
    .first('users.id', 'users.name', 'users.login', 'users.email', 'memberships.role');
  if (found === undefined) return null;
  const { role, ...user } = personRow.parse(found);
  return { user, member: role === null || labId === null ? null : { userId, labId, role } };
}

function viewerOf(request: Request, labId: string | null) {
  return { userId: request.session.userId ?? null, labId };
}

function asAnswer(reply: Reply): Answer {
  return {
    status: reply.status ?? (reply.body === undefined && reply.file === undefined ? 204 : 200),
    etag: reply.revision === undefined ? null : etagOf(reply.revision),
    body: reply.body,
    ...(reply.file === undefined ? {} : { file: reply.file }),
  };
}

export async function answerPublic<P extends z.ZodType, Q extends z.ZodType, B extends z.ZodType>(
  definition: PublicDefinition<P, Q, B>,
  { request, database }: Exchange,
): Promise<Answer> {
  const params = readParams(definition.params, request.params);
  const query = readInput(definition.query, request.query);
  const body = readInput(definition.body, request.body);
  const person =
    request.session.userId === undefined
      ? null
      : await inTransaction(database, viewerOf(request, null), (transaction) =>
          whoAsks(transaction, request, null),
        );
  return asAnswer(
    await definition.handler({ params, query, body, now: new Date(), user: person?.user ?? null, database }),
  );
}

export async function answerSignedIn<P extends z.ZodType, Q extends z.ZodType, B extends z.ZodType>(
  definition: SignedInDefinition<P, Q, B>,
  { request, response, database }: Exchange,
): Promise<Answer> {
  if (request.session.userId === undefined) throw unauthenticated();
  const now = new Date();
  const answer = await inTransaction(database, viewerOf(request, null), async (transaction) => {
    const person = await whoAsks(transaction, request, null);
    if (person === null) throw unauthenticated();
    const { user } = person;
    const params = readParams(definition.params, request.params);
    const query = readInput(definition.query, request.query);
    const body = readInput(definition.body, request.body);
    const audit = (labId: string, entry: AuditEntry) =>
      recordEvent(transaction, { labId, actor: { id: user.id, name: user.name }, at: now }, entry);
    const work = async () =>
      asAnswer(await definition.handler({ params, query, body, now, user, transaction, request, audit }));
    if (definition.idempotent !== true) return work();
    const claim = { userId: user.id, key: idempotencyKey(request), requestHash: requestHash(request, body) };
    return once<never>(transaction, claim, work);
  });
  await definition.afterwards?.(request, response);
  return answer;
}

export async function answerMember<
  P extends z.ZodType<{ labId: string }>,
  Q extends z.ZodType,
  B extends z.ZodType,
  T extends Thing,
>(definition: MemberDefinition<P, Q, B, T>, exchange: Exchange): Promise<Answer> {
  const { request, database } = exchange;
  if (request.session.userId === undefined) throw unauthenticated();
  try {
    const viewer = viewerOf(request, labIdFrom(definition, request));
    const first = await inTransaction(database, viewer, (transaction) =>
      answerInside(definition, request, transaction, definition.handler),
    );
    if (!('outside' in first)) return first;
    const finish = await first.outside();
    return await inTransaction(database, viewer, (transaction) =>
      answerInside<P, Q, B, T, never>(definition, request, transaction, finish),
    );
  } catch (error) {
    // Recorded after the refusal's own transaction is gone, so that it stays.
    if (error instanceof ProblemError && error.code === 'not-allowed') {
      await recordAccountEvent(database, {
        kind: 'refused',
        userId: request.session.userId,
        detail: `${definition.access.action} ${request.method}`,
        requestId: requestIdOf(request),
      });
    }
    throw error;
  }
}

/** The lab that the address names, before anyone knows who asks: an address that names none must still ask who it is. */
function labIdFrom(
  definition: { readonly params: z.ZodType<{ labId: string }> },
  request: Request,
): string | null {
  const parsed = definition.params.safeParse(request.params);
  return parsed.success ? parsed.data.labId : null;
}

async function answerInside<
  P extends z.ZodType<{ labId: string }>,
  Q extends z.ZodType,
  B extends z.ZodType,
  T extends Thing,
  Unfinished extends { readonly outside: unknown },
>(
  definition: MemberDefinition<P, Q, B, T>,
  request: Request,
  transaction: Transaction,
  handler: (context: MemberContext<P, Q, B, T>) => Promise<Reply | Unfinished>,
): Promise<Answer | Unfinished> {
  const now = new Date();
  const person = await whoAsks(transaction, request, labIdFrom(definition, request));
  if (person === null) throw unauthenticated();
  const params = readParams(definition.params, request.params);
  const { user, member } = person;
  if (member === null) throw notFound();
  const thing = await definition.access.thing(transaction, params);
  if (thing?.labId !== params.labId) throw notFound();
  if (!can(member, definition.access.action, thing)) throw forbidden();

  const query = readInput(definition.query, request.query);
  const body = readInput(definition.body, request.body);
  const expected = expectedRevision(request, definition.needsMatch === true);
  let recorded = 0;
  const audit = async (entry: AuditEntry) => {
    recorded += 1;
    await recordEvent(
      transaction,
      { labId: thing.labId, actor: { id: user.id, name: user.name }, at: now },
      entry,
    );
  };
  const work = async (): Promise<Answer | Unfinished> => {
    const reply = await handler({
      params,
      query,
      body,
      now,
      user,
      member,
      labId: thing.labId,
      transaction,
      thing,
      expectedRevision: expected,
      audit,
    });
    if ('outside' in reply) return reply;
    // A change that leaves no trace must not commit.
    if (definition.method !== 'get' && recorded === 0 && reply.unchanged !== true) {
      throw new Error(`${definition.method} ${definition.path} changed something and recorded no event`);
    }
    return asAnswer(reply);
  };
  if (definition.idempotent !== true) return work();
  return once(
    transaction,
    { userId: user.id, key: idempotencyKey(request), requestHash: requestHash(request, body) },
    work,
  );
}
