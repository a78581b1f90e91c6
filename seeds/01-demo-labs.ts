import type { Knex } from 'knex';
import { seedHarbour } from './lib/harbour';
import { seedTernStreet } from './lib/tern-street';
import { clock } from './lib/time';

/** Puts the two demo labs into a database where nobody is yet; leaves any other alone. */
export async function seed(knex: Knex): Promise<void> {
  await knex.transaction(async (transaction) => {
    // Two starters at once would both find it empty.
    await transaction.raw('lock table users in exclusive mode');
    const someone: unknown = await transaction('users').first('id');
    if (someone !== undefined) return;
    const at = clock(new Date());
    await seedTernStreet(transaction, at);
    await seedHarbour(transaction, at);
  });
}
