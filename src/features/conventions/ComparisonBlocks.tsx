import { classNames } from '../../components/class-names';
import { LitEdge } from '../../components/DataTable';
import type { ComparedPart, ComparedRow } from './compared-rows';
import { RowAgreement, RowName } from './RowWords';
import { WrittenMatrix, WrittenText } from './WrittenText';

function PartValues({ part }: { readonly part: ComparedPart }) {
  if (part.id === 'matrix' || part.id === 'mueller') return <WrittenMatrix part={part} />;
  return (
    <span className="flex flex-wrap justify-end gap-x-4">
      {part.values.map((value) => (
        <span key={value.label} className="whitespace-nowrap">
          {part.values.length > 1 && part.id !== 'jones' && (
            <span className="text-xs text-ink-2 font-words mr-1.5 font-sans">{value.label}</span>
          )}
          <WrittenText value={value} />
        </span>
      ))}
    </span>
  );
}

/** The same as the table where a row of it would not fit: one block for each convention. */
export function ComparisonBlocks({
  rows,
  caption,
}: {
  readonly rows: readonly ComparedRow[];
  readonly caption: string;
}) {
  return (
    <ul aria-label={caption} className="border-ink m-0 list-none border-t-[1.5px] p-0">
      {rows.map((row, index) => (
        <li
          key={row.id}
          className={classNames('border-hair relative border-b py-3', index === 0 && 'bg-glass pl-4')}
        >
          {index === 0 && <LitEdge />}
          <div className="flex flex-wrap items-start justify-between gap-x-6 gap-y-1">
            <h3 className="text-body font-words max-w-80">
              <RowName row={row} />
            </h3>
            <RowAgreement row={row} />
          </div>
          <dl className="mt-2">
            {row.parts.map((part) => (
              <div
                key={part.id}
                className="flex flex-wrap items-baseline justify-between gap-x-3 gap-y-0.5 py-0.5"
              >
                <dt className="text-s text-ink-2">{part.name}</dt>
                <dd
                  className={classNames(
                    'ml-auto text-right',
                    part.id === 'hand' ? '' : 'text-s font-mono leading-5.5',
                  )}
                >
                  <PartValues part={part} />
                </dd>
              </div>
            ))}
          </dl>
        </li>
      ))}
    </ul>
  );
}
