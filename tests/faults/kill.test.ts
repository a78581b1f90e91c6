import { type ChildProcess, spawn } from 'node:child_process';
import { randomUUID } from 'node:crypto';
import { once } from 'node:events';
import { createServer } from 'node:net';
import { setTimeout as sleep } from 'node:timers/promises';
import { mkdtempSync, mkdirSync, rmSync } from 'node:fs';
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import pg from 'pg';
import supertest from 'supertest';
import { build } from 'vite';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { z } from 'zod';
import { type RunningFakeOAuth, startFakeOAuth } from '../../fake-oauth/listen';
import { contentHash } from '../../shared/protocol/canonical-json';
import { verifyChain } from '../../shared/protocol/verify';
import {
  draftSchema,
  problemSchema,
  protocolSchema,
  runSchema,
  type DraftContent,
} from '../../shared/schemas';
import { chooseAtProvider, startSignIn } from '../api/support/harness';
import { makeLab, shownFor, target, type TestLab } from '../api/support/lab';
import { createTestDatabase, type TestDatabase } from '../setup/database';

const kills = 20;
const publicOrigin = 'http://127.0.0.1:4999';

const root = fileURLToPath(new URL('../..', import.meta.url));
/** So many servers come up at once: on a busy machine one after the other would take minutes. */
const comingUp = 3;

let database: TestDatabase;
let bundle = '';
let fake: RunningFakeOAuth;
let cookie = '';
const running = new Set<ChildProcess>();

/** Where the load goes now; null while nothing is up. */
let live: { readonly origin: string; readonly child: ChildProcess } | null = null;

beforeAll(async () => {
  database = await createTestDatabase();
  // In one file the server is up in a fraction of the time, and most of this test is servers coming up. Inside the
  // tree, because its packages are found from there.
  mkdirSync(path.join(root, 'node_modules/.cache'), { recursive: true });
  bundle = mkdtempSync(path.join(root, 'node_modules/.cache/kill-'));
  await build({
    configFile: false,
    root,
    publicDir: false,
    logLevel: 'error',
    build: { ssr: 'server/index.ts', outDir: bundle, emptyOutDir: true, minify: false },
  });
  fake = await startFakeOAuth({
    port: 0,
    clientId: 'kill',
    clientSecret: 'kill-secret',
    callbackUrl: `${publicOrigin}/`,
  });
});
afterAll(async () => {
  for (const child of running) child.kill('SIGKILL');
  await fake.close();
  await database.drop();
  rmSync(bundle, { recursive: true });
});

async function freePort(): Promise<number> {
  const probe = createServer().listen(0, '127.0.0.1');
  await once(probe, 'listening');
  const { port } = z.object({ port: z.number() }).parse(probe.address());
  probe.close();
  return port;
}

/** The product's own server, as a process; several may share one database, and each may be gone at any moment. */
async function startServer(): Promise<{ origin: string; child: ChildProcess }> {
  const port = await freePort();
  const origin = `http://127.0.0.1:${port}`;
  const child = spawn(process.execPath, [path.join(bundle, 'index.js')], {
    cwd: root,
    stdio: 'ignore',
    env: {
      ...process.env,
      NODE_ENV: 'test',
      PORT: String(port),
      PUBLIC_URL: publicOrigin,
      DATABASE_URL: database.appUrl,
      DATABASE_POOL_MAX: '8',
      SESSION_SECRET: 'the same secret for all of these servers',
      FAKE_GITHUB_URL: fake.url,
      GITHUB_CLIENT_ID: 'kill',
      GITHUB_CLIENT_SECRET: 'kill-secret',
      LOG_LEVEL: 'silent',
      API_CALLS_PER_MINUTE: '1000000',
    },
  });
  running.add(child);
  for (;;) {
    const up = await fetch(`${origin}/readyz`).then(
      ({ ok }) => ok,
      () => false,
    );
    if (up) return { origin, child };
    if (child.exitCode !== null) throw new Error(`the server ended with ${child.exitCode}`);
    await sleep(50);
  }
}

interface Sent {
  readonly method: string;
  readonly path: string;
  readonly body: unknown;
  readonly key?: string;
  readonly ifMatch?: string;
}

/** Sends until it is answered, the very same each time, as a page does whose server went away. */
async function insist({ method, path, body, key, ifMatch }: Sent): Promise<{ status: number; text: string }> {
  for (;;) {
    const target = live;
    if (target !== null) {
      try {
        const response = await fetch(`${target.origin}/api/v1${path}`, {
          method,
          headers: {
            Origin: publicOrigin,
            Cookie: cookie,
            'Content-Type': 'application/json',
            ...(key === undefined ? {} : { 'Idempotency-Key': key }),
            ...(ifMatch === undefined ? {} : { 'If-Match': ifMatch }),
          },
          body: JSON.stringify(body),
          signal: AbortSignal.timeout(10_000),
        });
        const text = await response.text();
        const stillWorking =
          response.status === 409 && problemSchema.parse(JSON.parse(text)).type.endsWith('still-working');
        if (response.status !== 503 && !stillWorking) return { status: response.status, text };
      } catch {
        // Gone in the middle: whether it was done or not, the same request again is right.
      }
    }
    await sleep(30);
  }
}

test(`a server killed ${kills} times while it saves and records loses nothing it acknowledged and leaves nothing half done`, async () => {
  live = await startServer();
  const { origin } = live;
  const agent = supertest.agent(origin);
  // As through a balancer: whatever server answers, the browser knows one address.
  agent.set('Host', new URL(publicOrigin).host);
  const callback = await chooseAtProvider(await startSignIn(agent), 'adaeze-holm');
  const signedIn = await agent.get(callback.pathname + callback.search).redirects(0);
  expect(signedIn.headers['location']).toBe('/');
  const [set] = z.array(z.string()).parse(signedIn.headers['set-cookie']);
  cookie = set?.split(';')[0] ?? '';
  const us = { origin: publicOrigin };
  const lab = await makeLab(us, agent, 'Under load');

  let going = true;
  const acknowledged = { drafts: [0, 0], versions: 0, readings: new Set<string>() };

  const saveDrafts = async (index: number, protocolId: string, content: DraftContent) => {
    let revision = 1;
    while (going) {
      const name = `Save ${revision} of ${index}`;
      const sent = {
        method: 'PUT',
        path: `/labs/${lab.labId}/protocols/${protocolId}/draft`,
        body: { ...content, name },
        ifMatch: `"r${revision}"`,
      };
      const { status, text } = await insist(sent);
      if (status === 412) {
        // The first try had been saved and its answer lost: what is there must be ours.
        const current = draftSchema.parse(problemSchema.parse(JSON.parse(text)).current);
        expect([current.revision, current.content.name]).toEqual([revision + 1, name]);
      } else expect([status, text.slice(0, 200)]).toEqual([200, text.slice(0, 200)]);
      revision += 1;
      acknowledged.drafts[index] = revision;
    }
  };
  const saveVersions = async (protocolId: string, content: DraftContent, shown: unknown) => {
    for (let revision = 1; going; revision += 1) {
      const path = `/labs/${lab.labId}/protocols/${protocolId}`;
      const saved = await insist({
        method: 'POST',
        path: `${path}/versions`,
        body: { message: `Version ${revision}`, shown },
        key: randomUUID(),
        ifMatch: `"r${revision}"`,
      });
      expect([saved.status, saved.text.slice(0, 300)]).toEqual([201, saved.text.slice(0, 300)]);
      acknowledged.versions = revision;
      const draft = await insist({
        method: 'PUT',
        path: `${path}/draft`,
        body: { ...content, purpose: `After ${revision}` },
        ifMatch: `"r${revision}"`,
      });
      expect([200, 412]).toContain(draft.status);
    }
  };
  const record = async (who: string) => {
    for (let count = 0; going; count += 1) {
      const note = `${who} ${count}`;
      const body = { outcome: 'done', settingIndex: count % 2, dialledDeg: [12.4, 301.7], note };
      const { status, text } = await insist({
        method: 'POST',
        path: `/labs/${lab.labId}/runs/${lab.runId}/readings`,
        body,
        key: randomUUID(),
      });
      expect([status, text.slice(0, 200)]).toEqual([201, text.slice(0, 200)]);
      acknowledged.readings.add(note);
    }
  };

  const protocols = [await begin(lab), await begin(lab), await begin(lab)] as const;
  const shown = await shownFor(us, agent, lab.labId, protocols[2].draft.content);
  const load = [
    saveDrafts(0, protocols[0].id, protocols[0].draft.content),
    saveDrafts(1, protocols[1].id, protocols[1].draft.content),
    saveVersions(protocols[2].id, protocols[2].draft.content, shown),
    record('one'),
    record('two'),
  ];
  const coming = Array.from({ length: comingUp }, () => startServer());
  for (let killed = 0; killed < kills; killed += 1) {
    // Others come up while this one is under load; once it is dead, all of the load goes to the next.
    const next = await coming.shift();
    if (next === undefined) throw new Error('no server is coming up');
    if (killed + comingUp < kills) coming.push(startServer());
    await sleep(300 + Math.random() * 300);
    live.child.kill('SIGKILL');
    running.delete(live.child);
    live = next;
  }
  await sleep(500);
  going = false;
  await Promise.all(load);

  const run = runSchema.parse(JSON.parse((await agentGet(lab, `/runs/${lab.runId}`)).text));
  const notes = run.readings.map(({ note }) => note);
  expect(notes.toSorted()).toEqual([...acknowledged.readings].toSorted());
  expect(run.readings.map(({ sequence }) => sequence)).toEqual(notes.map((_note, index) => index + 1));
  for (const index of [0, 1] as const) {
    const protocol = protocolSchema.parse(
      JSON.parse((await agentGet(lab, `/protocols/${protocols[index].id}`)).text),
    );
    expect(protocol.draft.revision).toBe(acknowledged.drafts[index]);
  }
  await checkRecord(protocols[2].id, acknowledged.versions, notes.length);
  expect(notes.length).toBeGreaterThan(kills);
}, 170_000);

async function begin(lab: TestLab) {
  const { text } = await insist({
    method: 'POST',
    path: `/labs/${lab.labId}/protocols`,
    body: {
      name: 'Under load',
      purpose: '',
      benchId: lab.benchId,
      kind: 'prepare',
      objective: 'least-expected-infidelity',
      presentDialsDeg: null,
      toleranceInfidelity: 1e-3,
      targets: [target('t', '(H + i V)/sqrt(2)')],
    },
    key: randomUUID(),
  });
  return protocolSchema.parse(JSON.parse(text));
}

function agentGet(lab: TestLab, path: string) {
  return supertest(live?.origin ?? '')
    .get(`/api/v1/labs/${lab.labId}${path}`)
    .set('Cookie', cookie);
}

/** In the database itself: chains unbroken, each change with its event, each key with its one answer. */
async function checkRecord(protocolId: string, versions: number, readings: number): Promise<void> {
  const client = new pg.Client({ connectionString: database.adminUrl });
  await client.connect();
  const rows = async (sql: string, values: unknown[] = []) =>
    (await client.query<Record<string, unknown>>(sql, values)).rows;
  const links = z
    .array(
      z.object({
        number: z.number(),
        canonicalJson: z.string(),
        contentHash: z.string(),
        parentHash: z.string().nullable(),
      }),
    )
    .parse(
      await rows(
        `select number, content as "canonicalJson", content_hash as "contentHash", parent_hash as "parentHash" from versions where protocol_id = $1 order by number`,
        [protocolId],
      ),
    );
  expect(verifyChain(links)).toEqual({ ok: true, length: versions });
  const events = z
    .array(
      z.object({
        kind: z.string(),
        content: z.string(),
        hash: z.string(),
        parent_hash: z.string().nullable(),
      }),
    )
    .parse(await rows('select kind, content, hash, parent_hash from audit_events order by sequence'));
  let parent: string | null = null;
  for (const event of events) {
    expect(event.parent_hash).toBe(parent);
    expect(contentHash(event.content)).toBe(event.hash);
    parent = event.hash;
  }
  expect(events.filter(({ kind }) => kind === 'reading.recorded')).toHaveLength(readings);
  const [draftSaves] = await rows(`select sum(revision - 1)::integer as saves from drafts`);
  expect(events.filter(({ kind }) => kind === 'draft.saved')).toHaveLength(
    z.object({ saves: z.number() }).parse(draftSaves).saves,
  );
  const [counts] = await rows(`select (select count(*)::integer from idempotency_keys) as keys,
    (select count(*)::integer from versions) + (select count(*)::integer from readings) + (select count(*)::integer from runs)
    + (select count(*)::integer from protocols) + (select count(*)::integer from plates) + (select count(*)::integer from benches)
    + (select count(*)::integer from labs) + (select count(*)::integer from invitations)
    + (select count(*)::integer from files) + (select count(*)::integer from plate_files)
    -- The others came with a plate, under its key.
    + (select count(*)::integer from mounts m where not exists (select from seats s where s.mount_id = m.id)) as made`);
  const { keys, made } = z.object({ keys: z.number(), made: z.number() }).parse(counts);
  expect(keys).toBe(made);
  await client.end();
}
