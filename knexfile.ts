import path from 'node:path';
import type { Knex } from 'knex';

/**
 * Migrations and seeds run as the role that owns the tables (DATABASE_OWNER_URL); the server never uses this file.
 * By hand: NODE_OPTIONS='--import tsx' DATABASE_OWNER_URL=… npx knex migrate:make name
 */
const config: Knex.Config = {
  client: 'pg',
  connection: process.env['DATABASE_OWNER_URL'] ?? '',
  pool: { min: 0, max: 2 },
  migrations: {
    directory: path.join(import.meta.dirname, 'migrations'),
    extension: 'ts',
    loadExtensions: ['.ts'],
  },
  seeds: {
    directory: path.join(import.meta.dirname, 'seeds'),
    extension: 'ts',
    loadExtensions: ['.ts'],
  },
};

export default config;
