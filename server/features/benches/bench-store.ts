import { z } from 'zod';
import type { Thing } from '../../../shared/permissions';
import {
  type Bench,
  type BenchPart,
  benchPartSchema,
  benchSchema,
  type CreateBench,
  laserClassSchema,
} from '../../../shared/schemas';
import type { Transaction } from '../../db/database';
import { newId } from '../../db/new-id';
import { asReadyPlate, findPlates, type StoredPlate } from '../cabinet';
import { holdLab } from '../labs';

const benchRow = z.object({
  id: z.string(),
  lab_id: z.string(),
  name: z.string(),
  wavelength_nm: z.number(),
  wavelength_sigma_nm: z.number(),
  temperature_c: z.number().nullable(),
  temperature_sigma_k: z.number(),
  input_expression: z.string(),
  polariser_sigma_deg: z.number(),
  polariser_extinction: z.number().nullable(),
  laser_class: laserClassSchema,
  hazard_wavelengths_nm: z.array(z.number()),
  detectors: z.string(),
  retired_at: z.date().nullable(),
  revision: z.number(),
});
const placeRow = z.object({ bench_id: z.string(), plate_id: z.string(), part: benchPartSchema });
const holderRow = z.object({ plate_id: z.string(), plate_name: z.string(), bench_name: z.string() });

export type StoredBench = Bench & Thing;

/** What the API shows of a bench. */
export function asBench({ labId: _labId, ...bench }: StoredBench): Bench {
  return bench;
}

/** The plates of one part of a bench, or none while one of them cannot be dialled: half a beam is no beam. */
function readyPlates(inBeam: readonly PlateInBeam[], part: BenchPart): Bench['plates'] {
  const ready = inBeam.filter((place) => place.part === part).map(({ plate }) => asReadyPlate(plate));
  const plates = ready.filter((plate) => plate !== null);
  return plates.length === ready.length ? plates : [];
}

interface PlateInBeam {
  readonly part: BenchPart;
  readonly plate: StoredPlate;
}

function notReady(inBeam: readonly PlateInBeam[]): Bench['notReady'] {
  return inBeam
    .filter(({ plate }) => asReadyPlate(plate) === null)
    .map(({ part, plate }) => ({
      plateId: plate.id,
      name: plate.name,
      part,
      why: plate.seat === null ? ('not-seated' as const) : ('not-calibrated' as const),
    }));
}

async function withPlates(
  transaction: Transaction,
  labId: string,
  unread: readonly unknown[],
): Promise<StoredBench[]> {
  const rows = z.array(benchRow).parse(unread);
  const places = z.array(placeRow).parse(
    await transaction('bench_plates')
      .where({ lab_id: labId })
      .whereIn(
        'bench_id',
        rows.map(({ id }) => id),
      )
      .orderBy(['part', 'position'])
      .select('bench_id', 'plate_id', 'part'),
  );
  const found = await findPlates(transaction, labId, [...new Set(places.map(({ plate_id }) => plate_id))]);
  const plates = new Map(found.map((plate) => [plate.id, plate]));
  return rows.map((row) => {
    // By name of its part preparation comes after analysis; light meets it first.
    const inBeam = benchPartSchema.options.flatMap((part) =>
      places
        .filter((place) => place.bench_id === row.id && place.part === part)
        .flatMap(({ plate_id }) => {
          const plate = plates.get(plate_id);
          return plate === undefined ? [] : [{ part, plate }];
        }),
    );
    return {
      id: row.id,
      labId: row.lab_id,
      name: row.name,
      wavelengthNm: row.wavelength_nm,
      wavelengthSigmaNm: row.wavelength_sigma_nm,
      temperatureC: row.temperature_c,
      temperatureSigmaK: row.temperature_sigma_k,
      inputExpression: row.input_expression,
      polariserSigmaDeg: row.polariser_sigma_deg,
      polariserExtinction: row.polariser_extinction,
      laserClass: row.laser_class,
      hazardWavelengthsNm: row.hazard_wavelengths_nm,
      plates: readyPlates(inBeam, 'preparation'),
      analysisPlates: readyPlates(inBeam, 'analysis'),
      order: inBeam.map(({ part, plate }) => ({ plateId: plate.id, name: plate.name, part })),
      notReady: notReady(inBeam),
      detectors: benchSchema.shape.detectors.parse(JSON.parse(row.detectors)),
      retiredAt: row.retired_at?.toISOString() ?? null,
      revision: row.revision,
    };
  });
}

/** Every bench of a lab, those in use first, by name. */
export async function listBenches(transaction: Transaction, labId: string): Promise<StoredBench[]> {
  const rows: unknown[] = await transaction('benches')
    .where({ lab_id: labId })
    .orderByRaw('retired_at is not null, name, id')
    .select();
  return withPlates(transaction, labId, rows);
}

export async function findBench(
  transaction: Transaction,
  { labId, benchId }: { readonly labId: string; readonly benchId: string },
): Promise<StoredBench | null> {
  const rows: unknown[] = await transaction('benches').where({ lab_id: labId, id: benchId }).select();
  const [bench] = await withPlates(transaction, labId, rows);
  return bench ?? null;
}

/** As `findBench`, and nobody else changes the bench or the lab's convention until the transaction ends. */
export async function findBenchToChange(
  transaction: Transaction,
  key: { readonly labId: string; readonly benchId: string },
): Promise<StoredBench | null> {
  await holdLab(transaction, key);
  await transaction('benches').where({ lab_id: key.labId, id: key.benchId }).forUpdate().select('id');
  return findBench(transaction, key);
}

/** Which other bench in use has which of these plates. */
export async function findHolders(
  transaction: Transaction,
  labId: string,
  plateIds: readonly string[],
  butBenchId: string,
): Promise<z.infer<typeof holderRow>[]> {
  const rows: unknown[] = await transaction('bench_plates')
    .join('benches', 'benches.id', 'bench_plates.bench_id')
    .join('plates', 'plates.id', 'bench_plates.plate_id')
    .where({ 'bench_plates.lab_id': labId, 'bench_plates.live': true })
    .whereIn('bench_plates.plate_id', plateIds)
    .whereNot({ 'bench_plates.bench_id': butBenchId })
    .select({
      plate_id: 'bench_plates.plate_id',
      plate_name: 'plates.name',
      bench_name: 'benches.name',
    });
  return z.array(holderRow).parse(rows);
}

export async function insertBench(
  transaction: Transaction,
  place: { readonly labId: string; readonly now: Date },
  bench: CreateBench,
  id = newId(),
): Promise<string> {
  await transaction('benches').insert({
    id,
    lab_id: place.labId,
    created_at: place.now,
    ...columnsOf(bench),
  });
  await placePlates(transaction, place.labId, id, bench);
  return id;
}

export async function updateBench(
  transaction: Transaction,
  stored: StoredBench,
  bench: CreateBench,
): Promise<void> {
  await transaction('benches')
    .where({ lab_id: stored.labId, id: stored.id })
    .update({ ...columnsOf(bench), revision: stored.revision + 1 });
  await transaction('bench_plates').where({ lab_id: stored.labId, bench_id: stored.id }).delete();
  await placePlates(transaction, stored.labId, stored.id, bench);
}

export async function setRetired(
  transaction: Transaction,
  stored: StoredBench,
  at: Date | null,
): Promise<void> {
  await transaction('benches')
    .where({ lab_id: stored.labId, id: stored.id })
    .update({ retired_at: at, revision: stored.revision + 1 });
  await transaction('bench_plates')
    .where({ lab_id: stored.labId, bench_id: stored.id })
    .update({ live: at === null });
}

async function placePlates(
  transaction: Transaction,
  labId: string,
  benchId: string,
  { plateIds, analysisPlateIds }: CreateBench,
): Promise<void> {
  const rowsOf = (part: BenchPart, ids: readonly string[]) =>
    ids.map((plateId, position) => ({ lab_id: labId, bench_id: benchId, part, position, plate_id: plateId }));
  await transaction('bench_plates').insert([
    ...rowsOf('preparation', plateIds),
    ...rowsOf('analysis', analysisPlateIds),
  ]);
}

function columnsOf(bench: CreateBench) {
  return {
    name: bench.name,
    wavelength_nm: bench.wavelengthNm,
    wavelength_sigma_nm: bench.wavelengthSigmaNm,
    temperature_c: bench.temperatureC,
    temperature_sigma_k: bench.temperatureSigmaK,
    input_expression: bench.inputExpression,
    polariser_sigma_deg: bench.polariserSigmaDeg,
    polariser_extinction: bench.polariserExtinction,
    laser_class: bench.laserClass,
    hazard_wavelengths_nm: bench.hazardWavelengthsNm,
    detectors: JSON.stringify(bench.detectors),
  };
}
