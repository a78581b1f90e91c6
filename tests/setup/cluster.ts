/**
 * Once per vitest project that needs a database: takes the cluster that `npm test` started, or starts a throwaway one,
 * and makes the migrated template that every test file's own database is cloned from.
 */
import { randomBytes } from 'node:crypto';
import { fileURLToPath } from 'node:url';
import pg from 'pg';
import type { TestProject } from 'vitest/node';
import { APP_ROLE, OWNER_ROLE, withDatabase } from '../../scripts/lib/postgres.mjs';
import { run } from '../../scripts/lib/run.mjs';
import { startThrowawayCluster } from '../../scripts/lib/throwaway-cluster.mjs';
import type { TestCluster } from './database';

interface Urls {
  readonly adminUrl: string;
  readonly ownerUrl: string;
  readonly appUrl: string;
}

/** The cluster named by the environment, all three addresses or none. */
function clusterFromEnvironment(): Urls | undefined {
  const adminUrl = process.env['TEST_DATABASE_ADMIN_URL'];
  const ownerUrl = process.env['TEST_DATABASE_OWNER_URL'];
  const appUrl = process.env['TEST_DATABASE_APP_URL'];
  if (adminUrl === undefined || ownerUrl === undefined || appUrl === undefined) return undefined;
  return { adminUrl, ownerUrl, appUrl };
}

async function asAdmin(url: string, statements: readonly string[]): Promise<void> {
  const admin = new pg.Client({ connectionString: url });
  await admin.connect();
  try {
    for (const statement of statements) await admin.query(statement);
  } finally {
    await admin.end();
  }
}

async function makeTemplate(urls: Urls): Promise<string> {
  // A name of its own, because two projects of one run may share a cluster.
  const template = `template_${randomBytes(6).toString('hex')}`;
  await asAdmin(urls.adminUrl, [
    `CREATE DATABASE ${template} OWNER ${OWNER_ROLE}`,
    `REVOKE ALL ON DATABASE ${template} FROM PUBLIC`,
    `GRANT CONNECT ON DATABASE ${template} TO ${APP_ROLE}`,
  ]);
  const migrated = await run(process.execPath, ['--import', 'tsx', 'scripts/migrate.ts'], {
    cwd: fileURLToPath(new URL('../..', import.meta.url)),
    env: { ...process.env, DATABASE_OWNER_URL: withDatabase(urls.ownerUrl, template) },
  });
  if (migrated.code !== 0) throw new Error(`The test database could not be migrated:\n${migrated.output}`);
  // Nobody may sit in the template while a test clones it.
  await asAdmin(urls.adminUrl, [`ALTER DATABASE ${template} ALLOW_CONNECTIONS false`]);
  return template;
}

export default async function setup(project: TestProject): Promise<() => Promise<void>> {
  const given = clusterFromEnvironment();
  const own = given === undefined ? await startThrowawayCluster() : undefined;
  const urls = given ?? own;
  if (urls === undefined) throw new Error('no cluster to test with');
  try {
    const template = await makeTemplate(urls);
    const provided: TestCluster = {
      adminUrl: urls.adminUrl,
      ownerUrl: urls.ownerUrl,
      appUrl: urls.appUrl,
      template,
    };
    project.provide('testCluster', provided);
    return async () => {
      if (own === undefined) await asAdmin(urls.adminUrl, [`DROP DATABASE ${template} WITH (FORCE)`]);
      else await own.stop();
    };
  } catch (error) {
    await own?.stop();
    throw error;
  }
}
