/**
 * Puts the demo labs into a database that has none: node --import tsx scripts/seed.ts
 */
import knex from 'knex';
import config from '../knexfile';
import { requireOwnerUrl } from './lib/owner-url';

requireOwnerUrl();
const database = knex(config);
try {
  const lab: unknown = await database('labs').first('id');
  if (lab === undefined) {
    await database.seed.run();
    process.stdout.write('Seeded the demo labs.\n');
  } else {
    process.stdout.write('There are labs already; nothing to seed.\n');
  }
} finally {
  await database.destroy();
}
