import knex, { type Knex } from 'knex';
import config from '../../knexfile';

/** Lends the database as the role that owns its tables, and closes it afterwards. Throws in words when DATABASE_OWNER_URL is missing. */
export async function withOwnersDatabase(work: (database: Knex) => Promise<void>): Promise<void> {
  const url = process.env['DATABASE_OWNER_URL'];
  if (url === undefined || url === '') {
    // Without it the driver would connect to whatever database is near.
    throw new Error('Set DATABASE_OWNER_URL to the database and the role that owns its tables.');
  }
  const database = knex(config);
  try {
    await work(database);
  } finally {
    await database.destroy();
  }
}

/** Runs the migrations that are missing and says which. */
export async function migrateToLatest(database: Knex): Promise<void> {
  const result: unknown = await database.migrate.latest();
  const names: unknown = Array.isArray(result) ? result[1] : undefined;
  if (!Array.isArray(names)) throw new Error('knex no longer answers the names of the migrations it ran');
  if (names.length > 0) process.stdout.write(`Database migrated: ${names.length} new.\n`);
}
