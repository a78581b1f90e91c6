import type { Draft, DraftContent } from '../../../../shared/schemas/protocols';
import { Button } from '../../../components/Button';
import { Dialog } from '../../../components/Dialog';
import { formatMoment } from '../../../lib/format';

interface ConflictDialogProps {
  readonly mine: DraftContent;
  readonly theirs: Draft;
  readonly onKeepMine: () => void;
  readonly onTakeTheirs: () => void;
}

interface Difference {
  readonly what: string;
  readonly mine: string;
  readonly theirs: string;
}

const missing = '—';

/** What the two sides say differently, in the order of the page. */
export function differences(mine: DraftContent, theirs: DraftContent): Difference[] {
  const facts: Difference[] = [
    { what: 'name', mine: mine.name, theirs: theirs.name },
    { what: 'purpose', mine: mine.purpose, theirs: theirs.purpose },
    { what: 'tolerance', mine: String(mine.toleranceInfidelity), theirs: String(theirs.toleranceInfidelity) },
    { what: 'bench', mine: mine.benchId, theirs: theirs.benchId },
  ].filter((fact) => fact.mine !== fact.theirs);
  const ids = new Set([...mine.targets, ...theirs.targets].map(({ id }) => id));
  const rows = [...ids].flatMap((id): Difference[] => {
    const [one, other] = [mine, theirs].map(({ targets }) => targets.find((target) => target.id === id));
    const [text, otherText] = [one, other].map((target) =>
      target === undefined ? missing : `${target.label}: ${target.expression}`,
    );
    if (text === undefined || otherText === undefined || text === otherText) return [];
    return [{ what: `target ${one?.label ?? other?.label ?? ''}`, mine: text, theirs: otherText }];
  });
  return [...facts, ...rows];
}

/** Somebody else saved this draft meanwhile. Both sides are shown; nothing is overwritten until the person says which stands. */
export function ConflictDialog({ mine, theirs, onKeepMine, onTakeTheirs }: ConflictDialogProps) {
  const rows = differences(mine, theirs.content);
  return (
    <Dialog
      open
      question="Which draft stands?"
      onClose={onTakeTheirs}
      actions={
        <>
          <Button kind="filled" onClick={onTakeTheirs}>
            Take {theirs.savedBy}’s draft
          </Button>
          <Button onClick={onKeepMine}>Save mine over it</Button>
        </>
      }
    >
      <p>
        {theirs.savedBy} saved this draft {formatMoment(new Date(theirs.savedAt), new Date())}, while you were
        typing. After taking theirs, Ctrl+Z brings yours back.
      </p>
      {rows.length === 0 ? (
        <p>Both say the same, in another order.</p>
      ) : (
        <table className="mt-3 w-full text-left">
          <thead className="text-s text-ink-2">
            <tr>
              <th scope="col">what differs</th>
              <th scope="col">yours</th>
              <th scope="col">theirs</th>
            </tr>
          </thead>
          <tbody>
            {rows.map((row) => (
              <tr key={row.what + row.mine} className="border-t border-hair align-top">
                <th scope="row" className="py-1 pr-4 font-words">
                  {row.what}
                </th>
                <td className="py-1 pr-4 font-mono text-s">{row.mine}</td>
                <td className="py-1 font-mono text-s">{row.theirs}</td>
              </tr>
            ))}
          </tbody>
        </table>
      )}
    </Dialog>
  );
}
