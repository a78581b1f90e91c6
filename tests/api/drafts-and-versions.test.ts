import { afterAll, beforeAll, expect, test } from 'vitest';
import { z } from 'zod';
import { verifyChain } from '../../shared/protocol/verify';
import {
  draftSchema,
  plateDetailSchema,
  problemSchema,
  protocolSchema,
  versionListSchema,
  versionPageSchema,
  versionSchema,
} from '../../shared/schemas';
import { answered, call } from './support/calls';
import { type Agent, type Harness, startHarness } from './support/harness';
import { makeLab, quarterCalibration, saveVersion, shownFor, target, type TestLab } from './support/lab';

let harness: Harness;
let lead: Agent;
let lab: TestLab;
beforeAll(async () => {
  harness = await startHarness();
  lead = await harness.signIn('adaeze-holm');
  lab = await makeLab(harness, lead, 'Own lab');
}, 60_000);
afterAll(async () => {
  await harness.close();
});

const get = <S extends z.ZodType>(path: string, schema: S) =>
  answered(call(harness, lead, 'get', path), schema);
const begin = (targets = [target('t1', 'H'), target('t2', '(H + i V)/sqrt(2)')]) =>
  answered(
    call(harness, lead, 'post', `/labs/${lab.labId}/protocols`, {
      body: {
        name: 'A protocol',
        purpose: '',
        benchId: lab.benchId,
        kind: 'prepare',
        objective: 'least-expected-infidelity',
        presentDialsDeg: null,
        toleranceInfidelity: 1e-3,
        targets,
      },
    }),
    protocolSchema,
  );

test('a draft needs the revision it was made against; an older one gets both sides and changes nothing', async () => {
  const protocol = await begin();
  const at = `/labs/${lab.labId}/protocols/${protocol.id}/draft`;
  const body = { ...protocol.draft.content, name: 'Mine' };
  expect((await call(harness, lead, 'put', at, { body })).status).toBe(428);
  for (const wrong of ['"r2"', 'W/"r1"', '"1"', '*', 'r1']) {
    expect((await call(harness, lead, 'put', at, { body, ifMatch: wrong })).status, wrong).toBe(412);
  }
  const first = await call(harness, lead, 'put', at, { body: { ...body, name: 'Theirs' }, ifMatch: '"r1"' });
  expect([first.status, first.headers['etag']]).toEqual([200, '"r2"']);
  const second = await call(harness, lead, 'put', at, { body, ifMatch: '"r1"' });
  expect([second.status, second.headers['etag']]).toEqual([412, '"r2"']);
  const { current } = problemSchema.parse(JSON.parse(second.text));
  expect(draftSchema.parse(current).content.name).toBe('Theirs');
  const now = await get(`/labs/${lab.labId}/protocols/${protocol.id}`, protocolSchema);
  expect([now.draft.revision, now.draft.content.name]).toEqual([2, 'Theirs']);
});

test('a draft keeps what was typed to the last character, even what no database column can hold', async () => {
  const protocol = await begin();
  const typed = [target('\u0000', 'H +\u0000 \ud800'), target('', '(((')];
  const saved = await answered(
    call(harness, lead, 'put', `/labs/${lab.labId}/protocols/${protocol.id}/draft`, {
      body: { ...protocol.draft.content, targets: typed },
      ifMatch: '"r1"',
    }),
    draftSchema,
  );
  expect(saved.content.targets).toEqual(typed);
  const again = await get(`/labs/${lab.labId}/protocols/${protocol.id}`, protocolSchema);
  expect(again.draft.content.targets).toEqual(typed);
});

test('of fifty saves of one draft at once, one becomes a version', async () => {
  const protocol = await begin();
  const shown = await shownFor(harness, lead, lab.labId, protocol.draft.content);
  const statuses = await Promise.all(
    Array.from({ length: 50 }, async () => {
      const response = await call(
        harness,
        lead,
        'post',
        `/labs/${lab.labId}/protocols/${protocol.id}/versions`,
        {
          body: { message: 'All at once', shown },
          ifMatch: '"r1"',
        },
      );
      return response.status;
    }),
  );
  expect(statuses.filter((status) => status === 201)).toHaveLength(1);
  expect(statuses.filter((status) => ![201, 409, 503].includes(status))).toEqual([]);
  const { items } = await get(`/labs/${lab.labId}/protocols/${protocol.id}/versions`, versionListSchema);
  expect(items.map(({ number }) => number)).toEqual([1]);
});

test('versions chain by their hashes and never change, whatever happens to the plates afterwards', async () => {
  let protocol = await begin();
  await saveVersion(harness, lead, lab.labId, protocol, 'First.');
  const at = `/labs/${lab.labId}/protocols/${protocol.id}`;
  const before = await get(`${at}/versions/1`, versionSchema);
  await answered(
    call(harness, lead, 'put', `${at}/draft`, {
      body: { ...protocol.draft.content, targets: [...protocol.draft.content.targets, target('d', 'D')] },
      ifMatch: '"r1"',
    }),
    draftSchema,
  );
  protocol = await get(at, protocolSchema);
  await saveVersion(harness, lead, lab.labId, protocol, 'Second.');
  const plate = await get(`/labs/${lab.labId}/plates/${lab.plateIds[1]}`, plateDetailSchema);
  const measured = plate.plate.calibration ?? quarterCalibration();
  await answered(
    call(harness, lead, 'post', `/labs/${lab.labId}/plates/${lab.plateIds[1]}/calibrations`, {
      body: { ...quarterCalibration(), retardanceDeg: measured.retardanceDeg + 0.5 },
    }),
    z.unknown(),
  );
  const [first, second] = [
    await get(`${at}/versions/1`, versionSchema),
    await get(`${at}/versions/2`, versionSchema),
  ];
  expect(first).toEqual(before);
  const links = [first, second].map(({ summary, canonicalJson, parentHash }) => ({
    number: summary.number,
    contentHash: summary.contentHash,
    canonicalJson,
    parentHash,
  }));
  expect(verifyChain(links)).toEqual({ ok: true, length: 2 });
});

test('saving what the page could not have shown is refused by row and plate, number for number', async () => {
  const protocol = await begin();
  const shown = await shownFor(harness, lead, lab.labId, protocol.draft.content);
  const save = (changed: typeof shown) =>
    call(harness, lead, 'post', `/labs/${lab.labId}/protocols/${protocol.id}/versions`, {
      body: { message: 'As shown', shown: changed },
      ifMatch: '"r1"',
    });
  const [first, second] = shown;
  if (first === undefined || second === undefined) throw new Error('two rows were shown');
  const turned = { ...second, dialsDeg: [second.dialsDeg[0] ?? 0, (second.dialsDeg[1] ?? 0) + 0.1] };
  const response = await save([first, turned]);
  expect(response.status).toBe(422);
  const [field] = problemSchema.parse(JSON.parse(response.text)).fields ?? [];
  expect(field?.path).toBe('shown.1.dialsDeg.1');
  expect(field?.message).toMatch(/^Row 2 \(t2\): Q-B was shown at/);
  const nearly = { ...first, infidelity: first.infidelity + Number.EPSILON };
  expect((await save([nearly, second])).status).toBe(422);
  expect((await save([first])).status).toBe(422);
  expect((await save([first, second, second])).status).toBe(422);
  expect((await save([first, second])).status).toBe(201);
});

test('a row that cannot be read holds a version up, by its label and column', async () => {
  const protocol = await begin([target('t1', 'H'), target('w3', 'cos(22.5) H + sin(22.5deg) V')]);
  const [ready] = protocol.draft.content.targets;
  const shown = await shownFor(harness, lead, lab.labId, {
    ...protocol.draft.content,
    targets: ready === undefined ? [] : [ready],
  });
  const response = await call(harness, lead, 'post', `/labs/${lab.labId}/protocols/${protocol.id}/versions`, {
    body: { message: 'Too early', shown },
    ifMatch: '"r1"',
  });
  expect(response.status).toBe(422);
  const [field] = problemSchema.parse(JSON.parse(response.text)).fields ?? [];
  expect(field).toMatchObject({ path: 'targets.1.expression' });
  expect(field?.message).toMatch(/^Row 2 \(w3\), column 5: /);
});

test('a version is refused only when it would hold nothing new: a new calibration is new under an untouched draft', async () => {
  const protocol = await begin();
  const at = `/labs/${lab.labId}/protocols/${protocol.id}`;
  await saveVersion(harness, lead, lab.labId, protocol, 'First.');
  const shown = await shownFor(harness, lead, lab.labId, protocol.draft.content);
  const same = await call(harness, lead, 'post', `${at}/versions`, {
    body: { message: 'Other words, the same numbers', shown },
    ifMatch: '"r1"',
  });
  expect(same.status).toBe(409);
  expect(problemSchema.parse(JSON.parse(same.text)).type).toContain('nothing-new');
  const calibrated = await call(
    harness,
    lead,
    'post',
    `/labs/${lab.labId}/plates/${lab.plateIds[0]}/calibrations`,
    {
      body: {
        ...quarterCalibration(),
        retardanceDeg: 179.9,
        offsetDeg: 13,
        measuredAt: '2026-06-20T10:00:00Z',
      },
    },
  );
  expect(calibrated.status).toBe(201);
  expect((await saveVersion(harness, lead, lab.labId, protocol, 'Recalibrated.')).number).toBe(2);
  // A draft that was saved again word for word brings nothing new either.
  const again = await answered(
    call(harness, lead, 'put', `${at}/draft`, { body: protocol.draft.content, ifMatch: '"r1"' }),
    draftSchema,
  );
  expect(again.revision).toBe(2);
  await expect(
    saveVersion(harness, lead, lab.labId, { ...protocol, draft: again }, 'Nothing.'),
  ).rejects.toThrow(/answered 409/);
});

test("a lab's versions come by page, each once, newest first", async () => {
  const seen: string[] = [];
  for (let cursor: string | null = '', pages = 0; cursor !== null && pages < 20; pages += 1) {
    const query: string = cursor === '' ? '?limit=2' : `?limit=2&cursor=${cursor}`;
    const page: z.infer<typeof versionPageSchema> = await get(
      `/labs/${lab.labId}/versions${query}`,
      versionPageSchema,
    );
    seen.push(...page.items.map(({ id }) => id));
    cursor = page.nextCursor;
  }
  expect(seen.length).toBeGreaterThan(3);
  expect(new Set(seen).size).toBe(seen.length);
  expect(seen).toEqual(seen.toSorted().toReversed());
});
