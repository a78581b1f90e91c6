import { type KeyboardEvent, type RefObject, useDeferredValue, useMemo, useState } from 'react';
import type { DraftTarget } from '../../../../shared/schemas/protocols';
import { findTargets, firstFound, nextFound } from './find-targets';
import { useDesignerView } from './view-store';

interface FindTargetProps {
  readonly field: RefObject<HTMLInputElement | null>;
  readonly targets: readonly DraftTarget[];
  /** Esc: back to the row that was found. */
  readonly onLeave: () => void;
}

/**
 * Finds a row by its label, its expression or its number and goes there: rows out of sight are not in the document, so that the
 * browser's own search can't. Enter goes on to the next one, with Shift to the one before.
 */
export function FindTarget({ field, targets, onLeave }: FindTargetProps) {
  const [text, setText] = useState('');
  const sought = useDeferredValue(text);
  const found = useMemo(() => findTargets(targets, sought), [targets, sought]);
  const { selectedId, select } = useDesignerView();
  const here = targets.findIndex(({ id }) => id === selectedId);
  const goTo = (place: number | undefined) => {
    const target = place === undefined ? undefined : targets[place];
    if (target !== undefined) select(target.id);
  };
  const press = (event: KeyboardEvent) => {
    if (event.key === 'Enter') {
      event.preventDefault();
      goTo(nextFound(found, here, event.shiftKey ? -1 : 1));
    } else if (event.key === 'Escape') {
      event.preventDefault();
      setText('');
      onLeave();
    }
  };
  return (
    <span className="find-target">
      <label>
        find a target{' '}
        <input
          ref={field}
          type="text"
          autoComplete="off"
          spellCheck={false}
          aria-keyshortcuts="/"
          className="find-input font-mono"
          value={text}
          onChange={({ target: { value } }) => {
            setText(value);
            goTo(firstFound(targets, value, findTargets(targets, value), here));
          }}
          onKeyDown={press}
        />
      </label>
      <span role="status" className="text-ink-2">
        {sought.trim() !== '' && countWords(found, here)}
      </span>
    </span>
  );
}

function countWords(found: readonly number[], here: number): string {
  if (found.length === 0) return 'No row has this.';
  const nth = found.indexOf(here);
  const count = nth < 0 ? `${found.length} rows` : `${nth + 1} of ${found.length}`;
  return found.length > 1 ? `${count}, Enter for the next` : count;
}
