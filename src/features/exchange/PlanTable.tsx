import { useState } from 'react';
import { DataCell, DataRow, DataTable, HeadCell, RowHead, TableHead } from '../../components/DataTable';
import { classNames } from '../../components/class-names';
import { missingSign } from '../../lib/format';
import { ShowMore } from '../../components/ShowMore';
import type { PlanRow, PlanWord } from './plan-rows';

const rowsAtOnce = 100;
/** On a phone these two stand inside their neighbours. */
const wide = 'max-sm:hidden';

const isReplaced = ({ word, now }: PlanRow): boolean => word === 'changes' && now !== missingSign;

/** What an import would do, row by row; a long plan comes in parts. */
export function PlanTable({ rows }: { readonly rows: readonly PlanRow[] }) {
  const [shown, setShown] = useState(rowsAtOnce);
  return (
    <>
      <DataTable caption="What would change" className="overflow-x-auto">
        <TableHead>
          <tr>
            <HeadCell>what</HeadCell>
            <HeadCell className={wide}>change</HeadCell>
            <HeadCell>field</HeadCell>
            <HeadCell className={wide}>now</HeadCell>
            <HeadCell>after the import</HeadCell>
          </tr>
        </TableHead>
        <tbody>
          {rows.slice(0, shown).map((row) => (
            <DataRow key={row.key}>
              <RowHead className="whitespace-nowrap">
                {row.what}
                <span className="block font-words sm:hidden">
                  <Change word={row.word} />
                </span>
              </RowHead>
              <DataCell className={classNames(wide, 'whitespace-nowrap')}>
                <Change word={row.word} />
              </DataCell>
              <DataCell>{row.field}</DataCell>
              <DataCell
                className={classNames(wide, isReplaced(row) ? 'text-ink-3 line-through' : 'text-ink-2')}
              >
                {row.now}
              </DataCell>
              <DataCell>
                <span className={row.word === 'changes' ? 'font-strong' : undefined}>{row.after}</span>
                {row.now !== missingSign && <span className="block text-ink-3 sm:hidden">now {row.now}</span>}
              </DataCell>
            </DataRow>
          ))}
        </tbody>
      </DataTable>
      <ShowMore
        what="changes"
        hasMore={shown < rows.length}
        isFetching={false}
        onMore={() => setShown((before) => before + rowsAtOnce)}
      />
    </>
  );
}

const signs: Readonly<Record<PlanWord, string>> = {
  // A mark set; two lines that miss; a line that stops at a bar.
  new: 'M0 -6V6M-6 0H6',
  changes: 'M-6 -3H3M-3 3H6',
  ends: 'M-6 0H4M4 -6V6',
};

/** The word of a change with its shape. */
function Change({ word }: { readonly word: PlanWord }) {
  return (
    <>
      <svg
        aria-hidden="true"
        viewBox="-9 -9 18 18"
        width="18"
        height="18"
        className="mr-1 inline-block align-[-4px]"
      >
        <path d={signs[word]} className="stroke-ink" strokeWidth="1.6" fill="none" />
      </svg>
      {word}
    </>
  );
}
