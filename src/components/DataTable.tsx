import { type ComponentPropsWithRef, type KeyboardEvent, type ReactNode, useEffect, useRef } from 'react';
import { edgeFade } from './edge-fade';
import { classNames } from './class-names';
import { nextCell } from './table-keys';

interface DataTableProps {
  /** What the table holds; read out, and shown unless the head above says it. */
  readonly caption: ReactNode;
  readonly showCaption?: boolean;
  readonly children: ReactNode;
  readonly className?: string | undefined;
}

const control = 'a, button, input, select, textarea, [tabindex="0"]';

/**
 * A real table with hairlines. One cell is in the Tab order; arrows go by cell, Home and End by row, with Ctrl by table. Enter goes
 * to what can be pressed in a cell, Esc comes back.
 */
export function DataTable({ caption, showCaption = false, children, className }: DataTableProps) {
  const table = useRef<HTMLTableElement>(null);

  // Rows come and go; whichever cell was reachable may have gone with one.
  useEffect(() => {
    const element = table.current;
    if (element?.querySelector('[data-cell][tabindex="0"]') !== null) return;
    element.querySelector('tbody [data-cell]')?.setAttribute('tabindex', '0');
  });

  const press = (event: KeyboardEvent<HTMLTableElement>): void => {
    if (!(event.target instanceof Element) || event.altKey || event.metaKey) return;
    const cell = event.target.closest<HTMLElement>('[data-cell]');
    const element = table.current;
    if (cell === null || element === null) return;
    if (event.target !== cell) {
      if (event.key === 'Escape') cell.focus();
      return;
    }
    if (event.key === 'Enter') {
      const inside = cell.querySelector<HTMLElement>(control);
      if (inside !== null) {
        event.preventDefault();
        inside.focus();
      }
      return;
    }
    const rows = [...element.rows].map((row) => [...row.cells]);
    const row = rows.findIndex((cells) => cells.some((other) => other === cell));
    const column = rows[row]?.findIndex((other) => other === cell) ?? 0;
    const next = nextCell(
      event.key,
      { row, column },
      rows.map((cells) => cells.length),
      event.ctrlKey,
    );
    const target = next === null ? undefined : rows[next.row]?.[next.column];
    if (target === undefined) return;
    event.preventDefault();
    cell.setAttribute('tabindex', '-1');
    target.setAttribute('tabindex', '0');
    target.focus();
  };

  return (
    <div ref={edgeFade} className={classNames('max-sm:overflow-x-auto', className)}>
      <table ref={table} onKeyDown={press} className="w-full border-collapse text-body">
        <caption className={showCaption ? 'pb-2 text-left text-s text-ink-2' : 'sr-only'}>{caption}</caption>
        {children}
      </table>
    </div>
  );
}

/** The head stays in sight while its rows run under it. Columns are named once, with their unit. */
export function TableHead({ children }: { readonly children: ReactNode }) {
  return <thead className="sticky top-0 z-10 bg-paper">{children}</thead>;
}

interface CellProps {
  /** Right-aligned on the decimal point, in mono. */
  readonly numeric?: boolean;
}

export function HeadCell({ numeric = false, className, ...rest }: CellProps & ComponentPropsWithRef<'th'>) {
  return (
    <th
      scope="col"
      data-cell=""
      tabIndex={-1}
      {...rest}
      className={classNames(
        'border-b-[1.5px] border-ink px-2 py-2.5 text-s font-words text-ink-2 first:pl-0 last:pr-0',
        numeric ? 'text-right' : 'text-left',
        className,
      )}
    />
  );
}

interface DataRowProps extends ComponentPropsWithRef<'tr'> {
  /** The one that is here, now: glass, and a lit edge with an ink line. */
  readonly selected?: boolean;
}

export function DataRow({ selected = false, className, ...rest }: DataRowProps) {
  return (
    <tr
      aria-current={selected ? true : undefined}
      {...rest}
      className={classNames('group border-b border-hair', selected ? 'bg-glass' : 'hover:bg-wash', className)}
    />
  );
}

export function DataCell({ numeric = false, className, ...rest }: CellProps & ComponentPropsWithRef<'td'>) {
  return (
    <td
      data-cell=""
      tabIndex={-1}
      {...rest}
      className={classNames(
        'relative h-[2.375rem] px-2 py-1.5 align-middle first:pl-0 last:pr-0',
        numeric ? 'text-right font-mono' : 'text-left',
        className,
      )}
    />
  );
}

/** What names a row: its number or label. */
export function RowHead({ className, ...rest }: ComponentPropsWithRef<'th'>) {
  return (
    <th
      scope="row"
      data-cell=""
      tabIndex={-1}
      {...rest}
      className={classNames('relative h-[2.375rem] px-2 py-1.5 text-left font-strong first:pl-0', className)}
    />
  );
}

/** The lit edge of the selected row; put it first in its first cell. */
export function LitEdge() {
  return (
    <span
      aria-hidden="true"
      className="pointer-events-none absolute inset-y-0 left-0 w-[5px] border-r-[1.2px] border-ink bg-lit"
    />
  );
}
