import { randomBytes } from 'node:crypto';
import pg from 'pg';
import { inject } from 'vitest';
import { APP_ROLE, OWNER_ROLE, withDatabase } from '../../scripts/lib/postgres.mjs';

/** What the global set-up hands to each test file: a running cluster and the name of its migrated template. */
export interface TestCluster {
  readonly adminUrl: string;
  readonly ownerUrl: string;
  readonly appUrl: string;
  readonly template: string;
}

declare module 'vitest' {
  export interface ProvidedContext {
    testCluster: TestCluster;
  }
}

export interface TestDatabase {
  readonly name: string;
  /** Connects as the superuser, past every rule: for arranging what no honest client could. */
  readonly adminUrl: string;
  /** Connects as the role that owns the tables. */
  readonly ownerUrl: string;
  /** Connects as the role that the server uses. */
  readonly appUrl: string;
  /** Removes the database, ending whatever is still connected to it. */
  readonly drop: () => Promise<void>;
}

/** A migrated, empty database of the caller's own, cloned in some tens of milliseconds. Call once per test file and drop it in afterAll. */
export async function createTestDatabase(): Promise<TestDatabase> {
  const cluster = inject('testCluster');
  const name = `test_${randomBytes(8).toString('hex')}`;
  await query(cluster.adminUrl, [
    `CREATE DATABASE ${name} TEMPLATE ${cluster.template} OWNER ${OWNER_ROLE}`,
    // A clone takes the template's tables but not the rights on the database itself.
    `REVOKE ALL ON DATABASE ${name} FROM PUBLIC`,
    `GRANT CONNECT ON DATABASE ${name} TO ${APP_ROLE}`,
  ]);
  return {
    name,
    adminUrl: withDatabase(cluster.adminUrl, name),
    ownerUrl: withDatabase(cluster.ownerUrl, name),
    appUrl: withDatabase(cluster.appUrl, name),
    drop: () => query(cluster.adminUrl, [`DROP DATABASE IF EXISTS ${name} WITH (FORCE)`]),
  };
}

async function query(url: string, statements: readonly string[]): Promise<void> {
  const client = new pg.Client({ connectionString: url });
  await client.connect();
  try {
    for (const statement of statements) await client.query(statement);
  } finally {
    await client.end();
  }
}
