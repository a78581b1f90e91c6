import { type MountQuery, mountSorts, mountStates } from '../../../../shared/schemas/mounts';

/** What the list of mounts shows, as its address says it. */
export interface MountsView {
  readonly search: string;
  readonly state: MountQuery['state'];
  readonly drive: 'hand' | 'motor' | null;
  readonly sort: MountQuery['sort'];
  readonly order: MountQuery['order'];
}

/** Reads an address; what it does not say, or says wrongly, is the usual. */
export function readMountsView(params: URLSearchParams): MountsView {
  const [state, drive, sort] = [params.get('state'), params.get('drive'), params.get('sort')];
  return {
    search: (params.get('search') ?? '').slice(0, 60),
    state: mountStates.find((known) => known === state) ?? 'in-use',
    drive: drive === 'hand' || drive === 'motor' ? drive : null,
    sort: mountSorts.find((known) => known === sort) ?? 'name',
    order: params.get('order') === 'desc' ? 'desc' : 'asc',
  };
}

/** The address of a view; what is usual is left out. */
export function mountsAddress(base: string, view: MountsView): string {
  const params = new URLSearchParams();
  if (view.search !== '') params.set('search', view.search);
  if (view.state !== 'in-use') params.set('state', view.state);
  if (view.drive !== null) params.set('drive', view.drive);
  if (view.sort !== 'name') params.set('sort', view.sort);
  if (view.order !== 'asc') params.set('order', view.order);
  const text = params.toString();
  return text === '' ? base : `${base}?${text}`;
}
