import { wrap } from '../../../../shared/optics/units';
import type { Bench } from '../../../../shared/schemas/benches';
import type { DraftContent, Objective } from '../../../../shared/schemas/protocols';
import { TextButton } from '../../../components/TextLink';
import { formatDial, parseTypedNumber } from '../../../lib/format';
import { type DraftEdit, rankBy, standAt } from '../draft-edits';
import { FactField } from './FactField';

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
  const { plates } = bench;
  const shown =
    presentDialsDeg === null
      ? null
      : plates
          .map(({ mount }, plate) => formatDial(presentDialsDeg[plate] ?? 0, mount.resolutionDeg))
          .join(' ');
  // A ring that turns all the way round says 40 where somebody counts on to 400.
  const onItsRing = (dialDeg: number, plate: number): number =>
    (plates[plate]?.mount.rangeDeg ?? null) === null ? wrap(dialDeg, 360) : dialDeg;
  return (
    <FactField
      before={shown === null ? null : 'dials stand at '}
      fact={shown ?? 'say where the dials stand'}
      isMono={shown !== null}
      after={
        standsAtDeg !== null && (
          <>
            {' '}
            <TextButton onClick={() => edit(standAt(standsAtDeg))}>take them from the stage</TextButton>
          </>
        )
      }
      label={`dials of ${plates.map(({ name }) => name).join(', ')} stand at`}
      start={shown ?? ''}
      size={8 * plates.length}
      faultOf={(typed) =>
        typed.trim() !== '' && readDials(typed, plates.length) === null
          ? `Write ${plates.length} readings with a blank between them, or nothing.`
          : null
      }
      onDone={(typed) => edit(standAt(readDials(typed, plates.length)?.map(onItsRing) ?? null))}
    />
  );
}
