import type { Request, Response } from 'express';
import type { Knex } from 'knex';
import type { Logger } from 'pino';
import { z } from 'zod';
import type { Action, Member, Thing } from '../../shared/permissions';
import type { AuditEntry } from '../audit/record-event';
import type { Transaction } from '../db/database';
import { answerMember, answerPublic, answerSignedIn } from './answer';

export interface User {
  readonly id: string;
  readonly name: string;
  readonly login: string;
  readonly email: string | null;
}

/** A file on its way to whoever asks: what someone uploaded, or an export. */
export interface SentFile {
  readonly name: string;
  /** As the content says; never what could run in a page of ours. */
  readonly mediaType: string;
  readonly bytes: Buffer;
}

/** What a handler gives back; without a body and a file the answer is 204. */
export interface Reply {
  readonly status?: 200 | 201;
  readonly body?: unknown;
  /** Sent instead of a body. */
  readonly file?: SentFile;
  /** Becomes the ETag `"r<revision>"`. */
  readonly revision?: number;
  /** A repeat of what is done already: nothing was changed, so nothing is recorded. */
  readonly unchanged?: true;
}

/**
 * What a handler gives back that has only read: work that takes longer than a transaction may stay open. It runs with none
 * open and says how to finish in another, where person, access and thing are looked up anew.
 */
export interface LongWork<Context> {
  readonly outside: () => Promise<(context: Context) => Promise<Reply>>;
}

/** Of a route that takes no query, or no body. */
export const nothing = z.strictObject({});
export const noBody = z.undefined();

interface Shape<P extends z.ZodType, Q extends z.ZodType, B extends z.ZodType> {
  readonly method: 'get' | 'post' | 'put' | 'patch' | 'delete';
  readonly path: string;
  readonly params: P;
  readonly query: Q;
  readonly body: B;
  /** What the answer looks like; the answer is held to it. Absent: there is no body. */
  readonly response?: z.ZodType;
  /** A creating call: needs an Idempotency-Key. */
  readonly idempotent?: boolean;
  /** Adds to the answer what is never stored, not even for the repeat of a creating call. */
  readonly present?: (body: unknown) => unknown;
}

interface Input<P extends z.ZodType, Q extends z.ZodType, B extends z.ZodType> {
  readonly params: z.output<P>;
  readonly query: z.output<Q>;
  readonly body: z.output<B>;
  readonly now: Date;
}

export interface PublicDefinition<
  P extends z.ZodType,
  Q extends z.ZodType,
  B extends z.ZodType,
> extends Shape<P, Q, B> {
  readonly access: { readonly kind: 'public' };
  readonly handler: (
    context: Input<P, Q, B> & { readonly user: User | null; readonly database: Knex },
  ) => Promise<Reply>;
}

export interface SignedInDefinition<
  P extends z.ZodType,
  Q extends z.ZodType,
  B extends z.ZodType,
> extends Shape<P, Q, B> {
  readonly access: { readonly kind: 'signed-in' };
  readonly handler: (
    context: Input<P, Q, B> & {
      readonly user: User;
      readonly transaction: Transaction;
      readonly request: Request;
      /** For a lab that the person makes or joins by this very request. */
      readonly audit: (labId: string, entry: AuditEntry) => Promise<void>;
    },
  ) => Promise<Reply>;
  /** Once the transaction is committed: what happens to the session, never to data. */
  readonly afterwards?: (request: Request, response: Response) => Promise<void>;
}

export interface MemberContext<
  P extends z.ZodType,
  Q extends z.ZodType,
  B extends z.ZodType,
  T extends Thing,
> extends Input<P, Q, B> {
  readonly user: User;
  readonly member: Member;
  readonly labId: string;
  readonly transaction: Transaction;
  /** The stored row that the action touches. */
  readonly thing: T;
  /** From If-Match; null when it names no revision of ours, and then it matches nothing. */
  readonly expectedRevision: number | null;
  /** Records what this request changes, in its transaction. Every member's write calls it. */
  readonly audit: (entry: AuditEntry) => Promise<void>;
}

export interface MemberDefinition<
  P extends z.ZodType<{ labId: string }>,
  Q extends z.ZodType,
  B extends z.ZodType,
  T extends Thing,
> extends Shape<P, Q, B> {
  readonly access: {
    readonly kind: 'member';
    readonly action: Action;
    /** The stored row that decides, or null where there is none that this lab can see. */
    readonly thing: (transaction: Transaction, params: z.output<P>) => Promise<T | null>;
  };
  /** Needs If-Match: 428 without. */
  readonly needsMatch?: boolean;
  readonly handler: (
    context: MemberContext<P, Q, B, T>,
  ) => Promise<Reply | LongWork<MemberContext<P, Q, B, T>>>;
}

/** One request as the router hands it on. */
export interface Exchange {
  readonly request: Request;
  readonly response: Response;
  readonly database: Knex;
  readonly logger: Logger;
}

/** An answer as it goes out, and as it is kept for a repeat. */
export interface Answer {
  readonly status: number;
  readonly etag: string | null;
  readonly body: unknown;
  readonly file?: SentFile;
}

/** A route as the router and the permission table see it: access is always part of it. */
export interface Route {
  readonly method: 'get' | 'post' | 'put' | 'patch' | 'delete';
  readonly path: string;
  readonly access:
    { readonly kind: 'public' | 'signed-in' } | { readonly kind: 'member'; readonly action: Action };
  readonly idempotent: boolean;
  readonly needsMatch: boolean;
  readonly response: z.ZodType | null;
  readonly present: (body: unknown) => unknown;
  readonly answer: (exchange: Exchange) => Promise<Answer>;
}

/**
 * Declares a route. Without `access` it does not type-check, and a member's route says which stored row decides:
 * the handler runs only after `can(member, action, row)`.
 */
export function route<P extends z.ZodType, Q extends z.ZodType, B extends z.ZodType>(
  definition: PublicDefinition<P, Q, B>,
): Route;
export function route<P extends z.ZodType, Q extends z.ZodType, B extends z.ZodType>(
  // eslint-disable-next-line @typescript-eslint/unified-signatures -- one signature for both would leave the handler's context without a type
  definition: SignedInDefinition<P, Q, B>,
): Route;
export function route<
  P extends z.ZodType<{ labId: string }>,
  Q extends z.ZodType,
  B extends z.ZodType,
  T extends Thing,
>(definition: MemberDefinition<P, Q, B, T>): Route;
export function route<
  P extends z.ZodType<{ labId: string }>,
  Q extends z.ZodType,
  B extends z.ZodType,
  T extends Thing,
>(definition: PublicDefinition<P, Q, B> | SignedInDefinition<P, Q, B> | MemberDefinition<P, Q, B, T>): Route {
  if (isPublic(definition)) {
    return {
      ...factsOf(definition),
      access: { kind: 'public' },
      answer: (exchange) => answerPublic(definition, exchange),
    };
  }
  if (isSignedIn(definition)) {
    return {
      ...factsOf(definition),
      access: { kind: 'signed-in' },
      answer: (exchange) => answerSignedIn(definition, exchange),
    };
  }
  return {
    ...factsOf(definition),
    needsMatch: definition.needsMatch === true,
    access: { kind: 'member', action: definition.access.action },
    answer: (exchange) => answerMember(definition, exchange),
  };
}

type AnyDefinition<
  P extends z.ZodType<{ labId: string }>,
  Q extends z.ZodType,
  B extends z.ZodType,
  T extends Thing,
> = PublicDefinition<P, Q, B> | SignedInDefinition<P, Q, B> | MemberDefinition<P, Q, B, T>;

// TypeScript does not tell a union apart by a tag one level down.
function isPublic<
  P extends z.ZodType<{ labId: string }>,
  Q extends z.ZodType,
  B extends z.ZodType,
  T extends Thing,
>(definition: AnyDefinition<P, Q, B, T>): definition is PublicDefinition<P, Q, B> {
  return definition.access.kind === 'public';
}

function isSignedIn<
  P extends z.ZodType<{ labId: string }>,
  Q extends z.ZodType,
  B extends z.ZodType,
  T extends Thing,
>(definition: AnyDefinition<P, Q, B, T>): definition is SignedInDefinition<P, Q, B> {
  return definition.access.kind === 'signed-in';
}

function factsOf(definition: Shape<z.ZodType, z.ZodType, z.ZodType>) {
  return {
    method: definition.method,
    path: definition.path,
    idempotent: definition.idempotent === true,
    needsMatch: false,
    response: definition.response ?? null,
    present: definition.present ?? ((body: unknown) => body),
  };
}
