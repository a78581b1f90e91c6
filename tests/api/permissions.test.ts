import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { emptyDocument, writeCabinet } from '../../shared/cabinet-document';
import type { Role } from '../../shared/permissions';
import { problemSchema } from '../../shared/schemas';
import type { Route } from '../../server/http/route';
import { allRoutes } from '../../server/routes';
import { call, upload } from './support/calls';
import { type Agent, type Harness, startHarness } from './support/harness';
import { newMount } from '../support/plates';
import {
  benchBody,
  calibrationBody,
  join,
  makeLab,
  plateBody,
  scanBody,
  target,
  type TestLab,
} from './support/lab';

/** Who may: written here by hand from product.md's table of roles, not from the code that is tested. */
type Least = 'anyone' | 'signed-in' | 'guest' | 'operator' | 'designer' | 'lead';

interface Row {
  readonly least: Least;
  readonly body?: (lab: TestLab) => unknown;
  /** The lab's own id is in the path anyway; these are the ids of one thing in it. */
  readonly ids?: (lab: TestLab) => Record<string, string>;
  /** The text of a file that is sent instead of JSON. */
  readonly upload?: string;
  /** The first who may leaves nothing for the next. */
  readonly usedUp?: true;
  /** Nobody is signed in after it, so each signs in for it. */
  readonly spendsSession?: boolean;
}

const plateId = (lab: TestLab) => ({ plateId: lab.sparePlateId });
const mountId = (lab: TestLab) => ({ mountId: lab.spareMountId });
const benchId = (lab: TestLab) => ({ benchId: lab.benchId });
const protocolId = (lab: TestLab) => ({ protocolId: lab.protocolId });
const runId = (lab: TestLab) => ({ runId: lab.runId });
const userId = () => ({ userId: removable });
let removable = '';

const draftBody = (lab: TestLab) => ({
  name: 'Changed',
  purpose: '',
  benchId: lab.benchId,
  kind: 'prepare',
  objective: 'least-expected-infidelity',
  presentDialsDeg: null,
  toleranceInfidelity: 1e-3,
  targets: [target('t1', 'H')],
});
const emptyCabinet = writeCabinet(emptyDocument, 'json');
const { seat: _seat, ...plateFacts } = plateBody('H-9');

const table: Readonly<Record<string, Row>> = {
  'GET /session': { least: 'anyone' },
  'POST /labs': { least: 'signed-in', body: () => ({ name: 'Another lab' }) },
  'GET /labs/:labId': { least: 'guest' },
  'PATCH /labs/:labId': { least: 'lead', body: () => ({ calibrationDueDays: 60 }) },
  'GET /labs/:labId/members': { least: 'guest' },
  'PATCH /labs/:labId/members/:userId': { least: 'lead', body: () => ({ role: 'guest' }), ids: userId },
  'DELETE /labs/:labId/members/:userId': { least: 'lead', ids: userId },
  'GET /labs/:labId/invitations': { least: 'lead' },
  'POST /labs/:labId/invitations': { least: 'lead', body: () => ({ role: 'guest', note: 'someone' }) },
  'DELETE /labs/:labId/invitations/:invitationId': {
    least: 'lead',
    ids: (lab) => ({ invitationId: lab.invitationId }),
  },
  'GET /invitations/:token': { least: 'signed-in' },
  'POST /invitations/:token/accept': { least: 'signed-in' },
  'GET /labs/:labId/plates': { least: 'guest' },
  'POST /labs/:labId/plates': { least: 'designer', body: () => plateBody(randomUUID().slice(0, 8)) },
  'GET /labs/:labId/plates/:plateId': { least: 'guest', ids: plateId },
  'PUT /labs/:labId/plates/:plateId': {
    least: 'designer',
    body: () => plateFacts,
    ids: plateId,
  },
  'POST /labs/:labId/plates/:plateId/calibrations': {
    least: 'operator',
    body: () => calibrationBody(),
    ids: plateId,
  },
  'GET /labs/:labId/plates/:plateId/calibrations/:calibrationId': {
    least: 'guest',
    ids: (lab) => ({ ...plateId(lab), calibrationId: lab.calibrationId }),
  },
  'GET /labs/:labId/scan-columns': { least: 'guest' },
  'POST /labs/:labId/plates/:plateId/scans': {
    least: 'operator',
    body: (lab) => scanBody(lab.fileId),
    ids: plateId,
  },
  'GET /labs/:labId/plates/:plateId/reliance': { least: 'guest', ids: plateId },
  'POST /labs/:labId/plates/:plateId/retire': { least: 'designer', ids: plateId },
  'POST /labs/:labId/plates/:plateId/return': { least: 'designer', ids: plateId },
  'GET /labs/:labId/cabinet': { least: 'guest' },
  'GET /labs/:labId/cabinet/export': { least: 'guest' },
  'POST /labs/:labId/cabinet/import': {
    least: 'designer',
    body: () => ({ fileText: emptyCabinet, format: 'json', dryRun: true, planHash: null }),
  },
  'PUT /labs/:labId/plates/:plateId/seat': {
    least: 'designer',
    body: (lab) => ({ mountId: lab.spareMountId, why: 'cleaned' }),
    ids: plateId,
  },
  'POST /labs/:labId/plates/:plateId/take-out': {
    least: 'designer',
    body: () => ({ why: 'cleaned' }),
    ids: plateId,
  },
  'POST /labs/:labId/plates/:plateId/files': {
    least: 'designer',
    body: (lab) => ({ fileId: lab.fileId, kind: 'data-sheet' }),
    ids: plateId,
  },
  'DELETE /labs/:labId/plates/:plateId/files/:fileId': {
    least: 'designer',
    ids: (lab) => ({ plateId: lab.plateIds[0], fileId: lab.fileId }),
    usedUp: true,
  },
  'GET /labs/:labId/mounts': { least: 'guest' },
  'POST /labs/:labId/mounts': {
    least: 'designer',
    body: () => newMount({ name: randomUUID().slice(0, 8) }),
  },
  'GET /labs/:labId/mounts/:mountId': { least: 'guest', ids: mountId },
  'PUT /labs/:labId/mounts/:mountId': {
    least: 'designer',
    body: () => newMount({ name: 'M-S' }),
    ids: mountId,
  },
  'POST /labs/:labId/mounts/:mountId/retire': { least: 'designer', ids: mountId },
  'POST /labs/:labId/mounts/:mountId/return': { least: 'designer', ids: mountId },
  'POST /labs/:labId/files': { least: 'operator', upload: 'dial,power\n0,1\n' },
  'GET /labs/:labId/files/:fileId': { least: 'guest', ids: (lab) => ({ fileId: lab.fileId }) },
  'GET /labs/:labId/benches': { least: 'guest' },
  'POST /labs/:labId/benches': { least: 'designer', body: (lab) => benchBody(lab.plateIds, 'another') },
  'GET /labs/:labId/benches/:benchId': { least: 'guest', ids: benchId },
  'GET /labs/:labId/benches/:benchId/plates': { least: 'guest', ids: benchId },
  'PUT /labs/:labId/benches/:benchId': {
    least: 'designer',
    body: (lab) => benchBody(lab.plateIds),
    ids: benchId,
  },
  'POST /labs/:labId/benches/:benchId/retire': { least: 'designer', ids: benchId },
  'POST /labs/:labId/benches/:benchId/return': { least: 'designer', ids: benchId },
  'GET /labs/:labId/protocols': { least: 'guest' },
  'POST /labs/:labId/protocols': { least: 'designer', body: draftBody },
  'GET /labs/:labId/protocols/:protocolId': { least: 'guest', ids: protocolId },
  'PUT /labs/:labId/protocols/:protocolId/draft': { least: 'designer', body: draftBody, ids: protocolId },
  'POST /labs/:labId/protocols/:protocolId/draft/from-version': {
    least: 'designer',
    body: () => ({ number: 1 }),
    ids: protocolId,
  },
  'POST /labs/:labId/protocols/:protocolId/versions': {
    least: 'designer',
    body: () => ({
      message: 'A version',
      shown: [{ targetId: randomUUID(), fastAxesDeg: [], dialsDeg: [], infidelity: 0, dialledInfidelity: 0 }],
    }),
    ids: protocolId,
  },
  'GET /labs/:labId/protocols/:protocolId/versions': { least: 'guest', ids: protocolId },
  'GET /labs/:labId/protocols/:protocolId/versions/:number': {
    least: 'guest',
    ids: (lab) => ({ protocolId: lab.protocolId, number: '1' }),
  },
  'GET /labs/:labId/versions': { least: 'guest' },
  'GET /labs/:labId/runs': { least: 'guest' },
  'POST /labs/:labId/runs': {
    least: 'operator',
    body: (lab) => ({
      versionId: lab.version.id,
      startDialsDeg: [null, null],
      cautionAcknowledged: true,
      staleAcknowledged: false,
    }),
  },
  'GET /labs/:labId/runs/:runId': { least: 'guest', ids: runId },
  'POST /labs/:labId/runs/:runId/readings': {
    least: 'operator',
    body: () => ({ outcome: 'skipped', settingIndex: 0, note: 'no light' }),
    ids: runId,
  },
  'POST /labs/:labId/runs/:runId/pause': { least: 'operator', body: () => ({ note: '' }), ids: runId },
  'POST /labs/:labId/runs/:runId/resume': { least: 'operator', ids: runId },
  'POST /labs/:labId/runs/:runId/finish': { least: 'operator', ids: runId },
  'GET /labs/:labId/home': { least: 'guest' },
  'POST /session/sign-out': { least: 'signed-in', spendsSession: true },
  'POST /session/sign-out-everywhere': { least: 'signed-in', spendsSession: true },
};

const routes = allRoutes({ secure: false, sessionSecret: 'of no matter here' });
const nameOf = (route: Route) => `${route.method.toUpperCase()} ${route.path}`;
const rank: readonly string[] = ['guest', 'operator', 'designer', 'lead'];
type Actor = 'anonymous' | 'stranger' | 'other lead' | Role;
const actors: readonly Actor[] = [
  'anonymous',
  'stranger',
  'other lead',
  'guest',
  'operator',
  'designer',
  'lead',
];

const people: readonly (readonly [Actor, string])[] = [
  ['stranger', 'pia-brandt'],
  ['other lead', 'oskar-lindqvist'],
  ['guest', 'mirela-stanic'],
  ['operator', 'juno-petrak'],
  ['designer', 'ines-varga'],
  ['lead', 'adaeze-holm'],
];

let harness: Harness;
let own: TestLab;
let foreign: TestLab;
const agents = new Map<Actor, Agent>();

beforeAll(async () => {
  harness = await startHarness();
  for (const [actor, login] of people) agents.set(actor, await harness.signIn(login));
  agents.set('anonymous', harness.browser());
  own = await makeLab(harness, agentOf('lead'), 'Own lab');
  foreign = await makeLab(harness, agentOf('other lead'), 'Foreign lab');
  for (const role of ['guest', 'operator', 'designer'] as const) {
    await join(harness, agentOf('lead'), own.labId, agentOf(role), role);
  }
  const second = await harness.signIn('tomas-reuter');
  await join(harness, agentOf('lead'), own.labId, second, 'guest');
  const row: unknown = await harness.database('users').where({ login: 'tomas-reuter' }).first('id');
  removable = idOf(row);
}, 120_000);

afterAll(async () => {
  await harness.close();
});

function idOf(row: unknown): string {
  if (typeof row === 'object' && row !== null && 'id' in row && typeof row.id === 'string') return row.id;
  throw new Error('no such row');
}

function agentOf(actor: Actor): Agent {
  const agent = agents.get(actor);
  if (agent === undefined) throw new Error(`nobody plays ${actor}`);
  return agent;
}

function rowOf(route: Route): Row {
  const row = table[nameOf(route)];
  if (row === undefined) throw new Error(`${nameOf(route)} has no row in the permission table`);
  return row;
}

function addressed(route: Route, labId: string, lab: TestLab, ids: Record<string, string>): string {
  return route.path
    .replace(':labId', labId)
    .replace(':token', lab.invitationToken)
    .replace(/:(\w+)/g, (_whole, name: string) => ids[name] ?? randomUUID());
}

function ask(route: Route, actor: Actor, path: string) {
  const row = rowOf(route);
  if (row.upload !== undefined) return upload(harness, agentOf(actor), path, row.upload);
  return call(harness, agentOf(actor), route.method, path, {
    ...(row.body === undefined ? {} : { body: row.body(own) }),
    ifMatch: '"r1"',
  });
}

function expected(least: Least, actor: Actor): 'allowed' | 401 | 403 | 404 {
  if (least === 'anyone') return 'allowed';
  if (actor === 'anonymous') return 401;
  if (least === 'signed-in') return 'allowed';
  if (actor === 'stranger' || actor === 'other lead') return 404;
  return rank.indexOf(actor) >= rank.indexOf(least) ? 'allowed' : 403;
}

/** What a refusal says, but for what differs from request to request. */
function refusal(text: string) {
  return { ...problemSchema.parse(JSON.parse(text)), requestId: 'of no matter' };
}

test('every route has a row, and every row a route', () => {
  expect(Object.keys(table).toSorted()).toEqual(routes.map(nameOf).toSorted());
});

const ordered = routes.toSorted(
  (a, b) => Object.keys(table).indexOf(nameOf(a)) - Object.keys(table).indexOf(nameOf(b)),
);

describe.each(ordered.map((route) => [nameOf(route), route] as const))('%s', (_name, route) => {
  test('answers each role as product.md says, in its own lab', async () => {
    const row = rowOf(route);
    const wrong: string[] = [];
    for (const actor of actors) {
      const login = people.find(([who]) => who === actor)?.[1];
      if (row.spendsSession === true && login !== undefined) agents.set(actor, await harness.signIn(login));
      const response = await ask(route, actor, addressed(route, own.labId, own, row.ids?.(own) ?? {}));
      const want = expected(row.least, actor);
      const right =
        want === 'allowed'
          ? response.status < 500 &&
            ![401, 403].includes(response.status) &&
            !isMissing(route, response.status)
          : response.status === want;
      if (!right) wrong.push(`${actor}: ${response.status} ${response.text.slice(0, 200)}, expected ${want}`);
    }
    expect(wrong).toEqual([]);
  });

  if (route.path.startsWith('/labs/:labId')) {
    test('shows nothing of another lab, in the very words for what does not exist', async () => {
      const { ids } = rowOf(route);
      const missing = await ask(route, 'lead', addressed(route, randomUUID(), own, {}));
      expect(missing.status).toBe(404);
      const attempts = [addressed(route, foreign.labId, foreign, ids?.(foreign) ?? {})];
      // Under the own lab's address, but with the other lab's thing.
      if (ids !== undefined && !route.path.includes(':userId')) {
        attempts.push(addressed(route, own.labId, foreign, ids(foreign)));
      }
      for (const path of attempts) {
        const response = await ask(route, 'lead', path);
        expect(response.status, `${path}: ${response.text}`).toBe(404);
        expect(refusal(response.text)).toEqual(refusal(missing.text));
      }
    });
  }
});

/** A second one who may finds the invitation used or the member gone: that is no refusal of the person. */
function isMissing(route: Route, status: number): boolean {
  const usedUp = rowOf(route).usedUp === true || /:(?:token|invitationId|userId)/.test(route.path);
  return status === 404 && !usedUp;
}

test('a changed role holds at the very next request', async () => {
  const designer = await harness.signIn('ines-varga');
  const lead = await harness.signIn('adaeze-holm');
  const plates = `/labs/${own.labId}/plates`;
  const before = await call(harness, designer, 'post', plates, { body: plateBody('now') });
  expect(before.status).toBe(201);
  const row: unknown = await harness.database('users').where({ login: 'ines-varga' }).first('id');
  const demoted = await call(harness, lead, 'patch', `/labs/${own.labId}/members/${idOf(row)}`, {
    body: { role: 'guest' },
  });
  expect(demoted.status).toBe(200);
  const after = await call(harness, designer, 'post', plates, { body: plateBody('then') });
  expect(after.status).toBe(403);
});

test('a lab keeps a lead: the last one can neither step down nor leave', async () => {
  const lead = await harness.signIn('adaeze-holm');
  const row: unknown = await harness.database('users').where({ login: 'adaeze-holm' }).first('id');
  const path = `/labs/${own.labId}/members/${idOf(row)}`;
  const stepDown = await call(harness, lead, 'patch', path, { body: { role: 'guest' } });
  const leave = await call(harness, lead, 'delete', path);
  expect([stepDown.status, leave.status]).toEqual([409, 409]);
});
