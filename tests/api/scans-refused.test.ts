import { randomUUID } from 'node:crypto';
import pg from 'pg';
import { spawnSync } from 'node:child_process';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { z } from 'zod';
import { fileSchema, type RecordScan } from '../../shared/schemas';
import { linearScanText } from '../support/scan-text';
import { call, upload } from './support/calls';
import { type Agent, type Harness, startHarness } from './support/harness';
import { makeLab, type TestLab } from './support/lab';
import { BOTH, bodyFor, problemOf, ScanDesk, TRUTH } from './support/scan-desk';

let harness: Harness;
let lead: Agent;
let lab: TestLab;
let desk: ScanDesk;
let watcher: pg.Client;
beforeAll(async () => {
  harness = await startHarness();
  lead = await harness.signIn('adaeze-holm');
  lab = await makeLab(harness, lead, 'Lab of refused scans');
  desk = new ScanDesk(harness, lead, lab.labId);
  watcher = new pg.Client({ connectionString: harness.testDatabase.adminUrl });
  await watcher.connect();
}, 60_000);
afterAll(async () => {
  await watcher.end();
  await harness.close();
});

/** Does to the database what another process would, and gives nothing else a turn until it is done. */
function atOnce(sql: string): void {
  const script = `const { Client } = require('pg'); const client = new Client(process.argv[1]);
    client.connect().then(() => client.query(process.argv[2])).then(() => client.end());`;
  const { status, stderr } = spawnSync(
    process.execPath,
    ['--eval', script, harness.testDatabase.adminUrl, sql],
    { encoding: 'utf8' },
  );
  if (status !== 0) throw new Error(stderr);
}

describe('what is refused', () => {
  test.each([
    ['another zero', (shown: RecordScan['shown']) => ({ ...shown, offsetDeg: shown.offsetDeg + 1e-12 })],
    ['no retardance', (shown: RecordScan['shown']) => ({ ...shown, retardanceDeg: null })],
  ])('other numbers than the server fits: %s', async (_, change) => {
    const plate = await desk.addPlate();
    const body = await desk.scanBody(plate, linearScanText({ truth: TRUTH, seed: 51 }));
    const refused = await desk.send(plate, { ...body, shown: change(body.shown) });
    expect([refused.status, problemOf(refused.text).paths]).toEqual([422, ['shown']]);
    expect((await desk.plateNow(plate)).calibrations).toHaveLength(1);
  });

  test('a line left out without a reason; with one it is in the audit and in the record', async () => {
    const plate = await desk.addPlate();
    const text = linearScanText({ truth: TRUTH, seed: 52 });
    const leftOut = [{ line: 9, why: 'The shutter closed.' }];
    const body = await desk.scanBody(plate, text, { leftOut });
    const bare = await desk.send(plate, { ...body, leftOut: [{ line: 9, why: ' ' }] });
    expect([bare.status, problemOf(bare.text).paths]).toEqual([400, ['leftOut.0.why']]);
    const made = await desk.record(plate, body);
    expect(made.method).toBe('scan between crossed and parallel polarisers, 40 points');
    expect((await desk.detailOf(plate, made.id)).scan?.record).toMatchObject({ leftOut, pointCount: 40 });
    const { rows } = await watcher.query(
      `select content from audit_events where kind = 'plate.scanned' and subject_id = $1`,
      [plate.id],
    );
    expect(rows).toHaveLength(1);
    const [{ content }] = z.tuple([z.object({ content: z.string() })]).parse(rows);
    expect(JSON.parse(content)).toMatchObject({
      details: { calibrationId: made.id, fileId: made.fileId, leftOut },
    });
  });

  test.each([
    ['a comment’s line', [{ line: 1, why: 'x' }], 'leftOut.0.line'],
    [
      'one line twice',
      [
        { line: 9, why: 'x' },
        { line: 9, why: 'y' },
      ],
      'leftOut.1.line',
    ],
  ])('%s left out', async (_, leftOut, path) => {
    const plate = await desk.addPlate();
    const body = await desk.scanBody(plate, linearScanText({ truth: TRUTH, seed: 55 }), { leftOut });
    const refused = await desk.send(plate, body);
    expect([refused.status, problemOf(refused.text).paths]).toEqual([422, [path]]);
  });

  const HEAD = 'dial (deg);crossed (mW);parallel (mW)\n';
  test.each([
    ['no number', `${HEAD}0;1;2\n5;nan;3\n`, 'Line 3, column 2 (crossed): “nan” is no measured value.'],
    ['a formula', `${HEAD}0;1;2\n5;=1+1;3\n`, 'Line 3, column 2 (crossed): “=1+1” is a formula'],
    [
      'cut off in a row',
      `${HEAD}0;1;2\n5;1`,
      'Line 3: This line has 2 columns, the others have 3. The file was cut off here.',
    ],
    [
      'powers below zero',
      `${HEAD}0;1;2\n5;-1;2\n10;1;2\n15;1;3\n20;2;1\n25;2;1\n`,
      'Line 3: the power −1 is below 0',
    ],
    ['prose', 'Nothing came out on Monday.\n', 'No line of this file is a row of numbers.'],
  ])('a file with faults, by their lines: %s', async (_, text, words) => {
    const plate = await desk.addPlate();
    const { id } = await desk.store(text);
    const refused = await desk.send(plate, bodyFor(id));
    const { detail, paths } = problemOf(refused.text);
    expect([refused.status, paths[0]]).toEqual([422, 'fileId']);
    expect(detail).toContain(words);
  });

  test('two encodings in one file', async () => {
    const plate = await desk.addPlate();
    const mixed = Buffer.concat([
      Buffer.from('# µW\ndial ('),
      Buffer.from([0xb0]),
      Buffer.from(');crossed;parallel\n0;1;2\n5;1;3\n'),
    ]);
    const stored = await upload(harness, lead, desk.at('/files'), mixed);
    if (stored.status !== 201) {
      expect([stored.status, problemOf(stored.text).detail]).toEqual([422, expect.stringContaining('text')]);
      return;
    }
    const refused = await desk.send(plate, bodyFor(fileSchema.parse(stored.body).id));
    expect([refused.status, problemOf(refused.text).detail]).toEqual([
      422,
      expect.stringContaining('Line 2'),
    ]);
  });

  test('the fault that is one too many is counted', async () => {
    const plate = await desk.addPlate();
    const { id } = await desk.store(`${HEAD}0;1;2\n${'5;nan;3\n'.repeat(70)}`);
    const { detail, paths } = problemOf((await desk.send(plate, bodyFor(id))).text);
    expect(paths).toHaveLength(51);
    expect(detail).toContain('And 20 more faults like these.');
  });

  test('a picture, a file that isn’t there and one of another lab', async () => {
    const plate = await desk.addPlate();
    const pdf = await desk.store(Buffer.from('%PDF-1.7\n%\u00e2\u00e3\n1 0 obj\n<<>>\nendobj\n'), 'scan.csv');
    expect(pdf.mediaType).toBe('application/pdf');
    const other = await makeLab(harness, lead, 'A third lab of scans');
    for (const [fileId, words] of [
      [pdf.id, 'is no text'],
      [randomUUID(), 'no such file'],
      [other.fileId, 'no such file'],
    ] as const) {
      const refused = await desk.send(plate, bodyFor(fileId));
      const { detail, paths } = problemOf(refused.text);
      expect([refused.status, paths]).toEqual([422, ['fileId']]);
      expect(detail).toContain(words);
    }
  });

  test.each([
    ['no power', { ...BOTH, crossed: null, parallel: null }, 'neither the crossed nor the parallel'],
    ['a column that isn’t there', { ...BOTH, parallel: { column: 7, unit: null } }, 'names column 8'],
    ['one column twice', { ...BOTH, parallel: { column: 1, unit: null } }, 'for two things'],
    ['units that can’t be compared', { ...BOTH, parallel: { column: 2, unit: 'V' } }, 'can’t be compared'],
  ] as const)('columns that don’t hold: %s', async (_, columns, words) => {
    const plate = await desk.addPlate();
    const { id } = await desk.store(linearScanText({ truth: TRUTH }));
    const refused = await desk.send(plate, bodyFor(id, { columns }));
    expect([refused.status, problemOf(refused.text).detail]).toEqual([422, expect.stringContaining(words)]);
  });

  test('a time to come, and a plate in no mount', async () => {
    const plate = await desk.addPlate();
    const body = await desk.scanBody(plate, linearScanText({ truth: TRUTH, seed: 53 }));
    const early = await desk.send(plate, { ...body, measuredAt: '2099-01-01T00:00:00Z' });
    expect([early.status, problemOf(early.text).paths]).toEqual([422, ['measuredAt']]);
    const out = await call(harness, lead, 'post', desk.at(`/plates/${plate.id}/take-out`), {
      body: { why: 'Cleaned.' },
      ifMatch: `"r${plate.revision}"`,
    });
    expect(out.status).toBe(200);
    const refused = await desk.send(plate, body);
    expect([refused.status, problemOf(refused.text).code]).toEqual([409, 'not-seated']);
  });

  test('a seat that ended while the scan was fitted', async () => {
    const plate = await desk.addPlate();
    const body = await desk.scanBody(plate, linearScanText({ truth: TRUTH, seed: 54 }));
    const seen: string[] = [];
    // Behind the first transaction, and while this process waits, before the second has begun.
    const endSeat = ({ sql }: { readonly sql: string }) => {
      if (/^commit/iu.test(sql)) seen.push('commit');
      if (!/^begin/iu.test(sql) || seen.at(-1) !== 'commit') return;
      seen.push('ended');
      atOnce(`update seats set left_at = now(), left_why = 'knocked' where id = '${plate.seat?.id ?? ''}'`);
    };
    harness.database.on('query', endSeat);
    const refused = await desk.send(plate, body);
    harness.database.removeListener('query', endSeat);
    expect(seen).toContain('ended');
    expect([refused.status, problemOf(refused.text).code]).toEqual([409, 'changed-meanwhile']);
    expect((await desk.plateNow(plate)).calibrations).toHaveLength(1);
  });
});
