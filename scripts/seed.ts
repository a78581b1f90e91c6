/**
 * Migrates, then puts the demo labs into a database where nobody is yet: node --import tsx scripts/seed.ts
 */
import { migrateToLatest, withOwnersDatabase } from './lib/owners-database';

await withOwnersDatabase(async (database) => {
  await migrateToLatest(database);
  // Not the labs: row-level security shows none of them to anybody, their owner included, outside a lab's own transaction.
  const someone: unknown = await database('users').first('id');
  if (someone !== undefined) return;
  await database.seed.run();
  process.stdout.write('Demo labs put in.\n');
});
