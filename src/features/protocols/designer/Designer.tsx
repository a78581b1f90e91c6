import { startTransition, useEffect, useRef, useState } from 'react';
import { notReadySentences } from '../../../../shared/bench-ready';
import { sameConvention } from '../../../../shared/optics/convention';
import type { Bench } from '../../../../shared/schemas/benches';
import type { Protocol } from '../../../../shared/schemas/protocols';
import { BeamEmpty, BeamWorking, BeamWrong } from '../../../components/BeamState';
import { KeyList } from '../../../components/KeyList';
import { TextButton, TextLink } from '../../../components/TextLink';
import { UndoSentence } from '../../../components/UndoSentence';
import { useLab } from '../../labs';
import { addRows, chooseBench, newTargets, writeExpression } from '../draft-edits';
import { AddRowsDialog } from '../rows/AddRowsDialog';
import { useDraft } from '../use-draft';
import { drawAlone } from '../../../lib/draw-in-turn';
import { useDrawnAlone } from '../../../lib/use-drawn-alone';
import { useSolvedRows } from '../use-solved-rows';
import { BenchWaits } from './BenchWaits';
import { BudgetSection } from './BudgetSection';
import { CalibratedElsewhere } from './CalibratedElsewhere';
import { ConflictDialog } from './ConflictDialog';
import { DesignerHead } from './DesignerHead';
import { rowRisks } from './dialled-problem';
import { shownSolutions, whatHoldsUp } from './row-view';
import { SaveRows } from './SaveRows';
import { SaveVersionDialog } from './SaveVersionDialog';
import { SelectedFigures } from './SelectedFigures';
import { SequencePanel } from './SequencePanel';
import { SelectedStage } from './SelectedStage';
import { TargetsSection } from './TargetsSection';
import { useDesignerCommands } from './use-designer-commands';
import { useLooked } from './use-looked';
import { useRowViews } from './use-row-views';
import { useUndoSentence } from './use-undo-sentence';
import { VocabularyDialog } from './VocabularyDialog';
import { useDesignerView } from './view-store';
import './designer.css';

const emptyWords = {
  prepare: 'Write a state in the row above, like |D> or (H + i V)/sqrt(2).',
  apply: 'Write a unitary in the row above, like hadamard or rotate(x, 90deg).',
} as const;

const noPlates: Bench['plates'] = [];

interface DesignerProps {
  readonly protocol: Protocol;
  readonly benches: readonly Bench[];
}

/** The designer: every keystroke is read, solved and drawn; the draft saves itself; a version is saved by hand. */
export function Designer({ protocol, benches }: DesignerProps) {
  const { lab, user, may } = useLab();
  const mayWrite = may('protocols.write');
  const draft = useDraft(lab.id, user.id, protocol, mayWrite);
  const [saving, setSaving] = useState(false);
  const [asking, setAsking] = useState<'rows' | 'words' | null>(null);
  const [writtenIn, setWrittenIn] = useState(lab.convention);
  const { selectedId, select, turnByHand, handDialsDeg } = useDesignerView();

  const findField = useRef<HTMLInputElement>(null);

  const { content } = draft;
  const bench = benches.find(({ id }) => id === content.benchId);
  // A beam that lacks a plate is not solved for: half of it would make other light.
  const waits = bench === undefined ? [] : notReadySentences(bench, 'preparation');
  const solvable = bench === undefined || waits.length > 0 ? null : bench;
  const solved = useSolvedRows(content.targets, solvable, lab.convention, content);
  const views = useRowViews(content.targets, solved.rows);
  // Turned by hand were other plates.
  const benchPlates = bench?.plates.map(({ id }) => id).join();
  useEffect(() => turnByHand(null), [benchPlates, turnByHand]);
  const commands = useDesignerCommands({
    draft,
    views,
    mayWrite,
    onFind: () => findField.current?.select(),
  });
  const undoable = useUndoSentence(content);

  // Some row is always looked at: the first, until a person chooses another.
  const place = content.targets.findIndex(({ id }) => id === selectedId);
  const first = content.targets[0]?.id ?? null;
  useEffect(() => {
    if (place < 0 && first !== selectedId) select(first);
  }, [place, first, selectedId, select]);

  const target = content.targets[place];
  const view = views[place];
  const looked = useLooked({ content, bench, convention: lab.convention, target, view });
  // The row is lit at once; the stage, the figures and the budget follow one after the other, each in a frame of its own.
  const staged = useDrawnAlone(looked);
  const drawn = useDrawnAlone(staged);
  const weighed = useDrawnAlone(drawn);

  return (
    <>
      <DesignerHead
        lab={lab}
        protocolId={protocol.id}
        content={content}
        latest={protocol.latestVersion}
        saving={draft.saving}
        bench={bench}
        benches={benches}
        mayWrite={mayWrite}
        maySave={may('versions.save')}
        holdUp={
          waits[0] !== undefined
            ? { text: `${bench?.name ?? 'The bench'} waits for a plate.`, isFault: true }
            : solved.planFault === null
              ? whatHoldsUp(content.targets, views)
              : { text: solved.planFault, isFault: true }
        }
        edit={draft.edit}
        lookedAt={looked?.target.expression ?? null}
        standsAtDeg={looked === null ? null : (handDialsDeg ?? looked.view.solution.dialsDeg)}
        onChooseBench={(benchId) => {
          turnByHand(null);
          draft.edit(chooseBench(benchId));
        }}
        onSaveVersion={() => setSaving(true)}
      />
      {bench === undefined && (
        <BeamWrong title="The bench of this draft is not there">
          Choose another one above; the targets stay as they are.{' '}
          <TextLink to={`/labs/${lab.id}/bench`}>See the benches</TextLink>
        </BeamWrong>
      )}
      {bench !== undefined && waits.length > 0 && <BenchWaits bench={bench} sentences={waits} />}
      {bench !== undefined && <CalibratedElsewhere bench={bench} looked={looked} />}
      {solved.benchFault !== null && (
        <BeamWrong title="The rows can’t be solved">{solved.benchFault}</BeamWrong>
      )}
      {solved.planFault !== null && (
        <BeamWrong title="The least travel can’t be planned">{solved.planFault}</BeamWrong>
      )}
      {staged === null && target !== undefined && <div className="stage-waits" />}
      {staged !== null && (
        <SelectedStage
          {...staged}
          toleranceInfidelity={content.toleranceInfidelity}
          convention={lab.convention}
        />
      )}
      <div className="designer-body">
        <div className="min-w-0">
          <TargetsSection
            targets={content.targets}
            views={views}
            kind={content.kind}
            plates={bench?.plates ?? noPlates}
            toleranceInfidelity={content.toleranceInfidelity}
            mayWrite={mayWrite}
            edit={draft.edit}
            onAskWords={() => setAsking('words')}
            findField={findField}
          >
            {mayWrite && (
              <>
                <TextButton onClick={() => startTransition(() => setAsking('rows'))}>
                  Add a set, or rows from text or a file
                </TextButton>
                <TextButton onClick={() => setAsking('words')}>What can be written</TextButton>
              </>
            )}
            {content.targets.length > 0 && <SaveRows content={content} convention={lab.convention} />}
          </TargetsSection>
          {solved.progress !== null && (
            <BeamWorking doing="Solving" unit="row" done={solved.progress.done} total={solved.progress.total}>
              The rows done already can be read.
            </BeamWorking>
          )}
          {content.targets.length === 0 && (
            <BeamEmpty title="No targets yet">
              {mayWrite ? emptyWords[content.kind] : 'Its writer has only begun.'}
            </BeamEmpty>
          )}
          {weighed !== null && (
            <BudgetSection
              label={weighed.target.label}
              bench={weighed.bench}
              content={content}
              convention={lab.convention}
              view={weighed.view}
            />
          )}
          {bench !== undefined && content.targets.length > 1 && (
            <SequencePanel
              {...{ content, bench, views, mayWrite }}
              onTake={(edit, words) => {
                undoable.say(words);
                draft.edit(edit);
              }}
            />
          )}
        </div>
        {drawn !== null && <SelectedFigures {...drawn} convention={lab.convention} />}
      </div>
      {undoable.done !== null && (
        <UndoSentence sentence={undoable.done} onUndo={draft.undo} onGone={undoable.forget} />
      )}
      <KeyList commands={commands} />
      {asking === 'rows' && (
        <AddRowsDialog
          kind={content.kind}
          convention={lab.convention}
          targets={content.targets}
          onAdd={(rows) => {
            setAsking(null);
            // The page without the dialog first; two hundred rows follow, in slices.
            drawAlone(() => startTransition(() => draft.edit(addRows(newTargets(content.targets, rows)))));
          }}
          onClose={() => setAsking(null)}
        />
      )}
      {asking === 'words' && (
        <VocabularyDialog
          mode={content.kind === 'apply' ? 'unitary' : 'state'}
          onUse={
            mayWrite && target !== undefined
              ? (example) => {
                  draft.edit(writeExpression(target.id, example));
                  setAsking(null);
                }
              : null
          }
          onClose={() => setAsking(null)}
        />
      )}
      {saving && (
        <SaveVersionDialog
          labId={lab.id}
          protocolId={protocol.id}
          number={(protocol.latestVersion?.number ?? 0) + 1}
          revision={draft.revision}
          draftIsSaved={draft.saving.state === 'saved'}
          shown={shownSolutions(content.targets, views)}
          risks={bench === undefined ? [] : rowRisks(bench, lab.convention, content, views)}
          onClose={() => setSaving(false)}
        />
      )}
      {draft.conflict !== null && (
        <ConflictDialog
          mine={content}
          theirs={draft.conflict}
          benches={benches}
          conventionChanged={!sameConvention(writtenIn, lab.convention)}
          onKeepMine={draft.keepMine}
          onTakeTheirs={() => {
            draft.takeTheirs();
            setWrittenIn(lab.convention);
          }}
        />
      )}
    </>
  );
}
