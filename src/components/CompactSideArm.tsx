import { Link } from 'react-router-dom';
import { sideStations, type StationKey, type StationTargets } from './beam-stations';
import { classNames } from './class-names';
import { type NavPerson, type PersonActions, PersonPanel } from './PersonPanel';
import { useDisclosure } from './use-disclosure';

interface CompactSideArmProps {
  readonly current: StationKey | 'home' | null;
  readonly targets: StationTargets;
  readonly person: NavPerson | null;
  readonly actions?: PersonActions | undefined;
  readonly signInHref?: string | undefined;
}

/** The splitter as a button where the side arm has no room: it opens the arm and what belongs to the person. */
export function CompactSideArm({ current, targets, person, actions, signInHref }: CompactSideArmProps) {
  const { open, panelId, rootRef, buttonRef, toggle, close } = useDisclosure();
  const here = sideStations.find(({ key }) => key === current);
  return (
    <div ref={rootRef}>
      <button
        ref={buttonRef}
        type="button"
        aria-expanded={open}
        aria-controls={panelId}
        onClick={toggle}
        className="absolute top-2 -left-3.5 block h-15 w-11 text-center"
      >
        <svg
          aria-hidden="true"
          viewBox="-12 -26 24 40"
          width="24"
          height="40"
          className="absolute top-4 left-2.5 max-sm:top-2"
        >
          <path
            d="M0 -22V-7"
            strokeWidth="1.3"
            className={here === undefined ? 'stroke-ink' : 'stroke-beam'}
          />
          <path
            d="M-7 -7H7V7H-7Z"
            strokeWidth="1.2"
            className={classNames('stroke-ink', here === undefined ? 'fill-glass' : 'fill-lit')}
          />
          <path
            d="M-7 -7L7 7"
            strokeWidth="1.3"
            className={here === undefined ? 'stroke-ink' : 'stroke-on-lit'}
          />
        </svg>
        <span
          className={classNames(
            'absolute top-[3.25rem] left-1/2 -translate-x-1/2 text-xs whitespace-nowrap max-sm:top-11.5',
            here === undefined ? 'text-ink-2' : 'font-strong text-ink',
          )}
        >
          {here?.shortName ?? 'more'}
          <span
            aria-hidden="true"
            className={classNames(
              'ml-1 inline-block border-x-[3.5px] border-t-[4.5px] border-x-transparent border-t-current align-middle',
              open && 'rotate-180',
            )}
          />
        </span>
      </button>
      <div
        id={panelId}
        hidden={!open}
        className="absolute top-19 right-0 z-30 w-84 max-w-[calc(100vw-2.5rem)] border border-ink bg-paper p-4 max-sm:-right-1"
      >
        <ul className="m-0 list-none border-b border-hair p-0 pb-2">
          {sideStations.map(({ key, name }) => {
            const target = targets[key];
            if (target === undefined) return null;
            const waiting = target.waiting ?? 0;
            return (
              <li key={key}>
                <Link
                  to={target.href}
                  onClick={close}
                  aria-current={key === current ? 'page' : undefined}
                  className={classNames(
                    'flex min-h-11 items-center text-body no-underline',
                    key === current ? 'font-strong text-ink' : 'text-ink-2',
                  )}
                >
                  <svg aria-hidden="true" viewBox="-8 -8 16 16" width="16" height="16" className="mr-3">
                    <circle
                      r={key === current ? 6 : 3.8}
                      strokeWidth="1.2"
                      className={classNames('stroke-ink', key === current ? 'fill-lit' : 'fill-glass')}
                    />
                  </svg>
                  {name}
                  {waiting > 0 && <span className="ml-2 text-s font-strong text-ink">{waiting}</span>}
                </Link>
              </li>
            );
          })}
        </ul>
        <div className="pt-4">
          {person !== null && actions !== undefined && (
            <>
              <p className="mb-3 font-strong">{person.name}</p>
              <PersonPanel {...actions} />
            </>
          )}
          {person === null && signInHref !== undefined && (
            <Link to={signInHref} className="beam-link">
              Sign in
            </Link>
          )}
        </div>
      </div>
    </div>
  );
}
