import { useState } from 'react';
import type { DraftContent } from '../../../../shared/schemas/protocols';

interface UndoWords {
  /** What was just done, as the sentence at the foot says it; null after any other edit, which Undo would take back first. */
  readonly done: string | null;
  /** Says it of the edit that is made with it. */
  readonly say: (text: string) => void;
  readonly forget: () => void;
}

/** The last edit in words, where it is one that a person may want back at once: a row taken out, or what `say` was told. */
export function useUndoSentence(content: DraftContent): UndoWords {
  const [before, setBefore] = useState(content);
  const [said, setSaid] = useState<string | null>(null);
  const [done, setDone] = useState<string | null>(null);
  if (before !== content) {
    setBefore(content);
    setSaid(null);
    setDone(said ?? removedFrom(before, content));
  }
  return { done, say: setSaid, forget: () => setDone(null) };
}

function removedFrom({ targets: before }: DraftContent, { targets: after }: DraftContent): string | null {
  if (after.length !== before.length - 1) return null;
  const place = before.findIndex(({ id }) => after.every((target) => target.id !== id));
  const gone = before[place];
  return gone === undefined ? null : `Row ${place + 1}, ${gone.label}, taken out.`;
}
