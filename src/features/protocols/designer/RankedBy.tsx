import { useState } from 'react';
import { wrap } from '../../../../shared/optics/units';
import type { Bench } from '../../../../shared/schemas/benches';
import type { DraftContent, Objective } from '../../../../shared/schemas/protocols';
import { TextButton } from '../../../components/TextLink';
import { formatDial, parseTypedNumber } from '../../../lib/format';
import { type DraftEdit, rankBy, standAt } from '../draft-edits';

const objectives: readonly { readonly value: Objective; readonly label: string }[] = [
  { value: 'least-expected-infidelity', label: 'least expected infidelity' },
  { value: 'least-travel', label: 'least travel down the list' },
  { value: 'nearest-to-present', label: 'nearest to where the dials stand' },
];

interface RankedByProps {
  readonly content: DraftContent;
  readonly bench: Bench | undefined;
  readonly mayWrite: boolean;
  /** What the stage's dials say; null while nothing stands there. */
  readonly standsAtDeg: readonly number[] | null;
  readonly edit: (edit: DraftEdit) => void;
}

/** By what the solutions are ranked, and for the two that turn on it, where the dials stand now. */
export function RankedBy({ content, bench, mayWrite, standsAtDeg, edit }: RankedByProps) {
  const { objective } = content;
  const chosen = objectives.find(({ value }) => value === objective);
  if (!mayWrite) {
    return (
      <span className="fold-first">
        ranked by <b>{chosen?.label}</b>
      </span>
    );
  }
  return (
    <>
      <label className="fold-first">
        ranked by{' '}
        <select
          className="fact-select"
          value={objective}
          onChange={(event) => {
            const next = objectives.find(({ value }) => value === event.target.value);
            if (next !== undefined) edit(rankBy(next.value));
          }}
        >
          {objectives.map(({ value, label }) => (
            <option key={value} value={value}>
              {label}
            </option>
          ))}
        </select>
      </label>
      {objective !== 'least-expected-infidelity' && bench !== undefined && (
        <PresentDials {...{ content, bench, standsAtDeg, edit }} />
      )}
    </>
  );
}

/** Readings with blanks between them; null where they can't be read or are too many or too few. */
function readDials(typed: string, count: number): number[] | null {
  const numbers = typed
    .trim()
    .split(/[\s;]+/)
    .map(parseTypedNumber);
  const read = numbers.flatMap((number) => (number.ok ? [number.value] : []));
  return read.length === count && numbers.length === count ? read : null;
}

/** Where the dials stand now: typed, taken from the stage, or not said. */
function PresentDials(props: {
  readonly content: DraftContent;
  readonly bench: Bench;
  readonly standsAtDeg: readonly number[] | null;
  readonly edit: (edit: DraftEdit) => void;
}) {
  const { content, bench, standsAtDeg, edit } = props;
  const { presentDialsDeg } = content;
  const [typed, setTyped] = useState<string | null>(null);
  const names = bench.plates.map(({ name }) => name).join(', ');
  const shown =
    presentDialsDeg === null
      ? null
      : bench.plates
          .map(({ mount }, plate) => formatDial(presentDialsDeg[plate] ?? 0, mount.resolutionDeg))
          .join(' ');
  if (typed === null) {
    return (
      <span>
        {shown === null ? (
          <button type="button" className="fact-button" onClick={() => setTyped('')}>
            say where the dials stand
          </button>
        ) : (
          <>
            dials stand at{' '}
            <button type="button" className="fact-button font-mono" onClick={() => setTyped(shown)}>
              {shown}
            </button>
          </>
        )}
        {standsAtDeg !== null && (
          <>
            {' '}
            <TextButton onClick={() => edit(standAt(standsAtDeg))}>take them from the stage</TextButton>
          </>
        )}
      </span>
    );
  }
  const read = readDials(typed, bench.plates.length);
  const fault = typed.trim() !== '' && read === null;
  // A ring that turns all the way round says 40 where somebody counts on to 400.
  const onItsRing = (dialDeg: number, plate: number): number =>
    (bench.plates[plate]?.mount.rangeDeg ?? null) === null ? wrap(dialDeg, 360) : dialDeg;
  const done = () => {
    if (fault) return;
    edit(standAt(typed.trim() === '' || read === null ? null : read.map(onItsRing)));
    setTyped(null);
  };
  return (
    <label>
      dials of {names} stand at{' '}
      <input
        type="text"
        inputMode="decimal"
        autoFocus
        className="fact-input font-mono"
        size={8 * bench.plates.length}
        aria-invalid={fault}
        aria-describedby="present-dials-fault"
        value={typed}
        onChange={(event) => setTyped(event.target.value)}
        onBlur={done}
        onKeyDown={(event) => {
          if (event.key === 'Enter') done();
          if (event.key === 'Escape') setTyped(null);
        }}
      />
      <span id="present-dials-fault" role="status" className="ml-2 font-strong text-fault">
        {fault && `Write ${bench.plates.length} readings with a blank between them, or nothing.`}
      </span>
    </label>
  );
}
