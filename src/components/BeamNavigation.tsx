import type { ReactNode } from 'react';
import { Link } from 'react-router-dom';
import { beamStations, sideStations, type StationKey, type StationTargets } from './beam-stations';
import { classNames } from './class-names';
import { CompactSideArm } from './CompactSideArm';
import { MarkLines } from './Mark';
import { PersonMenu } from './PersonMenu';
import type { NavPerson, PersonActions } from './PersonPanel';
import { SideArm } from './SideArm';
import { BeamPiece, StationLink } from './StationLink';

interface BeamNavigationProps {
  /** What is lit. `home` lights the mark's origin; null lights nothing, for pages that are no station. */
  readonly current: StationKey | 'home' | null;
  readonly homeHref: string;
  readonly targets: StationTargets;
  readonly labName?: string | undefined;
  readonly person: NavPerson | null;
  readonly actions?: PersonActions | undefined;
  /** Where a stranger signs in; shown when `person` is null. */
  readonly signInHref?: string | undefined;
}

/**
 * The beam runs from the mark through four plates to the person, and a splitter sends a side arm along the top edge.
 * From 1 216 px the side arm lies open; below that the splitter opens it, and on a phone the names go under the plates.
 */
export function BeamNavigation({
  current,
  homeHref,
  targets,
  labName,
  person,
  actions,
  signInHref,
}: BeamNavigationProps) {
  const shown = beamStations.filter(({ key }) => targets[key] !== undefined);
  const onSide = sideStations.some(({ key }) => key === current);
  const at = onSide ? shown.length : shown.findIndex(({ key }) => key === current);
  return (
    <nav
      aria-label="Quarterturn"
      className={classNames(
        'relative z-20 grid h-19 px-5 sm:px-10 print:hidden',
        shown.length === 4
          ? 'grid-cols-[81fr_66fr_66fr_66fr_52fr_19px] sm:grid-cols-[130fr_120fr_120fr_120fr_90fr_40px] desk:grid-cols-[minmax(190px,323fr)_146fr_146fr_146fr_minmax(88px,98fr)_minmax(380px,504fr)]'
          : 'grid-cols-[1fr_auto]',
      )}
    >
      <HomeLink href={homeHref} lit={current === 'home'} beamLit={at >= 0} labName={labName} />
      {shown.length === 4 && (
        <ul className="contents">
          {shown.map(({ key, name, axisDeg, goKey }, index) => {
            const target = targets[key];
            return target === undefined ? null : (
              <StationLink
                key={key}
                {...{ name, axisDeg, goKey, target }}
                current={key === current}
                litAfter={index < at}
              />
            );
          })}
          <li className="relative h-full">
            <BeamPiece lit={false} className="right-0 left-2 max-sm:-right-1 desk:right-7.5" />
            <div className="max-desk:hidden">
              <Splitter lit={false} />
              <SideArm current={current} targets={targets} />
            </div>
            <div className="desk:hidden">
              <CompactSideArm {...{ current, targets, person, actions, signInHref }} />
            </div>
            {person !== null && actions !== undefined && (
              <div className="absolute inset-y-0 right-0 max-desk:hidden">
                <PersonMenu person={person} {...actions} />
              </div>
            )}
            {person === null && signInHref !== undefined && (
              <SignInLink href={signInHref} className="absolute top-9.5 right-0 max-desk:hidden" />
            )}
          </li>
        </ul>
      )}
      {shown.length < 4 && (
        <div className="relative flex h-full items-center pt-6">
          <BeamPiece lit={false} className="right-full -left-400 hidden" />
          {person !== null && actions !== undefined ? (
            <PersonMenu person={person} {...actions} />
          ) : (
            signInHref !== undefined && <SignInLink href={signInHref} />
          )}
        </div>
      )}
    </nav>
  );
}

function SignInLink({ href, className }: { readonly href: string; readonly className?: string }) {
  return (
    <Link to={href} className={classNames('beam-link bg-paper px-2', className)}>
      Sign in
    </Link>
  );
}

interface HomeLinkProps {
  readonly href: string;
  readonly lit: boolean;
  readonly beamLit: boolean;
  readonly labName?: string | undefined;
}

/** The mark, whose baseline is the beam, with the name and the lab. */
function HomeLink({ href, lit, beamLit, labName }: HomeLinkProps) {
  return (
    <div className="relative h-full">
      <BeamPiece lit={beamLit} className="right-0 left-1 max-sm:left-0" />
      {lit && <BeamPiece lit className="left-1 w-6 max-sm:left-0" />}
      <Link
        to={href}
        aria-current={lit ? 'page' : undefined}
        className="absolute top-2 -left-1 block h-16 max-w-full min-w-11 pl-[3.0625rem] no-underline max-lg:w-12"
      >
        <svg
          aria-hidden="true"
          viewBox="-8 -34 42 42"
          width="42"
          height="42"
          className="absolute top-2 left-0 overflow-visible max-sm:top-0 max-sm:-left-1"
        >
          <MarkLines />
          {lit && <circle r="6" strokeWidth="1.5" className="fill-lit stroke-ink" />}
        </svg>
        <span className="block pt-4 text-[1.125rem] leading-6 font-section text-ink max-lg:sr-only">
          Quarterturn
        </span>
        {labName !== undefined && (
          <span className="block truncate pt-1 text-s text-ink-2 max-lg:sr-only">{labName}</span>
        )}
      </Link>
    </div>
  );
}

/** The cube that sends the side arm off. */
function Splitter({ lit }: { readonly lit: boolean }): ReactNode {
  return (
    <svg
      aria-hidden="true"
      viewBox="-8 -8 16 16"
      width="16"
      height="16"
      className="absolute top-[2.625rem] left-0 max-sm:top-[2.125rem]"
    >
      <path
        d="M-7 -7H7V7H-7Z"
        strokeWidth="1.2"
        className={classNames('stroke-ink', lit ? 'fill-lit' : 'fill-glass')}
      />
      <path d="M-7 -7L7 7" strokeWidth="1.3" className={lit ? 'stroke-on-lit' : 'stroke-ink'} />
    </svg>
  );
}
