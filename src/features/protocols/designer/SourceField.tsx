import { useEffect, useId, useLayoutEffect, useRef } from 'react';
import type { VocabularyEntry } from '../../../../shared/optics/expression/vocabulary';
import { Formula } from '../../../components/Formula';
import { TextButton } from '../../../components/TextLink';
import { CompletionList } from './CompletionList';
import type { RowView } from './row-view';
import { useCompletion } from './use-completion';

type Fault = Extract<RowView, { status: 'unreadable' }>['error'];

interface SourceFieldProps {
  readonly label: string;
  readonly value: string;
  readonly mode: 'state' | 'unitary';
  readonly fault: Fault | null;
  /** Typeset under the field while it is typed; null where it can't be read or stands elsewhere. */
  readonly latex: string | null;
  readonly autoFocus: boolean;
  readonly placeholder?: string;
  readonly onChange: (value: string) => void;
  /** Enter: what is typed stands. */
  readonly onDone: () => void;
  /** Esc: what stood before stands again. */
  readonly onCancel: () => void;
  readonly onFocus?: (() => void) | undefined;
  /** Opens the list of all that can be written. */
  readonly onAskWords: () => void;
}

/** An expression as typed. Where it can't be read, the part is underlined and a leader from its column leads to one sentence. */
export function SourceField(props: SourceFieldProps) {
  const { label, value, mode, fault, latex, autoFocus, placeholder, onChange, onDone, onCancel } = props;
  const input = useRef<HTMLInputElement>(null);
  const marks = useRef<HTMLDivElement>(null);
  const faultId = useId();
  const listId = useId();
  const completion = useCompletion(mode);
  const cursorWanted = useRef<number | null>(null);
  const offered = completion.entries.length > 0;

  // The text comes back from the draft with the next drawing; only then can the cursor stand behind what was put in.
  useLayoutEffect(() => {
    if (cursorWanted.current === null) return;
    input.current?.setSelectionRange(cursorWanted.current, cursorWanted.current);
    cursorWanted.current = null;
  }, [value]);

  const putIn = (entry: VocabularyEntry) => {
    const completed = completion.complete(value, entry);
    cursorWanted.current = completed.cursor;
    onChange(completed.value);
  };
  const look = (asked: boolean) => {
    const field = input.current;
    if (field !== null) completion.look(field.value, field.selectionStart ?? field.value.length, asked);
  };

  useEffect(() => {
    if (autoFocus) input.current?.focus();
  }, [autoFocus]);

  // The marks lie under the text: they follow when a long text scrolls in its field.
  const follow = () => {
    if (marks.current !== null && input.current !== null) marks.current.scrollLeft = input.current.scrollLeft;
  };

  return (
    <div className="source-field">
      <div className="relative">
        {fault !== null && (
          <div ref={marks} aria-hidden="true" className="source-marks font-mono">
            {value.slice(0, fault.column - 1)}
            <mark>
              {value.slice(fault.column - 1, fault.column - 1 + Math.max(fault.length, 1)) || '\u00a0'}
            </mark>
            {value.slice(fault.column - 1 + Math.max(fault.length, 1))}
          </div>
        )}
        <input
          ref={input}
          type="text"
          autoComplete="off"
          autoCapitalize="off"
          spellCheck={false}
          maxLength={4096}
          className="source-input font-mono"
          role="combobox"
          aria-autocomplete="list"
          aria-expanded={offered}
          aria-controls={offered ? listId : undefined}
          aria-activedescendant={completion.active < 0 ? undefined : `${listId}-${completion.active}`}
          aria-label={label}
          aria-invalid={fault !== null}
          aria-describedby={fault === null ? undefined : faultId}
          value={value}
          placeholder={placeholder}
          onFocus={props.onFocus}
          onBlur={completion.close}
          onScroll={follow}
          onChange={(event) => {
            onChange(event.target.value);
            follow();
            look(false);
          }}
          onKeyDown={(event) => {
            const active = completion.entries[completion.active];
            if (event.key === ' ' && event.ctrlKey) {
              event.preventDefault();
              look(true);
            } else if (offered && (event.key === 'ArrowDown' || event.key === 'ArrowUp')) {
              event.preventDefault();
              event.stopPropagation();
              completion.move(event.key === 'ArrowDown' ? 1 : -1);
            } else if (event.key === 'Enter') {
              event.preventDefault();
              if (active === undefined) onDone();
              else putIn(active);
            } else if (event.key === 'Escape') {
              event.preventDefault();
              if (offered) completion.close();
              else onCancel();
            }
          }}
        />
        {offered && (
          <CompletionList
            id={listId}
            entries={completion.entries}
            active={completion.active}
            onChoose={putIn}
          />
        )}
      </div>
      {(latex !== null || autoFocus) && (
        <p className="source-set">
          {latex !== null && <Formula latex={latex} source={value} />}
          <TextButton className="ml-auto text-s" onClick={props.onAskWords}>
            what can be written
          </TextButton>
        </p>
      )}
      {fault !== null && (
        <p id={faultId} role="status" className="source-fault">
          <FaultLeader column={fault.column} />
          <span>
            Column {fault.column}: {fault.message}
            {fault.suggestion !== undefined && (
              <>
                {' '}
                <TextButton onClick={() => onChange(mended(value, fault))}>
                  Write {fault.suggestion}
                </TextButton>
              </>
            )}
          </span>
        </p>
      )}
    </div>
  );
}

/** The text with the part at fault written as the fault suggests. */
function mended(value: string, { column, length, suggestion = '' }: Fault): string {
  return value.slice(0, column - 1) + suggestion + value.slice(column - 1 + length);
}

/** From the column at fault down and across to its sentence. */
function FaultLeader({ column }: { readonly column: number }) {
  // Columns are as wide as a numeral of the field's type; past the middle of the field the sentence keeps its place.
  const shown = Math.min(column, 28);
  return (
    <span
      aria-hidden="true"
      className="source-leader font-mono"
      style={{ marginInlineStart: `calc(${shown - 1} * 1ch + 0.2ch)` }}
    >
      <svg width="22" height="16" viewBox="0 0 22 16">
        <path d="M4 2 V11 H20" fill="none" stroke="currentColor" strokeWidth="1.4" />
        <path d="M4 0 l-3.4 5 h6.8 z" fill="currentColor" />
      </svg>
    </span>
  );
}
