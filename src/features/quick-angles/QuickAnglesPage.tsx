import { skipToken, useQuery } from '@tanstack/react-query';
import { useDeferredValue, useMemo, useState } from 'react';
import { useSearchParams } from 'react-router-dom';
import { type Convention, CONVENTION_SETS, DEFAULT_CONVENTION } from '../../../shared/optics';
import type { Bench } from '../../../shared/schemas/benches';
import { ExpressionField } from '../../components/ExpressionField';
import { SegmentedChoice } from '../../components/SegmentedChoice';
import { SelectField } from '../../components/SelectField';
import { benchesQuery, benchLabel, WaitsForPlates, waitsForPlates } from '../benches';
import { flagWords } from '../conventions';
import { labQuery } from '../labs';
import { sessionQuery } from '../session';
import { Dials, type NamedPlate } from './Dials';
import { idealPlatesFor } from './ideal-plates';
import type { Question } from './question';
import { type QuickSettings, readQuick } from './quick-settings';
import { SameLight } from './SameLight';
import { StateRead } from './StateRead';
import { UnitaryRead } from './UnitaryRead';
import { type QuickJob, useQuickSettings } from './use-quick-settings';

function idealPlates(question: Question): readonly NamedPlate[] {
  return idealPlatesFor(question).plates.map((plate) => {
    const half = plate.calibration.retardanceDeg === 180;
    return { name: half ? 'half-wave' : 'quarter-wave', kind: half ? 'half' : 'quarter', plate };
  });
}

const questions: readonly { readonly value: Question; readonly label: string }[] = [
  { value: 'prepare', label: 'make a state' },
  { value: 'analyse', label: 'measure a state' },
  { value: 'apply', label: 'be a unitary' },
];

const helpWords = {
  prepare:
    'A name (H V D A L R), a sum like (H + i V)/sqrt(2), a column [1, i], or bloch, stokes, ellipse, linear.',
  analyse: 'The state that passes the plates and a polariser at H; its opposite is blocked.',
  apply:
    'A gate (X Y Z S T hadamard), rotate(x, 90deg), zyz(…), matrix [[a, b], [c, d]], from A to B, or a product.',
} as const;

const idealWords = {
  prepare:
    'Level light in, a half-wave plate, then a quarter-wave plate, as exact as no plate is. Angles of the fast axes, counter-clockwise from level as the receiver sees them.',
  analyse:
    'The light meets a half-wave plate, then a quarter-wave plate, then a polariser that passes level light; the plates as exact as no plate is.',
  apply: 'A quarter-, a half- and a quarter-wave plate in this order, as exact as no plate is.',
} as const;

/** Fewer plates than this reach next to nothing of it: such a bench is there to choose, but not to begin with. */
const fewest = { prepare: 2, analyse: 2, apply: 3 } as const;

/** Where a first visit begins, for each question. */
const begins = {
  prepare: 'ellipse(30deg, 20deg)',
  analyse: 'ellipse(30deg, 20deg)',
  apply: 'hadamard',
} as const;

function questionOf(text: string | null): Question {
  return questions.find(({ value }) => value === text)?.value ?? 'prepare';
}

function namedPlates(bench: Bench): readonly NamedPlate[] {
  return bench.plates.map((plate) => ({ name: plate.name, kind: plate.kind, plate }));
}

/** What the first of a person's labs brings to this page: its convention and its benches. Nothing for a stranger. */
function useOwnLab(): {
  readonly labId: string | null;
  readonly convention: Convention | null;
  readonly benches: readonly Bench[];
} {
  const { data: session } = useQuery(sessionQuery);
  const labId = session?.labs[0]?.id;
  const lab = useQuery({
    ...labQuery(labId ?? ''),
    ...(labId === undefined ? { queryFn: skipToken } : {}),
  });
  const benches = useQuery({
    ...benchesQuery(labId ?? ''),
    ...(labId === undefined ? { queryFn: skipToken } : {}),
  });
  return {
    labId: labId ?? null,
    convention: lab.data?.convention ?? null,
    // Not before the lab: without its convention nothing says what light goes into its benches.
    benches:
      (lab.data === undefined ? undefined : benches.data)?.items.filter(
        ({ retiredAt }) => retiredAt === null,
      ) ?? [],
  };
}

/** A question with what its answer is drawn with, so that it can stand until the next one is there. */
interface Asked extends QuickJob {
  readonly plates: readonly NamedPlate[];
  readonly key: string;
}

function lateWords(shown: Asked | null): string {
  return shown === null
    ? 'They are being worked out.'
    : `These are still for ${shown.written.expression.trim()}; the new ones are being worked out.`;
}

function Answer({ asked, settings }: { readonly asked: Asked; readonly settings: QuickSettings }) {
  const { question } = asked.written;
  const ideal = asked.quick === null;
  return (
    <>
      {settings.ok ? (
        <Dials
          key={asked.key}
          solved={settings.solved}
          plates={asked.plates}
          ideal={ideal}
          idealInfidelityHere={settings.idealInfidelityHere}
        />
      ) : (
        <p className="mt-3">{settings.sentence}</p>
      )}
      {ideal && <p className="text-s text-ink-2 mt-3">{idealWords[question]}</p>}
      {!ideal && question === 'analyse' && (
        <p className="text-s text-ink-2 mt-3">
          The light meets these plates in beam order, then a polariser that passes level light. That polariser
          is taken as exact: the bench’s own polariser makes its input and has no part in this.
        </p>
      )}
    </>
  );
}

/** Angles for one state, with ideal plates or one's own, and how others write the same light. Nothing here is kept. */
export function Component() {
  const [search] = useSearchParams();
  const [question, setQuestion] = useState(() => questionOf(search.get('for')));
  const [typed, setTyped] = useState<Readonly<Record<Question, string>>>({
    ...begins,
    [questionOf(search.get('for'))]: search.get('state') ?? begins[questionOf(search.get('for'))],
  });
  const expression = typed[question];
  const [setId, setSetId] = useState('own');
  const [benchId, setBenchId] = useState<string | null>(null);
  const own = useOwnLab();
  const convention =
    CONVENTION_SETS.find(({ id }) => id === setId)?.convention ?? own.convention ?? DEFAULT_CONVENTION;
  const bench =
    benchId === 'ideal'
      ? undefined
      : (own.benches.find(({ id }) => id === benchId) ??
        own.benches.find(({ plates: standing }) => standing.length >= fewest[question]));
  // Half a beam is no beam: nothing is worked out for a bench that waits for a plate.
  const waits = bench !== undefined && waitsForPlates(bench);
  const written = useDeferredValue(expression);
  const read = useMemo(
    () => readQuick({ question, expression: written, convention }),
    [question, written, convention],
  );
  // The bench's input was written in its lab's convention, whichever one the state is written in here.
  const benchConvention = own.convention ?? DEFAULT_CONVENTION;
  const asked = useMemo(
    (): Asked | null =>
      read.ok && !waits
        ? {
            written: { question, expression: written, convention },
            quick:
              bench === undefined
                ? null
                : { bench, kinds: bench.plates.map(({ kind }) => kind), convention: benchConvention },
            plates: bench === undefined ? idealPlates(question) : namedPlates(bench),
            key: `${bench?.id ?? 'ideal'} ${question} ${written} ${setId}`,
          }
        : null,
    [read, waits, question, written, convention, bench, benchConvention, setId],
  );
  const { answered, isLate } = useQuickSettings(asked);
  const empty = expression.trim() === '';
  const reading = read.ok ? read.reading : null;
  return (
    <div className="pt-4 pb-10">
      <title>Quick angles · Quarterturn</title>
      <header className="mb-4 flex items-baseline justify-between gap-4">
        <h1 className="text-title">Quick angles</h1>
        <p className="text-ink-2">nothing here is kept</p>
      </header>
      <div className="grid grid-cols-1 gap-x-14 gap-y-8 lg:grid-cols-2">
        <div className="space-y-5">
          <SegmentedChoice
            label="the plates are to"
            value={question}
            onChange={setQuestion}
            segments={questions}
          />
          <ExpressionField
            label={question === 'apply' ? 'unitary' : 'state'}
            value={expression}
            onChange={(value) => setTyped({ ...typed, [question]: value })}
            help={helpWords[question]}
            fault={empty || read.ok ? undefined : read.error}
          />
          {reading?.kind === 'state' && <StateRead reading={reading} convention={convention} />}
          {reading?.kind === 'unitary' && (
            <UnitaryRead reading={reading} source={written} convention={convention} />
          )}
          <SelectField
            label="written in the convention of"
            value={setId}
            onChange={(event) => setSetId(event.target.value)}
            options={[
              {
                value: 'own',
                label: `${own.convention === null ? 'this page' : 'your lab'}: ${flagWords(own.convention ?? DEFAULT_CONVENTION)}`,
              },
              ...CONVENTION_SETS.map(({ id, name, convention: flags }) => ({
                value: id,
                label: `${name}: ${flagWords(flags)}`,
              })),
            ]}
          />
          <section aria-labelledby="dials" className="border-ink border-t-[1.5px] pt-4">
            <div className="flex flex-wrap items-end justify-between gap-4">
              <h2 id="dials" className="text-section">
                {bench === undefined ? 'Angles' : 'Dials'}
              </h2>
              {own.benches.length > 0 && (
                <SelectField
                  label="with the plates of"
                  className="w-72 max-w-full"
                  value={bench?.id ?? 'ideal'}
                  onChange={(event) => setBenchId(event.target.value)}
                  options={[
                    ...own.benches.map((one) => ({ value: one.id, label: benchLabel(one) })),
                    { value: 'ideal', label: 'ideal half- and quarter-wave plates' },
                  ]}
                />
              )}
            </div>
            <p role="status" className="text-s text-ink-2 mt-1">
              {asked !== null && isLate && lateWords(answered?.asked ?? null)}
            </p>
            {waits && own.labId !== null ? (
              <div className="mt-3">
                <WaitsForPlates labId={own.labId} bench={bench} part="preparation" />
              </div>
            ) : asked === null ? (
              <p className="text-ink-2 mt-3">They stand here as soon as it can be read.</p>
            ) : (
              answered !== null && <Answer asked={answered.asked} settings={answered.settings} />
            )}
          </section>
        </div>
        {reading?.kind === 'state' && <SameLight jones={reading.jones} source={written} own={convention} />}
      </div>
    </div>
  );
}
