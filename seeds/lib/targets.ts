import type { DraftTarget } from '../../shared/schemas';
import { newId } from '../../server/db/new-id';

/** Rows of a protocol from label and expression; a row keeps its id through all the drafts it is in. */
export function rows(pairs: readonly (readonly [label: string, expression: string])[]): DraftTarget[] {
  return pairs.map(([label, expression]) => ({ id: newId(), label, expression, heldFastAxesDeg: null }));
}
