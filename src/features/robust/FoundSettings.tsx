import { BeamEmpty, BeamWorking, BeamWrong } from '../../components/BeamState';
import { SectionHead } from '../../components/SectionHead';
import { GapText } from '../../lib/GapText';
import type { RobustStudy } from '../../workers/robust-study';
import type { StudyState } from '../../workers/use-study';
import type { ListedSetting } from './design';
import { errorWords } from './design-words';
import type { AskedQuestion } from './robust-question';
import { SettingsTable } from './SettingsTable';

/** A question with its answer. */
export interface Answered {
  readonly asked: AskedQuestion;
  readonly study: RobustStudy;
}

interface FoundSettingsProps {
  readonly search: StudyState<'robust'>;
  /** Starts of the search that runs. */
  readonly starts: number;
  /** The last question that was answered; it stays readable while another is looked into. */
  readonly answered: Answered | null;
  /** Whether that is the question as it stands. */
  readonly isCurrent: boolean;
  readonly settings: readonly ListedSetting[];
  readonly selected: number | null;
  readonly onSelect: (number: number) => void;
  readonly onCancel: () => void;
}

/** How the search stands, and what it found. */
export function FoundSettings(props: FoundSettingsProps) {
  const { search, starts, answered, isCurrent, settings, selected, onSelect, onCancel } = props;
  return (
    <section aria-labelledby="found-head" className="mt-8">
      <SectionHead id="found-head" note={answered === null ? undefined : <FoundNote {...answered} />}>
        Settings
      </SectionHead>
      {search.state === 'idle' && answered === null && (
        <BeamEmpty className="mt-4" title="No search yet">
          Say what the plates are to make and against which error, then search. Published composites stand
          below.
        </BeamEmpty>
      )}
      {search.state === 'working' && (
        <BeamWorking
          className="mt-4"
          doing="Searching"
          unit="start"
          done={Math.floor(search.share * starts)}
          total={starts}
          onCancel={onCancel}
        />
      )}
      {search.state === 'failed' && (
        <BeamWrong className="mt-4" title="The search stopped">
          {search.sentence}
        </BeamWrong>
      )}
      <div role="status">
        {answered !== null && !isCurrent && search.state !== 'working' && (
          <p className="mt-2 font-strong">The question has changed since: this answers the one before.</p>
        )}
        {answered !== null && <OutOfReach {...answered} found={settings.length} />}
      </div>
      {answered !== null && settings.length === 0 && (
        <BeamEmpty className="mt-4" title="No setting of these plates does better than the plain one">
          More starts may find one; another plate, or another range, more often does.
        </BeamEmpty>
      )}
      {answered !== null && settings.length > 0 && (
        <div className="mt-2">
          <SettingsTable
            settings={settings}
            plates={answered.asked.plates}
            plainAverage={answered.study.found.plain?.averageInfidelity ?? 0}
            range={rangeWords(answered.asked)}
            selected={selected}
            onSelect={onSelect}
          />
        </div>
      )}
    </section>
  );
}

function rangeWords({ question, error }: AskedQuestion): string {
  return `±${errorWords(question.problem.width, error)}`;
}

function OutOfReach({ asked, study, found }: Answered & { readonly found: number }) {
  const { shortfallDeg } = study.plain;
  if (!(shortfallDeg > 0)) return null;
  return (
    <p className="mt-2">
      <span className="font-strong">
        The goal is out of reach of these plates by {shortfallDeg.toFixed(2)}°
      </span>{' '}
      {asked.reading.kind === 'state' ? 'on the sphere' : 'of a turn'}
      {found > 0 ? '; these settings only keep 1 − F lower over the range.' : '.'}
    </p>
  );
}

function FoundNote({ asked, study }: Answered) {
  const { starts, seed } = asked.question.problem;
  const plates =
    asked.benchName === null
      ? asked.plates.map(({ retardanceDeg }) => `${retardanceDeg}°`).join(', ')
      : `the ${asked.benchName}’s plates`;
  const count = study.found.settings.length;
  return (
    <>
      {count === 0 ? 'no setting' : count === 1 ? '1 setting' : `${count} settings`} for {asked.source} with{' '}
      {plates}, <GapText text={rangeWords(asked)} />; {starts === 1 ? '1 start' : `${starts} starts`} from
      seed {seed}
    </>
  );
}
