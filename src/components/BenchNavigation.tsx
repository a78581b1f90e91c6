import type { ReactNode } from 'react';
import { Link } from 'react-router-dom';
import { beamStations, type StationTargets } from './beam-stations';
import { MarkLines } from './Mark';
import { BeamPiece, StationLink } from './StationLink';

interface BenchNavigationProps {
  readonly homeHref: string;
  readonly targets: StationTargets;
  /** At the right end: when it was last saved, the lamp. */
  readonly aside?: ReactNode;
}

/**
 * The beam at the bench: no side arm and no words beside the mark. That leaving a run asks once is the router's blocker on the
 * run's page, so that it holds for the back button too.
 */
export function BenchNavigation({ homeHref, targets, aside }: BenchNavigationProps) {
  const at = beamStations.findIndex(({ key }) => key === 'bench');
  return (
    <nav
      aria-label="Quarterturn"
      className="relative grid h-16 auto-rows-[4rem] grid-cols-[81fr_66fr_66fr_66fr_52fr_auto] px-5 max-sm:h-auto sm:grid-cols-[180fr_120fr_144fr_120fr_100fr_auto] sm:px-7"
    >
      <div className="relative -mt-2.5 h-full max-sm:mt-0">
        <BeamPiece lit className="right-0 left-0" />
        <Link to={homeHref} className="absolute top-2 -left-1 block h-14 w-12">
          <svg
            aria-hidden="true"
            viewBox="-8 -34 42 42"
            width="42"
            height="42"
            className="absolute top-2 -left-1 overflow-visible max-sm:top-0"
          >
            <MarkLines />
          </svg>
          <span className="sr-only">Home</span>
        </Link>
      </div>
      <ul className="contents *:-mt-2.5 max-sm:*:mt-0">
        {beamStations.map(({ key, name, axisDeg, goKey }, index) => {
          const target = targets[key];
          return target === undefined ? null : (
            <StationLink
              key={key}
              {...{ name, axisDeg, goKey, target: { href: target.href } }}
              current={key === 'bench'}
              litAfter={index < at}
            />
          );
        })}
      </ul>
      <div className="relative -mt-2.5 h-full max-sm:col-span-full max-sm:mt-0 max-sm:h-12">
        <BeamPiece lit={false} className="inset-x-0 max-sm:hidden" />
        <div className="flex h-14 items-center justify-end gap-8 max-sm:h-12">{aside}</div>
      </div>
    </nav>
  );
}
