import { keepPreviousData, useInfiniteQuery } from '@tanstack/react-query';
import { useSearchParams } from 'react-router-dom';
import type { CabinetMount } from '../../../../shared/schemas/mounts';
import { DataCell, DataRow, DataTable, HeadCell, RowHead, TableHead } from '../../../components/DataTable';
import { FilterLinks } from '../../../components/FilterLinks';
import { ShowMore } from '../../../components/ShowMore';
import { SortHead } from '../../../components/SortHead';
import { TextLink } from '../../../components/TextLink';
import { QueryState } from '../../../lib/QueryState';
import { useLab } from '../../labs';
import { SearchField } from '../SearchField';
import { driveNames, motionSummary, mountState } from './mount-words';
import { mountsAddress, type MountsView, readMountsView } from './mounts-address';
import { mountPagesQuery } from './queries';

const states = [
  { id: 'in-use', label: 'all in use' },
  { id: 'holding', label: 'holding a plate' },
  { id: 'empty', label: 'empty' },
  { id: 'retired', label: 'retired' },
] as const;
const drives = [
  { id: 'hand', label: driveNames.hand },
  { id: 'motor', label: driveNames.motor },
] as const;

/** The mounts as rows: searched, filtered and sorted by the server, page after page, all of it in the address. */
export function MountTable({ cabinet, base }: { readonly cabinet: string; readonly base: string }) {
  const { lab } = useLab();
  const [params] = useSearchParams();
  const view = readMountsView(params);
  const { search, state, drive, sort, order } = view;
  const pages = useInfiniteQuery({
    ...mountPagesQuery(lab.id, { search, state, drive: drive ?? undefined, sort, order, limit: 50 }),
    placeholderData: keepPreviousData,
  });
  const mounts = pages.data?.pages.flatMap(({ items }) => items);
  const linkTo = (change: Partial<MountsView>) => mountsAddress(base, { ...view, ...change });
  const sorted = (column: MountsView['sort']) => ({
    to: linkTo({ sort: column, order: sort === column && order === 'asc' ? 'desc' : 'asc' }),
    sorted: sort === column ? order : null,
  });
  return (
    <>
      <SearchField
        label="find by name, note or the plate in it"
        value={search}
        addressOf={(text) => linkTo({ search: text })}
      />
      <div className="mt-2 mb-4 flex flex-wrap gap-x-8">
        <FilterLinks
          label="state"
          currentId={state}
          links={states.map(({ id, label }) => ({ id, label, to: linkTo({ state: id }) }))}
        />
        <FilterLinks
          label="drive"
          currentId={drive ?? 'any'}
          links={[
            { id: 'any', label: 'any drive', to: linkTo({ drive: null }) },
            ...drives.map(({ id, label }) => ({ id, label, to: linkTo({ drive: id }) })),
          ]}
        />
      </div>
      {mounts === undefined ? (
        <QueryState query={pages} what="the mounts" />
      ) : (
        <>
          <DataTable caption="Mounts of the cabinet" className="max-lg:overflow-x-auto">
            <TableHead>
              <tr>
                <SortHead {...sorted('name')}>mount</SortHead>
                <SortHead {...sorted('plate')}>holds</SortHead>
                <HeadCell>drive</HeadCell>
                <SortHead {...sorted('step')} numeric>
                  finest step, °
                </SortHead>
                <SortHead {...sorted('repeatability')} numeric>
                  repeats within (σ), °
                </SortHead>
                <HeadCell className="pl-6!">motion</HeadCell>
                <HeadCell>note</HeadCell>
              </tr>
            </TableHead>
            <tbody aria-busy={pages.isPlaceholderData}>
              {mounts.map((mount) => (
                <MountRow key={mount.id} {...{ mount, cabinet, base }} />
              ))}
            </tbody>
          </DataTable>
          {mounts.length === 0 && !pages.isFetching && (
            <p className="mt-3">
              No mount is found by that. <TextLink to={base}>See every mount in use</TextLink>
            </p>
          )}
          {pages.isFetchNextPageError && <QueryState query={pages} what="the next mounts" />}
          <ShowMore
            what="mounts"
            hasMore={pages.hasNextPage}
            isFetching={pages.isFetchingNextPage}
            onMore={() => void pages.fetchNextPage()}
          />
        </>
      )}
    </>
  );
}

function MountRow(props: { readonly mount: CabinetMount; readonly cabinet: string; readonly base: string }) {
  const { mount, cabinet, base } = props;
  const state = mountState(mount);
  return (
    <DataRow>
      <RowHead className="whitespace-nowrap">
        <TextLink to={`${base}/${mount.id}`}>{mount.name}</TextLink>
      </RowHead>
      <DataCell>
        {mount.plate === null ? (
          <span className="text-ink-2">{state}</span>
        ) : (
          <TextLink to={`${cabinet}/${mount.plate.id}`}>{mount.plate.name}</TextLink>
        )}
      </DataCell>
      <DataCell>{driveNames[mount.drive]}</DataCell>
      <DataCell numeric>{mount.resolutionDeg}</DataCell>
      <DataCell numeric>{mount.repeatabilityDeg}</DataCell>
      <DataCell className="pl-6!">{motionSummary(mount)}</DataCell>
      <DataCell className="max-w-80 truncate text-ink-2">{mount.note === '' ? '—' : mount.note}</DataCell>
    </DataRow>
  );
}
