import { createHash, createHmac } from 'node:crypto';

/**
 * The token of an invitation's link, made from its id and the server's secret: it can be shown again to a repeat of
 * the creating call, and is stored nowhere.
 */
export function invitationToken(secret: string, invitationId: string): string {
  return createHmac('sha256', secret).update(`invitation ${invitationId}`).digest('base64url');
}

export function tokenHash(token: string): string {
  return createHash('sha256').update(token).digest('hex');
}
