import { type DraftContent, draftContentSchema } from '../../../shared/schemas/protocols';

/** Typed work that the server has not acknowledged, kept on this device so that a closed page loses nothing. */
export interface KeptDraft {
  /** The revision that it was typed over. */
  readonly revision: number;
  readonly content: DraftContent;
}

const keyOf = (userId: string, protocolId: string) => `quarterturn.draft.${userId}.${protocolId}`;

export function keepDraft(userId: string, protocolId: string, kept: KeptDraft): boolean {
  try {
    localStorage.setItem(keyOf(userId, protocolId), JSON.stringify(kept));
    return true;
  } catch {
    // A full or forbidden store: the page still holds the text, and says that it is only typed.
    return false;
  }
}

export function forgetDraft(userId: string, protocolId: string): void {
  try {
    localStorage.removeItem(keyOf(userId, protocolId));
  } catch {
    // Where nothing can be kept there is nothing to forget.
  }
}

export function keptDraft(userId: string, protocolId: string): KeptDraft | null {
  try {
    const value: unknown = JSON.parse(localStorage.getItem(keyOf(userId, protocolId)) ?? 'null');
    if (typeof value !== 'object' || value === null || !('revision' in value) || !('content' in value))
      return null;
    const content = draftContentSchema.safeParse(value.content);
    return typeof value.revision === 'number' && content.success
      ? { revision: value.revision, content: content.data }
      : null;
  } catch {
    return null;
  }
}
