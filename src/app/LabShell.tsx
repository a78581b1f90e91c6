import { useQuery, useSuspenseQuery } from '@tanstack/react-query';
import { Outlet, ScrollRestoration, useLocation, useNavigate } from 'react-router-dom';
import { BeamNavigation } from '../components/BeamNavigation';
import { LiveRegions } from '../components/LiveRegions';
import { useGoKeys } from '../components/use-go-keys';
import { homeQuery } from '../features/home';
import { useLab } from '../features/labs';
import { sessionQuery } from '../features/session';
import { singleLettersAreOn } from '../lib/commands';
import { labStations, stationAt } from './lab-stations';
import { initialsOf, usePersonActions } from './use-person-actions';

/** A lab's page: the beam above, the page below. */
export function LabShell() {
  const { lab, user } = useLab();
  const { data: session } = useSuspenseQuery(sessionQuery);
  const { data: home } = useQuery(homeQuery(lab.id));
  const { pathname } = useLocation();
  const navigate = useNavigate();
  const actions = usePersonActions(session, lab.id);
  const homeHref = `/labs/${lab.id}`;
  const targets = labStations(lab.id, home?.waiting ?? []);
  useGoKeys(targets, homeHref, (href) => void navigate(href), singleLettersAreOn());

  return (
    <>
      <a href="#page" className="skip-link">
        Skip to the page
      </a>
      <BeamNavigation
        current={stationAt(lab.id, pathname)}
        homeHref={homeHref}
        targets={targets}
        labName={lab.name}
        person={{ name: user.name, initials: initialsOf(user.name) }}
        actions={actions}
      />
      <main id="page" tabIndex={-1} className="px-5 pb-10 sm:px-10">
        <Outlet />
      </main>
      <LiveRegions />
      <ScrollRestoration />
    </>
  );
}
