/**
 * The start command as a person meets it, in a copy of the tree: up, disturbed, stopped, killed, up again.
 */
import { spawn, type ChildProcess } from 'node:child_process';
import {
  cpSync,
  existsSync,
  mkdirSync,
  mkdtempSync,
  readFileSync,
  readdirSync,
  rmSync,
  symlinkSync,
  chmodSync,
} from 'node:fs';
import { createServer, type Server } from 'node:net';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import pg from 'pg';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { z } from 'zod';
import { isPortFree } from '../../scripts/lib/ports.mjs';
import { waitUntil } from '../../scripts/lib/processes.mjs';

const root = fileURLToPath(new URL('../..', import.meta.url));
const LIMIT_MS = 60_000;

interface Started {
  readonly child: ChildProcess;
  readonly output: () => string;
  readonly exit: Promise<number | null>;
}

let clone: string;
const started: Started[] = [];
const blockers: Server[] = [];

beforeAll(async () => {
  clone = path.join(mkdtempSync(path.join(tmpdir(), 'quarterturn-start-')), 'clone');
  chmodSync(path.dirname(clone), 0o711);
  const left = new Set(['node_modules', '.git', '.data', '.env', 'dist']);
  cpSync(root, clone, { recursive: true, filter: (source) => !left.has(path.relative(root, source)) });
  symlinkSync(path.join(root, 'node_modules'), path.join(clone, 'node_modules'));
  // A client that was built from these sources need not be built again for the copy.
  const built = path.join(root, '.data', 'client-sources');
  if (existsSync(built) && existsSync(path.join(root, 'dist'))) {
    mkdirSync(path.join(clone, '.data'));
    cpSync(built, path.join(clone, '.data', 'client-sources'));
    cpSync(path.join(root, 'dist'), path.join(clone, 'dist'), { recursive: true });
  }
  // Somebody sits on the port that would be taken first: this test, unless somebody else does already.
  if (await isPortFree(4600)) {
    const blocker = createServer();
    await new Promise<void>((resolve) => {
      blocker.listen(4600, '127.0.0.1', resolve);
    });
    blockers.push(blocker);
  }
});

afterAll(async () => {
  for (const one of started) one.child.kill('SIGTERM');
  await Promise.all(started.map((one) => one.exit));
  for (const blocker of blockers) blocker.close();
  await waitUntil(() => processesOfClone().length === 0, 20_000);
  rmSync(path.dirname(clone), { recursive: true, force: true });
});

function startCommand(settings: Readonly<Record<string, string>> = {}): Started {
  const child = spawn(process.execPath, ['scripts/start.mjs'], {
    cwd: clone,
    env: { PATH: process.env['PATH'], HOME: process.env['HOME'], ...settings },
    stdio: ['ignore', 'pipe', 'pipe'],
  });
  let text = '';
  child.stdout.on('data', (chunk: Buffer) => (text += chunk.toString()));
  child.stderr.on('data', (chunk: Buffer) => (text += chunk.toString()));
  const exit = new Promise<number | null>((resolve) => child.once('close', resolve));
  const one = { child, output: () => text, exit };
  started.push(one);
  return one;
}

/** Waits until the command says that it is ready and answers the address it gave. */
async function ready(one: Started): Promise<string> {
  const isOver = () => one.child.exitCode !== null || one.output().includes('Ready after');
  await waitUntil(isOver, LIMIT_MS);
  const url = /Quarterturn is at (\S+)/.exec(one.output())?.[1];
  if (url === undefined) throw new Error(`the start command did not become ready:\n${one.output()}`);
  return url;
}

async function answersOk(url: string): Promise<boolean> {
  try {
    return (await fetch(url, { signal: AbortSignal.timeout(2_000) })).ok;
  } catch {
    return false;
  }
}

/** Every process whose command line names the copy, which the database's, the servers' and their keepers' do. */
function processesOfClone(containing = clone): number[] {
  return readdirSync('/proc')
    .filter((name) => /^\d+$/.test(name))
    .filter((name) => {
      try {
        return readFileSync(`/proc/${name}/cmdline`, 'utf8').includes(containing);
      } catch {
        return false;
      }
    })
    .map(Number);
}

function postmaster(): number {
  return Number(readFileSync(path.join(clone, '.data/postgres/data/postmaster.pid'), 'utf8').split('\n')[0]);
}

/** The ids of the labs in the copy's own database, read as the superuser, whom no row-level rule stops. */
async function labs(): Promise<unknown[]> {
  const record = z
    .object({ passwords: z.object({ admin: z.string() }) })
    .parse(JSON.parse(readFileSync(path.join(clone, '.data/database.json'), 'utf8')));
  const port = Number(
    readFileSync(path.join(clone, '.data/postgres/data/postmaster.pid'), 'utf8').split('\n')[3],
  );
  const client = new pg.Client({
    ...{ host: '127.0.0.1', port, user: 'quarterturn_admin', database: 'quarterturn' },
    password: record.passwords.admin,
  });
  await client.connect();
  try {
    return (await client.query<Record<string, unknown>>('SELECT id FROM labs ORDER BY id')).rows;
  } finally {
    await client.end();
  }
}

test('a first start brings everything up beside a taken port, survives its parts being killed, and Ctrl-C ends it all', async () => {
  const first = startCommand();
  const url = await ready(first);
  expect(url).not.toBe('http://localhost:4600');
  expect(await answersOk(`${url}/readyz`)).toBe(true);
  expect(await answersOk(url)).toBe(true);
  for (const name of ['Adaeze Holm', 'Noor Haddad', 'Pia Brandt']) expect(first.output()).toContain(name);

  const second = startCommand();
  expect(await second.exit).toBe(0);
  expect(second.output()).toContain(`runs here already: ${url}`);
  expect(await answersOk(`${url}/readyz`)).toBe(true);

  const [server] = processesOfClone(`${clone}/server/index.ts`);
  if (server === undefined) throw new Error('the server does not run');
  process.kill(server, 'SIGKILL');
  await waitUntil(() => first.output().includes('starting it again'), LIMIT_MS);
  expect(await waitUntil(() => answersOk(`${url}/readyz`), LIMIT_MS)).toBe(true);

  const database = postmaster();
  process.kill(database, 'SIGKILL');
  expect(await waitUntil(() => postmaster() !== database && answersOk(`${url}/readyz`), LIMIT_MS, 100)).toBe(
    true,
  );

  const interrupted = Date.now();
  first.child.kill('SIGINT');
  expect(await first.exit).toBe(0);
  expect(Date.now() - interrupted).toBeLessThan(15_000);
  expect(processesOfClone()).toEqual([]);
  expect(await answersOk(`${url}/readyz`)).toBe(false);
}, 180_000);

test('a start that is killed outright takes its servers with it, and the next one finds the same labs', async () => {
  const killed = startCommand();
  await ready(killed);
  const before = await labs();
  killed.child.kill('SIGKILL');
  await killed.exit;

  // At once, while the old servers and the old database are still closing.
  const next = startCommand();
  await ready(next);
  const after = await labs();
  next.child.kill('SIGKILL');
  expect(await waitUntil(() => processesOfClone().length === 0, 20_000)).toBe(true);
  expect(after).toEqual(before);
  expect(before.length).toBeGreaterThan(0);
}, 180_000);

describe('a step that fails says what failed and what to do', () => {
  const cases: readonly (readonly [string, Readonly<Record<string, string>>, string, string])[] = [
    ['a port that is none', { PORT: '99999' }, 'which is no port', 'from 1 to 65535'],
    [
      'production without GitHub',
      { NODE_ENV: 'production' },
      'stand-in for GitHub is refused',
      'Set GITHUB_CLIENT_ID',
    ],
    ['half of the sign-in settings', { GITHUB_CLIENT_ID: 'x' }, 'Only one of', 'Set both'],
    ['half of the database settings', { DATABASE_URL: 'postgres://127.0.0.1/x' }, 'Only one of', 'Set both'],
  ];
  test.each(cases)('%s', async (_name, settings, what, remedy) => {
    const refused = startCommand(settings);
    expect(await refused.exit).toBe(1);
    expect(refused.output()).toContain(what);
    expect(refused.output()).toContain(remedy);
  });

  test('a port asked for by name that is taken', async () => {
    const blocker = createServer();
    await new Promise<void>((resolve) => {
      blocker.listen(0, '127.0.0.1', resolve);
    });
    blockers.push(blocker);
    const address = blocker.address();
    if (address === null || typeof address === 'string') throw new Error('the blocker has no port');
    const refused = startCommand({ PORT: String(address.port) });
    expect(await refused.exit).toBe(1);
    expect(refused.output()).toContain(`PORT asks for ${address.port}`);
    expect(refused.output()).toContain('Set PORT to another number');
  });
});
