import pg from 'pg';
import { afterAll, beforeAll, expect, test } from 'vitest';
import {
  acceptedInvitationSchema,
  createdInvitationSchema,
  memberListSchema,
  memberSchema,
  cabinetPlateSchema,
  runSchema,
} from '../../shared/schemas';
import { answered, call } from './support/calls';
import { type Agent, type Harness, startHarness } from './support/harness';
import { join, makeLab, plateBody, type TestLab } from './support/lab';

let harness: Harness;
let lead: Agent;
let operator: Agent;
let lab: TestLab;
beforeAll(async () => {
  harness = await startHarness();
  [lead, operator] = [await harness.signIn('adaeze-holm'), await harness.signIn('juno-petrak')];
  lab = await makeLab(harness, lead, 'Own lab');
  await join(harness, lead, lab.labId, operator, 'operator');
}, 60_000);
afterAll(async () => {
  await harness.close();
});

const at = (path: string) => `/labs/${lab.labId}${path}`;
const invite = async (role: string): Promise<string> => {
  const created = await answered(
    call(harness, lead, 'post', at('/invitations'), { body: { role, note: 'someone' } }),
    createdInvitationSchema,
  );
  return created.token;
};
const accept = (agent: Agent, token: string) => call(harness, agent, 'post', `/invitations/${token}/accept`);

async function eventsOf(subjectId: string): Promise<readonly string[]> {
  const client = new pg.Client({ connectionString: harness.testDatabase.adminUrl });
  await client.connect();
  try {
    const { rows } = await client.query<{ kind: string }>(
      'select kind from audit_events where subject_id = $1 order by sequence',
      [subjectId],
    );
    return rows.map(({ kind }) => kind);
  } finally {
    await client.end();
  }
}

test('pausing, resuming and finishing a run again after a lost answer answers the run, and happens once', async () => {
  const run = at(`/runs/${lab.runId}`);
  const send = (agent: Agent, what: string, body?: unknown) =>
    call(harness, agent, 'post', `${run}/${what}`, body === undefined ? {} : { body });
  const twice = async (what: string, state: string, body?: unknown) => {
    const first = await answered(send(operator, what, body), runSchema);
    expect(first.summary.state).toBe(state);
    expect(await answered(send(operator, what, body), runSchema)).toEqual(first);
  };
  // Running since it was started, which is not resuming it.
  expect((await send(operator, 'resume')).status).toBe(409);
  await twice('pause', 'paused', { note: 'cryostat refill' });
  expect((await send(operator, 'pause', { note: 'lunch' })).status).toBe(409);
  expect((await send(lead, 'pause', { note: 'cryostat refill' })).status).toBe(409);
  await twice('resume', 'running');
  expect((await send(lead, 'resume')).status).toBe(409);
  for (const settingIndex of [0, 1]) {
    const body = { outcome: 'skipped', settingIndex, note: 'no light' };
    await answered(call(harness, operator, 'post', `${run}/readings`, { body }), runSchema);
  }
  await twice('finish', 'finished');
  expect((await send(lead, 'finish')).status).toBe(409);
  expect(await eventsOf(lab.runId)).toEqual([
    'run.started',
    'run.paused',
    'run.resumed',
    'reading.recorded',
    'reading.recorded',
    'run.finished',
  ]);
});

test('accepting an invitation again answers the membership; for anybody else it is used', async () => {
  const [mirela, pia] = [await harness.signIn('mirela-stanic'), await harness.signIn('pia-brandt')];
  const token = await invite('guest');
  const first = await answered(accept(mirela, token), acceptedInvitationSchema);
  expect(await answered(accept(mirela, token), acceptedInvitationSchema)).toEqual(first);
  expect((await accept(pia, token)).status).toBe(404);
  const { items } = await answered(call(harness, lead, 'get', at('/members')), memberListSchema);
  const mirelas = items.find(({ login }) => login === 'mirela-stanic');
  if (mirelas === undefined) throw new Error('who accepted is a member');
  await answered(
    call(harness, lead, 'patch', at(`/members/${mirelas.userId}`), { body: { role: 'operator' } }),
    memberSchema,
  );
  expect((await answered(accept(mirela, token), acceptedInvitationSchema)).role).toBe('operator');
  // Who was taken out of the lab does not come back by an old link.
  expect((await call(harness, lead, 'delete', at(`/members/${mirelas.userId}`))).status).toBe(204);
  expect((await accept(mirela, token)).status).toBe(404);
});

test('one invitation accepted many times at once, and two at once, make one membership and no failure', async () => {
  const pia = await harness.signIn('pia-brandt');
  const token = await invite('guest');
  const same = await Promise.all(Array.from({ length: 6 }, async () => (await accept(pia, token)).status));
  expect(same.filter((status) => ![200, 503].includes(status))).toEqual([]);
  const others = ['mirela-stanic', 'noor-haddad', 'oskar-lindqvist'];
  for (const login of others) {
    const agent = await harness.signIn(login);
    const tokens = [await invite('guest'), await invite('operator')];
    const statuses = await Promise.all(tokens.map(async (one) => (await accept(agent, one)).status));
    expect(statuses.toSorted()).toEqual([200, 409]);
  }
});

test('a plate comes back under its name or is refused in words, also when another takes the name at that moment', async () => {
  const path = at('/plates');
  for (let round = 0; round < 6; round += 1) {
    const name = `T-${round}`;
    const old = await answered(
      call(harness, lead, 'post', path, { body: plateBody(name) }),
      cabinetPlateSchema,
    );
    await answered(
      call(harness, lead, 'post', `${path}/${old.id}/retire`, { ifMatch: '"r1"' }),
      cabinetPlateSchema,
    );
    const [returned, added] = await Promise.all([
      call(harness, lead, 'post', `${path}/${old.id}/return`, { ifMatch: '"r2"' }),
      call(harness, lead, 'post', path, { body: plateBody(name) }),
    ]);
    expect([
      [200, 422],
      [409, 201],
    ]).toContainEqual([returned.status, added.status]);
  }
});
