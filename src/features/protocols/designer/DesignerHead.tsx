import { describeConvention } from '../../../../shared/optics/convention';
import type { Bench } from '../../../../shared/schemas/benches';
import type { Lab } from '../../../../shared/schemas/labs';
import type { DraftContent, VersionSummary } from '../../../../shared/schemas/protocols';
import { Button } from '../../../components/Button';
import { SaveState } from '../../../components/SaveState';
import { TextLink } from '../../../components/TextLink';
import { VersionSeal } from '../../../components/VersionSeal';
import { conventionsHref } from '../../conventions';
import { type DraftEdit, describePurpose, rename, setTolerance } from '../draft-edits';
import type { Saving } from '../use-draft';
import { RankedBy } from './RankedBy';
import type { HoldUp } from './row-view';
import { Tolerance } from './Tolerance';

interface DesignerHeadProps {
  readonly lab: Lab;
  readonly protocolId: string;
  readonly content: DraftContent;
  readonly latest: VersionSummary | null;
  readonly saving: Saving;
  readonly bench: Bench | undefined;
  readonly benches: readonly Bench[];
  readonly mayWrite: boolean;
  readonly maySave: boolean;
  readonly holdUp: HoldUp | null;
  readonly edit: (edit: DraftEdit) => void;
  /** The selected row's expression, to be looked at in other conventions; null while none can be read. */
  readonly lookedAt: string | null;
  /** What the stage's dials say, for “as on the stage”; null while nothing stands there. */
  readonly standsAtDeg: readonly number[] | null;
  readonly onChooseBench: (benchId: string) => void;
  readonly onSaveVersion: () => void;
}

/** What the protocol is, how safely it is kept, and what it is solved for. */
export function DesignerHead(props: DesignerHeadProps) {
  const { lab, protocolId, content, latest, saving, bench, benches, mayWrite, maySave, holdUp, edit } = props;
  const versionsHref = `/labs/${lab.id}/plan/${protocolId}/versions`;
  const next = (latest?.number ?? 0) + 1;
  return (
    <header className="designer-head">
      <VersionSeal state="draft" number={null} decorative />
      <div className="min-w-0">
        <div className="flex flex-wrap items-baseline gap-x-4">
          <h1 className="m-0 min-w-0 text-title">
            {mayWrite ? (
              <NameField name={content.name} onChange={(name) => edit(rename(name))} />
            ) : (
              content.name
            )}
          </h1>
          <p className="m-0 text-body text-ink-2">
            {latest === null ? (
              'draft before the first version'
            ) : (
              <>
                {content.kind === 'apply' && 'unitaries, '}draft after{' '}
                <TextLink to={`${versionsHref}/${latest.number}`}>version {latest.number}</TextLink>
              </>
            )}
            , <SavedWords saving={saving} />
          </p>
          {mayWrite ? (
            <input
              type="text"
              aria-label="Purpose, for whoever runs it"
              placeholder="purpose, for whoever runs it"
              className="purpose-input"
              maxLength={1000}
              value={content.purpose}
              onChange={(event) => edit(describePurpose(event.target.value))}
            />
          ) : (
            content.purpose !== '' && <p className="m-0 text-s text-ink-2">{content.purpose}</p>
          )}
        </div>
      </div>
      <div className="designer-facts">
        <BenchChoice {...{ bench, benches, mayWrite }} onChoose={props.onChooseBench} />
        <Tolerance
          value={content.toleranceInfidelity}
          mayWrite={mayWrite}
          onChange={(value) => edit(setTolerance(value))}
        />
        <RankedBy
          content={content}
          bench={bench}
          mayWrite={mayWrite}
          standsAtDeg={props.standsAtDeg}
          edit={edit}
        />
        <TextLink
          className="fact-convention fold-first"
          to={conventionsHref(
            content.kind === 'apply' ? 'unitary' : 'state',
            props.lookedAt ?? (content.kind === 'apply' ? 'hadamard' : 'L'),
            lab.convention,
          )}
        >
          {describeConvention(lab.convention)}
        </TextLink>
      </div>
      {maySave && (
        <div className="designer-save">
          <Button kind="filled" waitsFor={holdUp?.text} onClick={props.onSaveVersion}>
            Save version {next}
          </Button>
        </div>
      )}
      {maySave && (
        <p
          className={`designer-hold-up ${holdUp?.isFault === true ? 'font-strong text-fault' : 'text-ink-2'}`}
        >
          {holdUp?.text}
        </p>
      )}
    </header>
  );
}

/** What could not be saved says why; the rest is a word. */
function SavedWords({ saving }: { readonly saving: Saving }) {
  if (saving.state === 'saved') return <SaveState saving={{ kind: 'saved', at: new Date(saving.at) }} />;
  if (saving.state === 'typed') return <SaveState saving={{ kind: 'typed' }} />;
  return (
    <>
      <SaveState saving={{ kind: 'kept' }} />. <span className="text-fault">{saving.reason}</span>
    </>
  );
}

function NameField({ name, onChange }: { readonly name: string; readonly onChange: (name: string) => void }) {
  return (
    <input
      type="text"
      aria-label="Protocol’s name"
      className="title-input"
      size={Math.max(name.length, 8)}
      maxLength={80}
      value={name}
      onChange={(event) => onChange(event.target.value)}
    />
  );
}

interface BenchChoiceProps {
  readonly bench: Bench | undefined;
  readonly benches: readonly Bench[];
  readonly mayWrite: boolean;
  readonly onChoose: (benchId: string) => void;
}

function BenchChoice({ bench, benches, mayWrite, onChoose }: BenchChoiceProps) {
  const facts = bench === undefined ? '' : `, ${bench.wavelengthNm} nm, from ${bench.inputExpression}`;
  if (!mayWrite) return <span>{(bench?.name ?? 'no bench') + facts}</span>;
  const choices = benches.filter(({ retiredAt, id }) => retiredAt === null || id === bench?.id);
  return (
    <label>
      <span className="sr-only">Bench </span>
      <select
        className="fact-select"
        value={bench?.id ?? ''}
        onChange={(event) => onChoose(event.target.value)}
      >
        {bench === undefined && <option value="">choose a bench</option>}
        {choices.map(({ id, name }) => (
          <option key={id} value={id}>
            {name}
          </option>
        ))}
      </select>
      {facts}
    </label>
  );
}
