import type { DraftContent } from '../../../shared/schemas/protocols';
import type { DraftEdit } from './draft-edits';

const longestPast = 200;

/** A draft as it stands, and what Ctrl+Z and Ctrl+Shift+Z lead to. */
export interface DraftHistory {
  readonly content: DraftContent;
  readonly past: readonly DraftContent[];
  readonly future: readonly DraftContent[];
  readonly typing: string | null;
}

export function startHistory(content: DraftContent): DraftHistory {
  return { content, past: [], future: [], typing: null };
}

export function applyEdit(history: DraftHistory, edit: DraftEdit): DraftHistory {
  const content = edit.apply(history.content);
  const continues = edit.typing !== null && edit.typing === history.typing;
  const past = continues ? history.past : [...history.past, history.content].slice(-longestPast);
  return { content, past, future: [], typing: edit.typing };
}

export function undo(history: DraftHistory): DraftHistory {
  const before = history.past.at(-1);
  if (before === undefined) return history;
  return {
    content: before,
    past: history.past.slice(0, -1),
    future: [history.content, ...history.future],
    typing: null,
  };
}

export function redo(history: DraftHistory): DraftHistory {
  const [next, ...later] = history.future;
  if (next === undefined) return history;
  return { content: next, past: [...history.past, history.content], future: later, typing: null };
}
