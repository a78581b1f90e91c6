import { useState } from 'react';
import type { DraftTarget } from '../../../../shared/schemas/protocols';

/** The row that was last taken out, as the sentence at the foot says it; null once it is back. */
export function useRemovedRow(targets: readonly DraftTarget[]): {
  readonly row: { readonly id: string; readonly text: string } | null;
  readonly forget: () => void;
} {
  const [before, setBefore] = useState(targets);
  const [removed, setRemoved] = useState<{ readonly id: string; readonly text: string } | null>(null);
  if (before !== targets) {
    setBefore(targets);
    const place = before.findIndex(({ id }) => targets.every((target) => target.id !== id));
    const gone = before[place];
    if (gone !== undefined && targets.length === before.length - 1) {
      setRemoved({ id: gone.id, text: `Row ${place + 1}, ${gone.label}, taken out.` });
    } else if (removed !== null && targets.some(({ id }) => id === removed.id)) {
      setRemoved(null);
    }
  }
  return { row: removed, forget: () => setRemoved(null) };
}
