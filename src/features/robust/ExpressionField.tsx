import type { ExpressionProblem } from '../../../shared/optics';
import { TextButton } from '../../components/TextLink';
import { TextField } from '../../components/TextField';

interface ExpressionFieldProps {
  readonly label: string;
  readonly help?: string;
  readonly value: string;
  readonly fault: ExpressionProblem | undefined;
  readonly onChange: (value: string) => void;
}

/** An expression as it is typed; where it can't be read, the column, what is wrong, and what to write. */
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
      help={help}
      onChange={(event) => onChange(event.target.value)}
      fault={
        fault === undefined ? undefined : (
          <>
            Column {fault.column}: {fault.message}
            {fault.suggestion !== undefined && (
              <>
                {' '}
                <TextButton onClick={() => onChange(mended(value, fault))}>
                  Write {fault.suggestion}
                </TextButton>
              </>
            )}
          </>
        )
      }
    />
  );
}

function mended(value: string, { column, length, suggestion = '' }: ExpressionProblem): string {
  return value.slice(0, column - 1) + suggestion + value.slice(column - 1 + length);
}
