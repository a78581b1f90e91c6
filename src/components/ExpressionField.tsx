import type { ExpressionProblem } from '../../shared/optics';
import { TextField } from './TextField';
import { TextButton } from './TextLink';

interface ExpressionFieldProps {
  readonly label: string;
  readonly help?: string;
  readonly value: string;
  readonly fault: ExpressionProblem | undefined;
  readonly onChange: (value: string) => void;
}

/** An expression as it is typed. Where it can't be read: the text again with the part marked, one sentence, and what to write. */
export function ExpressionField({ label, help, value, fault, onChange }: ExpressionFieldProps) {
  return (
    <TextField
      label={label}
      mono
      autoCapitalize="off"
      autoCorrect="off"
      spellCheck={false}
      autoComplete="off"
      maxLength={4096}
      value={value}
      onChange={(event) => onChange(event.target.value)}
      help={help}
      fault={fault === undefined ? undefined : <FaultAt source={value} fault={fault} onMend={onChange} />}
    />
  );
}

interface FaultAtProps {
  readonly source: string;
  readonly fault: ExpressionProblem;
  readonly onMend: (value: string) => void;
}

function FaultAt({ source, fault, onMend }: FaultAtProps) {
  const { column, length, message, suggestion, nearestUnitary } = fault;
  const from = column - 1;
  const until = from + Math.max(length, 1);
  const mended =
    suggestion === undefined ? null : source.slice(0, from) + suggestion + source.slice(from + length);
  return (
    <>
      <span
        aria-hidden="true"
        className="font-words text-ink block overflow-x-auto pb-1.5 font-mono whitespace-pre"
      >
        {source.slice(0, from)}
        <mark className="text-ink bg-[color-mix(in_srgb,var(--fault)_18%,transparent)] underline decoration-fault decoration-wavy decoration-[1.2px] underline-offset-4">
          {source.slice(from, until) || '\u00a0'}
        </mark>
        {source.slice(until)}
      </span>
      <span className="block">
        Column {column}: {message}
        {mended !== null && (
          <>
            {' '}
            <TextButton onClick={() => onMend(mended)}>
              {suggestion === nearestUnitary ? 'Write the nearest unitary' : `Write ${suggestion ?? ''}`}
            </TextButton>
          </>
        )}
      </span>
    </>
  );
}
