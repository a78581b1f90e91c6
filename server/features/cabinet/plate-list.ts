import { z } from 'zod';
import { type CabinetCounts, type PlateHealth, plateHealths, type PlateQuery } from '../../../shared/schemas';
import type { Transaction } from '../../db/database';
import { readCursor } from '../../http/cursor';
import { jsonCursor, writeCursor } from '../../http/json-cursor';
import { healthWhere } from './health-where';
import { mapPlate, type StoredPlate } from './plate-rows';
import { plateQuery, rowsOf } from './plate-store';

/** What a list is sorted by, as SQL and as a cursor keeps it; the plate's id decides between equals. */
const sorts = {
  name: {
    by: 'p.name collate by_number',
    type: 'text',
    collated: ' collate by_number',
    of: (plate: StoredPlate) => plate.name,
  },
  age: {
    by: `coalesce(p.calibrated_at, '-infinity'::timestamptz)`,
    type: 'timestamptz',
    collated: '',
    of: (plate: StoredPlate) => plate.calibration?.measuredAt ?? '-infinity',
  },
  wavelength: {
    by: 'p.design_wavelength_nm',
    type: 'double precision',
    collated: '',
    of: (plate: StoredPlate) => plate.designWavelengthNm,
  },
} as const;

const cursorSchemas = {
  name: jsonCursor(z.string().max(100)),
  age: jsonCursor(z.union([z.literal('-infinity'), z.iso.datetime()])),
  wavelength: jsonCursor(z.number()),
};

interface ListFacts {
  readonly labId: string;
  readonly dueDays: number;
  readonly now: Date;
}

/** One page of the plates that a query asks for. Age runs from the oldest calibration, none being older than any. */
export async function listPlatePage(
  transaction: Transaction,
  { labId, dueDays, now }: ListFacts,
  query: PlateQuery,
): Promise<{ readonly items: StoredPlate[]; readonly nextCursor: string | null }> {
  const sort = sorts[query.sort];
  const after = readCursor(cursorSchemas[query.sort], query.cursor);
  const conditions: string[] = [healthWhere[query.health]];
  if (query.kind !== undefined) conditions.push('p.kind = :kind');
  if (query.search !== '') {
    conditions.push(
      `(p.name ilike :like or p.serial ilike :like or m.name ilike :like or p.note ilike :like or p.material ilike :like)`,
    );
  }
  if (after !== null) {
    const side = query.order === 'asc' ? '>' : '<';
    conditions.push(
      `(${sort.by}, p.id) ${side} (cast(:after as ${sort.type})${sort.collated}, cast(:afterId as uuid))`,
    );
  }
  const sql = `${plateQuery.replace('?', ':labId')} and ${conditions.join(' and ')}
    order by ${sort.by} ${query.order}, p.id ${query.order} limit :limit`;
  const found: unknown = await transaction.raw(sql, {
    labId,
    now,
    dueDays,
    kind: query.kind ?? null,
    like: `%${query.search.replaceAll(/[\\%_]/g, '\\$&')}%`,
    after: after?.value ?? null,
    afterId: after?.id ?? null,
    limit: query.limit + 1,
  });
  const plates = rowsOf.parse(found).rows.map(mapPlate);
  const items = plates.slice(0, query.limit);
  const last = items.at(-1);
  const more = plates.length > query.limit && last !== undefined;
  return { items, nextCursor: more ? writeCursor({ value: sort.of(last), id: last.id }) : null };
}

const countsRow = z.object({ rows: z.tuple([z.record(z.string(), z.coerce.number())]) });

/** How many plates are in which state, in one look. */
export async function countPlates(transaction: Transaction, facts: ListFacts): Promise<CabinetCounts> {
  const columns = plateHealths.map(
    (health) => `count(*) filter (where ${healthWhere[health]}) as "${health}"`,
  );
  const found: unknown = await transaction.raw(
    `select ${columns.join(', ')}, (select count(*) from mounts where lab_id = :labId and retired_at is null) as mounts
      from plates p where p.lab_id = :labId`,
    { labId: facts.labId, now: facts.now, dueDays: facts.dueDays },
  );
  const [counts] = countsRow.parse(found).rows;
  const of = (health: PlateHealth): number => counts[health] ?? 0;
  return {
    plates: {
      calibrated: of('calibrated'),
      due: of('due'),
      overdue: of('overdue'),
      'open-question': of('open-question'),
      'not-calibrated': of('not-calibrated'),
      'not-seated': of('not-seated'),
      retired: of('retired'),
    },
    mounts: counts['mounts'] ?? 0,
  };
}
