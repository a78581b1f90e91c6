import { queryOptions } from '@tanstack/react-query';
import type { z } from 'zod';
import type { acceptedInvitationSchema, invitationPreviewSchema, Lab } from '../../../shared/schemas/labs';
import { request } from '../../lib/api';

export const invitationQuery = (token: string) =>
  queryOptions({
    queryKey: ['invitations', token],
    queryFn: ({ signal }) =>
      request<z.infer<typeof invitationPreviewSchema>>(`/invitations/${encodeURIComponent(token)}`, {
        signal,
      }),
  });

export function acceptInvitation(token: string) {
  return request<z.infer<typeof acceptedInvitationSchema>>(
    `/invitations/${encodeURIComponent(token)}/accept`,
    {
      method: 'POST',
    },
  );
}

export function createLab(name: string, idempotencyKey: string) {
  return request<Lab>('/labs', { method: 'POST', body: { name }, idempotencyKey });
}
