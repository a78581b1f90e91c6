import { classNames } from '../../components/class-names';
import {
  DataCell,
  DataRow,
  DataTable,
  HeadCell,
  LitEdge,
  RowHead,
  TableHead,
} from '../../components/DataTable';
import type { ComparedPart, ComparedRow } from './compared-rows';
import { RowAgreement, RowName } from './RowWords';
import type { WrittenPart } from './written-parts';
import { WrittenMatrix, WrittenText } from './WrittenText';

const headWords: Record<WrittenPart['id'], string> = {
  jones: 'Jones vector, as written',
  hand: 'hand',
  stokes: 'Stokes, as shown',
  ellipse: 'ellipse, degrees',
  bloch: 'Bloch, as written',
  matrix: 'matrix, as written',
  mueller: 'Mueller matrix, S3 as shown',
};

const isMatrix = ({ id }: WrittenPart) => id === 'matrix' || id === 'mueller';

function PartCells({ part }: { readonly part: ComparedPart }) {
  if (isMatrix(part)) {
    return (
      <DataCell numeric className="text-s align-top">
        <WrittenMatrix part={part} />
      </DataCell>
    );
  }
  return part.values.map((value, index) => (
    <DataCell
      key={value.label}
      numeric={part.id !== 'hand'}
      className={classNames('align-top', part.id !== 'hand' && 'text-s leading-5.5', index === 0 && 'pl-5!')}
    >
      <WrittenText value={value} />
    </DataCell>
  ));
}

/** One row for each convention, one's own first and lit; what is not as typed is heavier and has its sign. */
export function ComparisonTable({
  rows,
  caption,
  compact,
}: {
  readonly rows: readonly ComparedRow[];
  readonly caption: string;
  /** Says under its name, not in a column of its own, how a convention stands to what is typed. */
  readonly compact: boolean;
}) {
  const parts = rows[0]?.parts ?? [];
  const split = parts.some((part) => !isMatrix(part) && part.values.length > 1);
  return (
    <DataTable caption={caption}>
      <TableHead>
        <tr>
          <HeadCell rowSpan={split ? 2 : 1} className="pl-4! align-bottom">
            convention
          </HeadCell>
          {parts.map((part) =>
            isMatrix(part) || part.values.length === 1 ? (
              <HeadCell
                key={part.id}
                numeric={isMatrix(part)}
                rowSpan={split ? 2 : 1}
                className={isMatrix(part) ? 'align-bottom' : 'pl-5! align-bottom'}
              >
                {headWords[part.id]}
              </HeadCell>
            ) : (
              <HeadCell
                key={part.id}
                numeric
                scope="colgroup"
                colSpan={part.values.length}
                className="border-b-0! pb-0"
              >
                {headWords[part.id]}
              </HeadCell>
            ),
          )}
          {!compact && (
            <HeadCell rowSpan={split ? 2 : 1} className="pl-5 align-bottom">
              beside what is typed
            </HeadCell>
          )}
        </tr>
        {split && (
          <tr>
            {parts
              .filter((part) => !isMatrix(part) && part.values.length > 1)
              .flatMap((part) =>
                part.values.map(({ label }, index) => (
                  <HeadCell
                    key={`${part.id} ${label}`}
                    numeric
                    className={classNames('pt-0.5 last:pr-2!', index === 0 && 'pl-5!')}
                  >
                    {label}
                  </HeadCell>
                )),
              )}
          </tr>
        )}
      </TableHead>
      <tbody>
        {rows.map((row, index) => (
          <DataRow key={row.id} selected={index === 0}>
            <RowHead className="max-w-72 min-w-48 pl-4! align-top">
              {index === 0 && <LitEdge />}
              <RowName row={row} />
              {compact && (
                <span className="font-words mt-1 block">
                  <RowAgreement row={row} />
                </span>
              )}
            </RowHead>
            {row.parts.map((part) => (
              <PartCells key={part.id} part={part} />
            ))}
            {!compact && (
              <DataCell className="max-w-52 min-w-36 pl-5! align-top">
                <RowAgreement row={row} />
              </DataCell>
            )}
          </DataRow>
        ))}
      </tbody>
    </DataTable>
  );
}
