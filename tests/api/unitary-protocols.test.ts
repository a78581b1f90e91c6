import { afterAll, beforeAll, expect, test } from 'vitest';
import { unitaryShortfall } from '../../shared/optics/goal';
import { DEFAULT_CONVENTION } from '../../shared/optics/convention';
import { parseUnitary } from '../../shared/optics/expression';
import {
  benchSchema,
  type DraftContent,
  labSchema,
  cabinetPlateSchema,
  protocolSchema,
  runSchema,
  versionSchema,
} from '../../shared/schemas';
import { answered, call } from './support/calls';
import { type Agent, type Harness, startHarness } from './support/harness';
import { benchBody, plateBody, quarterBody, saveVersion, target } from './support/lab';

let harness: Harness;
let lead: Agent;
let at: string;
let plateIds: readonly string[];
let benchId: string;
beforeAll(async () => {
  harness = await startHarness();
  lead = await harness.signIn('adaeze-holm');
  const lab = await answered(call(harness, lead, 'post', '/labs', { body: { name: 'Gate lab' } }), labSchema);
  at = `/labs/${lab.id}`;
  const added = [quarterBody('Q-1'), plateBody('H-1'), quarterBody('Q-2')].map((body) =>
    answered(call(harness, lead, 'post', `${at}/plates`, { body }), cabinetPlateSchema),
  );
  plateIds = (await Promise.all(added)).map(({ id }) => id);
  const bench = await answered(
    call(harness, lead, 'post', `${at}/benches`, { body: benchBody(plateIds, 'gate bench') }),
    benchSchema,
  );
  benchId = bench.id;
}, 60_000);
afterAll(async () => {
  await harness.close();
});

function content(change: Partial<DraftContent> = {}): DraftContent {
  return {
    name: 'Gates',
    purpose: '',
    kind: 'apply',
    benchId,
    objective: 'least-expected-infidelity',
    presentDialsDeg: null,
    toleranceInfidelity: 1e-3,
    targets: [target('t', 'T'), target('y', 'Y'), target('r', 'rotate([0, 1, 1], 50deg)')],
    ...change,
  };
}

const begin = (body: DraftContent) =>
  answered(call(harness, lead, 'post', `${at}/protocols`, { body }), protocolSchema);
const read = (id: string) => answered(call(harness, lead, 'get', `${at}/protocols/${id}`), protocolSchema);

test('unitaries are frozen with the quaternion they ask for, by any objective, and a run dials all three plates', async () => {
  for (const objective of ['least-expected-infidelity', 'nearest-to-present', 'least-travel'] as const) {
    const protocol = await begin(content({ objective, presentDialsDeg: [10, 20, 30] }));
    const summary = await saveVersion(harness, lead, at.slice('/labs/'.length), protocol);
    const version = await answered(
      call(harness, lead, 'get', `${at}/protocols/${protocol.id}/versions/1`),
      versionSchema,
    );
    expect(version.content).toMatchObject({ kind: 'apply', objective, presentDialsDeg: [10, 20, 30] });
    for (const frozen of version.content.targets) {
      expect(frozen.goal.kind).toBe('unitary');
      expect(frozen.solutions[frozen.chosenSolution]?.dialsDeg).toHaveLength(3);
    }
    const run = await answered(
      call(harness, lead, 'post', `${at}/runs`, {
        body: {
          versionId: summary.id,
          startDialsDeg: [null, null, 12.5],
          cautionAcknowledged: true,
          staleAcknowledged: false,
        },
      }),
      runSchema,
    );
    const dialledDeg = version.content.targets[0]?.solutions[0]?.dialsDeg ?? [];
    const reading = (dials: readonly number[]) =>
      call(harness, lead, 'post', `${at}/runs/${run.summary.id}/readings`, {
        body: { settingIndex: 0, outcome: 'done', dialledDeg: dials, note: '' },
      });
    expect((await reading(dialledDeg.slice(0, 2))).status).toBe(422);
    expect((await reading(dialledDeg)).status).toBe(201);
  }
});

test('a change of convention rewrites unitaries so that the plates do the same to the light', async () => {
  const protocol = await begin(content());
  const convention = { ...DEFAULT_CONVENTION, phase: 'wt-kz' as const };
  await answered(call(harness, lead, 'patch', at, { body: { convention } }), labSchema);
  const { targets } = (await read(protocol.id)).draft.content;
  for (const [place, { expression }] of targets.entries()) {
    const was = parseUnitary(content().targets[place]?.expression ?? '', DEFAULT_CONVENTION);
    const is = parseUnitary(expression, convention);
    if (!was.ok || !is.ok) throw new Error(`${expression} can’t be read`);
    expect(unitaryShortfall(is.quaternion, was.quaternion)).toBeLessThan(1e-24);
  }
  // Y is written with the other sign of i there, T with the other phase.
  expect(targets[0]?.expression).not.toBe('T');
});

test('plates that change places in a bench make its drafts forget held angles and present dials, and no others', async () => {
  const held = { ...target('t', 'T'), heldFastAxesDeg: [45, 56, 45] };
  const holding = await begin(content({ targets: [held], presentDialsDeg: [1, 2, 3] }));
  const plain = await begin(content());
  const bench = await call(harness, lead, 'get', `${at}/benches/${benchId}`);
  const put = (ids: readonly string[], ifMatch = '') =>
    call(harness, lead, 'put', `${at}/benches/${benchId}`, { body: benchBody(ids, 'gate bench'), ifMatch });
  const same = await put(plateIds, bench.headers['etag']);
  expect(same.status).toBe(200);
  expect((await read(holding.id)).draft.content.presentDialsDeg).toEqual([1, 2, 3]);
  const swapped = await put(plateIds.toReversed(), same.headers['etag']);
  expect(swapped.status).toBe(200);
  const after = (await read(holding.id)).draft;
  expect(after.content.presentDialsDeg).toBeNull();
  expect(after.content.targets[0]?.heldFastAxesDeg).toBeNull();
  expect(after.revision).toBe(holding.draft.revision + 1);
  expect((await read(plain.id)).draft.revision).toBe(plain.draft.revision);
});
