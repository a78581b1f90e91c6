import { useEffect, useState } from 'react';
import { sameConvention } from '../../../../shared/optics/convention';
import { parseState } from '../../../../shared/optics/expression';
import type { Bench } from '../../../../shared/schemas/benches';
import type { Protocol } from '../../../../shared/schemas/protocols';
import { BeamEmpty, BeamWorking, BeamWrong } from '../../../components/BeamState';
import { KeyList } from '../../../components/KeyList';
import { TextLink } from '../../../components/TextLink';
import { UndoSentence } from '../../../components/UndoSentence';
import { useLab } from '../../labs';
import { chooseBench } from '../draft-edits';
import { useDraft } from '../use-draft';
import { useSolvedRows } from '../use-solved-rows';
import { CalibratedElsewhere } from './CalibratedElsewhere';
import { ConflictDialog } from './ConflictDialog';
import { DesignerHead } from './DesignerHead';
import { lightOf } from './followed-light';
import { Limits } from './Limits';
import { shownSolutions, viewOf, whatHoldsUp } from './row-view';
import { SaveVersionDialog } from './SaveVersionDialog';
import { SelectedFigures } from './SelectedFigures';
import { SelectedStage } from './SelectedStage';
import { TargetsTable } from './TargetsTable';
import { useDesignerCommands } from './use-designer-commands';
import { useRemovedRow } from './use-removed-row';
import { useDesignerView } from './view-store';
import './designer.css';

const emptyWords = {
  prepare: 'Write a state in the row above, like |D> or (H + i V)/sqrt(2).',
  apply: 'Write a unitary in the row above, like hadamard or rotate(x, 90deg).',
} as const;

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
  const [writtenIn, setWrittenIn] = useState(lab.convention);
  const { selectedId, select, listSolutions, turnByHand, followed, handDialsDeg } = useDesignerView();

  const { content } = draft;
  const bench = benches.find(({ id }) => id === content.benchId);
  const solved = useSolvedRows(content.targets, bench ?? null, lab.convention, content);
  const views = content.targets.map((target) => viewOf(target, solved.rows.get(target.id)));
  const commands = useDesignerCommands({ draft, views, mayWrite });
  const removed = useRemovedRow(content);

  // Some row is always looked at: the first, until a person chooses another.
  const place = content.targets.findIndex(({ id }) => id === selectedId);
  const first = content.targets[0]?.id ?? null;
  useEffect(() => {
    if (place < 0 && first !== selectedId) select(first);
  }, [place, first, selectedId, select]);

  const target = content.targets[place];
  const view = views[place];
  const input = bench === undefined ? null : parseState(bench.inputExpression, lab.convention);
  const looked =
    bench !== undefined && input?.ok === true && target !== undefined && view?.status === 'solved'
      ? {
          bench,
          input: content.kind === 'apply' ? lightOf(followed, lab.convention) : input.stokes,
          followed: content.kind === 'apply' ? followed : null,
          target,
          view,
        }
      : null;

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
        holdUp={whatHoldsUp(content.targets, views)}
        edit={draft.edit}
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
      {bench !== undefined && <CalibratedElsewhere bench={bench} />}
      {solved.benchFault !== null && (
        <BeamWrong title="The rows can’t be solved">{solved.benchFault}</BeamWrong>
      )}
      {looked === null && target !== undefined && <div className="stage-waits" />}
      {looked !== null && (
        <SelectedStage
          {...looked}
          toleranceInfidelity={content.toleranceInfidelity}
          convention={lab.convention}
          onListSolutions={() => listSolutions(looked.target.id)}
        />
      )}
      <div className="designer-body">
        <div className="min-w-0">
          <div className="targets-scroll" tabIndex={0} role="region" aria-label="Targets, scrolls sideways">
            <TargetsTable
              targets={content.targets}
              views={views}
              kind={content.kind}
              plates={bench?.plates ?? []}
              toleranceInfidelity={content.toleranceInfidelity}
              mayWrite={mayWrite}
              edit={draft.edit}
            />
          </div>
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
          {looked !== null && (
            <Limits
              label={looked.target.label}
              solution={looked.view.solution}
              plates={looked.bench.plates}
            />
          )}
        </div>
        {looked !== null && <SelectedFigures {...looked} convention={lab.convention} />}
      </div>
      {removed.row !== null && (
        <UndoSentence
          key={removed.row.id}
          sentence={removed.row.text}
          onUndo={draft.undo}
          onGone={removed.forget}
        />
      )}
      <KeyList commands={commands} />
      {saving && (
        <SaveVersionDialog
          labId={lab.id}
          protocolId={protocol.id}
          number={(protocol.latestVersion?.number ?? 0) + 1}
          revision={draft.revision}
          draftIsSaved={draft.saving.state === 'saved'}
          shown={shownSolutions(content.targets, views)}
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
