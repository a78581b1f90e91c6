/**
 * Brings the database that DATABASE_OWNER_URL names up to the newest migration: node --import tsx scripts/migrate.ts
 */
import { withOwnersDatabase, migrateToLatest } from './lib/owners-database';

await withOwnersDatabase(migrateToLatest);
