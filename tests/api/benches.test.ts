import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import {
  type Bench,
  benchPlatesSchema,
  benchSchema,
  type CabinetPlate,
  cabinetPlateSchema,
  type CreateBench,
  labSchema,
  plateDetailSchema,
  problemSchema,
  protocolSchema,
} from '../../shared/schemas';
import { draft, target } from '../support/plates';
import { answered, call } from './support/calls';
import { type Agent, type Harness, startHarness } from './support/harness';
import { benchBody, plateBody } from './support/lab';

let harness: Harness;
let lead: Agent;
let labId: string;
beforeAll(async () => {
  harness = await startHarness();
  lead = await harness.signIn('adaeze-holm');
  const lab = await answered(call(harness, lead, 'post', '/labs', { body: { name: 'Benches' } }), labSchema);
  labId = lab.id;
}, 60_000);
afterAll(async () => {
  await harness.close();
});

const at = (path: string) => `/labs/${labId}${path}`;

async function addPlate(name: string): Promise<CabinetPlate> {
  return answered(call(harness, lead, 'post', at('/plates'), { body: plateBody(name) }), cabinetPlateSchema);
}

const addBench = async (body: CreateBench): Promise<Bench> =>
  answered(call(harness, lead, 'post', at('/benches'), { body }), benchSchema);

const benchNow = async (id: string): Promise<Bench> =>
  answered(call(harness, lead, 'get', at(`/benches/${id}`)), benchSchema);

async function changePlate(id: string, path: string, body?: unknown) {
  const { plate } = await answered(call(harness, lead, 'get', at(`/plates/${id}`)), plateDetailSchema);
  return call(harness, lead, 'post', at(`/plates/${id}${path}`), {
    ...(body === undefined ? {} : { body }),
    ifMatch: `"r${plate.revision}"`,
  });
}

const retire = async ({ id }: Bench) => {
  const { revision } = await benchNow(id);
  return call(harness, lead, 'post', at(`/benches/${id}/retire`), { ifMatch: `"r${revision}"` });
};
const giveBack = async ({ id }: Bench) => {
  const { revision } = await benchNow(id);
  return call(harness, lead, 'post', at(`/benches/${id}/return`), { ifMatch: `"r${revision}"` });
};

function faultsOf(text: string) {
  const problem = problemSchema.parse(JSON.parse(text));
  return { detail: problem.detail, fields: problem.fields ?? [] };
}

describe('the plates of a bench', () => {
  test('come in whatever state they are, as the light meets them, in both parts', async () => {
    const [a, b, c] = [await addPlate('A-1'), await addPlate('A-2'), await addPlate('A-3')];
    const bench = await addBench({ ...benchBody([b.id, a.id], 'arm A'), analysisPlateIds: [c.id] });
    await changePlate(a.id, '/take-out', { why: 'Cleaned.' });
    const { items } = await answered(
      call(harness, lead, 'get', at(`/benches/${bench.id}/plates`)),
      benchPlatesSchema,
    );
    expect(items.map(({ name }) => name)).toEqual(['A-2', 'A-1', 'A-3']);
    expect(items[1]).toMatchObject({ seat: null, calibration: null, health: 'not-seated' });
    expect(items[2]?.benches).toEqual([{ id: bench.id, name: 'arm A' }]);
    expect((await benchNow(bench.id)).plates).toEqual([]);
  });

  test('are refused where one stands twice, in either part, or on another bench', async () => {
    const [a, b] = [await addPlate('B-1'), await addPlate('B-2')];
    const twice = await call(harness, lead, 'post', at('/benches'), {
      body: { ...benchBody([a.id], 'arm B'), analysisPlateIds: [a.id] },
    });
    expect([twice.status, faultsOf(twice.text).fields[0]?.path]).toEqual([400, 'analysisPlateIds']);
    await addBench(benchBody([a.id], 'arm B'));
    const taken = await call(harness, lead, 'post', at('/benches'), {
      body: { ...benchBody([b.id], 'arm C'), analysisPlateIds: [a.id] },
    });
    expect(faultsOf(taken.text).fields).toEqual([
      {
        path: 'analysisPlateIds.0',
        message: 'B-1 stands in the beam of arm B. Choose another, or take it out there first.',
      },
    ]);
  });
});

describe('a bench that comes back into use', () => {
  test('is refused while one of its analysis plates stands elsewhere', async () => {
    const [a, b] = [await addPlate('C-1'), await addPlate('C-2')];
    const bench = await addBench({ ...benchBody([a.id], 'arm D'), analysisPlateIds: [b.id] });
    await retire(bench);
    await addBench(benchBody([b.id], 'arm E'));
    const answer = await giveBack(bench);
    expect([answer.status, faultsOf(answer.text).detail]).toEqual([
      409,
      'C-2 stands in the beam of arm E now. Take it out there first.',
    ]);
  });

  test('is refused while one of its plates is retired, though none of the beam is ready', async () => {
    const plate = await addPlate('D-1');
    const bench = await addBench(benchBody([plate.id], 'arm F'));
    await retire(bench);
    await changePlate(plate.id, '/take-out', { why: 'Cracked.' });
    expect((await changePlate(plate.id, '/retire')).status).toBe(200);
    const answer = await giveBack(bench);
    expect([answer.status, faultsOf(answer.text).detail]).toEqual([
      409,
      'D-1 is retired. Return it to the cabinet first.',
    ]);
  });
});

test('renaming a bench that waits for a plate leaves what its drafts hold', async () => {
  const [a, b] = [await addPlate('E-1'), await addPlate('E-2')];
  const bench = await addBench(benchBody([a.id, b.id], 'arm G'));
  const held = { ...target(), heldFastAxesDeg: [10, 20] };
  const protocol = await answered(
    call(harness, lead, 'post', at('/protocols'), {
      body: draft({ name: 'Held', benchId: bench.id, targets: [held] }),
    }),
    protocolSchema,
  );
  await changePlate(b.id, '/take-out', { why: 'Cleaned.' });
  const put = (body: CreateBench, revision: number) =>
    answered(
      call(harness, lead, 'put', at(`/benches/${bench.id}`), { body, ifMatch: `"r${revision}"` }),
      benchSchema,
    );
  const heldNow = async () =>
    (await answered(call(harness, lead, 'get', at(`/protocols/${protocol.id}`)), protocolSchema)).draft
      .content.targets[0]?.heldFastAxesDeg;
  const renamed = await put(benchBody([a.id, b.id], 'arm H'), bench.revision);
  expect(await heldNow()).toEqual([10, 20]);
  await put(benchBody([b.id, a.id], 'arm H'), renamed.revision);
  expect(await heldNow()).toBeNull();
});
