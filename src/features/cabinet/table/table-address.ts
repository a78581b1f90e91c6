import {
  plateHealths,
  type PlateHealth,
  type PlateKind,
  plateKindSchema,
} from '../../../../shared/schemas/cabinet';

/** What the table shows, as its address says it. */
export interface TableView {
  readonly search: string;
  readonly health: PlateHealth | 'in-use';
  readonly kind: PlateKind | null;
  readonly sort: 'name' | 'age' | 'wavelength';
  readonly order: 'asc' | 'desc';
}

const sorts = ['name', 'age', 'wavelength'] as const;

/** Reads an address; what it does not say, or says wrongly, is the usual. */
export function readTableView(params: URLSearchParams): TableView {
  const health = params.get('health');
  const sort = params.get('sort');
  return {
    search: (params.get('search') ?? '').slice(0, 60),
    health: plateHealths.find((known) => known === health) ?? 'in-use',
    kind: plateKindSchema.safeParse(params.get('kind')).data ?? null,
    sort: sorts.find((known) => known === sort) ?? 'name',
    order: params.get('order') === 'desc' ? 'desc' : 'asc',
  };
}

/** The address of a view; what is usual is left out. */
export function tableAddress(base: string, view: TableView): string {
  const params = new URLSearchParams({ view: 'table' });
  if (view.search !== '') params.set('search', view.search);
  if (view.health !== 'in-use') params.set('health', view.health);
  if (view.kind !== null) params.set('kind', view.kind);
  if (view.sort !== 'name') params.set('sort', view.sort);
  if (view.order !== 'asc') params.set('order', view.order);
  return `${base}?${params.toString()}`;
}
