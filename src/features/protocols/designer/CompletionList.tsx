import type { VocabularyEntry } from '../../../../shared/optics/expression/vocabulary';
import { classNames } from '../../../components/class-names';

interface CompletionListProps {
  readonly id: string;
  readonly entries: readonly VocabularyEntry[];
  readonly active: number;
  readonly onChoose: (entry: VocabularyEntry) => void;
}

/** What may stand at the cursor: how each is written, and one sentence of what it is. */
export function CompletionList({ id, entries, active, onChoose }: CompletionListProps) {
  return (
    <ul id={id} role="listbox" aria-label="What may stand here" className="completion-list">
      {entries.map((entry, place) => (
        <li
          key={entry.insert}
          id={`${id}-${place}`}
          role="option"
          aria-selected={place === active}
          className={classNames('completion', place === active && 'completion-active')}
          // Before the field loses the focus.
          onMouseDown={(event) => {
            event.preventDefault();
            onChoose(entry);
          }}
        >
          <code className="font-mono">{entry.signature}</code>
          <span className="text-s text-ink-2">{entry.help}</span>
        </li>
      ))}
    </ul>
  );
}
