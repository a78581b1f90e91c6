import { type ChildProcess, spawn } from 'node:child_process';
import { randomBytes } from 'node:crypto';
import { once } from 'node:events';
import { createServer } from 'node:net';
import path from 'node:path';
import { createTestDatabase } from '../../setup/database';

const root = path.resolve(import.meta.dirname, '../../..');
const startLimitMs = 30_000;

/** The built product on its own database with the demo lab in it, served as `npm start` serves it. */
export interface Product {
  readonly url: string;
  readonly fakeGitHubUrl: string;
  /** Everything that the server has logged. */
  readonly log: () => string;
  readonly stop: () => Promise<void>;
}

async function freePort(): Promise<number> {
  const server = createServer().listen(0, '127.0.0.1');
  await once(server, 'listening');
  const address = server.address();
  server.close();
  if (address === null || typeof address === 'string') throw new Error('The system gave no port.');
  return address.port;
}

function run(
  args: readonly string[],
  env: Record<string, string>,
): { child: ChildProcess; output: () => string } {
  const child = spawn(process.execPath, ['--import', 'tsx', ...args], {
    cwd: root,
    env: { PATH: process.env['PATH'] ?? '', NODE_ENV: 'development', ...env },
    // An open standard input: the server watches it and ends with its parent.
    stdio: ['pipe', 'pipe', 'pipe'],
  });
  let output = '';
  child.stdout.on('data', (chunk: Buffer) => (output += chunk.toString()));
  child.stderr.on('data', (chunk: Buffer) => (output += chunk.toString()));
  return { child, output: () => output };
}

async function ready(url: string, output: () => string): Promise<void> {
  const deadline = Date.now() + startLimitMs;
  while (Date.now() < deadline) {
    const answer = await fetch(url).catch(() => null);
    if (answer?.ok === true) return;
    await new Promise((resolve) => setTimeout(resolve, 100));
  }
  throw new Error(`${url} did not answer within ${startLimitMs / 1000} s.\n${output()}`);
}

async function end(child: ChildProcess): Promise<void> {
  if (child.exitCode !== null) return;
  const ended = once(child, 'exit');
  child.kill('SIGTERM');
  const timer = setTimeout(() => child.kill('SIGKILL'), 12_000);
  await ended;
  clearTimeout(timer);
}

export async function startProduct(): Promise<Product> {
  const database = await createTestDatabase();
  const seed = run(['scripts/seed.ts'], { DATABASE_OWNER_URL: database.ownerUrl });
  await once(seed.child, 'exit');
  if (seed.child.exitCode !== 0) throw new Error(`Seeding failed.\n${seed.output()}`);

  const [port, fakePort] = [await freePort(), await freePort()];
  const url = `http://localhost:${port}`;
  const fakeGitHubUrl = `http://localhost:${fakePort}`;
  const client = { GITHUB_CLIENT_ID: 'browser-test', GITHUB_CLIENT_SECRET: randomBytes(16).toString('hex') };
  const fake = run(['fake-oauth/index.ts'], { ...client, PORT: String(fakePort) });
  const server = run(['server/index.ts'], {
    ...client,
    PORT: String(port),
    HOST: '127.0.0.1',
    DATABASE_URL: database.appUrl,
    FAKE_GITHUB_URL: fakeGitHubUrl,
    SESSION_SECRET: randomBytes(48).toString('hex'),
    PUBLIC_URL: url,
    LOG_LEVEL: 'info',
  });
  await Promise.all([
    ready(`${fakeGitHubUrl}/demo-people`, fake.output),
    ready(`${url}/readyz`, server.output),
  ]);
  return {
    url,
    fakeGitHubUrl,
    log: server.output,
    stop: async () => {
      await Promise.all([end(server.child), end(fake.child)]);
      await database.drop();
    },
  };
}
