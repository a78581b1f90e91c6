import { keepPreviousData, useInfiniteQuery, useQuery } from '@tanstack/react-query';
import { useSearchParams } from 'react-router-dom';
import { DataTable, HeadCell, TableHead } from '../../../components/DataTable';
import { ShowMore } from '../../../components/ShowMore';
import { SortHead } from '../../../components/SortHead';
import { TextLink } from '../../../components/TextLink';
import { QueryState } from '../../../lib/QueryState';
import { useLab } from '../../labs';
import { SearchField } from '../SearchField';
import { countsQuery, platePagesQuery } from '../queries';
import { PlateFilters } from './PlateFilters';
import { PlateRow, widestNumbers } from './PlateRow';
import { readTableView, tableAddress, type TableView } from './table-address';

/** The cabinet as rows: searched, filtered and sorted by the server, page after page, all of it in the address. */
export function PlateTable({ base, now }: { readonly base: string; readonly now: Date }) {
  const { lab } = useLab();
  const [params] = useSearchParams();
  const view = readTableView(params);
  const { search, health, kind, sort, order } = view;
  const counts = useQuery({
    ...countsQuery(lab.id, search),
    placeholderData: keepPreviousData,
  });
  const pages = useInfiniteQuery({
    ...platePagesQuery(lab.id, { search, health, kind: kind ?? undefined, sort, order, limit: 50 }),
    placeholderData: keepPreviousData,
  });
  const plates = pages.data?.pages.flatMap(({ items }) => items);
  const widest = widestNumbers(plates ?? []);
  return (
    <>
      <SearchField
        label="find by name, serial, mount, material or note"
        value={search}
        addressOf={(text) => tableAddress(base, { ...view, search: text })}
      />
      <PlateFilters base={base} view={view} counts={counts.data} />
      {plates === undefined ? (
        <QueryState query={pages} what="the plates" />
      ) : (
        <>
          <DataTable caption="Plates of the cabinet" className="max-xl:overflow-x-auto">
            <TableHead>
              <tr>
                <SortHead {...sortOf(base, view, 'name')}>plate</SortHead>
                <HeadCell>health</HeadCell>
                <SortHead {...sortOf(base, view, 'age')}>calibration</SortHead>
                <HeadCell>kind</HeadCell>
                <SortHead {...sortOf(base, view, 'wavelength')} numeric>
                  made for, nm
                </SortHead>
                <HeadCell numeric>retardance(σ), °</HeadCell>
                <HeadCell numeric>at, nm</HeadCell>
                <HeadCell numeric>zero(σ), °</HeadCell>
                <HeadCell className="pl-6!">mount</HeadCell>
                <HeadCell>stands at</HeadCell>
              </tr>
            </TableHead>
            <tbody aria-busy={pages.isPlaceholderData}>
              {plates.map((plate) => (
                <PlateRow
                  key={plate.id}
                  {...{ plate, base, now }}
                  dueDays={lab.calibrationDueDays}
                  widest={widest}
                />
              ))}
            </tbody>
          </DataTable>
          {plates.length === 0 && !pages.isFetching && (
            <p className="mt-3">
              No plate is found by that.{' '}
              <TextLink to={tableAddress(base, readTableView(new URLSearchParams()))}>
                See every plate in use
              </TextLink>
            </p>
          )}
          {pages.isFetchNextPageError && <QueryState query={pages} what="the next plates" />}
          <ShowMore
            what="plates"
            hasMore={pages.hasNextPage}
            isFetching={pages.isFetchingNextPage}
            onMore={() => void pages.fetchNextPage()}
          />
        </>
      )}
    </>
  );
}

/** Sorted already, its head turns the order round. */
function sortOf(base: string, view: TableView, sort: TableView['sort']) {
  const sorted = view.sort === sort;
  const turned = sorted && view.order === 'asc' ? 'desc' : 'asc';
  return {
    to: tableAddress(base, { ...view, sort, order: turned }),
    sorted: sorted ? view.order : null,
  } as const;
}
