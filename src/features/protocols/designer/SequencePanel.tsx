import { useEffect, useMemo, useState } from 'react';
import type { SequencePlan, SequenceProblem } from '../../../../shared/optics/sequence';
import { mountMotion } from '../../../../shared/protocol/choose-solutions';
import { targetPlates } from '../../../../shared/protocol/solving-plates';
import type { Bench } from '../../../../shared/schemas/benches';
import type { DraftContent } from '../../../../shared/schemas/protocols';
import { BeamWorking } from '../../../components/BeamState';
import { Button } from '../../../components/Button';
import { SegmentedChoice } from '../../../components/SegmentedChoice';
import { TextButton } from '../../../components/TextLink';
import { useStudy } from '../../../workers/use-study';
import { type DraftEdit, takeHeld, takeOrder } from '../draft-edits';
import type { RowView } from './row-view';
import { SequenceAnswer } from './SequenceAnswer';

interface SequencePanelProps {
  readonly content: DraftContent;
  readonly bench: Bench;
  readonly views: readonly RowView[];
  readonly mayWrite: boolean;
  /** Takes a plan, with what is said of it at the foot. */
  readonly onTake: (edit: DraftEdit, words: string) => void;
}

type Solved = Extract<RowView, { status: 'solved' }>;

/** All rows as a list to be turned through; null while one can't be read or is still being solved. */
function useSequenceProblem(
  { content, bench, views }: Pick<SequencePanelProps, 'content' | 'bench' | 'views'>,
  cost: 'travel' | 'time',
  moves: 'one-by-one' | 'together',
): SequenceProblem | null {
  const solved = useMemo(
    () => views.filter((view): view is Solved => view.status === 'solved' && !view.stale),
    [views],
  );
  return useMemo(() => {
    if (solved.length < 2 || solved.length !== views.length) return null;
    return {
      mounts: targetPlates(bench.plates, bench).map(mountMotion),
      rows: solved.map((view) => ({
        branches: view.solved.solutions.map(({ fastAxesDeg }) => fastAxesDeg),
        held: view.held ? view.chosen : null,
      })),
      startDialsDeg: content.presentDialsDeg?.length === bench.plates.length ? content.presentDialsDeg : null,
      cost,
      moves,
    };
  }, [solved, views.length, bench, content.presentDialsDeg, cost, moves]);
}

/** How far the plates turn down the whole list, what the best choice of solutions saves, and what another order would. */
export function SequencePanel(props: SequencePanelProps) {
  const [open, setOpen] = useState(false);
  return (
    <section aria-labelledby="sequence-head" className="mt-6 border-t-[1.5px] border-ink pt-2">
      <h2 id="sequence-head" className="m-0 text-body font-section">
        Turning down the list
      </h2>
      {open ? (
        <SequencePlanner {...props} />
      ) : (
        <p className="mt-1 mb-0 text-s">
          <TextButton onClick={() => setOpen(true)}>
            Plan the least travel or time, or another order
          </TextButton>
        </p>
      )}
    </section>
  );
}

function SequencePlanner(props: SequencePanelProps) {
  const { content, bench, mayWrite, onTake } = props;
  const [cost, setCost] = useState<'travel' | 'time'>('travel');
  const [moves, setMoves] = useState<'one-by-one' | 'together'>('one-by-one');
  const problem = useSequenceProblem(props, cost, moves);
  const { study, start, cancel } = useStudy('sequence');
  // A plan of other rows would stand under these.
  useEffect(() => cancel, [problem, cancel]);
  const speedsKnown = bench.plates.every(({ mount }) => mount.speedDegPerS !== null);
  const ask = (withOrders: boolean) => {
    if (problem !== null) start({ kind: 'sequence', problem, reorder: withOrders });
  };
  return (
    <>
      <div className="mt-2 flex flex-wrap items-end gap-x-6 gap-y-3">
        <SegmentedChoice
          label="make least"
          value={cost}
          onChange={setCost}
          disabled={!speedsKnown}
          segments={[
            { value: 'travel', label: 'travel' },
            { value: 'time', label: 'time' },
          ]}
        />
        <SegmentedChoice
          label="the mounts turn"
          value={moves}
          onChange={setMoves}
          segments={[
            { value: 'one-by-one', label: 'one by one' },
            { value: 'together', label: 'together' },
          ]}
        />
        <Button waitsFor={problem === null ? 'every row to be solved' : undefined} onClick={() => ask(false)}>
          Plan this order
        </Button>
        <Button waitsFor={problem === null ? 'every row to be solved' : undefined} onClick={() => ask(true)}>
          Try other orders too
        </Button>
      </div>
      {!speedsKnown && (
        <p className="mt-1 mb-0 text-s text-ink-2">
          Time needs every mount’s speed: write it with the plate in the cabinet.
        </p>
      )}
      {study.state === 'working' && (
        <div className="mt-3">
          <BeamWorking doing="Planning" unit="per cent" done={Math.round(study.share * 100)} total={100}>
            <TextButton onClick={cancel}>Cancel the planning</TextButton>
          </BeamWorking>
        </div>
      )}
      {study.state === 'failed' && (
        <p role="alert" className="mt-3 mb-0 font-strong text-fault">
          {study.sentence}
        </p>
      )}
      {study.state === 'done' && (
        <SequenceAnswer
          {...study.result}
          cost={problem?.cost ?? cost}
          labels={content.targets.map(({ label }) => label)}
          ranked={content.objective === 'least-travel'}
          take={
            mayWrite && problem !== null
              ? (order, plan) => onTake(taken(content, problem, order, plan), takenWords(problem, order))
              : null
          }
        />
      )}
    </>
  );
}

/** A plan by travel is what the objective makes of the list by itself; one by time has to be held row by row. */
function taken(
  content: DraftContent,
  { cost, rows }: SequenceProblem,
  order: readonly number[],
  plan: SequencePlan,
): DraftEdit {
  const ids = order.flatMap((place) => content.targets[place]?.id ?? []);
  if (cost === 'travel') return takeOrder(ids);
  return takeHeld(
    ids.map((id, step) => ({
      id,
      fastAxesDeg: rows[order[step] ?? 0]?.branches[plan.choices[step] ?? 0] ?? null,
    })),
  );
}

function takenWords({ cost }: SequenceProblem, order: readonly number[]): string {
  const moves = order.some((place, index) => place !== index);
  const rows = moves ? 'The rows stand in the planned order' : 'The rows keep their order';
  return cost === 'travel' ? `${rows}, ranked by least travel.` : `${rows}, with the planned solutions held.`;
}
