import { type ReactNode, useId, useState } from 'react';

interface FactFieldProps {
  /** What the button says. */
  readonly fact: ReactNode;
  /** Stands before the button, not part of it. */
  readonly before?: ReactNode;
  /** Stands after the button while nobody types. */
  readonly after?: ReactNode;
  readonly isMono?: boolean;
  /** Stands before the field. */
  readonly label: ReactNode;
  /** What the field begins with. */
  readonly start: string;
  readonly size?: number;
  readonly faultOf: (typed: string) => string | null;
  /** Called with what has no fault. */
  readonly onDone: (typed: string) => void;
}

/** A fact until it is pressed, then a field; what can't be read stays in the field with its fault. */
export function FactField(props: FactFieldProps) {
  const { fact, before, after, isMono = false, label, start, size, faultOf, onDone } = props;
  const [typed, setTyped] = useState<string | null>(null);
  const faultId = useId();
  if (typed === null) {
    return (
      <span>
        {before}
        <button
          type="button"
          className={isMono ? 'fact-button font-mono' : 'fact-button'}
          onClick={() => setTyped(start)}
        >
          {fact}
        </button>
        {after}
      </span>
    );
  }
  const fault = faultOf(typed);
  const done = () => {
    if (fault !== null) return;
    onDone(typed);
    setTyped(null);
  };
  return (
    <label className="fact-field">
      {label}{' '}
      <input
        type="text"
        inputMode="decimal"
        autoFocus
        className="fact-input font-mono"
        size={size}
        aria-invalid={fault !== null}
        aria-describedby={faultId}
        value={typed}
        onChange={(event) => setTyped(event.target.value)}
        onBlur={done}
        onKeyDown={(event) => {
          if (event.key === 'Enter') done();
          if (event.key === 'Escape') setTyped(null);
        }}
      />
      <span id={faultId} role="status" className="fact-fault">
        {fault}
      </span>
    </label>
  );
}
