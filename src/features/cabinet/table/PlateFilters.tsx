import {
  type CabinetCounts,
  type HealthCounts,
  plateHealths,
  type PlateKind,
} from '../../../../shared/schemas/cabinet';
import { FilterLinks } from '../../../components/FilterLinks';
import { HealthSign } from '../../../components/HealthSign';
import { healthWords } from '../plate-words';
import { tableAddress, type TableView } from './table-address';

const kinds = [
  { id: 'half', label: 'half-wave' },
  { id: 'quarter', label: 'quarter-wave' },
  { id: 'other', label: 'other' },
] as const;

/** How many of these plates a health filter lets through. */
function ofHealth(counts: HealthCounts, health: TableView['health']): number {
  if (health !== 'in-use') return counts[health];
  return plateHealths.reduce((sum, one) => sum + (one === 'retired' ? 0 : counts[one]), 0);
}

function ofKind(counts: CabinetCounts, kind: PlateKind | null): HealthCounts {
  return kind === null ? counts.plates : counts.kinds[kind];
}

/** The two filters of the plates, each choice with how many it would show beside what else is chosen. */
export function PlateFilters(props: {
  readonly base: string;
  readonly view: TableView;
  readonly counts: CabinetCounts | undefined;
}) {
  const { base, view, counts } = props;
  const shown = counts === undefined ? undefined : ofHealth(ofKind(counts, view.kind), view.health);
  return (
    <>
      <FilterLinks
        label="health"
        className="mt-2"
        currentId={view.health}
        links={(['in-use', ...plateHealths] as const).map((health) => ({
          id: health,
          to: tableAddress(base, { ...view, health }),
          label: health === 'in-use' ? 'all in use' : healthWords[health],
          count: counts === undefined ? undefined : ofHealth(ofKind(counts, view.kind), health),
          sign: health === 'in-use' ? undefined : <HealthSign health={health} />,
        }))}
      />
      <div className="mb-4 flex flex-wrap items-center gap-x-6">
        <FilterLinks
          label="kind"
          currentId={view.kind ?? 'any'}
          links={[
            {
              id: 'any',
              to: tableAddress(base, { ...view, kind: null }),
              label: 'any kind',
              count: counts === undefined ? undefined : ofHealth(counts.plates, view.health),
            },
            ...kinds.map(({ id, label }) => ({
              id,
              to: tableAddress(base, { ...view, kind: id }),
              label,
              count: counts === undefined ? undefined : ofHealth(counts.kinds[id], view.health),
            })),
          ]}
        />
        <p role="status" className="text-ink-2 sm:ml-auto">
          {shown === undefined ? '' : shown === 1 ? '1 plate' : `${shown} plates`}
        </p>
      </div>
    </>
  );
}
