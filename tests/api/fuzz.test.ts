import fc from 'fast-check';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { emptyDocument, writeCabinet } from '../../shared/cabinet-document';
import { call } from './support/calls';
import { type Agent, type Harness, startHarness } from './support/harness';
import { newMount } from '../support/plates';
import {
  benchBody,
  calibrationBody,
  makeLab,
  plateBody,
  scanBody,
  target,
  type TestLab,
} from './support/lab';

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

const strange: fc.Arbitrary<unknown> = fc.oneof(
  fc.constantFrom<unknown>(
    null,
    true,
    '',
    ' ',
    0,
    -0,
    -1,
    1e308,
    5e-324,
    2 ** 53 + 1,
    '0x10',
    '１２',
    '−5',
    'NaN',
    '\u0000',
    '\ud800',
    'a'.repeat(5000),
    '('.repeat(4000),
    [],
    {},
    [[[[]]]],
    { __proto__: null, constructor: 1 },
    '2026-13-45T00:00:00Z',
    '00000000-0000-7000-8000-000000000000',
  ),
  fc.double(),
  fc.string({ unit: 'binary', maxLength: 40 }),
  fc.jsonValue({ maxDepth: 3 }),
);

/** A body with some of its parts, however deep, put in place of by something strange. */
function mutated(body: unknown): fc.Arbitrary<unknown> {
  return fc.array(fc.tuple(fc.nat(), strange), { minLength: 1, maxLength: 3 }).map((changes) => {
    const copy = structuredClone({ body });
    for (const [pick, value] of changes) {
      const places: { holder: Record<string, unknown>; key: string }[] = [];
      collect(copy, places);
      const place = places[pick % places.length];
      if (place !== undefined) place.holder[place.key] = value;
    }
    return copy.body;
  });
}

function isHolder(value: unknown): value is Record<string, unknown> {
  return typeof value === 'object' && value !== null;
}

function collect(value: unknown, places: { holder: Record<string, unknown>; key: string }[]): void {
  if (!isHolder(value)) return;
  for (const key of Object.keys(value)) {
    places.push({ holder: value, key });
    collect(value[key], places);
  }
}

const knownLightBody = (fileId: string) => ({
  ...scanBody(fileId),
  light: { kind: 'known', inputExpression: 'L', analyserDeg: 0, extinction: null, beforeId: null },
  leftOut: [{ line: 2, why: 'wild' }],
});

test('three thousand mutated requests to every writing address: each a clear answer, none a failure', async () => {
  const at = `/labs/${lab.labId}`;
  const draft = {
    name: 'A protocol',
    purpose: '',
    benchId: lab.benchId,
    kind: 'prepare',
    objective: 'least-expected-infidelity',
    presentDialsDeg: null,
    toleranceInfidelity: 1e-3,
    targets: [target('t', 'H'), target('u', '(H + i V)/sqrt(2)')],
  };
  const { seat: _seat, ...facts } = plateBody('F-1');
  const targets: readonly (readonly ['post' | 'put' | 'patch', string, unknown])[] = [
    ['post', '/labs', { name: 'A lab' }],
    [
      'patch',
      at,
      {
        name: 'A lab',
        calibrationDueDays: 30,
        convention: { phase: 'kz-wt', handedness: 'receiver', s3Sign: 'L' },
      },
    ],
    ['post', `${at}/invitations`, { role: 'guest', note: 'x' }],
    ['post', `${at}/plates`, plateBody('F-1')],
    ['put', `${at}/plates/${lab.sparePlateId}`, facts],
    ['post', `${at}/plates/${lab.sparePlateId}/calibrations`, calibrationBody()],
    ['post', `${at}/plates/${lab.sparePlateId}/scans`, scanBody(lab.fileId)],
    ['post', `${at}/plates/${lab.sparePlateId}/scans`, knownLightBody(lab.fileId)],
    ['put', `${at}/plates/${lab.sparePlateId}/seat`, { mountId: lab.spareMountId, why: 'cleaned' }],
    ['post', `${at}/plates/${lab.sparePlateId}/take-out`, { why: 'cleaned' }],
    ['post', `${at}/plates/${lab.sparePlateId}/files`, { fileId: lab.fileId, kind: 'data-sheet' }],
    [
      'post',
      `${at}/cabinet/import`,
      { fileText: writeCabinet(emptyDocument, 'csv'), format: 'csv', dryRun: true, planHash: null },
    ],
    ['post', `${at}/mounts`, newMount({ name: 'F-M' })],
    ['put', `${at}/mounts/${lab.spareMountId}`, newMount({ name: 'F-M' })],
    ['post', `${at}/benches`, benchBody(lab.plateIds, 'b')],
    ['put', `${at}/benches/${lab.benchId}`, benchBody(lab.plateIds)],
    ['post', `${at}/protocols`, draft],
    ['put', `${at}/protocols/${lab.protocolId}/draft`, draft],
    [
      'post',
      `${at}/protocols/${lab.protocolId}/versions`,
      {
        message: 'm',
        shown: [
          {
            targetId: draft.targets[0]?.id,
            fastAxesDeg: [1, 2],
            dialsDeg: [1, 2],
            infidelity: 0,
            dialledInfidelity: 0,
          },
        ],
      },
    ],
    [
      'post',
      `${at}/runs`,
      {
        versionId: lab.version.id,
        startDialsDeg: [null, 1],
        cautionAcknowledged: true,
        staleAcknowledged: false,
      },
    ],
    [
      'post',
      `${at}/runs/${lab.runId}/readings`,
      { outcome: 'done', settingIndex: 0, dialledDeg: [1, 2], note: '' },
    ],
    ['post', `${at}/runs/${lab.runId}/readings`, { outcome: 'skipped', settingIndex: 0, note: 'x' }],
    ['post', `${at}/runs/${lab.runId}/pause`, { note: '' }],
  ];
  const failures: string[] = [];
  for (const [method, path, body] of targets) {
    const bodies = fc.sample(mutated(body), { numRuns: 200, seed: 20261201 });
    for (let from = 0; from < bodies.length; from += 4) {
      await Promise.all(
        bodies.slice(from, from + 4).map(async (sent) => {
          const response = await call(harness, lead, method, path, { body: sent, ifMatch: '"r1"' });
          if (response.status >= 500 && response.status !== 503) {
            failures.push(`${method} ${path} ${JSON.stringify(sent).slice(0, 300)} → ${response.status}`);
          }
        }),
      );
    }
  }
  expect(failures).toEqual([]);
  expect((await harness.browser().get('/readyz')).status).toBe(200);
}, 180_000);
