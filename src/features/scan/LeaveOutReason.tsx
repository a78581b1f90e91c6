import { useState } from 'react';
import type { LeftOut } from '../../../shared/schemas/scans';
import { Button } from '../../components/Button';
import { NumberField } from '../../components/NumberField';
import { TextField } from '../../components/TextField';

/** Lines left out, in the order of the file. */
export function withLine(leftOut: readonly LeftOut[], row: LeftOut): readonly LeftOut[] {
  return [...leftOut.filter(({ line }) => line !== row.line), row].toSorted((a, b) => a.line - b.line);
}

/** Asks why a line is left out, and which one where none is meant yet. */
export function LeaveOutReason(props: {
  readonly line: number | null;
  readonly onLeave: (row: LeftOut) => void;
  readonly onKeep: () => void;
  /** Why a line that is typed can't be left out; null where it can. */
  readonly problemOf?: (line: number) => string | null;
}) {
  const { line, onLeave, onKeep, problemOf = () => null } = props;
  const [typedLine, setTypedLine] = useState('');
  const [why, setWhy] = useState('');
  const [isTried, setIsTried] = useState(false);
  const chosen = line ?? Number(typedLine.trim());
  const lineFault =
    line !== null || !isTried
      ? null
      : typedLine.trim() === '' || !Number.isInteger(chosen)
        ? 'Write the number of a line of the file.'
        : problemOf(chosen);
  const whyFault = why.trim() === '' ? 'Write why: the reason stands in the record.' : null;
  const leave = () => {
    setIsTried(true);
    if (why.trim() === '' || !Number.isInteger(chosen) || problemOf(chosen) !== null) return;
    onLeave({ line: chosen, why: why.trim() });
  };
  return (
    <div className="my-2 grid items-start gap-3 sm:grid-cols-[6rem_minmax(0,1fr)]">
      {line === null && (
        <NumberField
          label="line"
          value={typedLine}
          onChange={({ target }) => setTypedLine(target.value)}
          fault={lineFault}
        />
      )}
      <TextField
        label={line === null ? 'why it is left out' : `why line ${line} is left out`}
        className={line === null ? undefined : 'sm:col-span-2'}
        maxLength={200}
        value={why}
        onChange={({ target }) => setWhy(target.value)}
        fault={isTried ? whyFault : null}
      />
      <div className="flex flex-wrap gap-3 sm:col-span-2">
        <Button onClick={leave}>Leave {line === null ? 'it' : `line ${line}`} out</Button>
        <Button kind="quiet" onClick={onKeep}>
          Keep it
        </Button>
      </div>
    </div>
  );
}
