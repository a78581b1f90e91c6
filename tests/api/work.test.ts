import pg from 'pg';
import { afterAll, beforeAll, expect, test } from 'vitest';
import type { z } from 'zod';
import {
  benchSchema,
  homeSchema,
  labSchema,
  cabinetPlateSchema,
  problemSchema,
  protocolSchema,
  runPageSchema,
  runSchema,
} from '../../shared/schemas';
import { answered, call } from './support/calls';
import { type Agent, type Harness, startHarness } from './support/harness';
import { benchBody, join, makeLab, plateBody, target, type TestLab } from './support/lab';

let harness: Harness;
let lead: Agent;
let operator: Agent;
let guest: Agent;
let lab: TestLab;
beforeAll(async () => {
  harness = await startHarness();
  [lead, operator, guest] = [
    await harness.signIn('adaeze-holm'),
    await harness.signIn('juno-petrak'),
    await harness.signIn('mirela-stanic'),
  ];
  lab = await makeLab(harness, lead, 'Own lab');
  await join(harness, lead, lab.labId, operator, 'operator');
  await join(harness, lead, lab.labId, guest, 'guest');
}, 60_000);
afterAll(async () => {
  await harness.close();
});

const at = (path: string) => `/labs/${lab.labId}${path}`;
const get = <S extends z.ZodType>(path: string, schema: S, agent = lead) =>
  answered(call(harness, agent, 'get', at(path)), schema);
async function faultOf(
  request: ReturnType<typeof call>,
): Promise<{ status: number; path?: string | undefined; message?: string | undefined }> {
  const response = await request;
  const problem = problemSchema.parse(JSON.parse(response.text));
  const [field] = problem.fields ?? [];
  return { status: response.status, path: field?.path, message: field?.message ?? problem.detail };
}

test('a plate stands on one bench at a time: the other bench is named, and a standing plate is not retired', async () => {
  const twice = await faultOf(
    call(harness, lead, 'post', at('/benches'), { body: benchBody(lab.plateIds, 'second') }),
  );
  expect(twice).toMatchObject({ status: 422, path: 'plateIds.0' });
  expect(twice.message).toMatch(/^H-3 stands in the beam of signal arm\./);
  const standing = await faultOf(
    call(harness, lead, 'post', at(`/plates/${lab.plateIds[0]}/retire`), { ifMatch: '"r1"' }),
  );
  expect(standing).toMatchObject({ status: 409 });
  expect(standing.message).toContain('signal arm');
});

test('a bench is refused at its field: an input that cannot be read, a plate that is retired or not there', async () => {
  const spare = await answered(
    call(harness, lead, 'post', at('/plates'), { body: plateBody('S-1') }),
    cabinetPlateSchema,
  );
  const other = await answered(
    call(harness, lead, 'post', at('/plates'), { body: plateBody('S-2') }),
    cabinetPlateSchema,
  );
  const body = benchBody([spare.id, other.id], 'spare bench');
  const input = await faultOf(
    call(harness, lead, 'post', at('/benches'), { body: { ...body, inputExpression: 'cos(22.5) H' } }),
  );
  expect(input).toMatchObject({ status: 422, path: 'inputExpression' });
  expect(input.message).toMatch(/^Column 5: /);
  await answered(
    call(harness, lead, 'post', at(`/plates/${other.id}/retire`), { ifMatch: '"r1"' }),
    cabinetPlateSchema,
  );
  const retired = await faultOf(call(harness, lead, 'post', at('/benches'), { body }));
  expect(retired).toMatchObject({ status: 422, path: 'plateIds.1' });
  await answered(
    call(harness, lead, 'post', at(`/plates/${other.id}/return`), { ifMatch: '"r2"' }),
    cabinetPlateSchema,
  );
  const bench = await answered(call(harness, lead, 'post', at('/benches'), { body }), benchSchema);
  expect(bench.plates.map(({ name }) => name)).toEqual(['S-1', 'S-2']);
  const same = await faultOf(
    call(harness, lead, 'put', at(`/benches/${bench.id}`), {
      body: { ...body, name: 'Signal ARM' },
      ifMatch: '"r1"',
    }),
  );
  expect(same).toMatchObject({ status: 422, path: 'name' });
  // Turned about, and its plates free again once it is retired.
  const turned = await answered(
    call(harness, lead, 'put', at(`/benches/${bench.id}`), {
      body: { ...body, plateIds: [other.id, spare.id] },
      ifMatch: '"r1"',
    }),
    benchSchema,
  );
  expect(turned.plates.map(({ name }) => name)).toEqual(['S-2', 'S-1']);
  await answered(
    call(harness, lead, 'post', at(`/benches/${bench.id}/retire`), { ifMatch: '"r2"' }),
    benchSchema,
  );
  await answered(
    call(harness, lead, 'post', at('/benches'), { body: { ...body, name: 'third' } }),
    benchSchema,
  );
  const back = await faultOf(
    call(harness, lead, 'post', at(`/benches/${bench.id}/return`), { ifMatch: '"r3"' }),
  );
  expect(back).toMatchObject({ status: 409 });
});

test('a run is recorded setting by setting, paused, resumed and finished only when nothing is left open', async () => {
  const run = at(`/runs/${lab.runId}`);
  const reading = (body: unknown) => call(harness, operator, 'post', `${run}/readings`, { body });
  const done = await answered(
    reading({ outcome: 'done', settingIndex: 0, dialledDeg: [12.4, 301.7], note: '' }),
    runSchema,
  );
  expect(done.summary).toMatchObject({ state: 'running', doneCount: 1, skippedCount: 0, settingCount: 2 });
  expect(done.startDialsDeg).toEqual([null, 12.5]);
  expect((await faultOf(call(harness, operator, 'post', `${run}/finish`))).message).toMatch(
    /^One setting is neither/,
  );
  const paused = await answered(
    call(harness, operator, 'post', `${run}/pause`, { body: { note: 'cryostat refill' } }),
    runSchema,
  );
  expect(paused.summary).toMatchObject({ state: 'paused', pauseNote: 'cryostat refill' });
  expect(await faultOf(reading({ outcome: 'skipped', settingIndex: 1, note: 'x' }))).toMatchObject({
    status: 409,
  });
  await answered(call(harness, operator, 'post', `${run}/resume`), runSchema);
  expect(
    await faultOf(reading({ outcome: 'done', settingIndex: 7, dialledDeg: [1, 2], note: '' })),
  ).toMatchObject({ status: 422, path: 'settingIndex' });
  expect(
    await faultOf(reading({ outcome: 'done', settingIndex: 1, dialledDeg: [1], note: '' })),
  ).toMatchObject({ status: 422, path: 'dialledDeg' });
  expect((await reading({ outcome: 'done', settingIndex: 1, dialledDeg: [1, 360], note: '' })).status).toBe(
    400,
  );
  await answered(reading({ outcome: 'skipped', settingIndex: 1, note: 'no light' }), runSchema);
  // A later reading of the same setting takes the place of the earlier one, which stays in the record.
  const corrected = await answered(
    reading({ outcome: 'done', settingIndex: 1, dialledDeg: [90, 45], note: 'light again' }),
    runSchema,
  );
  expect(corrected.summary).toMatchObject({ doneCount: 2, skippedCount: 0 });
  expect(corrected.readings.map(({ sequence }) => sequence)).toEqual([1, 2, 3]);
  const finished = await answered(call(harness, operator, 'post', `${run}/finish`), runSchema);
  expect(finished.summary.state).toBe('finished');
  expect(await faultOf(reading({ outcome: 'skipped', settingIndex: 0, note: 'late' }))).toMatchObject({
    status: 409,
  });
  const { items } = await get('/runs', runPageSchema);
  expect(items.map(({ number }) => number)).toEqual([1]);
});

test('the record says which laser class was acknowledged, and with what words', async () => {
  const client = new pg.Client({ connectionString: harness.testDatabase.adminUrl });
  await client.connect();
  const { rows } = await client.query<{ content: string }>(
    `select content from audit_events where kind = 'run.started' and subject_id = $1`,
    [lab.runId],
  );
  await client.end();
  expect(JSON.parse(rows[0]?.content ?? '')).toMatchObject({
    details: {
      acknowledged: { laserClass: '3B', hazardWavelengthsNm: [405, 810], statement: 'caution-and-officer' },
    },
  });
});

test('no run starts at a bench that is retired, which is named', async () => {
  const other = await makeLab(harness, lead, 'A lab that clears up');
  const there = `/labs/${other.labId}`;
  for (const settingIndex of [0, 1]) {
    await answered(
      call(harness, lead, 'post', `${there}/runs/${other.runId}/readings`, {
        body: { outcome: 'skipped', settingIndex, note: 'no light' },
      }),
      runSchema,
    );
  }
  await answered(call(harness, lead, 'post', `${there}/runs/${other.runId}/finish`), runSchema);
  await answered(
    call(harness, lead, 'post', `${there}/benches/${other.benchId}/retire`, { ifMatch: '"r1"' }),
    benchSchema,
  );
  const body = {
    versionId: other.version.id,
    startDialsDeg: [null, null],
    cautionAcknowledged: true,
    staleAcknowledged: false,
  };
  const refusal = await faultOf(call(harness, lead, 'post', `${there}/runs`, { body }));
  expect(refusal.status).toBe(409);
  expect(refusal.message).toMatch(/^signal arm is retired\./);
  await answered(
    call(harness, lead, 'post', `${there}/benches/${other.benchId}/return`, { ifMatch: '"r2"' }),
    benchSchema,
  );
  await answered(call(harness, lead, 'post', `${there}/runs`, { body }), runSchema);
});

test('a run does not start without the caution acknowledged', async () => {
  const body = {
    versionId: lab.version.id,
    startDialsDeg: [null, null],
    cautionAcknowledged: false,
    staleAcknowledged: false,
  };
  const refusal = await faultOf(call(harness, operator, 'post', at('/runs'), { body }));
  expect(refusal).toMatchObject({ status: 400, path: 'cautionAcknowledged' });
});

test('home shows each person what they could do something about, and to everyone what was last made', async () => {
  const protocol = await answered(
    call(harness, lead, 'post', at('/protocols'), {
      body: {
        name: 'Begun',
        purpose: '',
        benchId: lab.benchId,
        kind: 'prepare',
        objective: 'least-expected-infidelity',
        presentDialsDeg: null,
        toleranceInfidelity: 1e-3,
        targets: [target('t', 'H')],
      },
    }),
    protocolSchema,
  );
  await answered(
    call(harness, operator, 'post', at('/runs'), {
      body: {
        versionId: lab.version.id,
        startDialsDeg: [null, null],
        cautionAcknowledged: true,
        staleAcknowledged: false,
      },
    }),
    runSchema,
  );
  const [forLead, forOperator, forGuest] = [
    await get('/home', homeSchema),
    await get('/home', homeSchema, operator),
    await get('/home', homeSchema, guest),
  ];
  const kinds = (home: typeof forLead) => [...new Set(home.waiting.map(({ kind }) => kind))].toSorted();
  // Calibrated on 1 June, due after 90 days; the second setting was dialled far off.
  expect(kinds(forLead)).toEqual(['calibration-due', 'dialled-not-within', 'draft-ahead', 'run-stands']);
  expect(kinds(forOperator)).toEqual(['calibration-due', 'dialled-not-within', 'run-stands']);
  expect(kinds(forGuest)).toEqual([]);
  expect(forLead.waiting).toContainEqual(
    expect.objectContaining({ kind: 'draft-ahead', protocolId: protocol.id, afterVersion: null }),
  );
  for (const home of [forLead, forOperator, forGuest]) {
    // H-9 stands in no beam, so nothing about it waits.
    expect(home.cabinet.map(({ name }) => name)).toEqual(expect.arrayContaining(['H-3', 'H-9', 'Q-B']));
    expect(home.lastMade).toHaveLength(1);
    expect(home.lastMade[0]).toMatchObject({ label: 't2', runNumber: 1, toleranceInfidelity: 1e-3 });
    expect(home.lastMade[0]?.dialledInfidelity).toBeGreaterThan(1e-3);
  }
});

test('home says of a run which setting is next and which was done last, whatever was skipped or done twice', async () => {
  const { summary } = await answered(
    call(harness, lead, 'post', at('/runs'), {
      body: {
        versionId: lab.version.id,
        startDialsDeg: [null, null],
        cautionAcknowledged: true,
        staleAcknowledged: false,
      },
    }),
    runSchema,
  );
  const stands = async () => {
    const { waiting } = await get('/home', homeSchema);
    const item = waiting.find((one) => one.kind === 'run-stands' && one.run.id === summary.id);
    return item?.kind === 'run-stands' ? [item.nextSetting, item.lastDoneSetting] : null;
  };
  const record = async (reading: unknown) => {
    await answered(
      call(harness, lead, 'post', at(`/runs/${summary.id}/readings`), { body: reading }),
      runSchema,
    );
  };
  const done = (settingIndex: number) => ({ outcome: 'done', settingIndex, dialledDeg: [1, 2], note: '' });
  expect(await stands()).toEqual([1, null]);
  await record(done(1));
  expect(await stands()).toEqual([1, 2]);
  await record({ outcome: 'skipped', settingIndex: 0, note: 'no light' });
  expect(await stands()).toEqual([null, 2]);
  await record({ outcome: 'skipped', settingIndex: 1, note: 'dials slipped' });
  expect(await stands()).toEqual([null, null]);
  await record(done(0));
  expect(await stands()).toEqual([null, 1]);
  await answered(call(harness, lead, 'post', at(`/runs/${summary.id}/finish`)), runSchema);
  expect(await stands()).toBeNull();
});

test('a change of convention rewrites drafts and inputs so that the light stays, and leaves versions alone', async () => {
  const protocol = await answered(
    call(harness, lead, 'post', at('/protocols'), {
      body: {
        name: 'Hands',
        purpose: '',
        benchId: lab.benchId,
        kind: 'prepare',
        objective: 'least-expected-infidelity',
        presentDialsDeg: null,
        toleranceInfidelity: 1e-3,
        targets: [
          target('l', 'L'),
          target('h', 'H'),
          target('c', '(H + i V)/sqrt(2)'),
          target('x', 'half ('),
        ],
      },
    }),
    protocolSchema,
  );
  const before = await get('', labSchema);
  await answered(
    call(harness, lead, 'patch', at(''), {
      body: { convention: { phase: 'wt-kz', handedness: 'source', s3Sign: 'R' } },
    }),
    labSchema,
  );
  const after = await get(`/protocols/${protocol.id}`, protocolSchema);
  expect(before.convention.phase).toBe('kz-wt');
  expect(after.draft.revision).toBe(2);
  // Counter-clockwise to the receiver was L and (H + i V)/√2; it is R now, and H and what cannot be read stay.
  expect(after.draft.content.targets.map(({ expression }) => expression)).toEqual(['R', 'H', 'R', 'half (']);
});
