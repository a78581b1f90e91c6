import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { DEFAULT_CONVENTION, type Stokes } from '../../shared/optics';
import { parseState } from '../../shared/optics/expression';
import { calibrationSchema } from '../../shared/schemas';
import { knownLightText, linearScanText } from '../support/scan-text';
import { answered, call } from './support/calls';
import { type Agent, type Harness, startHarness } from './support/harness';
import { makeLab, quarterCalibration, type TestLab } from './support/lab';
import { bodyFor, fitOf, ONE, problemOf, ScanDesk, TRUTH } from './support/scan-desk';

let harness: Harness;
let lead: Agent;
let lab: TestLab;
let desk: ScanDesk;
beforeAll(async () => {
  harness = await startHarness();
  lead = await harness.signIn('adaeze-holm');
  lab = await makeLab(harness, lead, 'Lab of settled scans');
  desk = new ScanDesk(harness, lead, lab.labId);
}, 60_000);
afterAll(async () => {
  await harness.close();
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
    const plate = await desk.addPlate();
    const linear = linearScanText({ truth: TRUTH, seed: 61 });
    const first = await desk.record(plate, await desk.scanBody(plate, linear));
    const before = fitOf(plate, linear).found.fit;
    if (!('ports' in before)) throw new Error('the first scan is one between polarisers');
    const light = { ...KNOWN, beforeId: first.id };
    const text = knownLightText(input(), 0, { truth: { ...TRUTH, offsetDeg: 121.73 }, seed: 62 });
    const body = await desk.scanBody(plate, text, { columns: ONE, light, before });
    const made = await desk.record(plate, { ...body, settlesId: first.id });
    expect(made).toMatchObject({ openQuestions: [], settlesId: first.id });
    expect(Math.abs(made.offsetDeg - 121.73)).toBeLessThan(0.5);
    const { scan } = await desk.detailOf(plate, made.id);
    expect(scan?.record).toMatchObject({ inputStokes: [...input()], light });
    expect((await desk.plateNow(plate)).plate.calibration).toMatchObject({ id: made.id, openQuestions: [] });

    const again = await desk.send(plate, { ...body, settlesId: made.id });
    expect([again.status, problemOf(again.text).paths]).toEqual([422, ['settlesId']]);
  });

  test('belongs to this plate and this seat', async () => {
    const [plate, other] = [await desk.addPlate(), await desk.addPlate()];
    const theirs = await desk.record(
      other,
      await desk.scanBody(other, linearScanText({ truth: TRUTH, seed: 63 })),
    );
    const body = await desk.scanBody(plate, linearScanText({ truth: TRUTH, seed: 64 }));
    const refused = await desk.send(plate, { ...body, settlesId: theirs.id });
    expect([refused.status, problemOf(refused.text).paths]).toEqual([422, ['settlesId']]);
    const light = { ...KNOWN, beforeId: theirs.id };
    const taken = await desk.send(plate, { ...body, light });
    expect([taken.status, problemOf(taken.text).paths]).toEqual([422, ['light.beforeId']]);
  });

  test('a light that can’t be read is refused at its column, and one that tells too little in words', async () => {
    const plate = await desk.addPlate();
    const text = knownLightText([0, 0, 1], 0, { truth: { ...TRUTH, retardanceDeg: 70 }, seed: 65 });
    const { id } = await desk.store(text);
    const unread = await desk.send(
      plate,
      bodyFor(id, { columns: ONE, light: { ...KNOWN, inputExpression: 'bloch(', beforeId: null } }),
    );
    expect([unread.status, problemOf(unread.text).paths]).toEqual([422, ['light.inputExpression']]);
    const circular = { ...KNOWN, inputExpression: 'L', beforeId: null };
    const open = await desk.send(plate, bodyFor(id, { columns: ONE, light: circular }));
    const { detail, paths } = problemOf(open.text);
    expect([open.status, paths]).toEqual([422, ['light']]);
    expect(detail).toContain('180° − δ');
  });

  test('a calibration by hand that leaves nothing open needs no settling', async () => {
    const plate = await desk.addPlate();
    const body = await desk.scanBody(plate, linearScanText({ truth: TRUTH, seed: 66 }));
    const byHand = await answered(
      call(harness, lead, 'post', desk.at(`/plates/${plate.id}/calibrations`), {
        body: quarterCalibration(),
      }),
      calibrationSchema,
    );
    const refused = await desk.send(plate, { ...body, settlesId: byHand.id });
    expect([refused.status, problemOf(refused.text).detail]).toEqual([
      422,
      expect.stringContaining('left nothing open'),
    ]);
  });
});
