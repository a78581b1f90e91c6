import type { ReactNode } from 'react';
import { Link, type To } from 'react-router-dom';
import { classNames } from './class-names';
import { HeadCell } from './DataTable';

interface SortHeadProps {
  /** The address of the list sorted by this column, or the other way round where it is sorted so already. */
  readonly to: To;
  readonly sorted: 'asc' | 'desc' | null;
  readonly numeric?: boolean;
  readonly children: ReactNode;
}

/** A column that a list can be sorted by; the order lives in the address. */
export function SortHead({ to, sorted, numeric = false, children }: SortHeadProps) {
  return (
    <HeadCell
      numeric={numeric}
      aria-sort={sorted === null ? undefined : sorted === 'asc' ? 'ascending' : 'descending'}
    >
      <Link
        to={to}
        preventScrollReset
        className={classNames(
          'inline-flex min-h-6 items-center gap-1 underline decoration-rule underline-offset-4 hover:bg-wash',
          sorted !== null && 'font-strong text-ink',
        )}
      >
        {children}
        <SortSign sorted={sorted} />
      </Link>
    </HeadCell>
  );
}

/** A wedge that widens the way the values grow. */
function SortSign({ sorted }: { readonly sorted: 'asc' | 'desc' | null }) {
  if (sorted === null) return null;
  return (
    <svg aria-hidden="true" width="10" height="12" viewBox="0 0 10 12" className="shrink-0">
      <path d={sorted === 'asc' ? 'M5 1.5 9 10.5H1Z' : 'M5 10.5 9 1.5H1Z'} className="fill-ink" />
    </svg>
  );
}
