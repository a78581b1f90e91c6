import type { Bench } from '../../../../shared/schemas/benches';
import type { Draft, DraftContent, DraftTarget } from '../../../../shared/schemas/protocols';
import { Button } from '../../../components/Button';
import { Dialog } from '../../../components/Dialog';
import { formatMoment } from '../../../lib/format';

interface ConflictDialogProps {
  readonly mine: DraftContent;
  readonly theirs: Draft;
  readonly benches: readonly Bench[];
  /** The lab's convention changed meanwhile: what was typed under the old one can't be saved over the translated rows. */
  readonly conventionChanged: boolean;
  readonly onKeepMine: () => void;
  readonly onTakeTheirs: () => void;
}

interface Difference {
  readonly id: string;
  readonly what: string;
  readonly mine: string;
  readonly theirs: string;
}

const missing = '—';

function targetText(target: DraftTarget | undefined): string {
  if (target === undefined) return missing;
  const held = target.heldFastAxesDeg?.map((angle) => `${angle.toFixed(2)}°`).join(', ');
  return `${target.label}: ${target.expression}${held === undefined ? '' : `, held at θ ${held}`}`;
}

/** What the two sides say differently, in the order of the page. */
export function differences(
  mine: DraftContent,
  theirs: DraftContent,
  benches: readonly Bench[],
): Difference[] {
  const benchName = (benchId: string) => benches.find(({ id }) => id === benchId)?.name ?? missing;
  const order = ({ targets }: DraftContent) => targets.map(({ label }) => label).join(', ');
  const facts: Difference[] = [
    { id: 'name', what: 'name', mine: mine.name, theirs: theirs.name },
    { id: 'purpose', what: 'purpose', mine: mine.purpose, theirs: theirs.purpose },
    {
      id: 'tolerance',
      what: 'tolerance',
      mine: String(mine.toleranceInfidelity),
      theirs: String(theirs.toleranceInfidelity),
    },
    { id: 'bench', what: 'bench', mine: benchName(mine.benchId), theirs: benchName(theirs.benchId) },
    { id: 'order', what: 'rows in order', mine: order(mine), theirs: order(theirs) },
  ];
  const ids = [...new Set([...mine.targets, ...theirs.targets].map(({ id }) => id))];
  const rows = ids.map((id): Difference => {
    const one = mine.targets.find((target) => target.id === id);
    const other = theirs.targets.find((target) => target.id === id);
    const label = one?.label ?? other?.label ?? '';
    return { id, what: `target ${label}`, mine: targetText(one), theirs: targetText(other) };
  });
  return [...facts, ...rows].filter((difference) => difference.mine !== difference.theirs);
}

/** Somebody else saved this draft meanwhile. Both sides are shown; nothing is overwritten until the person says which stands. */
export function ConflictDialog(props: ConflictDialogProps) {
  const { mine, theirs, benches, conventionChanged, onKeepMine, onTakeTheirs } = props;
  const rows = differences(mine, theirs.content, benches);
  return (
    <Dialog
      open
      question="Which draft stands?"
      // Esc decides nothing here: one of the two has to stand before anything else can be typed.
      onClose={() => undefined}
      actions={
        <>
          <Button kind="filled" onClick={onTakeTheirs}>
            Take {theirs.savedBy}’s draft
          </Button>
          <Button
            waitsFor={conventionChanged ? 'you to write it again in the lab’s new convention' : undefined}
            onClick={onKeepMine}
          >
            Save mine over it
          </Button>
        </>
      }
    >
      <p>
        {theirs.savedBy} saved this draft {formatMoment(new Date(theirs.savedAt), new Date())}, while you were
        typing.{' '}
        {conventionChanged
          ? 'The lab’s convention changed meanwhile, and theirs is written in the new one: the same letters of yours would now mean other light.'
          : 'After taking theirs, Ctrl+Z brings yours back.'}
      </p>
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
            <tr key={row.id} className="border-t border-hair align-top">
              <th scope="row" className="py-1 pr-4 font-words">
                {row.what}
              </th>
              <td className="py-1 pr-4 font-mono text-s">{row.mine}</td>
              <td className="py-1 font-mono text-s">{row.theirs}</td>
            </tr>
          ))}
        </tbody>
      </table>
    </Dialog>
  );
}
