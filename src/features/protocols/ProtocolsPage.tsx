import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import type { ProtocolSummary } from '../../../shared/schemas/protocols';
import { BeamEmpty, BeamWorking, BeamWrong } from '../../components/BeamState';
import { ButtonLink } from '../../components/Button';
import { TextField } from '../../components/TextField';
import { TextLink } from '../../components/TextLink';
import { VersionSeal } from '../../components/VersionSeal';
import { formatMoment } from '../../lib/format';
import { useTitle } from '../../lib/use-title';
import { useLab } from '../labs';
import { protocolsQuery } from './queries';

type Order = 'name' | 'latest';

function matches({ name, purpose, benchName }: ProtocolSummary, search: string): boolean {
  const text = `${name} ${purpose} ${benchName}`.toLocaleLowerCase('en');
  return search
    .toLocaleLowerCase('en')
    .split(/\s+/u)
    .every((word) => text.includes(word));
}

function compare(order: Order): (one: ProtocolSummary, other: ProtocolSummary) => number {
  if (order === 'name') return (one, other) => one.name.localeCompare(other.name, 'en', { numeric: true });
  return (one, other) => other.draftSavedAt.localeCompare(one.draftSavedAt);
}

/** The lab's protocols: what each makes, on which bench, and how far its draft is from its last version. */
export function Component() {
  const { lab, may } = useLab();
  const protocols = useQuery(protocolsQuery(lab.id));
  const [search, setSearch] = useState('');
  const [order, setOrder] = useState<Order>('latest');
  useTitle('Plan');

  const all = protocols.data?.items ?? [];
  const shown = all.filter((protocol) => matches(protocol, search)).sort(compare(order));

  return (
    <>
      <div className="flex flex-wrap items-baseline justify-between gap-x-8 gap-y-3 pt-3">
        <h1 className="m-0 text-title">Plan</h1>
        <TextLink className="mr-auto" to={`/labs/${lab.id}/plan/robust`}>
          Robust designs
        </TextLink>
        {may('protocols.write') && (
          <ButtonLink kind="filled" to={`/labs/${lab.id}/plan/new`}>
            Write a protocol
          </ButtonLink>
        )}
      </div>
      {protocols.isPending && <BeamWorking doing="Fetching the protocols" />}
      {protocols.isError && (
        <BeamWrong title="The protocols could not be fetched">{protocols.error.message}</BeamWrong>
      )}
      {protocols.isSuccess && all.length === 0 && (
        <BeamEmpty title="No protocols yet">
          A protocol says which states an experiment needs, and how well they must be made.{' '}
          {may('protocols.write') && <TextLink to={`/labs/${lab.id}/plan/new`}>Write the first one</TextLink>}
        </BeamEmpty>
      )}
      {all.length > 0 && (
        <>
          <TextField
            label="find by name, purpose or bench"
            type="search"
            className="mt-5 max-w-96"
            value={search}
            onChange={(event) => setSearch(event.target.value)}
          />
          <table className="mt-5 w-full border-collapse">
            <thead>
              <tr className="border-y border-ink text-left text-s text-ink-2">
                <SortHead order="name" current={order} onSort={setOrder}>
                  protocol
                </SortHead>
                <th scope="col" className="font-words max-md:hidden">
                  bench
                </th>
                <th scope="col" className="text-right font-words max-sm:hidden">
                  targets
                </th>
                <th scope="col" className="pl-10 font-words">
                  last version
                </th>
                <SortHead order="latest" current={order} onSort={setOrder} hideOnPhone>
                  draft saved
                </SortHead>
              </tr>
            </thead>
            <tbody>
              {shown.map((protocol) => (
                <ProtocolRow key={protocol.id} labId={lab.id} protocol={protocol} />
              ))}
            </tbody>
          </table>
          {shown.length === 0 && (
            <p className="mt-4 text-ink-2">
              No protocol holds all of these words. Take one out of the search.
            </p>
          )}
        </>
      )}
    </>
  );
}

interface SortHeadProps {
  readonly order: Order;
  readonly current: Order;
  readonly onSort: (order: Order) => void;
  readonly hideOnPhone?: boolean;
  readonly children: string;
}

function SortHead({ order, current, onSort, hideOnPhone = false, children }: SortHeadProps) {
  const sorted = order === current;
  return (
    <th
      scope="col"
      aria-sort={sorted ? (order === 'name' ? 'ascending' : 'descending') : 'none'}
      className={`font-words ${hideOnPhone ? 'max-sm:hidden' : ''}`}
    >
      <button
        type="button"
        className={`min-h-8 ${sorted ? 'text-ink underline' : ''}`}
        onClick={() => onSort(order)}
      >
        {children}
      </button>
    </th>
  );
}

function ProtocolRow({ labId, protocol }: { readonly labId: string; readonly protocol: ProtocolSummary }) {
  const { latestVersion } = protocol;
  const href = `/labs/${labId}/plan/${protocol.id}`;
  return (
    <tr className="border-b border-hair align-middle hover:bg-wash">
      <th scope="row" className="py-3 pr-6 text-left font-words">
        <TextLink to={href} className="font-strong">
          {protocol.name}
        </TextLink>
        {protocol.purpose !== '' && <span className="mt-1 block text-s text-ink-2">{protocol.purpose}</span>}
      </th>
      <td className="min-w-32 py-3 pr-6 max-md:hidden">{protocol.benchName}</td>
      <td className="text-right font-mono max-sm:hidden">{protocol.targetCount}</td>
      <td className="py-3 pl-10 md:pr-6">
        {latestVersion === null ? (
          <span className="text-ink-2">none yet</span>
        ) : (
          <span className="flex items-center gap-3">
            <VersionSeal state="saved" number={latestVersion.number} />
            <TextLink to={`${href}/versions/${latestVersion.number}`}>{latestVersion.message}</TextLink>
          </span>
        )}
      </td>
      <td className="text-s text-ink-2 max-sm:hidden">
        {formatMoment(new Date(protocol.draftSavedAt), new Date())}, {protocol.draftSavedBy}
      </td>
    </tr>
  );
}
