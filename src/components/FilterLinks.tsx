import type { ReactNode } from 'react';
import { Link, type To } from 'react-router-dom';
import { classNames } from './class-names';

interface FilterLink {
  readonly id: string;
  readonly to: To;
  readonly label: string;
  /** How many it would show; absent while nobody has counted. */
  readonly count?: number | undefined;
  readonly sign?: ReactNode;
}

interface FilterLinksProps {
  /** What is filtered by. */
  readonly label: string;
  readonly links: readonly FilterLink[];
  readonly currentId: string;
  readonly className?: string | undefined;
}

/** A filter that lives in the address: each choice is a link with its count, the current one underlined by the beam. */
export function FilterLinks({ label, links, currentId, className }: FilterLinksProps) {
  return (
    <nav aria-label={label} className={className}>
      <ul className="flex flex-wrap gap-x-5">
        {links.map(({ id, to, label: words, count, sign }) => {
          const current = id === currentId;
          return (
            <li key={id} className={count === 0 && !current ? 'max-sm:hidden' : undefined}>
              <Link
                to={to}
                preventScrollReset
                aria-current={current ? 'true' : undefined}
                className={classNames(
                  'flex min-h-9 items-center gap-1.5 border-b-2 no-underline hover:bg-wash max-sm:min-h-11',
                  current ? 'border-beam font-strong text-ink' : 'border-transparent text-ink-2',
                )}
              >
                {sign}
                <span>
                  {words}
                  {count !== undefined && (
                    <span className="ml-1.5 font-mono font-words text-ink-2">{count}</span>
                  )}
                </span>
              </Link>
            </li>
          );
        })}
      </ul>
    </nav>
  );
}
