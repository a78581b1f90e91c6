import { z } from 'zod';
import type { Thing } from '../../../shared/permissions';
import type { CabinetMount, MountQuery, WriteMount } from '../../../shared/schemas';
import type { Transaction } from '../../db/database';
import { newId } from '../../db/new-id';
import { rowsOf } from '../../db/rows';
import { nameKey, numberKey, sortedPage, type SortKey } from '../../http/sorted-page';
import { mapMountColumns, mountColumnsRow } from './plate-rows';

const mountRow = mountColumnsRow.extend({
  id: z.string(),
  lab_id: z.string(),
  name: z.string(),
  drive: z.enum(['hand', 'motor']),
  note: z.string(),
  retired_at: z.date().nullable(),
  revision: z.number(),
  plate_id: z.string().nullable(),
  plate_name: z.string().nullable(),
  seated_at: z.date().nullable(),
});

export type StoredMount = CabinetMount & Thing;

function mapMount(unread: unknown): StoredMount {
  const row = mountRow.parse(unread);
  const { plate_id, plate_name, seated_at } = row;
  const seated = plate_id !== null && plate_name !== null && seated_at !== null;
  return {
    ...mapMountColumns(row, row.name),
    id: row.id,
    labId: row.lab_id,
    drive: row.drive,
    note: row.note,
    plate: seated ? { id: plate_id, name: plate_name, seatedAt: seated_at.toISOString() } : null,
    retiredAt: row.retired_at?.toISOString() ?? null,
    revision: row.revision,
  };
}

/** What the API shows of a mount. */
export function asMount({ labId: _labId, ...mount }: StoredMount): CabinetMount {
  return mount;
}

const mountQuery = `
  select m.id, m.lab_id, m.name, m.drive, m.note, m.retired_at, m.revision, m.direction, m.resolution_deg, m.repeatability_deg,
    m.range_from_deg, m.range_to_deg, m.speed_deg_per_s, m.backlash_deg, m.approach,
    p.id as plate_id, p.name as plate_name, s.seated_at
  from mounts m
  left join seats s on s.lab_id = m.lab_id and s.mount_id = m.id and s.left_at is null
  left join plates p on p.lab_id = s.lab_id and p.id = s.plate_id
  where m.lab_id = :labId`;

const states = {
  'in-use': 'm.retired_at is null',
  holding: 'm.retired_at is null and s.id is not null',
  empty: 'm.retired_at is null and s.id is null',
  retired: 'm.retired_at is not null',
} as const;

const byName = nameKey<StoredMount>('m.name');
/** What a list is sorted by; names decide between equals. By what it holds: the empty ones first. */
const sorts: Readonly<Record<MountQuery['sort'], readonly SortKey<StoredMount>[]>> = {
  name: [byName],
  plate: [{ ...nameKey(`coalesce(p.name, '')`), of: ({ plate }) => plate?.name ?? '' }, byName],
  step: [numberKey('m.resolution_deg', ({ resolutionDeg }) => resolutionDeg), byName],
  repeatability: [numberKey('m.repeatability_deg', ({ repeatabilityDeg }) => repeatabilityDeg), byName],
};

export async function listMountPage(
  transaction: Transaction,
  labId: string,
  query: MountQuery,
): Promise<{ readonly items: StoredMount[]; readonly nextCursor: string | null }> {
  const { orderBy, condition, values, cursorAfter } = sortedPage({ sorts, idBy: 'm.id' }, query);
  const conditions: string[] = [states[query.state]];
  if (query.drive !== undefined) conditions.push('m.drive = :drive');
  if (query.search !== '')
    conditions.push('(m.name ilike :like or m.note ilike :like or p.name ilike :like)');
  if (condition !== null) conditions.push(condition);
  const found: unknown = await transaction.raw(
    `${mountQuery} and ${conditions.join(' and ')} ${orderBy} limit :limit`,
    {
      labId,
      drive: query.drive ?? null,
      like: `%${query.search.replaceAll(/[\\%_]/g, '\\$&')}%`,
      ...values,
      limit: query.limit + 1,
    },
  );
  const mounts = rowsOf(found).map(mapMount);
  const items = mounts.slice(0, query.limit);
  const last = items.at(-1);
  const more = mounts.length > query.limit && last !== undefined;
  return { items, nextCursor: more ? cursorAfter(last) : null };
}

export async function findMount(
  transaction: Transaction,
  { labId, mountId }: { readonly labId: string; readonly mountId: string },
): Promise<StoredMount | null> {
  const found: unknown = await transaction.raw(`${mountQuery} and m.id = :mountId`, { labId, mountId });
  const [row] = rowsOf(found);
  return row === undefined ? null : mapMount(row);
}

/** As `findMount`, and nobody else changes the mount, or puts a plate into it, until the transaction ends. */
export async function findMountToChange(
  transaction: Transaction,
  key: { readonly labId: string; readonly mountId: string },
): Promise<StoredMount | null> {
  await transaction('mounts').where({ lab_id: key.labId, id: key.mountId }).forUpdate().select('id');
  return findMount(transaction, key);
}

export async function insertMount(
  transaction: Transaction,
  place: { readonly labId: string; readonly now: Date },
  mount: WriteMount,
  id = newId(),
): Promise<string> {
  await transaction('mounts').insert({
    id,
    lab_id: place.labId,
    ...mountColumns(mount),
    created_at: place.now,
  });
  return id;
}

export async function updateMount(
  transaction: Transaction,
  stored: StoredMount,
  mount: WriteMount,
): Promise<void> {
  await transaction('mounts')
    .where({ lab_id: stored.labId, id: stored.id })
    .update({ ...mountColumns(mount), revision: stored.revision + 1 });
}

export async function setMountRetired(
  transaction: Transaction,
  stored: StoredMount,
  at: Date | null,
): Promise<void> {
  await transaction('mounts')
    .where({ lab_id: stored.labId, id: stored.id })
    .update({ retired_at: at, revision: stored.revision + 1 });
}

/** Everything of a mount, as its columns hold it. */
export function mountColumns(mount: WriteMount) {
  return {
    name: mount.name,
    drive: mount.drive,
    note: mount.note,
    direction: mount.direction,
    resolution_deg: mount.resolutionDeg,
    repeatability_deg: mount.repeatabilityDeg,
    range_from_deg: mount.rangeDeg?.from ?? null,
    range_to_deg: mount.rangeDeg?.to ?? null,
    speed_deg_per_s: mount.speedDegPerS,
    backlash_deg: mount.backlashDeg,
    approach: mount.approach,
  };
}
