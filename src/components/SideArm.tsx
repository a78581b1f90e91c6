import { Link } from 'react-router-dom';
import { sideStations, type StationKey, type StationTargets } from './beam-stations';
import { classNames } from './class-names';

interface SideArmProps {
  readonly current: StationKey | 'home' | null;
  readonly targets: StationTargets;
}

/** The arm behind the splitter, along the top edge; only where the window has room for it. */
export function SideArm({ current, targets }: SideArmProps) {
  const shown = sideStations.filter(({ key }) => targets[key] !== undefined);
  const at = shown.findIndex(({ key }) => key === current);
  const lit = at >= 0;
  return (
    <>
      <span
        aria-hidden="true"
        className={classNames(
          'motion-beam absolute top-[22px] left-[7px] h-5',
          lit ? 'w-[2.6px] bg-beam' : 'w-px bg-rule',
        )}
      />
      <span
        aria-hidden="true"
        className={classNames(
          'motion-beam absolute top-[22px] left-2 w-22',
          lit ? 'h-[2.6px] -translate-y-px bg-beam' : 'h-px bg-rule',
        )}
      />
      <svg
        aria-hidden="true"
        viewBox="-8 -8 16 16"
        width="16"
        height="16"
        className="absolute top-3.5 left-0"
      >
        <path d="M-6 6L6 -6" strokeWidth="2.6" className="stroke-ink" />
      </svg>
      <ul className="absolute top-0 left-[5.625rem] m-0 flex list-none gap-8 p-0">
        {shown.map(({ key, name, goKey }, index) => {
          const target = targets[key];
          if (target === undefined) return null;
          const isCurrent = index === at;
          const waiting = target.waiting ?? 0;
          return (
            <li key={key} className="relative">
              <span
                aria-hidden="true"
                className={classNames(
                  'motion-beam absolute top-[22px] left-1',
                  index < at ? 'h-[2.6px] -translate-y-px bg-beam' : 'h-px bg-rule',
                  index === shown.length - 1 ? '-right-3' : '-right-9',
                )}
              />
              <Link
                to={target.href}
                aria-current={isCurrent ? 'page' : undefined}
                aria-keyshortcuts={`g ${goKey}`}
                className={classNames(
                  'relative block min-w-6 pt-7 pb-1 text-[0.875rem] leading-5 whitespace-nowrap no-underline',
                  isCurrent ? 'font-strong text-ink' : 'text-ink-2',
                )}
              >
                <svg
                  aria-hidden="true"
                  viewBox="-8 -8 16 16"
                  width="16"
                  height="16"
                  className="absolute top-3.5 -left-1"
                >
                  <circle
                    r={isCurrent ? 6 : 3.8}
                    strokeWidth="1.2"
                    className={classNames('motion-beam stroke-ink', isCurrent ? 'fill-lit' : 'fill-glass')}
                  />
                </svg>
                <span className="ml-0.5">{name}</span>
                {waiting > 0 && (
                  <span className="ml-1.5 text-s font-strong text-ink">
                    <span aria-hidden="true">{waiting}</span>
                    <span className="sr-only">
                      , {waiting === 1 ? 'one thing waits' : `${waiting} things wait`}
                    </span>
                  </span>
                )}
              </Link>
            </li>
          );
        })}
      </ul>
    </>
  );
}
