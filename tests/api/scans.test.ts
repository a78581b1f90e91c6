import { createHash, randomUUID } from 'node:crypto';
import pg from 'pg';
import { spawnSync } from 'node:child_process';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { z } from 'zod';
import { DEFAULT_CONVENTION, type Stokes } from '../../shared/optics';
import { parseState } from '../../shared/optics/expression';
import type { LinearScanFit } from '../../shared/optics/calibration';
import { fitScan, type ScanLight } from '../../shared/scan-calibration';
import {
  type CabinetPlate,
  cabinetPlateSchema,
  type Calibration,
  calibrationDetailSchema,
  calibrationSchema,
  fileSchema,
  plateDetailSchema,
  problemSchema,
  type RecordScan,
  rememberedColumnsSchema,
  type ScanColumns,
} from '../../shared/schemas';
import { readScanFile } from '../../shared/scan-file';
import { knownLightText, linearScanText } from '../support/scan-text';
import { answered, call, upload } from './support/calls';
import { type Agent, type Harness, startHarness } from './support/harness';
import { makeLab, plateBody, quarterBody, quarterCalibration, type TestLab } from './support/lab';

let harness: Harness;
let lead: Agent;
let lab: TestLab;
let watcher: pg.Client;
beforeAll(async () => {
  harness = await startHarness();
  lead = await harness.signIn('adaeze-holm');
  lab = await makeLab(harness, lead, 'Lab of scans');
  watcher = new pg.Client({ connectionString: harness.testDatabase.adminUrl });
  await watcher.connect();
}, 60_000);
afterAll(async () => {
  await watcher.end();
  await harness.close();
});

const at = (path: string) => `/labs/${lab.labId}${path}`;
const TRUTH = { offsetDeg: 31.73, retardanceDeg: 86.9, direction: -1, leak: 2e-4 } as const;
const LINEAR = { kind: 'linear', extinction: null, power: null } as const;
const BOTH: ScanColumns = {
  dial: { column: 0, unit: 'deg' },
  crossed: { column: 1, unit: 'mW' },
  parallel: { column: 2, unit: 'mW' },
  crossedSigma: null,
  parallelSigma: null,
};
const ONE: ScanColumns = { ...BOTH, parallel: null };

let plates = 0;
async function addPlate(): Promise<CabinetPlate> {
  plates += 1;
  const body = quarterBody(`Q-${plates}`);
  return answered(call(harness, lead, 'post', at('/plates'), { body }), cabinetPlateSchema);
}

const store = (content: string | Buffer, name = 'scan.csv') =>
  answered(upload(harness, lead, at('/files'), content, name), fileSchema);

interface Shown {
  readonly columns?: ScanColumns;
  readonly light?: RecordScan['light'];
  readonly before?: LinearScanFit | null;
  readonly leftOut?: RecordScan['leftOut'];
}

function lightOf({ light = LINEAR, before = null }: Shown): ScanLight {
  if (light.kind === 'linear') return light;
  const read = parseState(light.inputExpression, DEFAULT_CONVENTION);
  if (!read.ok) throw new Error(read.error.message);
  const { analyserDeg, extinction } = light;
  return { kind: 'known', input: read.stokes, analyserDeg, extinction, before };
}

/** What the page would have fitted from the same bytes. */
function fitOf(plate: CabinetPlate, text: string, shown: Shown = {}) {
  const answer = fitScan({
    bytes: new TextEncoder().encode(text),
    columns: shown.columns ?? BOTH,
    light: lightOf(shown),
    leftOutLines: (shown.leftOut ?? []).map(({ line }) => line),
    plate,
    direction: plate.seat?.mount.direction ?? 1,
    wavelengthNm: 810,
    temperatureC: null,
    measuredBefore: null,
  });
  if (answer.kind !== 'fitted') throw new Error(JSON.stringify(answer));
  return answer;
}

function bodyFor(fileId: string, change: Partial<RecordScan> = {}): RecordScan {
  return {
    fileId,
    columns: BOTH,
    light: LINEAR,
    leftOut: [],
    wavelengthNm: 810,
    temperatureC: null,
    measuredAt: '2026-06-02T08:52:00Z',
    note: '',
    settlesId: null,
    shown: { offsetDeg: 0, retardanceDeg: null },
    ...change,
  };
}

/** The body with which the page would record what it shows. */
async function scanBody(plate: CabinetPlate, text: string, shown: Shown = {}): Promise<RecordScan> {
  const { values } = fitOf(plate, text, shown);
  const { id } = await store(text);
  const { columns = BOTH, light = LINEAR, leftOut = [] } = shown;
  return bodyFor(id, {
    columns,
    light,
    leftOut,
    shown: { offsetDeg: values.offsetDeg, retardanceDeg: values.retardance?.deg ?? null },
  });
}

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

const send = (plate: { readonly id: string }, body: unknown) =>
  call(harness, lead, 'post', at(`/plates/${plate.id}/scans`), { body });
const record = (plate: CabinetPlate, body: RecordScan): Promise<Calibration> =>
  answered(send(plate, body), calibrationSchema);

async function plateNow(plate: { readonly id: string }) {
  return answered(call(harness, lead, 'get', at(`/plates/${plate.id}`)), plateDetailSchema);
}
const detailOf = (plate: CabinetPlate, calibrationId: string) =>
  answered(
    call(harness, lead, 'get', at(`/plates/${plate.id}/calibrations/${calibrationId}`)),
    calibrationDetailSchema,
  );

function problemOf(text: string) {
  const { type, detail, fields = [] } = problemSchema.parse(JSON.parse(text));
  return { code: type.split(':').at(-1), detail, paths: fields.map(({ path }) => path) };
}

describe('from the file to the calibration', () => {
  test('a scan is the plate’s calibration, with its record and its file under the hash', async () => {
    const plate = await addPlate();
    const text = linearScanText({ truth: TRUTH, seed: 31 });
    const made = await record(plate, await scanBody(plate, text));
    expect(made).toMatchObject({
      method: 'scan between crossed and parallel polarisers, 41 points',
      openQuestions: ['axis'],
      settlesId: null,
      recordedBy: 'Adaeze Holm',
    });
    expect(Math.abs(made.offsetDeg - 31.73)).toBeLessThan(4 * made.offsetSigmaDeg);
    expect(Math.abs(made.retardanceDeg - 86.9)).toBeLessThan(4 * made.retardanceSigmaDeg);

    const now = await plateNow(plate);
    expect(now.plate.calibration).toMatchObject({ id: made.id, offsetDeg: made.offsetDeg });
    expect(now.calibrations.find(({ id }) => id === made.id)?.scan).toMatchObject({ name: 'scan.csv' });

    const { calibration, scan } = await detailOf(plate, made.id);
    expect(calibration).toEqual(made);
    const { found } = fitOf(plate, text);
    expect(scan?.file).toMatchObject({
      id: made.fileId,
      sha256: createHash('sha256').update(text).digest('hex'),
    });
    expect(scan?.record).toEqual({
      format: 'quarterturn.scan/1',
      columns: BOTH,
      light: LINEAR,
      inputStokes: null,
      direction: -1,
      leftOut: [],
      retardanceFrom: 'scan',
      pointCount: 41,
      chiSquared: found.fit.chiSquared,
      degreesOfFreedom: found.fit.degreesOfFreedom,
      sigmaFrom: 'scatter',
      parameters: found.fit.parameters,
      covarianceOf: found.fit.covarianceOf,
      covariance: found.fit.covariance,
    });
    const back = await lead.get(`/api/v1${at(`/files/${made.fileId}`)}`).buffer(true);
    expect(back.text).toBe(text);
  });

  test('one written by hand has no scan in its detail, and one of another plate is not there', async () => {
    const [plate, other] = [await addPlate(), await addPlate()];
    const byHand = plate.calibration?.id ?? '';
    expect((await detailOf(plate, byHand)).scan).toBe(null);
    const path = at(`/plates/${other.id}/calibrations/${byHand}`);
    expect((await call(harness, lead, 'get', path)).status).toBe(404);
  });

  test('a repeat with its key records once', async () => {
    const plate = await addPlate();
    const body = await scanBody(plate, linearScanText({ truth: TRUTH, seed: 32 }));
    const key = randomUUID();
    const again = () => call(harness, lead, 'post', at(`/plates/${plate.id}/scans`), { body, key });
    const [first, second] = [await again(), await again()];
    expect([first.status, second.status, second.body]).toEqual([201, 201, first.body]);
    expect((await plateNow(plate)).calibrations).toHaveLength(2);
  });

  test('one port without power takes over the retardance of before and says so', async () => {
    const plate = await addPlate();
    const text = linearScanText({ truth: TRUTH, seed: 33, ports: 'crossed' });
    const made = await record(plate, await scanBody(plate, text, { columns: ONE }));
    expect(made).toMatchObject({
      retardanceDeg: plate.calibration?.retardanceDeg,
      retardanceSigmaDeg: plate.calibration?.retardanceSigmaDeg,
      method: 'scan between crossed polarisers, 41 points',
    });
    expect((await detailOf(plate, made.id)).scan?.record).toMatchObject({
      retardanceFrom: 'before',
      columns: ONE,
    });
  });

  test('one port without power and without a calibration before is refused', async () => {
    const { seat, ...facts } = plateBody('Q-bare', {
      kind: 'quarter',
      mount: { name: 'M-bare', direction: -1 },
    });
    if (seat.kind !== 'new-mount') throw new Error('the plate has a mount');
    const body = { ...facts, seat: { ...seat, since: '2026-06-01T10:00:00Z', calibration: null } };
    const plate = await answered(call(harness, lead, 'post', at('/plates'), { body }), cabinetPlateSchema);
    const text = linearScanText({ truth: TRUTH, seed: 34, ports: 'crossed' });
    const refused = await send(plate, await scanBody(plate, text, { columns: ONE }));
    const { code, detail } = problemOf(refused.text);
    expect([refused.status, code]).toEqual([409, 'no-retardance']);
    expect(detail).toContain('State the power that enters');
  });
});

describe('the lab’s memory of columns', () => {
  const read = (labId: string, text: string) => {
    const reading = readScanFile(new TextEncoder().encode(text));
    if (reading.kind === 'faults') throw new Error('the file has faults');
    const query = `signature=${encodeURIComponent(reading.signature)}`;
    return answered(
      call(harness, lead, 'get', `/labs/${labId}/scan-columns?${query}`),
      rememberedColumnsSchema,
    );
  };
  const unnamed = (seed: number) =>
    linearScanText({ truth: TRUTH, seed }).replace(/^.*\n/u, 'a;b (mW);c (mW)\n');

  test('comes back for a file that looks alike, the last one, and not for another', async () => {
    const plate = await addPlate();
    expect(await read(lab.labId, unnamed(41))).toEqual({ columns: null });
    await record(plate, await scanBody(plate, unnamed(41)));
    expect(await read(lab.labId, unnamed(42))).toEqual({ columns: BOTH });
    const columns = { ...BOTH, dial: { column: 0, unit: null } };
    await record(plate, await scanBody(plate, unnamed(43), { columns }));
    expect(await read(lab.labId, unnamed(42))).toEqual({ columns });
    expect(await read(lab.labId, unnamed(42).replaceAll(';', '\t'))).toEqual({ columns: null });
  });

  test('does not reach into another lab', async () => {
    const plate = await addPlate();
    await record(plate, await scanBody(plate, unnamed(44)));
    const other = await makeLab(harness, lead, 'Another lab of scans');
    expect(await read(other.labId, unnamed(45))).toEqual({ columns: null });
  });

  test('asks for a signature', async () => {
    expect((await call(harness, lead, 'get', at('/scan-columns'))).status).toBe(400);
  });
});

describe('what is refused', () => {
  test.each([
    ['another zero', (shown: RecordScan['shown']) => ({ ...shown, offsetDeg: shown.offsetDeg + 1e-12 })],
    ['no retardance', (shown: RecordScan['shown']) => ({ ...shown, retardanceDeg: null })],
  ])('other numbers than the server fits: %s', async (_, change) => {
    const plate = await addPlate();
    const body = await scanBody(plate, linearScanText({ truth: TRUTH, seed: 51 }));
    const refused = await send(plate, { ...body, shown: change(body.shown) });
    expect([refused.status, problemOf(refused.text).paths]).toEqual([422, ['shown']]);
    expect((await plateNow(plate)).calibrations).toHaveLength(1);
  });

  test('a line left out without a reason; with one it is in the audit and in the record', async () => {
    const plate = await addPlate();
    const text = linearScanText({ truth: TRUTH, seed: 52 });
    const leftOut = [{ line: 9, why: 'The shutter closed.' }];
    const body = await scanBody(plate, text, { leftOut });
    const bare = await send(plate, { ...body, leftOut: [{ line: 9, why: ' ' }] });
    expect([bare.status, problemOf(bare.text).paths]).toEqual([400, ['leftOut.0.why']]);
    const made = await record(plate, body);
    expect(made.method).toBe('scan between crossed and parallel polarisers, 40 points');
    expect((await detailOf(plate, made.id)).scan?.record).toMatchObject({ leftOut, pointCount: 40 });
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
    const plate = await addPlate();
    const body = await scanBody(plate, linearScanText({ truth: TRUTH, seed: 55 }), { leftOut });
    const refused = await send(plate, body);
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
    const plate = await addPlate();
    const { id } = await store(text);
    const refused = await send(plate, bodyFor(id));
    const { detail, paths } = problemOf(refused.text);
    expect([refused.status, paths[0]]).toEqual([422, 'fileId']);
    expect(detail).toContain(words);
  });

  test('two encodings in one file', async () => {
    const plate = await addPlate();
    const mixed = Buffer.concat([
      Buffer.from('# µW\ndial ('),
      Buffer.from([0xb0]),
      Buffer.from(');crossed;parallel\n0;1;2\n5;1;3\n'),
    ]);
    const stored = await upload(harness, lead, at('/files'), mixed);
    if (stored.status !== 201) {
      expect([stored.status, problemOf(stored.text).detail]).toEqual([422, expect.stringContaining('text')]);
      return;
    }
    const refused = await send(plate, bodyFor(fileSchema.parse(stored.body).id));
    expect([refused.status, problemOf(refused.text).detail]).toEqual([
      422,
      expect.stringContaining('Line 2'),
    ]);
  });

  test('the fault that is one too many is counted', async () => {
    const plate = await addPlate();
    const { id } = await store(`${HEAD}0;1;2\n${'5;nan;3\n'.repeat(70)}`);
    const { detail, paths } = problemOf((await send(plate, bodyFor(id))).text);
    expect(paths).toHaveLength(51);
    expect(detail).toContain('And 20 more faults like these.');
  });

  test('a picture, a file that isn’t there and one of another lab', async () => {
    const plate = await addPlate();
    const pdf = await store(Buffer.from('%PDF-1.7\n%\u00e2\u00e3\n1 0 obj\n<<>>\nendobj\n'), 'scan.csv');
    expect(pdf.mediaType).toBe('application/pdf');
    const other = await makeLab(harness, lead, 'A third lab of scans');
    for (const [fileId, words] of [
      [pdf.id, 'is no text'],
      [randomUUID(), 'no such file'],
      [other.fileId, 'no such file'],
    ] as const) {
      const refused = await send(plate, bodyFor(fileId));
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
    const plate = await addPlate();
    const { id } = await store(linearScanText({ truth: TRUTH }));
    const refused = await send(plate, bodyFor(id, { columns }));
    expect([refused.status, problemOf(refused.text).detail]).toEqual([422, expect.stringContaining(words)]);
  });

  test('a time to come, and a plate in no mount', async () => {
    const plate = await addPlate();
    const body = await scanBody(plate, linearScanText({ truth: TRUTH, seed: 53 }));
    const early = await send(plate, { ...body, measuredAt: '2099-01-01T00:00:00Z' });
    expect([early.status, problemOf(early.text).paths]).toEqual([422, ['measuredAt']]);
    const out = await call(harness, lead, 'post', at(`/plates/${plate.id}/take-out`), {
      body: { why: 'Cleaned.' },
      ifMatch: `"r${plate.revision}"`,
    });
    expect(out.status).toBe(200);
    const refused = await send(plate, body);
    expect([refused.status, problemOf(refused.text).code]).toEqual([409, 'not-seated']);
  });

  test('a seat that ended while the scan was fitted', async () => {
    const plate = await addPlate();
    const body = await scanBody(plate, linearScanText({ truth: TRUTH, seed: 54 }));
    const seen: string[] = [];
    // Behind the first transaction, and while this process waits, before the second has begun.
    const endSeat = ({ sql }: { readonly sql: string }) => {
      if (/^commit/iu.test(sql)) seen.push('commit');
      if (!/^begin/iu.test(sql) || seen.at(-1) !== 'commit') return;
      seen.push('ended');
      atOnce(`update seats set left_at = now(), left_why = 'knocked' where id = '${plate.seat?.id ?? ''}'`);
    };
    harness.database.on('query', endSeat);
    const refused = await send(plate, body);
    harness.database.removeListener('query', endSeat);
    expect(seen).toContain('ended');
    expect([refused.status, problemOf(refused.text).code]).toEqual([409, 'changed-meanwhile']);
    expect((await plateNow(plate)).calibrations).toHaveLength(1);
  });
});

describe('a question that a second scan settles', () => {
  const ELLIPTICAL = 'stokes(0.48, 0.36, 0.8)';
  const KNOWN = { kind: 'known', inputExpression: ELLIPTICAL, analyserDeg: 0, extinction: null } as const;
  const input = (): Stokes => {
    const read = parseState(ELLIPTICAL, DEFAULT_CONVENTION);
    if (!read.ok) throw new Error(read.error.message);
    return read.stokes;
  };

  test('is no longer open, with the light as it was meant on the day', async () => {
    const plate = await addPlate();
    const linear = linearScanText({ truth: TRUTH, seed: 61 });
    const first = await record(plate, await scanBody(plate, linear));
    const before = fitOf(plate, linear).found.fit;
    if (!('ports' in before)) throw new Error('the first scan is one between polarisers');
    const light = { ...KNOWN, beforeId: first.id };
    const text = knownLightText(input(), 0, { truth: { ...TRUTH, offsetDeg: 121.73 }, seed: 62 });
    const body = await scanBody(plate, text, { columns: ONE, light, before });
    const made = await record(plate, { ...body, settlesId: first.id });
    expect(made).toMatchObject({ openQuestions: [], settlesId: first.id });
    expect(Math.abs(made.offsetDeg - 121.73)).toBeLessThan(0.5);
    const { scan } = await detailOf(plate, made.id);
    expect(scan?.record).toMatchObject({ inputStokes: [...input()], light });
    expect((await plateNow(plate)).plate.calibration).toMatchObject({ id: made.id, openQuestions: [] });

    const again = await send(plate, { ...body, settlesId: made.id });
    expect([again.status, problemOf(again.text).paths]).toEqual([422, ['settlesId']]);
  });

  test('belongs to this plate and this seat', async () => {
    const [plate, other] = [await addPlate(), await addPlate()];
    const theirs = await record(other, await scanBody(other, linearScanText({ truth: TRUTH, seed: 63 })));
    const body = await scanBody(plate, linearScanText({ truth: TRUTH, seed: 64 }));
    const refused = await send(plate, { ...body, settlesId: theirs.id });
    expect([refused.status, problemOf(refused.text).paths]).toEqual([422, ['settlesId']]);
    const light = { ...KNOWN, beforeId: theirs.id };
    const taken = await send(plate, { ...body, light });
    expect([taken.status, problemOf(taken.text).paths]).toEqual([422, ['light.beforeId']]);
  });

  test('a light that can’t be read is refused at its column, and one that tells too little in words', async () => {
    const plate = await addPlate();
    const text = knownLightText([0, 0, 1], 0, { truth: { ...TRUTH, retardanceDeg: 70 }, seed: 65 });
    const { id } = await store(text);
    const unread = await send(
      plate,
      bodyFor(id, { columns: ONE, light: { ...KNOWN, inputExpression: 'bloch(', beforeId: null } }),
    );
    expect([unread.status, problemOf(unread.text).paths]).toEqual([422, ['light.inputExpression']]);
    const circular = { ...KNOWN, inputExpression: 'L', beforeId: null };
    const open = await send(plate, bodyFor(id, { columns: ONE, light: circular }));
    const { detail, paths } = problemOf(open.text);
    expect([open.status, paths]).toEqual([422, ['light']]);
    expect(detail).toContain('180° − δ');
  });

  test('a calibration by hand that leaves nothing open needs no settling', async () => {
    const plate = await addPlate();
    const body = await scanBody(plate, linearScanText({ truth: TRUTH, seed: 66 }));
    const byHand = await answered(
      call(harness, lead, 'post', at(`/plates/${plate.id}/calibrations`), { body: quarterCalibration() }),
      calibrationSchema,
    );
    const refused = await send(plate, { ...body, settlesId: byHand.id });
    expect([refused.status, problemOf(refused.text).detail]).toEqual([
      422,
      expect.stringContaining('left nothing open'),
    ]);
  });
});
