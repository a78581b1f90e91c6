import { z } from 'zod';
import {
  type CabinetCounts,
  cabinetCountsSchema,
  type HealthCounts,
  type PlateHealth,
  plateHealths,
  type PlateKind,
  plateKindSchema,
  type PlateQuery,
} from '../../../shared/schemas';
import type { Transaction } from '../../db/database';
import { rowsOf } from '../../db/rows';
import { nameKey, numberKey, sortedPage, type SortKey } from '../../http/sorted-page';
import { healthWhere } from './health-where';
import { mapPlate, type StoredPlate } from './plate-rows';
import { plateQuery } from './plate-store';

const byName = nameKey<StoredPlate>('p.name');
/** What a list is sorted by, indexed so; names decide between equals. */
const sorts: Readonly<Record<PlateQuery['sort'], readonly SortKey<StoredPlate>[]>> = {
  name: [byName],
  age: [
    {
      by: `coalesce(p.calibrated_at, '-infinity'::timestamptz)`,
      read: 'cast(? as timestamptz)',
      value: z.union([z.literal('-infinity'), z.iso.datetime()]),
      of: ({ calibration }) => calibration?.measuredAt ?? '-infinity',
    },
    byName,
  ],
  wavelength: [numberKey('p.design_wavelength_nm', ({ designWavelengthNm }) => designWavelengthNm), byName],
};

/** Of the plate itself, or the name of the mount that it sits in; every character as it is. */
const searchWhere = `(strpos(p.search_text, lower(:search)) > 0 or p.seat_id in (select s.id from seats s
  join mounts m on m.lab_id = s.lab_id and m.id = s.mount_id
  where s.lab_id = :labId and s.left_at is null and strpos(lower(m.name), lower(:search)) > 0))`;

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
  const { orderBy, condition, values, cursorAfter } = sortedPage({ sorts, idBy: 'p.id' }, query);
  const conditions: string[] = [healthWhere[query.health]];
  if (query.kind !== undefined) conditions.push('p.kind = :kind');
  if (query.search !== '') {
    conditions.push(searchWhere);
  }
  if (condition !== null) conditions.push(condition);
  // Which plates first, and then what is shown of those few: of thousands nothing is looked up that no one sees.
  const sql = `with page as (
      select p.id from plates p where p.lab_id = :labId and ${conditions.join(' and ')} ${orderBy} limit :limit
    ) ${plateQuery.replace('?', ':labId')} and p.id in (select id from page) ${orderBy}`;
  const found: unknown = await transaction.raw(sql, {
    labId,
    now,
    dueDays,
    kind: query.kind ?? null,
    search: query.search,
    ...values,
    limit: query.limit + 1,
  });
  const plates = rowsOf(found).map(mapPlate);
  const items = plates.slice(0, query.limit);
  const last = items.at(-1);
  const more = plates.length > query.limit && last !== undefined;
  return { items, nextCursor: more ? cursorAfter(last) : null };
}

const countsRow = z.object({
  kind: plateKindSchema,
  counts: cabinetCountsSchema.shape.plates,
  open_axes: z.coerce.number(),
});
const mountsRow = z.object({ mounts: z.coerce.number() });

/** How many of the plates that a search finds are in which state, in one look. */
export async function countPlates(
  transaction: Transaction,
  facts: ListFacts,
  search: string,
): Promise<CabinetCounts> {
  const columns = plateHealths.map((health) => `'${health}', count(*) filter (where ${healthWhere[health]})`);
  const found: unknown = await transaction.raw(
    `select p.kind, json_build_object(${columns.join(', ')}) as counts,
        count(*) filter (where ${healthWhere['in-use']} and 'axis' = any(c.open_questions)) as open_axes
      from plates p
      left join calibrations c on c.lab_id = p.lab_id and c.id = p.calibration_id
      where p.lab_id = :labId ${search === '' ? '' : `and ${searchWhere}`} group by p.kind`,
    { labId: facts.labId, now: facts.now, dueDays: facts.dueDays, search },
  );
  const rows = z.array(countsRow).parse(rowsOf(found));
  const mounts: unknown = await transaction('mounts')
    .where({ lab_id: facts.labId, retired_at: null })
    .count({ mounts: '*' })
    .first();
  const sumOf = (some: typeof rows): HealthCounts => {
    const of = (health: PlateHealth) => some.reduce((sum, { counts }) => sum + counts[health], 0);
    return {
      calibrated: of('calibrated'),
      due: of('due'),
      overdue: of('overdue'),
      'open-question': of('open-question'),
      'not-calibrated': of('not-calibrated'),
      'not-seated': of('not-seated'),
      retired: of('retired'),
    };
  };
  const ofKind = (kind: PlateKind) => sumOf(rows.filter((row) => row.kind === kind));
  return {
    plates: sumOf(rows),
    kinds: { half: ofKind('half'), quarter: ofKind('quarter'), other: ofKind('other') },
    openAxes: rows.reduce((sum, row) => sum + row.open_axes, 0),
    mounts: mountsRow.parse(mounts).mounts,
  };
}
