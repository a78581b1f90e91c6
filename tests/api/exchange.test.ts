import { createHash } from 'node:crypto';
import pg from 'pg';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { z } from 'zod';
import {
  type CabinetDocument,
  type CabinetFileFormat,
  emptyDocument,
  type ImportResult,
  importResultSchema,
  maxDocumentBytes,
  readCabinet,
  writeCabinet,
} from '../../shared/cabinet-document';
import { labSchema, plateDetailSchema, platePageSchema, problemSchema } from '../../shared/schemas';
import { cabinet, calibration, day, mount, plate, seat } from '../cabinet/document-fixture';
import { answered, call } from './support/calls';
import { type Agent, type Harness, startHarness } from './support/harness';
import { calibrationBody, join, makeLab, type TestLab } from './support/lab';

let harness: Harness;
let lead: Agent;
let operator: Agent;
let lab: TestLab;
beforeAll(async () => {
  harness = await startHarness();
  lead = await harness.signIn('adaeze-holm');
  operator = await harness.signIn('juno-petrak');
  lab = await makeLab(harness, lead, 'Lab “of files”');
  await join(harness, lead, lab.labId, operator, 'operator');
}, 60_000);
afterAll(async () => {
  await harness.close();
});

const emptyLab = async (): Promise<string> =>
  (await answered(call(harness, lead, 'post', '/labs', { body: { name: 'Another lab' } }), labSchema)).id;

const exported = (labId: string, format: CabinetFileFormat) =>
  call(harness, lead, 'get', `/labs/${labId}/cabinet/export?format=${format}`);

async function textOf(labId: string, format: CabinetFileFormat): Promise<string> {
  const answer = await exported(labId, format)
    .buffer(true)
    .parse((response, done) => {
      const parts: Buffer[] = [];
      response.on('data', (part: Buffer) => parts.push(part));
      response.on('end', () => done(null, Buffer.concat(parts)));
    });
  expect(answer.status).toBe(200);
  return z.instanceof(Buffer).parse(answer.body).toString('utf8');
}

interface Sent {
  readonly fileText: string;
  readonly format?: CabinetFileFormat;
  readonly planHash?: string | null;
}

const send = (labId: string, { fileText, format = 'json', planHash = null }: Sent) =>
  call(harness, lead, 'post', `/labs/${labId}/cabinet/import`, {
    body: { fileText, format, dryRun: planHash === null, planHash },
  });

async function imported(
  labId: string,
  fileText: string,
  format: CabinetFileFormat = 'json',
): Promise<ImportResult> {
  const { planHash } = await answered(send(labId, { fileText, format }), importResultSchema);
  return answered(send(labId, { fileText, format, planHash }), importResultSchema);
}

const platesOf = async (labId: string) =>
  (await answered(call(harness, lead, 'get', `/labs/${labId}/plates`), platePageSchema)).items;

const detailOf = async (labId: string, name: string) => {
  const found = (await platesOf(labId)).find((one) => one.name === name);
  return answered(call(harness, lead, 'get', `/labs/${labId}/plates/${found?.id ?? ''}`), plateDetailSchema);
};

const problemOf = (text: string) => problemSchema.parse(JSON.parse(text));
const json = (document: CabinetDocument): string => writeCabinet(document, 'json');

/** A cabinet with a history: seats that ended, a question settled in the same seat, things retired, two of one moment. */
const storied = cabinet(
  [
    mount('M-1', { rangeDeg: { from: -5, to: 355 }, note: '=1+1' }),
    mount('M-2'),
    mount('M-1', { retiredAt: day(3) }),
  ],
  [
    plate('H-1', [
      seat('M-1', 1, 2, [calibration(2)], day(3)),
      seat('M-1', 5, null, [
        calibration(6, { openQuestions: ['axis', 'branch'] }),
        calibration(6, { retardanceDeg: 91, settles: 2, recordedBy: "O'Neil" }),
        calibration(7, { note: '@two\nlines', temperatureC: -3.25 }),
      ]),
    ]),
    plate('H-1', [], { retiredAt: day(1) }),
    plate('Q-1', [seat('M-2', 5, 6)], {
      construction: 'multi-order',
      order: 7,
      coatingNm: { from: 700, to: 900 },
    }),
  ],
);

/** What the lab's record says of its imports. */
async function recordedImports(labId: string): Promise<readonly unknown[]> {
  const client = new pg.Client({ connectionString: harness.testDatabase.adminUrl });
  await client.connect();
  try {
    const { rows } = await client.query<{ content: string }>(
      `select content from audit_events where lab_id = $1 and kind = 'cabinet.imported'`,
      [labId],
    );
    return rows.map(({ content }) => z.object({ details: z.unknown() }).parse(JSON.parse(content)).details);
  } finally {
    await client.end();
  }
}

describe('an export', () => {
  test.each(['csv', 'json'] as const)(
    'as %s is a file to be saved, and reads as the cabinet',
    async (format) => {
      const answer = await exported(lab.labId, format);
      expect(answer.headers['content-type']).toMatch(
        format === 'csv' ? /^text\/csv; charset=utf-8/u : /^application\/json/u,
      );
      expect(answer.headers['content-disposition']).toContain(
        `attachment; filename="Lab _of files_ cabinet `,
      );
      expect(answer.headers['content-security-policy']).toBe("sandbox; default-src 'none'");
      expect(answer.headers['x-content-type-options']).toBe('nosniff');
      const reading = readCabinet(await textOf(lab.labId, format), format, new Date());
      if (!reading.ok) throw new Error(reading.faults[0]?.message);
      expect(reading.document.plates.map(({ name }) => name)).toEqual(['H-3', 'H-9', 'Q-B']);
      expect(reading.document.mounts.map(({ name }) => name)).toEqual(['M H-3', 'M H-9', 'M Q-B', 'M-S']);
      const person = reading.document.plates[0]?.seats[0]?.calibrations[0]?.recordedBy;
      expect(person).toBe('Adaeze Holm');
      expect(await textOf(lab.labId, format)).toBe(writeCabinet(reading.document, format));
    },
  );

  test('imported where it came from changes nothing, and records nothing', async () => {
    for (const format of ['csv', 'json'] as const) {
      const { plan, imported: isDone } = await imported(lab.labId, await textOf(lab.labId, format), format);
      expect([plan.changes, plan.refused, isDone]).toEqual([[], [], true]);
      expect(plan.unchanged).toMatchObject({ plates: 3, mounts: 4 });
    }
  });

  test.each(['csv', 'json'] as const)(
    'as %s into an empty lab makes the same cabinet, which exports as the very same file',
    async (format) => {
      for (const fileText of [writeCabinet(storied, format), await textOf(lab.labId, format)]) {
        const other = await emptyLab();
        const result = await imported(other, fileText, format);
        expect(result).toMatchObject({ imported: true, plan: { refused: [] } });
        expect(await textOf(other, format)).toBe(fileText);
      }
    },
  );
});

describe('an import', () => {
  test('leaves each plate as its newest seat and calibration have it, under the names of those who measured', async () => {
    const labId = await emptyLab();
    await imported(labId, json(storied));
    const h1 = await detailOf(labId, 'H-1');
    expect(h1.plate).toMatchObject({
      seat: { mount: { name: 'M-1' }, seatedAt: day(5) },
      calibration: { measuredAt: day(7), recordedBy: 'Ines Okafor', note: '@two\nlines' },
    });
    expect(h1.calibrations.map(({ recordedBy }) => recordedBy)).toEqual([
      'Ines Okafor',
      "O'Neil",
      'Ines Okafor',
      'Ines Okafor',
    ]);
    // Of two of one moment the later in the file is the newer.
    expect(h1.calibrations[1]?.settlesId).toBe(h1.calibrations[2]?.id);
    const q1 = (await platesOf(labId)).find(({ name }) => name === 'Q-1');
    expect(q1).toMatchObject({ health: 'not-seated', seat: null, calibration: null });
  });

  test('ends a seat and begins the next as the file says, and the zero of the old one is void', async () => {
    const labId = await emptyLab();
    const mounts = [mount('M-1'), mount('M-2')];
    await imported(labId, json(cabinet(mounts, [plate('H-1', [seat('M-1', 1, null, [calibration(2)])])])));
    const before = (await detailOf(labId, 'H-1')).plate.revision;
    const moved = cabinet(mounts, [
      plate('H-1', [seat('M-1', 1, 4, [calibration(2)]), seat('M-2', 4, null)]),
      plate('A-1', [seat('M-1', 4, null, [calibration(5)])]),
    ]);
    const { plan } = await imported(labId, json(moved));
    expect(plan.changes.map(({ kind }) => kind).toSorted()).toEqual([
      'calibration-added',
      'plate-added',
      'seat-added',
      'seat-added',
      'seat-ended',
    ]);
    const h1 = await detailOf(labId, 'H-1');
    expect(h1.plate).toMatchObject({ health: 'not-calibrated', seat: { mount: { name: 'M-2' } } });
    expect(h1.plate.revision).toBeGreaterThan(before);
    expect(await textOf(labId, 'json')).toBe(json(moved));
  });

  test('changes facts field by field and takes what the rest allows, the refused named beside it', async () => {
    const labId = await emptyLab();
    await imported(labId, json(storied));
    const [m1, ...others] = storied.mounts;
    const changed = {
      ...storied,
      mounts: [{ ...(m1 ?? mount('M-1')), backlashDeg: 0.4 }, ...others],
      plates: storied.plates.map((one) =>
        one.name === 'Q-1' ? { ...one, serial: 'S-7', seats: [seat('M-2', 3, 4), ...one.seats] } : one,
      ),
    };
    const { plan } = await imported(labId, json(changed));
    expect(plan.changes.map(({ kind }) => kind)).toEqual(['mount-changed', 'plate-changed']);
    expect(plan.refused).toMatchObject([{ what: 'seat', name: 'Q-1' }]);
    expect((await detailOf(labId, 'Q-1')).plate.serial).toBe('S-7');
  });

  test('is recorded once, with the file’s hash and its counts', async () => {
    const labId = await emptyLab();
    const fileText = json(storied);
    await imported(labId, fileText);
    const recorded = await recordedImports(labId);
    expect(recorded).toHaveLength(1);
    expect(recorded[0]).toMatchObject({
      fileSha256: createHash('sha256').update(fileText).digest('hex'),
      format: 'json',
      refused: 0,
      changes: { 'plate-added': 3, 'mount-added': 3, 'seat-added': 3, 'calibration-added': 4 },
    });
  });

  test('of a plan that is no longer the one that was shown is refused whole', async () => {
    const labId = await emptyLab();
    const fileText = json(storied);
    const { planHash } = await answered(send(labId, { fileText }), importResultSchema);
    expect(await platesOf(labId)).toEqual([]);
    await imported(labId, json(cabinet([mount('M-2', { backlashDeg: 3 })])));
    const refused = await send(labId, { fileText, planHash });
    expect([refused.status, problemOf(refused.text).type]).toEqual([
      409,
      'urn:quarterturn:problem:plan-changed',
    ]);
    expect(await platesOf(labId)).toEqual([]);
    expect((await imported(labId, fileText)).imported).toBe(true);
    const again = await send(labId, { fileText, planHash });
    expect(again.status).toBe(409);
  });

  test('by two at the same moment happens once', async () => {
    const labId = await emptyLab();
    const fileText = json(storied);
    const { planHash } = await answered(send(labId, { fileText }), importResultSchema);
    const answers = await Promise.all([1, 2, 3].map(() => send(labId, { fileText, planHash })));
    expect(answers.map(({ status }) => status).toSorted()).toEqual([200, 409, 409]);
    expect(await textOf(labId, 'json')).toBe(fileText);
  });

  test('of a file at fault is refused with row and column, and changes nothing', async () => {
    const labId = await emptyLab();
    const text = writeCabinet(storied, 'csv').replace(',91,', ',NaN,').replace(',-3.25,', ',=cmd,');
    const refused = await send(labId, { fileText: text, format: 'csv' });
    const problem = problemOf(refused.text);
    expect([refused.status, problem.type]).toEqual([422, 'urn:quarterturn:problem:unreadable-file']);
    expect(problem.fields?.map(({ path }) => path)).toEqual([
      'rows.4.retardance_deg',
      'rows.5.temperature_degc',
    ]);
    expect(problem.detail).toBe('The file has 2 faults, and nothing of it was imported.');
    for (const fileText of ['', '\u0000', '{}', '[[['.repeat(9), text.slice(0, 900)]) {
      expect((await send(labId, { fileText, format: 'csv' })).status).toBe(422);
      expect((await send(labId, { fileText, format: 'json' })).status).toBe(422);
    }
    expect(await platesOf(labId)).toEqual([]);
  });

  test('without its dry run is refused, and so is one of an operator', async () => {
    const body = { fileText: json(emptyDocument), format: 'json', dryRun: false, planHash: null };
    const path = `/labs/${lab.labId}/cabinet/import`;
    const refused = await call(harness, lead, 'post', path, { body });
    expect([refused.status, problemOf(refused.text).fields?.[0]?.path]).toEqual([422, 'planHash']);
    expect((await call(harness, operator, 'post', path, { body })).status).toBe(403);
    expect((await call(harness, operator, 'get', `/labs/${lab.labId}/cabinet/export`)).status).toBe(200);
  });

  test('of four megabytes is read though every character of it is written as two; more is refused by its size', async () => {
    const whole = await send(lab.labId, { fileText: '"'.repeat(maxDocumentBytes), format: 'csv' });
    expect(whole.status).toBe(422);
    const over = await send(lab.labId, { fileText: '"'.repeat(maxDocumentBytes + 10_000), format: 'csv' });
    expect([over.status, problemOf(over.text).detail]).toEqual([
      413,
      expect.stringContaining('larger than 4 MB'),
    ]);
    const stranger = await call(harness, harness.browser(), 'post', `/labs/${lab.labId}/cabinet/import`, {
      body: { fileText: '' },
    });
    expect(stranger.status).toBe(401);
  });

  test('of two thousand calibrations is done in one go', async () => {
    const labId = await emptyLab();
    const many = cabinet(
      Array.from({ length: 100 }, (_, nth) => mount(`M-${nth}`)),
      Array.from({ length: 100 }, (_, nth) =>
        plate(`H-${nth}`, [
          seat(
            `M-${nth}`,
            1,
            null,
            Array.from({ length: 20 }, (_one, at) => calibration(2 + at)),
          ),
        ]),
      ),
    );
    const fileText = writeCabinet(many, 'csv');
    const { plan } = await imported(labId, fileText, 'csv');
    expect(plan.changes).toHaveLength(100 * 23);
    expect(await textOf(labId, 'csv')).toBe(fileText);
  });
});

test('a calibration that is measured here goes under the person’s own name', async () => {
  const labId = await emptyLab();
  await imported(labId, json(storied));
  const { plate: h1 } = await detailOf(labId, 'H-1');
  const recorded = await call(harness, lead, 'post', `/labs/${labId}/plates/${h1.id}/calibrations`, {
    body: calibrationBody(),
  });
  expect(recorded.status).toBe(201);
  const { calibrations } = await detailOf(labId, 'H-1');
  expect(calibrations.find(({ measuredAt }) => measuredAt.startsWith('2026-06-01'))?.recordedBy).toBe(
    'Adaeze Holm',
  );
});
