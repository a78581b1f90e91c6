import { useMemo, useState } from 'react';
import { type Convention, describeConvention } from '../../../../shared/optics/convention';
import { maxTargets, type ProtocolKind } from '../../../../shared/schemas/protocols';
import { Button } from '../../../components/Button';
import { Dialog } from '../../../components/Dialog';
import { SegmentedChoice } from '../../../components/SegmentedChoice';
import { Sphere, type SphereInput } from '../../../sphere';
import { labelsFor } from '../draft-edits';
import { CsvFields } from './CsvFields';
import { SetFields } from './SetFields';
import { firstChoice } from './target-set-choice';
import { useDrawnAlone } from '../../../lib/use-drawn-alone';
import { type FoundRow, roomFor, type RowsFrom, useFoundRows } from './use-found-rows';

interface AddRowsDialogProps {
  readonly kind: ProtocolKind;
  readonly convention: Convention;
  /** The rows that the protocol has. */
  readonly targets: readonly { readonly label: string }[];
  readonly onAdd: (rows: readonly FoundRow[]) => void;
  readonly onClose: () => void;
}

const shownProblems = 8;
const sphereHeightPx = 280;

/** Many rows at once: a set, or what was pasted or is in a file, looked at on the sphere before it is added. */
export function AddRowsDialog({ kind, convention, targets, onAdd, onClose }: AddRowsDialogProps) {
  const [from, setFrom] = useState<RowsFrom>('set');
  const [choice, setChoice] = useState(() => firstChoice(kind));
  const [text, setText] = useState('');
  const found = useFoundRows(from, choice, text, kind, convention);
  const scene = useMemo(
    (): SphereInput => ({ start: [1, 0, 0], plates: [], points: found.points, convention }),
    [found.points, convention],
  );
  // The dialog is there first; the drawing is a task of its own.
  const drawn = useDrawnAlone<SphereInput | null>(scene, null);
  const present = targets.length;
  const count = roomFor(found.rows.length, present);
  const relabelled = useMemo(() => relabelledWords(targets, found.rows), [targets, found.rows]);
  const unread = found.rows.length - found.points.length;
  return (
    <Dialog
      open
      wide
      question="Add many rows at once?"
      onClose={onClose}
      actions={
        <>
          <Button
            kind="filled"
            waitsFor={
              found.isBehind ? 'the text to be read' : count === 0 ? 'rows that can be added' : undefined
            }
            onClick={() => onAdd(found.rows.slice(0, count))}
          >
            Add {count === 1 ? '1 row' : `${count} rows`}
          </Button>
          {unread > 0 && unread < found.rows.length && (
            <Button onClick={() => onAdd(found.readable.slice(0, roomFor(found.readable.length, present)))}>
              Add only the {found.readable.length} that can be read
            </Button>
          )}
          <Button onClick={onClose}>Leave the table as it is</Button>
        </>
      }
    >
      <SegmentedChoice
        label="rows from"
        value={from}
        onChange={setFrom}
        segments={[
          { value: 'set', label: 'a set' },
          { value: 'text', label: 'text or a file' },
        ]}
      />
      <div className="grid gap-x-8 gap-y-4 md:grid-cols-2">
        <div className="min-w-0 space-y-3">
          {from === 'set' ? (
            <SetFields kind={kind} choice={choice} chosen={found.chosen} onChange={setChoice} />
          ) : (
            <CsvFields text={text} onText={setText} />
          )}
          <div role="status" className="space-y-1 text-s">
            {found.translatedFrom !== null && (
              <p className="m-0 font-strong">
                The text names {describeConvention(found.translatedFrom)}. Its rows are translated to your
                lab’s convention: the same light in your words.
              </p>
            )}
            {count < found.rows.length && (
              <p className="m-0 font-strong">
                A protocol has at most {maxTargets} rows: the first {count} fit.
              </p>
            )}
            {relabelled !== null && <p className="m-0 font-strong">{relabelled}</p>}
            {found.leftOut > 0 && (
              <p className="m-0 font-strong text-fault">
                {found.leftOut === 1 ? 'One line gives' : `${found.leftOut} lines give`} no row and will not
                be added.
              </p>
            )}
            {unread > 0 && (
              <p className="m-0 font-strong text-fault">
                {unread === 1 ? 'One row can’t' : `${unread} rows can’t`} be read. Added as typed, to be
                mended in the table.
              </p>
            )}
            {found.problems.slice(0, shownProblems).map(({ line, message }) => (
              <p key={`${line} ${message}`} className="m-0">
                Line {line}. {message}
              </p>
            ))}
            {found.problems.length > shownProblems && (
              <p className="m-0">And {found.problems.length - shownProblems} more lines like these.</p>
            )}
          </div>
        </div>
        <div className="min-w-0">
          <p className="m-0 mb-1 text-s text-ink-2">
            {kind === 'prepare' ? 'where they lie' : 'where each of them takes H'}
          </p>
          {drawn === null ? (
            <div style={{ height: sphereHeightPx }} />
          ) : (
            <Sphere input={drawn} height={sphereHeightPx} />
          )}
        </div>
      </div>
    </Dialog>
  );
}

const namedLabels = 3;

/** Which rows get another label than was written, since it is taken; null where none does. Empty labels are filled as always. */
function relabelledWords(targets: AddRowsDialogProps['targets'], rows: readonly FoundRow[]): string | null {
  const labels = labelsFor(targets, rows);
  const changed = rows.flatMap(({ label }, place) => {
    const given = labels[place];
    return label === '' || given === undefined || given === label ? [] : [`${label} becomes ${given}`];
  });
  if (changed.length === 0) return null;
  const more = changed.length - namedLabels;
  const rest = more > 0 ? ` and ${more} more` : '';
  const head = changed.length === 1 ? 'A label is' : `${changed.length} labels are`;
  return `${head} taken already: ${changed.slice(0, namedLabels).join(', ')}${rest}.`;
}
