import { createServer, type Server } from 'node:http';
import { tmpdir } from 'node:os';
import { Writable } from 'node:stream';
import type { Knex } from 'knex';
import { pino } from 'pino';
import supertest from 'supertest';
import { z } from 'zod';
import { type RunningFakeOAuth, startFakeOAuth } from '../../../fake-oauth/listen';
import { type RunningFakeSmtp, startFakeSmtp } from '../../../fake-smtp/listen';
import { createApp } from '../../../server/app';
import { type Config, loadConfig } from '../../../server/config';
import { openDatabase, openSidePool } from '../../../server/db/database';
import { startJobs } from '../../../server/jobs';
import { allWorkers } from '../../../server/workers';
import { createTestDatabase, type TestDatabase } from '../../setup/database';

export type Agent = ReturnType<typeof supertest.agent>;

export interface Harness {
  readonly origin: string;
  readonly config: Config;
  readonly database: Knex;
  readonly testDatabase: TestDatabase;
  readonly fake: RunningFakeOAuth;
  /** Takes the mail that jobs send. */
  readonly smtp: RunningFakeSmtp;
  /** Everything that was logged, for tests that look for what must not be there. */
  readonly log: () => string;
  /** A browser of its own, with its own cookies. */
  readonly browser: () => Agent;
  /** A browser in which this demo person has signed in, by the whole way through the provider. */
  readonly signIn: (login: string) => Promise<Agent>;
  readonly close: () => Promise<void>;
}

export interface HarnessOptions {
  readonly environment?: Readonly<Record<string, string>>;
  readonly pagesDirectory?: string;
  /** Whether the server works on its queue. Without it jobs are queued and wait. */
  readonly jobs?: true;
}

/** The whole server on a loopback port, with a database and a provider of its own. */
export async function startHarness(options: HarnessOptions = {}): Promise<Harness> {
  const testDatabase = await createTestDatabase();
  const server = createServer();
  const port = await listen(server);
  const origin = `http://127.0.0.1:${port}`;
  const client = { clientId: 'test-client', clientSecret: 'test-client-secret' };
  const fake = await startFakeOAuth({ port: 0, ...client, callbackUrl: `${origin}/` });
  const smtp = await startFakeSmtp({ smtpPort: 0, httpPort: 0 });
  const config = loadConfig({
    NODE_ENV: 'test',
    PORT: String(port),
    DATABASE_URL: testDatabase.appUrl,
    DATABASE_POOL_MAX: '4',
    SESSION_SECRET: 'a secret of the tests, long enough for anyone',
    PUBLIC_URL: origin,
    FAKE_GITHUB_URL: fake.url,
    GITHUB_CLIENT_ID: client.clientId,
    GITHUB_CLIENT_SECRET: client.clientSecret,
    FAKE_SMTP_URL: smtp.smtpUrl,
    SIGN_INS_PER_MINUTE: '100000',
    API_CALLS_PER_MINUTE: '1000000',
    UPLOADS_PER_MINUTE: '1000000',
    ...options.environment,
  });
  const database = openDatabase(config);
  const sidePool = openSidePool(config, () => undefined);
  const lines: string[] = [];
  const sink = new Writable({
    write(chunk: Buffer, _encoding, done) {
      lines.push(chunk.toString());
      done();
    },
  });
  const logger = pino({ level: 'info' }, sink);
  const { app, close } = createApp({
    config,
    database,
    sidePool,
    logger,
    readiness: { accepting: true },
    pagesDirectory: options.pagesDirectory ?? tmpdir(),
    prunes: false,
  });
  server.on('request', app);
  const jobs =
    options.jobs === true
      ? startJobs({ sidePool, database, logger, workers: allWorkers(config, database) })
      : null;
  return {
    origin,
    config,
    database,
    testDatabase,
    fake,
    smtp,
    log: () => lines.join(''),
    browser: () => supertest.agent(origin),
    signIn: async (login) => {
      const agent = supertest.agent(origin);
      const answer = await finishSignIn(agent, await chooseAtProvider(await startSignIn(agent), login));
      if (!answer.startsWith('/')) throw new Error(`signing in as ${login} ended at ${answer}`);
      return agent;
    },
    close: async () => {
      close();
      await jobs?.stop();
      await Promise.all([fake.close(), smtp.close()]);
      await new Promise<void>((resolve) => {
        server.close(() => resolve());
        server.closeAllConnections();
      });
      await Promise.all([database.destroy(), sidePool.end()]);
      await testDatabase.drop();
    },
  };
}

async function listen(server: Server): Promise<number> {
  await new Promise<void>((resolve) => {
    server.listen(0, '127.0.0.1', resolve);
  });
  return z.object({ port: z.number() }).parse(server.address()).port;
}

/** Sends a browser off; answers the provider's address it is sent to. */
export async function startSignIn(agent: Agent, returnTo = '/'): Promise<URL> {
  const response = await agent.get(`/auth/github?returnTo=${encodeURIComponent(returnTo)}`).redirects(0);
  return new URL(z.string().parse(response.headers['location']));
}

/** Chooses a person on the provider's page; answers our callback's address with its code. */
export async function chooseAtProvider(authorize: URL, login: string): Promise<URL> {
  const form = new URLSearchParams(authorize.searchParams);
  form.set('choose', login);
  const response = await fetch(new URL(authorize.pathname, authorize), {
    method: 'POST',
    body: form,
    redirect: 'manual',
  });
  return new URL(z.string().parse(response.headers.get('location')));
}

/** Follows the callback; answers where the browser ends up. */
export async function finishSignIn(agent: Agent, callback: URL): Promise<string> {
  const response = await agent.get(callback.pathname + callback.search).redirects(0);
  return z.string().parse(response.headers['location']);
}
