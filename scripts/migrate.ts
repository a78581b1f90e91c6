/**
 * Brings the database that DATABASE_OWNER_URL names up to the newest migration: node --import tsx scripts/migrate.ts
 */
import knex from 'knex';
import { z } from 'zod';
import config from '../knexfile';
import { requireOwnerUrl } from './lib/owner-url';

// Knex answers the batch number and the names it ran, and types neither.
const migrated = z.tuple([z.number(), z.array(z.string())]);

requireOwnerUrl();
const database = knex(config);
try {
  const [, names] = migrated.parse(await database.migrate.latest());
  process.stdout.write(names.length === 0 ? 'No new migration.\n' : `Migrated: ${names.join(', ')}.\n`);
} finally {
  await database.destroy();
}
