import { useState } from 'react';
import { DataCell, DataRow, DataTable, HeadCell, RowHead, TableHead } from '../../components/DataTable';
import { ShowMore } from '../../components/ShowMore';
import { type PlanRow, type PlanWord } from './plan-rows';

const rowsAtOnce = 100;

/** What an import would do, row by row; a long plan comes in parts. */
export function PlanTable({ rows }: { readonly rows: readonly PlanRow[] }) {
  const [shown, setShown] = useState(rowsAtOnce);
  return (
    <>
      <DataTable caption="What would change" className="overflow-x-auto">
        <TableHead>
          <tr>
            <HeadCell>what</HeadCell>
            <HeadCell>change</HeadCell>
            <HeadCell>field</HeadCell>
            <HeadCell>now</HeadCell>
            <HeadCell>after the import</HeadCell>
          </tr>
        </TableHead>
        <tbody>
          {rows.slice(0, shown).map((row) => (
            <DataRow key={row.key}>
              <RowHead className="whitespace-nowrap">{row.what}</RowHead>
              <DataCell className="whitespace-nowrap">
                <ChangeSign word={row.word} /> {row.word}
              </DataCell>
              <DataCell>{row.field}</DataCell>
              <DataCell className={row.word === 'changes' ? 'text-ink-3 line-through' : 'text-ink-2'}>
                {row.now}
              </DataCell>
              <DataCell className={row.word === 'changes' ? 'font-strong' : undefined}>{row.after}</DataCell>
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
  // A seat taken: the post in its ring. Two lines that miss. A line that stops at a bar.
  new: 'M0 -6V6M-6 0H6',
  changes: 'M-6 -3H3M-3 3H6',
  ends: 'M-6 0H4M4 -6V6',
};

/** The shape of a change; never without its word. */
function ChangeSign({ word }: { readonly word: PlanWord }) {
  return (
    <svg
      aria-hidden="true"
      viewBox="-9 -9 18 18"
      width="18"
      height="18"
      className="mr-1 inline-block align-[-4px]"
    >
      <path d={signs[word]} className="stroke-ink" strokeWidth="1.6" fill="none" />
    </svg>
  );
}
