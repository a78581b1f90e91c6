import { PUBLISHED_COMPOSITES, type PublishedComposite } from '../../../shared/optics/robust';
import {
  DataCell,
  DataRow,
  DataTable,
  HeadCell,
  LitEdge,
  RowHead,
  TableHead,
} from '../../components/DataTable';
import { TextButton } from '../../components/TextLink';
import { madeWords } from './published-design';

const standingWords: Readonly<Record<PublishedComposite['standing'], string>> = {
  seen: 'seen in print',
  recalled: 'from memory, checked by what it does',
  computed: 'computed from its idea',
};

function plateWords({ plates }: PublishedComposite): string {
  return plates
    .map(({ retardanceDeg, fastAxisDeg }) => `${retardanceDeg}° at ${Number(fastAxisDeg.toFixed(2))}°`)
    .join(', ');
}

interface PublishedTableProps {
  readonly lookedAt: string | null;
  readonly onLookAt: (composite: PublishedComposite) => void;
}

/** Composites from the literature, each to be looked at beside its plain counterpart. */
export function PublishedTable({ lookedAt, onLookAt }: PublishedTableProps) {
  return (
    <DataTable caption="Published composites">
      <TableHead>
        <tr>
          <HeadCell className="md:w-[42%]">composite, source</HeadCell>
          <HeadCell className="max-md:hidden">plates in beam order</HeadCell>
          <HeadCell className="max-sm:hidden">makes</HeadCell>
          <HeadCell className="max-md:hidden">1 − F grows as</HeadCell>
          <HeadCell>
            <span className="sr-only">look at it</span>
          </HeadCell>
        </tr>
      </TableHead>
      <tbody>
        {PUBLISHED_COMPOSITES.map((composite) => {
          const { id, name, source, standing, makes, infidelityPower } = composite;
          const selected = id === lookedAt;
          return (
            <DataRow key={id} selected={selected}>
              <RowHead className="pl-3! font-words">
                {selected && <LitEdge />}
                <span className="font-strong">{name}</span>
                <span className="mt-0.5 block max-w-150 text-s text-ink-2">
                  {source}; {standingWords[standing]}
                </span>
              </RowHead>
              <DataCell className="font-mono text-s max-md:hidden">{plateWords(composite)}</DataCell>
              <DataCell className="max-sm:hidden">{madeWords(makes)}</DataCell>
              <DataCell className="whitespace-nowrap max-md:hidden">
                {infidelityPower === null ? (
                  <span className="text-ink-2">no power: over a band</span>
                ) : (
                  <>
                    ε<sup>{infidelityPower}</sup>
                  </>
                )}
              </DataCell>
              <DataCell className="text-right whitespace-nowrap">
                {selected ? (
                  'shown above'
                ) : (
                  <TextButton onClick={() => onLookAt(composite)}>
                    Look at it<span className="sr-only">: {name}</span>
                  </TextButton>
                )}
              </DataCell>
            </DataRow>
          );
        })}
      </tbody>
    </DataTable>
  );
}
