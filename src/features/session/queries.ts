import { queryOptions } from '@tanstack/react-query';
import type { Session } from '../../../shared/schemas/labs';
import { request } from '../../lib/api';

export const sessionQuery = queryOptions({
  queryKey: ['session'],
  queryFn: ({ signal }) => request<Session>('/session', { signal }),
  staleTime: 60_000,
});

/** Where a person goes to sign in: a link, since a form that redirects to the provider breaks our form-action policy. */
export function signInHref(returnTo: string): string {
  return `/auth/github?returnTo=${encodeURIComponent(returnTo)}`;
}

export async function signOut(everywhere: boolean): Promise<void> {
  await request<null>(everywhere ? '/session/sign-out-everywhere' : '/session/sign-out', { method: 'POST' });
}
