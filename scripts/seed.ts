/**
 * Migrates, then puts the demo labs into a database that has no lab: node --import tsx scripts/seed.ts
 */
import { migrateToLatest, withOwnersDatabase } from './lib/owners-database';

await withOwnersDatabase(async (database) => {
  await migrateToLatest(database);
  const lab: unknown = await database('labs').first('id');
  if (lab !== undefined) return;
  await database.seed.run();
  process.stdout.write('Demo labs put in.\n');
});
