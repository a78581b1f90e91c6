import knex, { type Knex } from 'knex';
import pg from 'pg';
import type { Config } from '../config';

export type Transaction = Knex.Transaction;

/** What a connection is never allowed to outlast; a stuck one gives way to an answer. */
const connectionLimits = {
  connectionTimeoutMillis: 5_000,
  statement_timeout: 15_000,
  lock_timeout: 3_000,
  idle_in_transaction_session_timeout: 15_000,
} as const;

/** The pool that requests work in. */
export function openDatabase(config: Pick<Config, 'databaseUrl' | 'databasePoolMax'>): Knex {
  return knex({
    client: 'pg',
    connection: { connectionString: config.databaseUrl, ...connectionLimits },
    pool: { min: 0, max: config.databasePoolMax },
    acquireConnectionTimeout: 5_000,
    asyncStackTraces: false,
  });
}

/** The pool of the session store and the rate limits, which speak to pg directly. Counts against max_connections too. */
export function openSidePool(
  config: Pick<Config, 'databaseUrl' | 'databasePoolMax'>,
  onIdleError: (error: Error) => void,
): pg.Pool {
  const pool = new pg.Pool({
    connectionString: config.databaseUrl,
    ...connectionLimits,
    max: Math.max(1, Math.ceil(config.databasePoolMax / 2)),
  });
  // Without a listener, a connection that the database ends while it idles would end the process.
  pool.on('error', onIdleError);
  return pool;
}
