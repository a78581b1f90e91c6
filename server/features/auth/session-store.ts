import connectPgSimple from 'connect-pg-simple';
import session, { type SessionData } from 'express-session';
import type pg from 'pg';
import { z } from 'zod';

/** Minutes that a visitor who is not signed in keeps the place of their sign-in. */
const visitorMinutes = 15;
const idleHours = 8;
const absoluteHours = 24;
/** A session that is used is prolonged this often, not at every request: each time costs a write. */
const prolongMinutes = 10;

const liveRow = z.object({
  sess: z.custom<SessionData>((value) => typeof value === 'object' && value !== null),
  stale: z.boolean(),
});

const PGStore = connectPgSimple(session);

/** Until when a session lives, by the database's clock: $1 is its JSON. */
const expiry = `case when ($1::json ->> 'userId') is null then now() + interval '${visitorMinutes} minutes'
  else least(now() + interval '${idleHours} hours',
    to_timestamp(($1::json ->> 'signedInAt')::double precision / 1000) + interval '${absoluteHours} hours') end`;

/**
 * Sessions in PostgreSQL. An ended one is never deleted before its time but marked, so that a slow request which read
 * it earlier and saves it later cannot bring it back.
 */
export class SessionStore extends PGStore {
  readonly #pool: pg.Pool;

  constructor(pool: pg.Pool, onError: (error: unknown) => void, prune: boolean) {
    super({
      pool,
      tableName: 'sessions',
      disableTouch: true,
      pruneSessionInterval: prune ? 15 * 60 : false,
      errorLog: (...details: unknown[]) => onError(details),
    });
    this.#pool = pool;
  }

  override get(sid: string, callback: (error: unknown, session?: SessionData | null) => void): void {
    void settle(this.#read(sid), callback);
  }

  async #read(sid: string): Promise<SessionData | null> {
    const { rows } = await this.#pool.query<Record<string, unknown>>({
      name: 'session-read',
      text: `select sess, user_id is not null and seen_at < now() - interval '${prolongMinutes} minutes' as stale
        from sessions where sid = $1 and ended_at is null and expire > now()`,
      values: [sid],
    });
    if (rows[0] === undefined) return null;
    const row = liveRow.parse(rows[0]);
    if (row.stale) {
      await this.#pool.query(
        `update sessions set seen_at = now(), expire = ${expiry} where sid = $2 and ended_at is null`,
        [JSON.stringify(row.sess), sid],
      );
    }
    return row.sess;
  }

  override set(sid: string, data: SessionData, callback?: (error?: unknown) => void): void {
    void settle(
      this.#pool.query(
        `insert into sessions (sid, sess, expire) values ($2, $1::json, ${expiry})
          on conflict (sid) do update set sess = excluded.sess, expire = excluded.expire, seen_at = now()
          where sessions.ended_at is null`,
        [JSON.stringify(data), sid],
      ),
      (error) => callback?.(error),
    );
  }

  override destroy(sid: string, callback?: (error?: unknown) => void): void {
    void settle(
      this.#pool.query(
        // A row must stand there even if it was never saved: a slower request may be about to save it.
        `insert into sessions (sid, sess, expire, ended_at) values ($1, '{}', now() + interval '${absoluteHours} hours', now())
          on conflict (sid) do update set sess = '{}', ended_at = coalesce(sessions.ended_at, now())`,
        [sid],
      ),
      (error) => callback?.(error),
    );
  }

  override touch(_sid: string, _data: SessionData, callback?: () => void): void {
    callback?.();
  }
}

async function settle<Value>(
  promise: Promise<Value>,
  callback: (error: unknown, value?: Value) => void,
): Promise<void> {
  let value: Value;
  try {
    value = await promise;
  } catch (error) {
    callback(error);
    return;
  }
  callback(null, value);
}
