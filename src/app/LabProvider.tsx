import { useSuspenseQuery } from '@tanstack/react-query';
import { useMemo } from 'react';
import { Outlet, useParams } from 'react-router-dom';
import { LabContext, labQuery } from '../features/labs';
import { sessionQuery } from '../features/session';
import { ApiError } from '../lib/api';

/** Gives the pages of a lab what they ask `useLab` for. The route's loader has fetched it before. */
export function LabProvider() {
  const { labId = '' } = useParams();
  const { data: session } = useSuspenseQuery(sessionQuery);
  const { data: lab } = useSuspenseQuery(labQuery(labId));
  const role = session.labs.find(({ id }) => id === labId)?.role;
  const value = useMemo(
    () =>
      session.user === null || role === undefined
        ? null
        : { lab, user: session.user, member: { userId: session.user.id, labId, role } },
    [session.user, lab, labId, role],
  );
  if (value === null) throw new ApiError(404, null, 'There is no such page, or it is not yours to see.');
  return (
    <LabContext.Provider value={value}>
      <Outlet />
    </LabContext.Provider>
  );
}
