import { Link } from 'react-router-dom';
import type { StationTarget } from './beam-stations';
import { classNames } from './class-names';

interface StationLinkProps {
  readonly name: string;
  readonly axisDeg: number;
  readonly goKey: string;
  readonly target: StationTarget;
  readonly current: boolean;
  /** The piece of beam from here to the next plate. */
  readonly litAfter: boolean;
  readonly onFollow?: (() => void) | undefined;
}

/** One plate on the beam with its name. The name stands above the beam, on a phone below it. */
export function StationLink({ name, axisDeg, goKey, target, current, litAfter, onFollow }: StationLinkProps) {
  const angle = (axisDeg * Math.PI) / 180;
  const reach = current ? 10 : 9;
  const x = reach * Math.cos(angle);
  const y = reach * Math.sin(angle);
  const waiting = target.waiting ?? 0;
  return (
    <li className="relative h-full">
      <BeamPiece lit={litAfter} className="inset-x-0" />
      <Link
        to={target.href}
        onClick={onFollow}
        aria-current={current ? 'page' : undefined}
        aria-keyshortcuts={`g ${goKey}`}
        className="absolute top-3.5 -left-3.25 block h-12.5 min-w-11 no-underline max-sm:top-4 max-sm:h-15"
      >
        <span
          className={classNames(
            'block pr-2 pl-3.5 whitespace-nowrap max-sm:absolute max-sm:top-8.5 max-sm:left-5.5 max-sm:-translate-x-1/2 max-sm:px-0 max-sm:text-xs',
            'text-[0.96875rem] leading-6',
            current ? 'font-strong text-ink' : 'text-ink-2',
          )}
        >
          {name}
          {waiting > 0 && (
            <span className="ml-2 text-s font-strong text-ink max-sm:absolute max-sm:-top-10 max-sm:left-1/2 max-sm:ml-3">
              <span aria-hidden="true">{waiting}</span>
              <span className="sr-only">
                , {waiting === 1 ? 'one thing waits' : `${waiting} things wait`}
              </span>
            </span>
          )}
        </span>
        <svg
          viewBox="-12 -12 24 24"
          width="24"
          height="24"
          aria-hidden="true"
          className="absolute top-6 left-2.5 max-sm:top-3.5"
        >
          <circle
            r={reach}
            className={classNames('motion-beam stroke-ink', current ? 'fill-lit' : 'fill-glass')}
            strokeWidth={current ? 1.6 : 1.2}
          />
          <path
            d={`M${x.toFixed(2)} ${(-y).toFixed(2)}L${(-x).toFixed(2)} ${y.toFixed(2)}`}
            className={current ? 'stroke-on-lit' : 'stroke-ink'}
            strokeWidth={current ? 2 : 1.4}
          />
        </svg>
      </Link>
    </li>
  );
}

/** A length of the beam: thick and amber where the light is, a hairline where it isn't yet. */
export function BeamPiece({ lit, className }: { readonly lit: boolean; readonly className: string }) {
  return (
    <span
      aria-hidden="true"
      className={classNames(
        'motion-beam pointer-events-none absolute top-[3.125rem] block -translate-y-1/2 max-sm:top-[2.625rem]',
        lit ? 'h-[2.6px] bg-beam' : 'h-px bg-rule',
        className,
      )}
    />
  );
}
