import { useQuery } from '@tanstack/react-query';
import { Outlet, ScrollRestoration, useLocation } from 'react-router-dom';
import { BeamNavigation } from '../components/BeamNavigation';
import { sessionQuery } from '../features/session';
import type { Session } from '../../shared/schemas/labs';
import { labStations } from './lab-stations';
import { initialsOf, usePersonActions } from './use-person-actions';

const nobody: Session = { user: null, labs: [] };

/** A page that belongs to no lab. Whoever is signed in keeps the way back to the first of theirs. */
export function PlainShell() {
  const { data: session = nobody } = useQuery(sessionQuery);
  const { pathname } = useLocation();
  const actions = usePersonActions(session);
  const [lab] = session.labs;
  const { user } = session;
  return (
    <>
      <a href="#page" className="skip-link">
        Skip to the page
      </a>
      <BeamNavigation
        current={pathname === '/quick-angles' ? 'quick' : null}
        homeHref="/"
        targets={lab === undefined ? {} : labStations(lab.id, [])}
        labName={lab?.name}
        person={user === null ? null : { name: user.name, initials: initialsOf(user.name) }}
        actions={user === null ? undefined : actions}
        signInHref="/sign-in"
      />
      <main id="page" tabIndex={-1} className="px-5 pb-10 sm:px-10">
        <Outlet />
      </main>
      <ScrollRestoration />
    </>
  );
}
