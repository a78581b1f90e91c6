import { numberSchema } from '../../../../shared/schemas/common';
import { Scientific } from '../../../components/Scientific';
import { commaSentence, parseTypedNumber } from '../../../lib/format';
import { FactField } from './FactField';

const toleranceSchema = numberSchema('A tolerance', 1e-9, 0.5, '');

interface ToleranceProps {
  readonly value: number;
  readonly mayWrite: boolean;
  readonly onChange: (value: number) => void;
}

export function Tolerance({ value, mayWrite, onChange }: ToleranceProps) {
  const shown = (
    <>
      tolerance 1 − F ≤ <Scientific value={value} />
    </>
  );
  if (!mayWrite) return <span>{shown}</span>;
  return (
    <FactField
      fact={shown}
      label="tolerance 1 − F ≤"
      start={value.toExponential()}
      faultOf={faultOf}
      onDone={(typed) => {
        const read = parseTypedNumber(typed);
        if (read.ok) onChange(read.value);
      }}
    />
  );
}

function faultOf(typed: string): string | null {
  const read = parseTypedNumber(typed);
  if (!read.ok) return read.fault === 'comma' ? commaSentence(typed) : 'A tolerance is a number, like 1e−3.';
  const parsed = toleranceSchema.safeParse(read.value);
  return parsed.success ? null : (parsed.error.issues[0]?.message ?? 'A tolerance is from 1e−9 to 0.5.');
}
