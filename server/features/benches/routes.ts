import { z } from 'zod';
import {
  type Bench,
  type BenchPart,
  benchListSchema,
  benchPlatesSchema,
  benchSchema,
  createBenchSchema,
  idSchema,
  updateBenchSchema,
} from '../../../shared/schemas';
import type { Transaction } from '../../db/database';
import { newId } from '../../db/new-id';
import { brokenUnique } from '../../db/sql-state';
import { conflict, notFound, refused } from '../../errors';
import { labParams } from '../../http/lab-params';
import { requireRevision } from '../../http/revision';
import { noBody, nothing, type Route, route } from '../../http/route';
import { requestReliance } from '../beam-changes';
import { asCabinetPlate, findPlates, type StoredPlate } from '../cabinet';
import { findLab, holdLab, type StoredLab } from '../labs';
import {
  asBench,
  findBench,
  findBenchToChange,
  findHolders,
  insertBench,
  listBenches,
  setRetired,
  type StoredBench,
  updateBench,
} from './bench-store';
import { checkBench } from './check-bench';
import { unholdDrafts } from './unhold-drafts';

const benchParams = labParams.extend({ benchId: idSchema });
const runRow = z.object({ number: z.number() });

export function benchRoutes(): readonly Route[] {
  return [
    route({
      method: 'get',
      path: '/labs/:labId/benches',
      access: { kind: 'member', action: 'benches.read', thing: findLab },
      params: labParams,
      query: nothing,
      body: noBody,
      response: benchListSchema,
      handler: async ({ labId, transaction }) => ({
        body: { items: (await listBenches(transaction, labId)).map(asBench) },
      }),
    }),
    route({
      method: 'post',
      path: '/labs/:labId/benches',
      access: { kind: 'member', action: 'benches.write', thing: holdLab },
      params: labParams,
      query: nothing,
      body: createBenchSchema,
      response: benchSchema,
      idempotent: true,
      handler: async ({ body, thing, labId, transaction, audit, now }) => {
        const benchId = newId();
        await checkBench(transaction, { labId, benchId, convention: thing.convention }, body);
        await uniquely(body.name, () => insertBench(transaction, { labId, now }, body, benchId));
        await audit({ kind: 'bench.added', subjectId: benchId, details: { bench: body } });
        return answer(await stored(transaction, labId, benchId), 201);
      },
    }),
    route({
      method: 'get',
      path: '/labs/:labId/benches/:benchId',
      access: { kind: 'member', action: 'benches.read', thing: findBench },
      params: benchParams,
      query: nothing,
      body: noBody,
      response: benchSchema,
      handler: async ({ thing }) => Promise.resolve(answer(thing)),
    }),
    route({
      method: 'get',
      path: '/labs/:labId/benches/:benchId/plates',
      access: { kind: 'member', action: 'benches.read', thing: findBench },
      params: benchParams,
      query: nothing,
      body: noBody,
      response: benchPlatesSchema,
      handler: async ({ thing, labId, transaction, now }) => {
        const lab = await theLab(transaction, labId);
        const items = await platesInOrder(transaction, thing);
        return { body: { items: items.map((plate) => asCabinetPlate(plate, lab, now)) } };
      },
    }),
    route({
      method: 'put',
      path: '/labs/:labId/benches/:benchId',
      access: { kind: 'member', action: 'benches.write', thing: findBenchToChange },
      params: benchParams,
      query: nothing,
      body: updateBenchSchema,
      response: benchSchema,
      needsMatch: true,
      handler: async ({ body, thing, labId, transaction, audit, expectedRevision }) => {
        requireRevision(expectedRevision, thing.revision, asBench(thing));
        if (thing.retiredAt !== null) {
          throw conflict('bench-retired', `${thing.name} is retired. Return it to use before changing it.`);
        }
        const { convention } = await theLab(transaction, labId);
        await checkBench(transaction, { labId, benchId: thing.id, convention }, body);
        await uniquely(body.name, () => updateBench(transaction, thing, body));
        // Of the order, since `plates` is empty while one of them is not ready.
        if (idsOf(thing, 'preparation').join() !== body.plateIds.join()) {
          await unholdDrafts(transaction, { labId, benchId: thing.id });
        }
        await requestReliance(transaction, labId, { benchId: thing.id });
        await audit({
          kind: 'bench.changed',
          subjectId: thing.id,
          details: {
            before: {
              ...asBench(thing),
              plates: idsOf(thing, 'preparation'),
              analysisPlates: idsOf(thing, 'analysis'),
            },
            after: body,
          },
        });
        return answer(await stored(transaction, labId, thing.id));
      },
    }),
    route({
      method: 'post',
      path: '/labs/:labId/benches/:benchId/retire',
      access: { kind: 'member', action: 'benches.write', thing: findBenchToChange },
      params: benchParams,
      query: nothing,
      body: noBody,
      response: benchSchema,
      needsMatch: true,
      handler: async ({ thing, labId, transaction, audit, expectedRevision, now }) => {
        requireRevision(expectedRevision, thing.revision, asBench(thing));
        if (thing.retiredAt !== null) throw conflict('already-retired', `${thing.name} is retired already.`);
        const run = await unfinishedRun(transaction, thing);
        if (run !== null) {
          throw conflict(
            'bench-in-use',
            `Run ${run} at ${thing.name} is not finished. Finish it before the bench is retired.`,
          );
        }
        await setRetired(transaction, thing, now);
        await audit({ kind: 'bench.retired', subjectId: thing.id, details: { name: thing.name } });
        return answer(await stored(transaction, labId, thing.id));
      },
    }),
    route({
      method: 'post',
      path: '/labs/:labId/benches/:benchId/return',
      access: { kind: 'member', action: 'benches.write', thing: findBenchToChange },
      params: benchParams,
      query: nothing,
      body: noBody,
      response: benchSchema,
      needsMatch: true,
      handler: async ({ thing, labId, transaction, audit, expectedRevision }) => {
        requireRevision(expectedRevision, thing.revision, asBench(thing));
        if (thing.retiredAt === null) throw conflict('not-retired', `${thing.name} is in use already.`);
        const gone = (await platesInOrder(transaction, thing)).find(({ retiredAt }) => retiredAt !== null);
        if (gone !== undefined) {
          throw conflict('plate-retired', `${gone.name} is retired. Return it to the cabinet first.`);
        }
        const plateIds = thing.order.map(({ plateId }) => plateId);
        const [holder] = await findHolders(transaction, labId, plateIds, thing.id);
        if (holder !== undefined) {
          throw conflict(
            'plate-in-use',
            `${holder.plate_name} stands in the beam of ${holder.bench_name} now. Take it out there first.`,
          );
        }
        await uniquely(thing.name, () => setRetired(transaction, thing, null));
        await audit({ kind: 'bench.returned', subjectId: thing.id, details: { name: thing.name } });
        return answer(await stored(transaction, labId, thing.id));
      },
    }),
  ];
}

/** The plates of one part of a beam, ready or not. */
function idsOf({ order }: Pick<Bench, 'order'>, part: BenchPart): string[] {
  return order.filter((place) => place.part === part).map(({ plateId }) => plateId);
}

/** Every plate of a bench's beam as the cabinet has it, in whatever state, as the light meets them. */
async function platesInOrder(
  transaction: Transaction,
  { labId, order }: StoredBench,
): Promise<StoredPlate[]> {
  const found = await findPlates(
    transaction,
    labId,
    order.map(({ plateId }) => plateId),
  );
  return order.flatMap(({ plateId }) => found.find(({ id }) => id === plateId) ?? []);
}

function answer(bench: StoredBench, status: 200 | 201 = 200) {
  return { status, body: asBench(bench), revision: bench.revision };
}

async function stored(transaction: Transaction, labId: string, benchId: string): Promise<StoredBench> {
  const bench = await findBench(transaction, { labId, benchId });
  if (bench === null) throw new Error('a bench that was just written is not there');
  return bench;
}

async function theLab(transaction: Transaction, labId: string): Promise<StoredLab> {
  const lab = await findLab(transaction, { labId });
  if (lab === null) throw notFound();
  return lab;
}

async function unfinishedRun(transaction: Transaction, bench: StoredBench): Promise<number | null> {
  const found: unknown = await transaction('runs')
    .join('versions', 'versions.id', 'runs.version_id')
    .where({ 'runs.lab_id': bench.labId, 'versions.bench_id': bench.id })
    .whereNot({ 'runs.state': 'finished' })
    .first('runs.number');
  return found === undefined ? null : runRow.parse(found).number;
}

/** What two people do at the same moment, the database's own rules catch. */
async function uniquely<Result>(name: string, work: () => Promise<Result>): Promise<Result> {
  try {
    return await work();
  } catch (error) {
    const broken = brokenUnique(error);
    if (broken === 'benches_one_of_a_name') {
      throw refused([
        { path: 'name', message: `There is a bench called ${name} already. Choose another name.` },
      ]);
    }
    if (broken === 'bench_plates_one_place') {
      throw refused([
        { path: 'plateIds', message: 'One of these plates was just put on another bench. Choose again.' },
      ]);
    }
    throw error;
  }
}
