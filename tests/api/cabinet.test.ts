import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import {
  cabinetCountsSchema,
  type CabinetPlate,
  cabinetPlateSchema,
  calibrationSchema,
  mountDetailSchema,
  mountPageSchema,
  platePageSchema,
} from '../../shared/schemas';
import { newMount, newPlate } from '../support/plates';
import { CabinetDesk, faultOf } from './support/cabinet-desk';
import { answered, call } from './support/calls';
import { type Agent, type Harness, startHarness } from './support/harness';
import { calibrationBody, makeLab, plateBody, type TestLab } from './support/lab';

let harness: Harness;
let lead: Agent;
let lab: TestLab;
let desk: CabinetDesk;
beforeAll(async () => {
  harness = await startHarness();
  lead = await harness.signIn('adaeze-holm');
  lab = await makeLab(harness, lead, 'Cabinet lab');
  desk = new CabinetDesk(harness, lead, lab.labId);
}, 60_000);
afterAll(async () => {
  await harness.close();
});

describe('a calibration', () => {
  test('of a plate that sits nowhere is refused, since its zero would hold for nothing', async () => {
    const plate = await desk.addPlate('C-1');
    await desk.change(plate.id, 'post', '/take-out', { why: 'Moved.' });
    const refused = await desk.change(plate.id, 'post', '/calibrations', calibrationBody());
    expect([refused.status, faultOf(refused.text).code]).toEqual([409, 'not-seated']);
  });

  test('from before the plate was seated as it is now is refused, in a first seat as in a later one', async () => {
    const plate = await desk.addPlate('C-0');
    const record = (measuredAt: string) =>
      desk.change(plate.id, 'post', '/calibrations', calibrationBody({ measuredAt }));
    const older = await record('2026-05-31T10:00:00Z');
    expect(faultOf(older.text).path).toBe('measuredAt');
    expect(faultOf(older.text).detail).toContain(
      'C-0 sits in M C-0 since 2026-06-01 10:00 UTC, and this is before that',
    );
    await desk.change(plate.id, 'put', '/seat', { mountId: plate.seat?.mountId, why: 'Knocked.' });
    const old = await record('2026-06-01T10:00:00Z');
    expect([old.status, faultOf(old.text).path]).toEqual([422, 'measuredAt']);
    expect((await desk.plateNow(plate.id)).calibration).toBeNull();
    expect((await record(new Date().toISOString())).status).toBe(201);
  });

  test('leaves its question open until another one settles it, and answers only what was asked', async () => {
    const plate = await desk.addPlate('C-2');
    const record = (body: unknown) =>
      call(harness, lead, 'post', desk.at(`/plates/${plate.id}/calibrations`), { body });
    const open = await answered(
      record(calibrationBody({ openQuestions: ['axis'], measuredAt: '2026-06-02T10:00:00Z' })),
      calibrationSchema,
    );
    expect((await desk.plateNow(plate.id)).health).toBe('open-question');
    const stranger = await record(calibrationBody({ settlesId: lab.version.id }));
    expect(faultOf(stranger.text).path).toBe('settlesId');
    const nothing = await record(calibrationBody({ settlesId: plate.calibration?.id ?? null }));
    expect(faultOf(nothing.text).detail).toContain('left nothing open');
    await answered(
      record(
        calibrationBody({
          settlesId: open.id,
          offsetDeg: 102.4,
          method: 'mark on the rim',
          measuredAt: '2026-06-02T11:00:00Z',
        }),
      ),
      calibrationSchema,
    );
    expect(await desk.plateNow(plate.id)).toMatchObject({
      health: 'overdue',
      calibration: { offsetDeg: 102.4 },
    });
  });

  test('that was measured before the newest one does not take its place', async () => {
    const plate = await desk.addPlate('C-3');
    await call(harness, lead, 'post', desk.at(`/plates/${plate.id}/calibrations`), {
      body: calibrationBody({ offsetDeg: 2, measuredAt: '2026-06-03T10:00:00Z' }),
    });
    await call(harness, lead, 'post', desk.at(`/plates/${plate.id}/calibrations`), {
      body: calibrationBody({ offsetDeg: 1, measuredAt: '2026-06-02T10:00:00Z' }),
    });
    expect((await desk.plateNow(plate.id)).calibration?.offsetDeg).toBe(2);
  });
});

describe('lists', () => {
  let many: TestLab;
  const page = (query: string) =>
    answered(call(harness, lead, 'get', `/labs/${many.labId}/plates?${query}`), platePageSchema);
  beforeAll(async () => {
    many = await makeLab(harness, lead, 'Lab of lists');
    const now = new Date().toISOString();
    const bodies = [
      ...[10, 2, 1].map((number) => plateBody(`L-${number}`, { serial: `S/N ${number}` })),
      plateBody('L-fresh', { calibration: { measuredAt: now } }),
      plateBody('L-open', { calibration: { measuredAt: now, openQuestions: ['axis'] } }),
      plateBody('50%_off', { kind: 'other', designWavelengthNm: 1550 }),
      { ...newPlate({ name: 'L-bare' }), seat: { kind: 'none' } },
      {
        ...newPlate({ name: 'L-new' }),
        seat: { kind: 'new-mount', mount: newMount({ name: 'M new' }), calibration: null },
      },
    ];
    for (const body of bodies) {
      await answered(call(harness, lead, 'post', `/labs/${many.labId}/plates`, { body }), cabinetPlateSchema);
    }
  }, 60_000);

  test('go by number within names, page by page, without a plate twice or none', async () => {
    const names: string[] = [];
    let cursor: string | null = '';
    while (cursor !== null) {
      const part: { items: CabinetPlate[]; nextCursor: string | null } = await page(
        `limit=3${cursor === '' ? '' : `&cursor=${cursor}`}`,
      );
      names.push(...part.items.map(({ name }) => name));
      cursor = part.nextCursor;
    }
    expect(names.filter((name) => /^L-\d/.test(name))).toEqual(['L-1', 'L-2', 'L-10']);
    expect(names.length).toBe(new Set(names).size);
    const { items: all } = await page('limit=200');
    expect(names).toEqual(all.map(({ name }) => name));
    const { items: back } = await page('limit=200&order=desc');
    expect(back.map(({ name }) => name)).toEqual(names.toReversed());
  });

  test.each(['age', 'wavelength'] as const)('sorted by %s page by page as at once', async (sort) => {
    for (const order of ['asc', 'desc']) {
      const { items } = await page(`sort=${sort}&order=${order}&limit=200`);
      const first = await page(`sort=${sort}&order=${order}&limit=4`);
      const second = await page(`sort=${sort}&order=${order}&limit=200&cursor=${first.nextCursor ?? ''}`);
      expect([...first.items, ...second.items].map(({ id }) => id)).toEqual(items.map(({ id }) => id));
    }
  });

  test('stand by their names where what they are sorted by is the same', async () => {
    const { items } = await page('sort=wavelength&limit=200');
    const byNumber = new Intl.Collator('en', { numeric: true });
    const inOrder = items.toSorted(
      (one, other) =>
        one.designWavelengthNm - other.designWavelengthNm || byNumber.compare(one.name, other.name),
    );
    expect(items.map(({ name }) => name)).toEqual(inOrder.map(({ name }) => name));
    expect(new Set(items.map(({ designWavelengthNm }) => designWavelengthNm)).size).toBeLessThan(
      items.length,
    );
  });

  test('find by name, serial and mount, taking every character as it is', async () => {
    const names = async (search: string) =>
      (await page(`search=${encodeURIComponent(search)}`)).items.map(({ name }) => name);
    expect(await names('l-1')).toEqual(['L-1', 'L-10']);
    expect(await names('S/N 2')).toEqual(['L-2']);
    expect(await names('M new')).toEqual(['L-new']);
    expect(await names('50%_')).toEqual(['50%_off']);
    expect(await names('%%%')).toEqual([]);
    expect(await names("' or 1=1 --")).toEqual([]);
  });

  test('filter by health as each plate says of itself, and the counts agree', async () => {
    const counts = await answered(
      call(harness, lead, 'get', `/labs/${many.labId}/cabinet`),
      cabinetCountsSchema,
    );
    const { items: all } = await page('limit=200');
    for (const [health, count] of Object.entries(counts.plates)) {
      const { items } = await page(`health=${health}&limit=200`);
      expect([health, items.length]).toEqual([health, count]);
      if (health !== 'retired') {
        expect(items.map(({ id }) => id)).toEqual(
          all.filter((plate) => plate.health === health).map(({ id }) => id),
        );
      }
    }
    expect(counts.plates['open-question']).toBe(1);
    expect(counts.plates['not-seated']).toBe(1);
    expect(counts.plates['not-calibrated']).toBe(1);
    expect(counts.openAxes).toBe(1);
    for (const kind of ['half', 'quarter', 'other'] as const) {
      const { items } = await page(`kind=${kind}&limit=200`);
      const inUse = Object.entries(counts.kinds[kind]).filter(([health]) => health !== 'retired');
      expect([kind, inUse.reduce((sum, [, count]) => sum + count, 0)]).toEqual([kind, items.length]);
    }
  });

  test('are counted by what a search finds', async () => {
    const counts = await answered(
      call(harness, lead, 'get', `/labs/${many.labId}/cabinet?search=l-o`),
      cabinetCountsSchema,
    );
    expect(counts.plates).toMatchObject({ 'open-question': 1, calibrated: 0, overdue: 0 });
    expect([
      counts.kinds.other['open-question'] + counts.kinds.half['open-question'],
      counts.openAxes,
    ]).toEqual([1, 1]);
  });

  test('refuse a cursor that is none of theirs, also one of another sort', async () => {
    const { nextCursor } = await page('limit=2&sort=wavelength');
    for (const query of ['cursor=bm9uc2Vuc2U', `sort=age&cursor=${nextCursor ?? ''}`, 'cursor=%00']) {
      const response = await call(harness, lead, 'get', `/labs/${many.labId}/plates?${query}`);
      expect(response.status, query).toBe(400);
    }
  });

  test.each(['name', 'plate', 'step', 'repeatability'] as const)(
    'of mounts, sorted by %s, go on page by page and back from the other end',
    async (sort) => {
      const mounts = (query: string) =>
        answered(
          call(harness, lead, 'get', `/labs/${many.labId}/mounts?sort=${sort}&${query}`),
          mountPageSchema,
        );
      const { items } = await mounts('limit=200');
      const names = items.map(({ name }) => name);
      const first = await mounts('limit=3');
      const second = await mounts(`limit=200&cursor=${first.nextCursor ?? ''}`);
      expect([...first.items, ...second.items].map(({ name }) => name)).toEqual(names);
      const back = await mounts('limit=200&order=desc');
      expect(back.items.map(({ name }) => name)).toEqual(names.toReversed());
      expect(names.length).toBeGreaterThan(5);
    },
  );

  test('of mounts say what sits where, and where it sat before', async () => {
    const list = await answered(
      call(harness, lead, 'get', `/labs/${many.labId}/mounts?state=holding&search=M L-`),
      mountPageSchema,
    );
    expect(list.items.map(({ name, plate }) => [name, plate?.name])).toContainEqual(['M L-1', 'L-1']);
    const [mount] = list.items;
    const detail = await answered(
      call(harness, lead, 'get', `/labs/${many.labId}/mounts/${mount?.id ?? ''}`),
      mountDetailSchema,
    );
    expect(detail.seats.map(({ plate, leftAt }) => [plate.name, leftAt])).toEqual([
      [mount?.plate?.name, null],
    ]);
  });
});

describe('a mount', () => {
  test('that holds a plate is not retired, and two of a name are refused', async () => {
    const plate = await desk.addPlate('M-1');
    const retire = await call(harness, lead, 'post', desk.at(`/mounts/${plate.seat?.mountId ?? ''}/retire`), {
      ifMatch: '"r1"',
    });
    expect([retire.status, faultOf(retire.text).detail]).toEqual([
      409,
      expect.stringContaining('M-1 sits in M M-1'),
    ]);
    const twice = await call(harness, lead, 'post', desk.at('/mounts'), {
      body: newMount({ name: 'm m-1' }),
    });
    expect([twice.status, faultOf(twice.text).path]).toEqual([422, 'name']);
    const withPlate = await call(harness, lead, 'post', desk.at('/plates'), {
      body: plateBody('M-2', { mount: { name: 'M M-1' } }),
    });
    expect([withPlate.status, faultOf(withPlate.text).path]).toEqual([422, 'seat.mount.name']);
  });
});
