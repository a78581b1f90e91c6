import { useInfiniteQuery, useQuery } from '@tanstack/react-query';
import type { CabinetPlate } from '../../../shared/schemas/cabinet';
import { ApiError } from '../../lib/api';
import { platePagesQuery, plateQuery } from './queries';

/** One page of the tray: about what a wide window shows. */
const trayPage = 24;

/** The plates in use by name, as far as they have come, and the open one, which may not be among them. */
export function useTray(labId: string, plateId: string | undefined, shown: boolean) {
  const pages = useInfiniteQuery({
    ...platePagesQuery(labId, { sort: 'name', limit: trayPage }),
    enabled: shown,
  });
  const listed = pages.data?.pages.flatMap(({ items }) => items);
  const one = useQuery({ ...plateQuery(labId, plateId ?? ''), enabled: shown && plateId !== undefined });
  const named = one.data?.plate ?? listed?.find(({ id }) => id === plateId);
  const open = !shown ? undefined : plateId === undefined ? listed?.[0] : named;
  return {
    pages,
    /** By name; one that is open and not on a page that has come stands first. */
    plates: listed === undefined ? undefined : withOpen(listed, open),
    open,
    /** The plate that the address names is not of this lab. */
    unknown: one.error instanceof ApiError && [400, 404, 422].includes(one.error.status),
    one,
  };
}

export type Tray = ReturnType<typeof useTray>;

function withOpen(listed: readonly CabinetPlate[], open: CabinetPlate | undefined): readonly CabinetPlate[] {
  if (open === undefined || listed.some(({ id }) => id === open.id)) return listed;
  return [open, ...listed];
}
