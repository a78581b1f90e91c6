import { setTimeout as sleep } from 'node:timers/promises';
import { afterAll, beforeAll, expect, test } from 'vitest';
import {
  benchSchema,
  cabinetPlateSchema,
  calibrationSchema,
  homeSchema,
  draftSchema,
  problemSchema,
  protocolSchema,
  type Reliance,
  relianceSchema,
  versionSchema,
} from '../../shared/schemas';
import { answered, call } from './support/calls';
import { type Agent, type Harness, startHarness } from './support/harness';
import {
  benchBody,
  calibrationBody,
  join,
  makeLab,
  quarterCalibration,
  saveVersion,
  target,
  type TestLab,
} from './support/lab';

let harness: Harness;
let lead: Agent;
let lab: TestLab;

beforeAll(async () => {
  harness = await startHarness({ jobs: true });
  lead = await harness.signIn('adaeze-holm');
  lab = await makeLab(harness, lead, 'Relying lab');
});
afterAll(async () => {
  await harness.close();
});

const at = (path: string) => `/labs/${lab.labId}${path}`;

async function relianceOf(plateId: string): Promise<Reliance> {
  return answered(call(harness, lead, 'get', at(`/plates/${plateId}/reliance`)), relianceSchema);
}

/** As a page would: looks again until nothing is being worked out. */
async function settled(plateId: string): Promise<Reliance['versions'][number]> {
  for (;;) {
    const { versions } = await relianceOf(plateId);
    const [version] = versions;
    if (version?.progress === null) return version;
    await sleep(50);
  }
}

const calibrate = (plateId: string, body: object) =>
  answered(call(harness, lead, 'post', at(`/plates/${plateId}/calibrations`), { body }), calibrationSchema);
const protocol = () =>
  answered(call(harness, lead, 'get', at(`/protocols/${lab.protocolId}`)), protocolSchema);
const plateNow = async (plateId: string) => {
  const response = await call(harness, lead, 'get', at(`/plates/${plateId}`));
  return { etag: String(response.headers['etag']) };
};

test('a plate names the benches, drafts and newest versions that rely on it, and others name none', async () => {
  const [first] = lab.plateIds;
  const reliance = await relianceOf(first);
  expect(reliance.benches).toEqual([{ id: lab.benchId, name: 'signal arm' }]);
  expect(reliance.drafts).toEqual([
    { protocolId: lab.protocolId, protocolName: 'Two states', benchName: 'signal arm', targetCount: 2 },
  ]);
  expect(reliance.versions).toMatchObject([{ versionId: lab.version.id, number: 1, draftRevision: 1 }]);
  expect(await relianceOf(lab.sparePlateId)).toEqual({ benches: [], drafts: [], versions: [] });
});

test('a new zero is told of every version that used the old one, with the numbers that the solver gives', async () => {
  const [first, second] = lab.plateIds;
  await calibrate(first, calibrationBody({ offsetDeg: 12.4 + 3 }));
  const { report } = await settled(first);
  expect(report?.stale).toBe(true);
  expect(report?.plates).toMatchObject([
    { plateName: 'H-3', change: 'recalibrated' },
    { plateName: 'Q-B', change: 'same' },
  ]);
  expect(report?.plates[0]?.zeroShiftDeg).toBeCloseTo(3, 9);
  // H before a half-wave plate that is 3° off: sin²(6°), the quarter-wave plate being nearly along.
  expect(report?.oldDials).toMatchObject({ within: 0, out: 2 });
  expect(report?.resolved).toMatchObject({ out: report?.frozen.out });
  const other = await settled(second);
  expect(other.report).toEqual(report);
});

test('home tells designers and leads of versions that were left behind, by the plate that did it', async () => {
  const [first] = lab.plateIds;
  const operator = await harness.signIn('juno-petrak');
  await join(harness, lead, lab.labId, operator, 'operator');
  const staleFor = async (agent: Agent) =>
    (await answered(call(harness, agent, 'get', at('/home')), homeSchema)).waiting.filter(
      ({ kind }) => kind === 'stale-versions',
    );
  const [item, ...others] = await staleFor(lead);
  expect(others).toEqual([]);
  expect(item).toMatchObject({
    subject: { kind: 'plate', id: first, name: 'H-3', change: 'recalibrated' },
    versionCount: 1,
    voidCount: 0,
    asDialled: { outCount: 2 },
  });
  expect(await staleFor(operator)).toEqual([]);
});

test('a calibration that changes nothing leaves nothing stale', async () => {
  const [first] = lab.plateIds;
  await calibrate(first, calibrationBody({ measuredAt: '2026-06-02T10:00:00Z' }));
  const { report } = await settled(first);
  expect(report?.oldDials).toEqual(report?.frozen);
  expect(report?.plates[0]).toMatchObject({ change: 'recalibrated', zeroShiftDeg: 0, retardanceShiftDeg: 0 });
});

test('a plate taken out voids the dials; seated and calibrated anew they stay void, and can be re-solved', async () => {
  const [, second] = lab.plateIds;
  const out = await answered(
    call(harness, lead, 'post', at(`/plates/${second}/take-out`), {
      body: { why: 'cleaned' },
      ifMatch: (await plateNow(second)).etag,
    }),
    cabinetPlateSchema,
  );
  const waiting = await settled(second);
  expect(waiting.report).toMatchObject({ oldDials: null, resolved: null });
  expect(waiting.report?.waits).toHaveLength(1);
  await answered(
    call(harness, lead, 'put', at(`/plates/${second}/seat`), {
      body: { mountId: lab.spareMountId, why: '' },
      ifMatch: `"r${out.revision}"`,
    }),
    cabinetPlateSchema,
  );
  await calibrate(second, quarterCalibration({ measuredAt: new Date().toISOString(), offsetDeg: 11 }));
  const { report } = await settled(second);
  expect(report?.voids).toEqual([{ why: 'seat-ended', plateId: second, plateName: 'Q-B' }]);
  expect(report).toMatchObject({ oldDials: null, waits: [], resolved: { within: report?.frozen.within } });
});

test('one step makes the draft that is solved with the plates of now; a newer version is fresh', async () => {
  const before = await protocol();
  const from = (body: object, revision = before.draft.revision) =>
    call(harness, lead, 'post', at(`/protocols/${lab.protocolId}/draft/from-version`), {
      body,
      ifMatch: `"r${revision}"`,
    });
  // The draft asks for what the version asked for: it is only opened.
  expect(await answered(from({ number: 1 }), draftSchema)).toEqual(before.draft);

  const saved = await answered(
    call(harness, lead, 'put', at(`/protocols/${lab.protocolId}/draft`), {
      body: { ...before.draft.content, name: 'Renamed', targets: [target('t9', 'D')] },
      ifMatch: `"r${before.draft.revision}"`,
    }),
    draftSchema,
  );
  const refusal = await from({ number: 1 }, saved.revision);
  expect(refusal.status).toBe(409);
  const problem = problemSchema.parse(refusal.body);
  expect(problem.detail).toMatch(
    /The draft of Renamed, saved by Adaeze Holm, .* Version 1 would take their place/,
  );
  expect(problem.current).toEqual(saved);
  expect((await from({ number: 1 }, before.draft.revision)).status).toBe(412);
  expect((await from({ number: 7 }, saved.revision)).status).toBe(422);

  const replaced = await answered(from({ number: 1, replace: true }, saved.revision), draftSchema);
  expect(replaced.revision).toBe(saved.revision + 1);
  const version = await answered(
    call(harness, lead, 'get', at(`/protocols/${lab.protocolId}/versions/1`)),
    versionSchema,
  );
  expect(replaced.content).toEqual({ ...before.draft.content, name: 'Renamed' });
  expect(replaced.content.targets.map(({ id }) => id)).toEqual(version.content.targets.map(({ id }) => id));

  await saveVersion(harness, lead, lab.labId, await protocol(), 'Re-solved.');
  const { versions } = await relianceOf(lab.plateIds[1]);
  expect(versions).toMatchObject([{ number: 2, progress: null, report: null }]);
});

test('a bench that gets another plate leaves the versions for its old beam behind', async () => {
  const response = await call(harness, lead, 'get', at(`/benches/${lab.benchId}`));
  const bench = benchSchema.parse(response.body);
  const [, second] = lab.plateIds;
  await answered(
    call(harness, lead, 'put', at(`/benches/${lab.benchId}`), {
      body: { ...benchBody([lab.sparePlateId, second]), name: bench.name },
      ifMatch: `"r${bench.revision}"`,
    }),
    benchSchema,
  );
  const { report } = await settled(lab.plateIds[0]);
  expect(report?.voids.map(({ why, plateName }) => [why, plateName])).toEqual([
    ['not-in-beam', 'H-3'],
    ['new-in-beam', 'H-9'],
  ]);
});
