/** The token in what a person pasted: a whole link, a path, or the token alone; null when there is none. */
export function invitationToken(text: string): string | null {
  const trimmed = text.trim();
  const inLink = /\/invitations\/([\w.~-]+)\/?(?:[?#].*)?$/.exec(trimmed)?.[1];
  if (inLink !== undefined) return inLink;
  return /^[\w.~-]{16,200}$/.test(trimmed) ? trimmed : null;
}
