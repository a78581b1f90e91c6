import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import {
  benchSchema,
  cabinetMountSchema,
  cabinetPlateSchema,
  calibrationSchema,
  plateDetailSchema,
  protocolSchema,
  runSchema,
} from '../../shared/schemas';
import { readCabinet } from '../../shared/cabinet-document';
import { newMount } from '../support/plates';
import { CabinetDesk, faultOf } from './support/cabinet-desk';
import { answered, call } from './support/calls';
import { type Agent, type Harness, startHarness } from './support/harness';
import {
  calibrationBody,
  makeLab,
  plateBody,
  quarterCalibration,
  shownFor,
  type TestLab,
} from './support/lab';

let harness: Harness;
let lead: Agent;
let lab: TestLab;
let desk: CabinetDesk;
beforeAll(async () => {
  harness = await startHarness();
  lead = await harness.signIn('adaeze-holm');
  lab = await makeLab(harness, lead, 'Lab of seats');
  desk = new CabinetDesk(harness, lead, lab.labId);
}, 60_000);
afterAll(async () => {
  await harness.close();
});

describe('a seat', () => {
  test('that ends takes its zero with it, even when the plate comes back into the same mount', async () => {
    const plate = await desk.addPlate('S-1');
    const first = plate.seat;
    expect([plate.health, plate.calibration?.offsetDeg]).toEqual(['overdue', 12.4]);

    const out = await desk.change(plate.id, 'post', '/take-out', { why: 'Cleaned.' });
    expect(out.status).toBe(200);
    expect(await desk.plateNow(plate.id)).toMatchObject({
      seat: null,
      calibration: null,
      health: 'not-seated',
    });

    const seated = await desk.change(plate.id, 'put', '/seat', { mountId: first?.mountId, why: '' });
    expect(seated.status).toBe(200);
    const again = await desk.plateNow(plate.id);
    expect(again).toMatchObject({ calibration: null, health: 'not-calibrated' });
    expect(again.seat?.mountId).toBe(first?.mountId);
    expect(again.seat?.id).not.toBe(first?.id);

    const history = await answered(
      call(harness, lead, 'get', desk.at(`/plates/${plate.id}`)),
      plateDetailSchema,
    );
    expect(history.seats.map(({ leftWhy }) => leftWhy)).toEqual([null, 'Cleaned.']);
    expect(history.calibrations.map(({ seatId }) => seatId)).toEqual([first?.id]);
  });

  test('is left in one step when a plate is seated anew, and that asks why', async () => {
    const plate = await desk.addPlate('S-2');
    const mountId = plate.seat?.mountId;
    const refused = await desk.change(plate.id, 'put', '/seat', { mountId, why: '' });
    expect([refused.status, faultOf(refused.text).path]).toEqual([422, 'why']);
    expect((await desk.plateNow(plate.id)).seat?.id).toBe(plate.seat?.id);
    expect((await desk.change(plate.id, 'put', '/seat', { mountId, why: 'Knocked.' })).status).toBe(200);
    expect((await desk.plateNow(plate.id)).calibration).toBeNull();
  });

  test('begins and ends when a person says, as far as what is known of plate and mount allows', async () => {
    const [plate, other] = [await desk.addPlate('S-10'), await desk.addPlate('S-11')];
    const mountId = plate.seat?.mountId;
    // It was measured at 10:00 on that day, so it sat by then.
    expect(plate.seat?.seatedAt).toBe('2026-06-01T10:00:00.000Z');
    const measured = (measuredAt: string) =>
      desk.change(plate.id, 'post', '/calibrations', calibrationBody({ measuredAt }));
    expect((await measured('2026-06-03T10:00:00Z')).status).toBe(201);
    const out = (why: string, when: string) => desk.change(plate.id, 'post', '/take-out', { why, at: when });
    const refusals = [
      await out('Moved.', '2099-01-01T00:00:00Z'),
      await out('Moved.', '2026-05-30T10:00:00Z'),
      await desk.change(plate.id, 'put', '/seat', { mountId, why: 'Knocked.', at: '2026-06-02T10:00:00Z' }),
    ];
    expect(refusals.map(({ status, text }) => [status, faultOf(text).path])).toEqual([
      [422, 'at'],
      [422, 'at'],
      [422, 'at'],
    ]);
    expect(refusals.map(({ text }) => faultOf(text).detail)).toEqual([
      expect.stringContaining('in the future'),
      expect.stringContaining('S-10 was seated in M S-10 at 2026-06-01 10:00 UTC, after this'),
      expect.stringContaining('was measured in M S-10 at 2026-06-03 10:00 UTC, so it still sat there'),
    ]);
    expect((await out('Moved.', '2026-06-05T10:00:00Z')).status).toBe(200);
    const seat = (plateId: string, when: string) =>
      desk.change(plateId, 'put', '/seat', { mountId, why: 'Moved.', at: when });
    expect(faultOf((await seat(plate.id, '2026-06-04T10:00:00Z')).text).detail).toContain(
      'S-10 sat in M S-10 until 2026-06-05 10:00 UTC',
    );
    expect(faultOf((await seat(other.id, '2026-06-04T10:00:00Z')).text).detail).toContain(
      'S-10 sat in M S-10 until 2026-06-05 10:00 UTC',
    );
    expect((await seat(plate.id, '2026-06-06T10:00:00Z')).status).toBe(200);
    const { seats } = await answered(
      call(harness, lead, 'get', desk.at(`/plates/${plate.id}`)),
      plateDetailSchema,
    );
    expect(seats.map(({ seatedAt, leftAt }) => [seatedAt, leftAt])).toEqual([
      ['2026-06-06T10:00:00.000Z', null],
      ['2026-06-01T10:00:00.000Z', '2026-06-05T10:00:00.000Z'],
    ]);
    expect((await measured('2026-06-06T11:00:00Z')).status).toBe(201);
  });

  test('of a new plate begins when a person says, or when it was measured, and not after that', async () => {
    const add = (name: string, since: string | null, measuredAt: string) => {
      const body = plateBody(name, { calibration: { measuredAt } });
      return call(harness, lead, 'post', desk.at('/plates'), {
        body: { ...body, seat: { ...body.seat, since } },
      });
    };
    const begun = async (...plate: Parameters<typeof add>) =>
      (await answered(add(...plate), cabinetPlateSchema)).seat?.seatedAt;
    expect(await begun('S-12', '2026-04-01T08:00:00Z', '2026-06-01T10:00:00Z')).toBe(
      '2026-04-01T08:00:00.000Z',
    );
    expect(await begun('S-13', null, '2026-06-01T10:00:00Z')).toBe('2026-06-01T10:00:00.000Z');
    const late = await add('S-14', '2026-06-02T08:00:00Z', '2026-06-01T10:00:00Z');
    expect([late.status, faultOf(late.text).path]).toEqual([422, 'seat.calibration.measuredAt']);
    expect(faultOf(late.text).detail).toContain('S-14 sits in M S-14 since 2026-06-02 08:00 UTC');
  });

  test('lasts, so that even one that ended in the minute it began is read back from an export', async () => {
    const own = await makeLab(harness, lead, 'Lab of short seats');
    const path = (rest: string) => `/labs/${own.labId}${rest}`;
    const body = plateBody('S-1', { calibration: { measuredAt: '2026-06-01T10:00:00Z' } });
    const plate = await answered(
      call(harness, lead, 'post', path('/plates'), {
        body: { ...body, seat: { ...body.seat, since: '2026-06-01T10:00:00Z', calibration: null } },
      }),
      cabinetPlateSchema,
    );
    const anew = { mountId: plate.seat?.mountId, why: 'Entered wrongly.', at: '2026-06-01T10:00:00Z' };
    const seated = await call(harness, lead, 'put', path(`/plates/${plate.id}/seat`), {
      body: anew,
      ifMatch: `"r${plate.revision}"`,
    });
    expect(seated.status).toBe(200);
    for (const format of ['csv', 'json'] as const) {
      const { text } = await call(harness, lead, 'get', path(`/cabinet/export?format=${format}`));
      expect(readCabinet(text, format, new Date())).toMatchObject({ ok: true });
    }
  });

  test('did not end before its plate was last dialled', async () => {
    const own = await makeLab(harness, lead, 'Lab of a dialled plate');
    const path = (rest: string) => `/labs/${own.labId}${rest}`;
    const reading = { outcome: 'done', settingIndex: 0, dialledDeg: [12, 301], note: '' };
    await answered(
      call(harness, lead, 'post', path(`/runs/${own.runId}/readings`), { body: reading }),
      runSchema,
    );
    const [half, quarter] = own.plateIds;
    const out = async (plateId: string, when: string | null) => {
      const { plate } = await answered(
        call(harness, lead, 'get', path(`/plates/${plateId}`)),
        plateDetailSchema,
      );
      const body = { why: 'Moved.', at: when };
      return call(harness, lead, 'post', path(`/plates/${plateId}/take-out`), {
        body,
        ifMatch: `"r${plate.revision}"`,
      });
    };
    const early = await out(half, '2026-06-05T10:00:00Z');
    expect([early.status, faultOf(early.text).path]).toEqual([422, 'at']);
    expect(faultOf(early.text).detail).toMatch(
      /^A dial of H-3 was recorded in run 1 at .*, so it still sat there\./u,
    );
    expect((await out(quarter, null)).status).toBe(200);
    // The spare one was in no run.
    expect((await out(own.sparePlateId, '2026-06-05T10:00:00Z')).status).toBe(200);
  });

  test('begins a few minutes after what was said at most, however many things it waited for', async () => {
    const [one, other] = [await desk.addPlate('S-27'), await desk.addPlate('S-28')];
    const minutesAgo = (minutes: number) => new Date(Date.now() - minutes * 60_000).toISOString();
    const out = async (id: string, at: string) =>
      (await desk.change(id, 'post', '/take-out', { why: 'Moved.', at })).status;
    expect(await out(one.id, minutesAgo(60))).toBe(200);
    expect(await out(other.id, minutesAgo(56))).toBe(200);
    const seat = (at: string) =>
      desk.change(one.id, 'put', '/seat', { mountId: other.seat?.mountId, why: '', at });
    // Each alone is near enough to the one before it.
    const early = await seat(minutesAgo(63));
    expect([early.status, faultOf(early.text).path]).toEqual([422, 'at']);
    expect((await seat(minutesAgo(59))).status).toBe(200);
  });

  test('is refused in a mount that holds another plate, is retired or is not there, each by name', async () => {
    const [one, other] = [await desk.addPlate('S-3'), await desk.addPlate('S-4')];
    await desk.change(one.id, 'post', '/take-out', { why: 'Moved.' });
    const taken = await desk.change(one.id, 'put', '/seat', { mountId: other.seat?.mountId, why: '' });
    expect(faultOf(taken.text).path).toBe('mountId');
    expect(faultOf(taken.text).detail).toContain('S-4 sits in M S-4');
    const mount = await answered(
      call(harness, lead, 'post', desk.at('/mounts'), { body: newMount({ name: 'M-old' }) }),
      cabinetMountSchema,
    );
    await call(harness, lead, 'post', desk.at(`/mounts/${mount.id}/retire`), { ifMatch: '"r1"' });
    const retired = await desk.change(one.id, 'put', '/seat', { mountId: mount.id, why: '' });
    expect(faultOf(retired.text).detail).toContain('M-old is retired');
    const missing = await desk.change(one.id, 'put', '/seat', { mountId: one.id, why: '' });
    expect(faultOf(missing.text).detail).toContain('no such mount');
  });

  test('goes to one of two that want the same mount at the same moment', async () => {
    const plates = [await desk.addPlate('S-5'), await desk.addPlate('S-6')];
    for (const { id } of plates) await desk.change(id, 'post', '/take-out', { why: 'Moved.' });
    const answers = await Promise.all(
      plates.map(({ id }) => desk.change(id, 'put', '/seat', { mountId: lab.spareMountId, why: '' })),
    );
    expect(answers.map(({ status }) => status).toSorted()).toEqual([200, 422]);
  });

  test('that has ended is never opened again, not even by the database’s own role', async () => {
    const plate = await desk.addPlate('S-7');
    await desk.change(plate.id, 'post', '/take-out', { why: 'Moved.' });
    await expect(
      harness.database.transaction(async (transaction) => {
        await transaction.raw(`select set_config('app.lab_id', ?, true)`, [lab.labId]);
        await transaction('seats').where({ id: plate.seat?.id }).update({ left_at: null, left_why: null });
      }),
    ).rejects.toThrow(/stays so/);
  });
});

describe('a bench whose plate was taken out', () => {
  test('has no beam to solve for until the plate is calibrated in its new seat, and versions are refused by name', async () => {
    const own = await makeLab(harness, lead, 'Lab of a bench that waits');
    const path = (rest: string) => `/labs/${own.labId}${rest}`;
    const quarter = own.plateIds[1];
    const protocol = await answered(
      call(harness, lead, 'get', path(`/protocols/${own.protocolId}`)),
      protocolSchema,
    );
    const shown = await shownFor(harness, lead, own.labId, protocol.draft.content);
    const plate = (await answered(call(harness, lead, 'get', path(`/plates/${quarter}`)), plateDetailSchema))
      .plate;
    const bench = () => answered(call(harness, lead, 'get', path(`/benches/${own.benchId}`)), benchSchema);
    await call(harness, lead, 'post', path(`/plates/${quarter}/take-out`), {
      body: { why: 'Cleaned.' },
      ifMatch: `"r${plate.revision}"`,
    });
    const run = () => answered(call(harness, lead, 'get', path(`/runs/${own.runId}`)), runSchema);
    expect((await run()).voids).toEqual([{ why: 'seat-ended', plateId: quarter, plateName: 'Q-B' }]);
    expect(await bench()).toMatchObject({
      plates: [],
      notReady: [{ plateId: quarter, name: 'Q-B', part: 'preparation', why: 'not-seated' }],
    });
    const save = await call(harness, lead, 'post', path(`/protocols/${own.protocolId}/versions`), {
      body: { message: 'Again.', shown },
      ifMatch: '"r1"',
    });
    expect([save.status, faultOf(save.text).detail]).toEqual([
      422,
      expect.stringContaining('Q-B sits in no mount'),
    ]);

    await call(harness, lead, 'put', path(`/plates/${quarter}/seat`), {
      body: { mountId: plate.seat?.mountId, why: '' },
      ifMatch: `"r${plate.revision + 1}"`,
    });
    expect((await bench()).notReady.map(({ why }) => why)).toEqual(['not-calibrated']);
    await answered(
      call(harness, lead, 'post', path(`/plates/${quarter}/calibrations`), {
        body: quarterCalibration({ offsetDeg: 12, measuredAt: new Date().toISOString() }),
      }),
      calibrationSchema,
    );
    expect((await bench()).plates.map(({ calibration }) => calibration.offsetDeg)).toEqual([12.4, 12]);

    const start = { versionId: own.version.id, startDialsDeg: [null, null], cautionAcknowledged: true };
    const refused = await call(harness, lead, 'post', path('/runs'), {
      body: { ...start, staleAcknowledged: false },
    });
    expect(faultOf(refused.text).path).toBe('staleAcknowledged');
    expect(faultOf(refused.text).detail).toContain('Q-B has left the seat that version 1 was worked out for');
    // Seated anew and calibrated, the zero that the run dials by is still void; of a finished run nothing is asked.
    expect((await run()).voids.map(({ why }) => why)).toEqual(['seat-ended']);
    for (const settingIndex of [0, 1]) {
      const body = { outcome: 'skipped', settingIndex, note: 'Q-B was moved.' };
      await call(harness, lead, 'post', path(`/runs/${own.runId}/readings`), { body });
    }
    const finish = call(harness, lead, 'post', path(`/runs/${own.runId}/finish`));
    expect((await answered(finish, runSchema)).voids).toEqual([]);
    await answered(
      call(harness, lead, 'post', path('/runs'), { body: { ...start, staleAcknowledged: true } }),
      runSchema,
    );
  });
});
