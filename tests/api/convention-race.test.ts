import pg from 'pg';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { benchSchema, labSchema, type Protocol, protocolSchema } from '../../shared/schemas';
import { answered, call } from './support/calls';
import { type Agent, type Harness, startHarness } from './support/harness';
import { benchBody, makeLab, target, type TestLab } from './support/lab';

let harness: Harness;
let lead: Agent;
let lab: TestLab;
let someoneElse: pg.Client;
beforeAll(async () => {
  harness = await startHarness();
  lead = await harness.signIn('adaeze-holm');
  lab = await makeLab(harness, lead, 'Own lab');
  someoneElse = new pg.Client({ connectionString: harness.testDatabase.adminUrl });
  await someoneElse.connect();
}, 60_000);
afterAll(async () => {
  await someoneElse.end();
  await harness.close();
});

const at = (path: string) => `/labs/${lab.labId}${path}`;
const conventions = {
  ours: { phase: 'kz-wt', handedness: 'receiver', s3Sign: 'L' },
  other: { phase: 'wt-kz', handedness: 'source', s3Sign: 'R' },
} as const;
const changeTo = (convention: (typeof conventions)[keyof typeof conventions]) =>
  answered(call(harness, lead, 'patch', at(''), { body: { convention } }), labSchema);
const theProtocol = () =>
  answered(call(harness, lead, 'get', at(`/protocols/${lab.protocolId}`)), protocolSchema);
const theBench = () => answered(call(harness, lead, 'get', at(`/benches/${lab.benchId}`)), benchSchema);
const saveDraft = ({ draft }: Protocol, expression: string) =>
  call(harness, lead, 'put', at(`/protocols/${lab.protocolId}/draft`), {
    body: { ...draft.content, targets: [target('t1', expression)] },
    ifMatch: `"r${draft.revision}"`,
  });

/** Does this while someone else holds the lab's row; answers what the request came to once they let go. */
async function whileTheLabIsChanged<Result>(
  statements: readonly string[],
  request: () => PromiseLike<Result>,
): Promise<{ readonly waited: boolean; readonly result: Result }> {
  await someoneElse.query('begin');
  for (const statement of statements) await someoneElse.query(statement, [lab.labId]);
  let answeredYet = false;
  const asked = (async () => {
    const result = await request();
    answeredYet = true;
    return result;
  })();
  await new Promise((resolve) => {
    setTimeout(resolve, 300);
  });
  const waited = !answeredYet;
  await someoneElse.query('commit');
  return { waited, result: await asked };
}

test('two settings that two leads change at once both stay', async () => {
  const { result } = await whileTheLabIsChanged(
    [`update labs set name = 'Renamed meanwhile' where id = $1`],
    () => answered(call(harness, lead, 'patch', at(''), { body: { calibrationDueDays: 45 } }), labSchema),
  );
  expect(result).toMatchObject({ name: 'Renamed meanwhile', calibrationDueDays: 45 });
  const stored = await answered(call(harness, lead, 'get', at('')), labSchema);
  expect(stored).toMatchObject({ name: 'Renamed meanwhile', calibrationDueDays: 45 });
});

test('a page that was opened before a change of convention saves nothing, though no row had to be translated', async () => {
  await answered(saveDraft(await theProtocol(), 'H'), protocolSchema.shape.draft);
  const [protocol, bench] = [await theProtocol(), await theBench()];
  await changeTo(conventions.other);
  // Written under the old convention, where L is the light that is R now.
  expect((await saveDraft(protocol, 'L')).status).toBe(412);
  const put = await call(harness, lead, 'put', at(`/benches/${lab.benchId}`), {
    body: { ...benchBody(lab.plateIds), inputExpression: 'L' },
    ifMatch: `"r${bench.revision}"`,
  });
  expect(put.status).toBe(412);
  expect((await theProtocol()).draft.content).toEqual(protocol.draft.content);
  await changeTo(conventions.ours);
});

test('settings that leave the convention as it is make no draft and no bench older', async () => {
  const [protocol, bench] = [await theProtocol(), await theBench()];
  await answered(call(harness, lead, 'patch', at(''), { body: { name: 'Another name' } }), labSchema);
  await changeTo(conventions.ours);
  expect((await theProtocol()).draft.revision).toBe(protocol.draft.revision);
  expect((await theBench()).revision).toBe(bench.revision);
});

test('a draft, a bench and a protocol that are saved during a change of convention wait for it', async () => {
  const [protocol, bench] = [await theProtocol(), await theBench()];
  const changing = [
    `update labs set s3_sign = 'R' where id = $1`,
    'update drafts set revision = revision + 1 where lab_id = $1',
    'update benches set revision = revision + 1 where lab_id = $1',
  ];
  const draft = await whileTheLabIsChanged(changing, () => saveDraft(protocol, 'L'));
  expect([draft.waited, draft.result.status]).toEqual([true, 412]);
  const changed = await whileTheLabIsChanged(changing, () =>
    call(harness, lead, 'put', at(`/benches/${lab.benchId}`), {
      body: benchBody(lab.plateIds),
      ifMatch: `"r${bench.revision}"`,
    }),
  );
  expect([changed.waited, changed.result.status]).toEqual([true, 412]);
  const begun = await whileTheLabIsChanged([`update labs set s3_sign = 'L' where id = $1`], () =>
    call(harness, lead, 'post', at('/protocols'), { body: protocol.draft.content }),
  );
  expect([begun.waited, begun.result.status]).toEqual([true, 201]);
});
