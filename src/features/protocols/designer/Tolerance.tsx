import { useState } from 'react';
import { numberSchema } from '../../../../shared/schemas/common';
import { Scientific } from '../../../components/Scientific';
import { commaSentence, parseTypedNumber } from '../../../lib/format';

const toleranceSchema = numberSchema('A tolerance', 1e-9, 0.5, '');

interface ToleranceProps {
  readonly value: number;
  readonly mayWrite: boolean;
  readonly onChange: (value: number) => void;
}

/** A fact until it is pressed, then a field; what can't be read stays in the field with its fault. */
export function Tolerance({ value, mayWrite, onChange }: ToleranceProps) {
  const [typed, setTyped] = useState<string | null>(null);
  const fault = typed === null ? null : faultOf(typed);
  const shown = (
    <>
      tolerance 1 − F ≤ <Scientific value={value} />
    </>
  );
  if (!mayWrite) return <span>{shown}</span>;
  if (typed === null) {
    return (
      <button type="button" className="fact-button" onClick={() => setTyped(value.toExponential())}>
        {shown}
      </button>
    );
  }
  const done = () => {
    const read = parseTypedNumber(typed);
    if (fault !== null || !read.ok) return;
    onChange(read.value);
    setTyped(null);
  };
  return (
    <label>
      tolerance 1 − F ≤{' '}
      <input
        type="text"
        inputMode="decimal"
        autoFocus
        className="fact-input font-mono"
        aria-invalid={fault !== null}
        aria-describedby="tolerance-fault"
        value={typed}
        onChange={(event) => setTyped(event.target.value)}
        onBlur={done}
        onKeyDown={(event) => {
          if (event.key === 'Enter') done();
          if (event.key === 'Escape') setTyped(null);
        }}
      />
      <span id="tolerance-fault" role="status" className="ml-2 font-strong text-fault">
        {fault}
      </span>
    </label>
  );
}

function faultOf(typed: string): string | null {
  const read = parseTypedNumber(typed);
  if (!read.ok) return read.fault === 'comma' ? commaSentence(typed) : 'A tolerance is a number, like 1e−3.';
  const parsed = toleranceSchema.safeParse(read.value);
  return parsed.success ? null : (parsed.error.issues[0]?.message ?? 'A tolerance is from 1e−9 to 0.5.');
}
