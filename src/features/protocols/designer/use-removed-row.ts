import { useState } from 'react';
import type { DraftContent } from '../../../../shared/schemas/protocols';

interface RemovedRow {
  readonly id: string;
  readonly text: string;
}

/** The row that was just taken out, as the sentence at the foot says it; null after any other edit, which Undo would take back first. */
export function useRemovedRow(content: DraftContent): {
  readonly row: RemovedRow | null;
  readonly forget: () => void;
} {
  const [before, setBefore] = useState(content);
  const [row, setRow] = useState<RemovedRow | null>(null);
  if (before !== content) {
    setBefore(content);
    setRow(removedFrom(before, content));
  }
  return { row, forget: () => setRow(null) };
}

function removedFrom({ targets: before }: DraftContent, { targets: after }: DraftContent): RemovedRow | null {
  const place = before.findIndex(({ id }) => after.every((target) => target.id !== id));
  const gone = before[place];
  if (gone === undefined || after.length !== before.length - 1) return null;
  return { id: gone.id, text: `Row ${place + 1}, ${gone.label}, taken out.` };
}
