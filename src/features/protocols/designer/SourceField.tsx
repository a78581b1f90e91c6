import { useEffect, useId, useRef } from 'react';
import type { RowView } from './row-view';

type Fault = Extract<RowView, { status: 'unreadable' }>['error'];

interface SourceFieldProps {
  readonly label: string;
  readonly value: string;
  readonly fault: Fault | null;
  readonly autoFocus: boolean;
  readonly placeholder?: string;
  readonly onChange: (value: string) => void;
  /** Enter: what is typed stands. */
  readonly onDone: () => void;
  /** Esc: what stood before stands again. */
  readonly onCancel: () => void;
  readonly onFocus?: (() => void) | undefined;
}

/** An expression as typed. Where it can't be read, the part is underlined and a leader from its column leads to one sentence. */
export function SourceField(props: SourceFieldProps) {
  const { label, value, fault, autoFocus, placeholder, onChange, onDone, onCancel, onFocus } = props;
  const input = useRef<HTMLInputElement>(null);
  const marks = useRef<HTMLDivElement>(null);
  const faultId = useId();

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
          aria-label={label}
          aria-invalid={fault !== null}
          aria-describedby={fault === null ? undefined : faultId}
          value={value}
          placeholder={placeholder}
          onFocus={onFocus}
          onScroll={follow}
          onChange={(event) => {
            onChange(event.target.value);
            follow();
          }}
          onKeyDown={(event) => {
            if (event.key === 'Enter') {
              event.preventDefault();
              onDone();
            }
            if (event.key === 'Escape') {
              event.preventDefault();
              onCancel();
            }
          }}
        />
      </div>
      {fault !== null && (
        <p id={faultId} role="status" className="source-fault">
          <FaultLeader column={fault.column} />
          <span>
            Column {fault.column}: {fault.message}
          </span>
        </p>
      )}
    </div>
  );
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
