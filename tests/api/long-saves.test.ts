import pg from 'pg';
import { afterAll, beforeAll, expect, test } from 'vitest';
import {
  benchSchema,
  type DraftContent,
  labSchema,
  cabinetPlateSchema,
  problemSchema,
  type Protocol,
  protocolSchema,
  type ShownSolution,
  versionListSchema,
} from '../../shared/schemas';
import { answered, call } from './support/calls';
import { type Agent, type Harness, startHarness } from './support/harness';
import {
  benchBody,
  join,
  makeLab,
  plateBody,
  quarterBody,
  quarterCalibration,
  shownFor,
  target,
  type TestLab,
} from './support/lab';

// Six plates take a good part of a second a row: long enough to do something else meanwhile.
const expressions = Array.from({ length: 14 }, (_, k) => `bloch(${20 + 10 * k}deg, ${40 * k}deg)`);

let harness: Harness;
let lead: Agent;
let other: Agent;
let lab: TestLab;
let watcher: pg.Client;
let plateIds: readonly string[];
let benchId: string;
let draft: DraftContent;
let shown: ShownSolution[] | null = null;
beforeAll(async () => {
  harness = await startHarness();
  lead = await harness.signIn('adaeze-holm');
  other = await harness.signIn('oskar-lindqvist');
  lab = await makeLab(harness, lead, 'Own lab');
  await join(harness, lead, lab.labId, other, 'lead');
  watcher = new pg.Client({ connectionString: harness.testDatabase.adminUrl });
  await watcher.connect();
  const ids: string[] = [];
  for (const [k, made] of [
    quarterBody,
    plateBody,
    quarterBody,
    plateBody,
    quarterBody,
    plateBody,
  ].entries()) {
    const { id } = await answered(
      call(harness, lead, 'post', at('/plates'), { body: made(`P-${k}`) }),
      cabinetPlateSchema,
    );
    ids.push(id);
  }
  plateIds = ids;
  const bench = await answered(
    call(harness, lead, 'post', at('/benches'), { body: benchBody(plateIds, 'long arm') }),
    benchSchema,
  );
  benchId = bench.id;
  draft = {
    name: 'Many rows',
    purpose: '',
    kind: 'prepare',
    benchId,
    objective: 'least-expected-infidelity',
    presentDialsDeg: null,
    toleranceInfidelity: 1e-3,
    targets: expressions.map((expression, k) => target(`t${k}`, expression)),
  };
}, 120_000);
afterAll(async () => {
  await watcher.end();
  await harness.close();
});

const at = (path: string) => `/labs/${lab.labId}${path}`;
const begin = () => answered(call(harness, lead, 'post', at('/protocols'), { body: draft }), protocolSchema);

/** What the page shows of this draft: solved once, since only ids change. */
async function shownOf({ draft: { content } }: Protocol): Promise<ShownSolution[]> {
  shown ??= await shownFor(harness, lead, lab.labId, content);
  return shown.map((one, k) => ({ ...one, targetId: content.targets[k]?.id ?? '' }));
}

interface Saving {
  readonly finished: () => boolean;
  readonly answer: Promise<Awaited<ReturnType<typeof call>>>;
}

async function startSaving(protocol: Protocol, agent = lead): Promise<Saving> {
  const body = { message: 'All of them', shown: await shownOf(protocol) };
  let isFinished = false;
  const ask = async () => {
    const response = await call(harness, agent, 'post', at(`/protocols/${protocol.id}/versions`), {
      body,
      ifMatch: `"r${protocol.draft.revision}"`,
    });
    isFinished = true;
    return response;
  };
  const answer = ask();
  // Until it is read and the first rows are being solved.
  await new Promise((resolve) => {
    setTimeout(resolve, 300);
  });
  expect(isFinished).toBe(false);
  return { finished: () => isFinished, answer };
}

const codeOf = (text: string) => problemSchema.parse(JSON.parse(text)).type.split(':').at(-1);

test('while a long protocol is frozen, others are answered and no transaction stays open', async () => {
  const saving = await startSaving(await begin());
  let answeredMeanwhile = 0;
  while (!saving.finished()) {
    expect((await call(harness, other, 'get', at('/benches'))).status).toBe(200);
    if (saving.finished()) break;
    answeredMeanwhile += 1;
    const { rows } = await watcher.query(
      `select 1 from pg_stat_activity where usename = 'quarterturn_app' and xact_start < now() - interval '300 ms'`,
    );
    if (!saving.finished()) expect(rows).toEqual([]);
  }
  expect(answeredMeanwhile).toBeGreaterThan(2);
  expect((await saving.answer).status).toBe(201);
});

test('a person has one version worked out at a time; another person is not kept waiting by it', async () => {
  const [mine, second, theirs] = [await begin(), await begin(), await begin()];
  const saving = await startSaving(mine);
  const refused = await call(harness, lead, 'post', at(`/protocols/${second.id}/versions`), {
    body: { message: 'At once', shown: await shownOf(second) },
    ifMatch: '"r1"',
  });
  expect([refused.status, codeOf(refused.text)]).toEqual([409, 'still-freezing']);
  const beside = await startSaving(theirs, other);
  expect((await saving.answer).status).toBe(201);
  expect((await beside.answer).status).toBe(201);
  expect((await (await startSaving(second)).answer).status).toBe(201);
});

test('a draft that is saved meanwhile is refused, and no version of the old one is kept', async () => {
  const protocol = await begin();
  const saving = await startSaving(protocol);
  const put = await call(harness, other, 'put', at(`/protocols/${protocol.id}/draft`), {
    body: { ...protocol.draft.content, purpose: 'Changed meanwhile' },
    ifMatch: '"r1"',
  });
  expect([put.status, saving.finished()]).toEqual([200, false]);
  const refused = await saving.answer;
  expect([refused.status, codeOf(refused.text)]).toEqual([412, 'changed-meanwhile']);
  const { items } = await answered(
    call(harness, lead, 'get', at(`/protocols/${protocol.id}/versions`)),
    versionListSchema,
  );
  expect(items).toEqual([]);
});

test.for([
  ['a plate that is calibrated', () => calibrated(), [409, 'bench-changed-meanwhile']],
  ['a bench that is renamed', () => renamed(), [409, 'bench-changed-meanwhile']],
  // It makes every draft older.
  ['a convention that is changed', () => otherConvention(), [412, 'changed-meanwhile']],
] as const)('%s meanwhile makes the version refused', async ([, change, refusal]) => {
  const protocol = await begin();
  const saving = await startSaving(protocol);
  await change();
  expect(saving.finished()).toBe(false);
  const refused = await saving.answer;
  expect([refused.status, codeOf(refused.text)]).toEqual(refusal);
});

async function calibrated() {
  const response = await call(harness, other, 'post', at(`/plates/${plateIds[0] ?? ''}/calibrations`), {
    body: quarterCalibration({ measuredAt: '2026-07-01T10:00:00Z' }),
  });
  expect(response.status).toBe(201);
}

async function renamed() {
  const { revision } = await answered(call(harness, other, 'get', at(`/benches/${benchId}`)), benchSchema);
  const response = await call(harness, other, 'put', at(`/benches/${benchId}`), {
    body: benchBody(plateIds, 'longer arm'),
    ifMatch: `"r${revision}"`,
  });
  expect(response.status).toBe(200);
}

async function otherConvention() {
  const body = { convention: { phase: 'wt-kz', handedness: 'source', s3Sign: 'R' } };
  await answered(call(harness, other, 'patch', at(''), { body }), labSchema);
}
