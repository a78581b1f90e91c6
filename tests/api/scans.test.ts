import { createHash, randomUUID } from 'node:crypto';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { cabinetPlateSchema, rememberedColumnsSchema } from '../../shared/schemas';
import { readScanFile } from '../../shared/scan-file';
import { linearScanText } from '../support/scan-text';
import { answered, call } from './support/calls';
import { type Agent, type Harness, startHarness } from './support/harness';
import { makeLab, plateBody, type TestLab } from './support/lab';
import { LINEAR, BOTH, fitOf, ONE, problemOf, ScanDesk, TRUTH } from './support/scan-desk';

let harness: Harness;
let lead: Agent;
let lab: TestLab;
let desk: ScanDesk;
beforeAll(async () => {
  harness = await startHarness();
  lead = await harness.signIn('adaeze-holm');
  lab = await makeLab(harness, lead, 'Lab of scans');
  desk = new ScanDesk(harness, lead, lab.labId);
}, 60_000);
afterAll(async () => {
  await harness.close();
});

describe('from the file to the calibration', () => {
  test('a scan is the plate’s calibration, with its record and its file under the hash', async () => {
    const plate = await desk.addPlate();
    const text = linearScanText({ truth: TRUTH, seed: 31 });
    const made = await desk.record(plate, await desk.scanBody(plate, text));
    expect(made).toMatchObject({
      method: 'scan between crossed and parallel polarisers, 41 points',
      openQuestions: ['axis'],
      settlesId: null,
      recordedBy: 'Adaeze Holm',
    });
    expect(Math.abs(made.offsetDeg - 31.73)).toBeLessThan(4 * made.offsetSigmaDeg);
    expect(Math.abs(made.retardanceDeg - 86.9)).toBeLessThan(4 * made.retardanceSigmaDeg);

    const now = await desk.plateNow(plate);
    expect(now.plate.calibration).toMatchObject({ id: made.id, offsetDeg: made.offsetDeg });
    expect(now.calibrations.find(({ id }) => id === made.id)?.scan).toMatchObject({ name: 'scan.csv' });

    const { calibration, scan } = await desk.detailOf(plate, made.id);
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
    const back = await lead.get(`/api/v1${desk.at(`/files/${made.fileId}`)}`).buffer(true);
    expect(back.text).toBe(text);
  });

  test('one written by hand has no scan in its detail, and one of another plate is not there', async () => {
    const [plate, other] = [await desk.addPlate(), await desk.addPlate()];
    const byHand = plate.calibration?.id ?? '';
    expect((await desk.detailOf(plate, byHand)).scan).toBe(null);
    const path = desk.at(`/plates/${other.id}/calibrations/${byHand}`);
    expect((await call(harness, lead, 'get', path)).status).toBe(404);
  });

  test('a repeat with its key records once', async () => {
    const plate = await desk.addPlate();
    const body = await desk.scanBody(plate, linearScanText({ truth: TRUTH, seed: 32 }));
    const key = randomUUID();
    const again = () => call(harness, lead, 'post', desk.at(`/plates/${plate.id}/scans`), { body, key });
    const [first, second] = [await again(), await again()];
    expect([first.status, second.status, second.body]).toEqual([201, 201, first.body]);
    expect((await desk.plateNow(plate)).calibrations).toHaveLength(2);
  });

  test('one port without power takes over the retardance of before and says so', async () => {
    const plate = await desk.addPlate();
    const text = linearScanText({ truth: TRUTH, seed: 33, ports: 'crossed' });
    const made = await desk.record(plate, await desk.scanBody(plate, text, { columns: ONE }));
    expect(made).toMatchObject({
      retardanceDeg: plate.calibration?.retardanceDeg,
      retardanceSigmaDeg: plate.calibration?.retardanceSigmaDeg,
      method: 'scan between crossed polarisers, 41 points',
    });
    expect((await desk.detailOf(plate, made.id)).scan?.record).toMatchObject({
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
    const plate = await answered(
      call(harness, lead, 'post', desk.at('/plates'), { body }),
      cabinetPlateSchema,
    );
    const text = linearScanText({ truth: TRUTH, seed: 34, ports: 'crossed' });
    const refused = await desk.send(plate, await desk.scanBody(plate, text, { columns: ONE }));
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
    const plate = await desk.addPlate();
    expect(await read(lab.labId, unnamed(41))).toEqual({ columns: null });
    await desk.record(plate, await desk.scanBody(plate, unnamed(41)));
    expect(await read(lab.labId, unnamed(42))).toEqual({ columns: BOTH });
    const columns = { ...BOTH, dial: { column: 0, unit: null } };
    await desk.record(plate, await desk.scanBody(plate, unnamed(43), { columns }));
    expect(await read(lab.labId, unnamed(42))).toEqual({ columns });
    expect(await read(lab.labId, unnamed(42).replaceAll(';', '\t'))).toEqual({ columns: null });
  });

  test('does not reach into another lab', async () => {
    const plate = await desk.addPlate();
    await desk.record(plate, await desk.scanBody(plate, unnamed(44)));
    const other = await makeLab(harness, lead, 'Another lab of scans');
    expect(await read(other.labId, unnamed(45))).toEqual({ columns: null });
  });

  test('asks for a signature', async () => {
    expect((await call(harness, lead, 'get', desk.at('/scan-columns'))).status).toBe(400);
  });
});
