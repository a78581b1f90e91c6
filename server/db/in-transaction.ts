import { setTimeout as sleep } from 'node:timers/promises';
import type { Knex } from 'knex';
import { sqlState } from './sql-state';
import type { Transaction } from './database';

/** Whose eyes a transaction sees with: row-level security reads these two. */
interface Viewer {
  readonly userId: string | null;
  readonly labId: string | null;
}

const retriable = new Set(['40001', '40P01']);
const maxAttempts = 3;

/**
 * Runs work in one transaction that sees only what the viewer may. Work may run up to three times (after a
 * serialisation failure or a deadlock), so it touches nothing but its transaction.
 */
export async function inTransaction<Result>(
  database: Knex,
  viewer: Viewer,
  work: (transaction: Transaction) => Promise<Result>,
): Promise<Result> {
  for (let attempt = 1; ; attempt += 1) {
    try {
      return await database.transaction(async (transaction) => {
        await seeAs(transaction, viewer);
        return work(transaction);
      });
    } catch (error) {
      const state = sqlState(error);
      if (attempt >= maxAttempts || state === null || !retriable.has(state)) throw error;
      await sleep(Math.random() * 40 * attempt);
    }
  }
}

/** Sets the viewer for the rest of this transaction. */
export async function seeAs(transaction: Transaction, viewer: Viewer): Promise<void> {
  await transaction.raw(`select set_config('app.user_id', ?, true), set_config('app.lab_id', ?, true)`, [
    viewer.userId ?? '',
    viewer.labId ?? '',
  ]);
}
