import { queryOptions } from '@tanstack/react-query';
import type { z } from 'zod';
import type { Role } from '../../../shared/permissions';
import type {
  createdInvitationSchema,
  createInvitationSchema,
  invitationListSchema,
  Lab,
  LabMember,
  memberListSchema,
  updateLabSchema,
} from '../../../shared/schemas/labs';
import { request } from '../../lib/api';

export const labQuery = (labId: string) =>
  queryOptions({
    queryKey: ['labs', labId],
    queryFn: ({ signal }) => request<Lab>(`/labs/${labId}`, { signal }),
  });

export const membersQuery = (labId: string) =>
  queryOptions({
    queryKey: ['labs', labId, 'members'],
    queryFn: ({ signal }) => request<z.infer<typeof memberListSchema>>(`/labs/${labId}/members`, { signal }),
  });

export const invitationsQuery = (labId: string) =>
  queryOptions({
    queryKey: ['labs', labId, 'invitations'],
    queryFn: ({ signal }) =>
      request<z.infer<typeof invitationListSchema>>(`/labs/${labId}/invitations`, { signal }),
  });

export function updateLab(labId: string, body: z.infer<typeof updateLabSchema>) {
  return request<Lab>(`/labs/${labId}`, { method: 'PATCH', body });
}

export function changeRole(labId: string, userId: string, role: Role) {
  return request<LabMember>(`/labs/${labId}/members/${userId}`, { method: 'PATCH', body: { role } });
}

export function removeMember(labId: string, userId: string) {
  return request<null>(`/labs/${labId}/members/${userId}`, { method: 'DELETE' });
}

export function createInvitation(
  labId: string,
  body: z.infer<typeof createInvitationSchema>,
  idempotencyKey: string,
) {
  return request<z.infer<typeof createdInvitationSchema>>(`/labs/${labId}/invitations`, {
    method: 'POST',
    body,
    idempotencyKey,
  });
}

export function revokeInvitation(labId: string, invitationId: string) {
  return request<null>(`/labs/${labId}/invitations/${invitationId}`, { method: 'DELETE' });
}
