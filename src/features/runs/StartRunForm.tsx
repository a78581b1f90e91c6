import { useQuery } from '@tanstack/react-query';
import { type SyntheticEvent, useState } from 'react';
import { useNavigate } from 'react-router-dom';
import type { Version } from '../../../shared/schemas/versions';
import { Button } from '../../components/Button';
import { NumberField } from '../../components/NumberField';
import { TextLink } from '../../components/TextLink';
import { VersionSeal } from '../../components/VersionSeal';
import { ApiError, newIdempotencyKey } from '../../lib/api';
import { formatMoment } from '../../lib/format';
import { benchQuery, LaserCaution, needsCaution } from '../benches';
import { useLab } from '../labs';
import { readDial } from './DialAnswer';
import { keepKnownVoids } from './known-voids';
import { placeWords } from './move-words';
import { startRun } from './queries';
import { VersionWarnings } from './VersionWarnings';

/** One field of a dial's present reading; empty where nobody has looked. */
function readStart(text: string): { readonly dialDeg: number | null; readonly fault: string } {
  if (text.trim() === '') return { dialDeg: null, fault: '' };
  const read = readDial(text);
  return read.ok ? { dialDeg: read.dialDeg, fault: '' } : { dialDeg: null, fault: read.fault };
}

/** The sentence of a refusal that a person may overrule, else null. */
function staleFault(error: unknown): string | null {
  if (!(error instanceof ApiError)) return null;
  return error.problem?.fields?.find(({ path }) => path === 'staleAcknowledged')?.message ?? null;
}

export function StartRunForm({ version }: { readonly version: Version }) {
  const { lab } = useLab();
  const navigate = useNavigate();
  const { content, summary } = version;
  const { bench } = content;
  // As it stands now, not as it stood when this browser last asked: a plate may have been calibrated a minute ago.
  const live = useQuery({ ...benchQuery(lab.id, bench.id), staleTime: 0 });
  const asksBench = !live.isFetchedAfterMount;
  const [typed, setTyped] = useState<readonly string[]>(() => bench.plates.map(() => ''));
  const [acknowledged, setAcknowledged] = useState(false);
  const [checked, setChecked] = useState(false);
  const [fault, setFault] = useState('');
  // What the server says of dials that are void, once it has said so; then a person may start all the same.
  const [voidWords, setVoidWords] = useState('');
  const [knowsVoid, setKnowsVoid] = useState(false);
  const [busy, setBusy] = useState(false);
  // One key for one start, so that a second press after a lost answer makes no second run.
  const [key] = useState(newIdempotencyKey);
  const starts = typed.map(readStart);
  const count = content.targets.length;

  const start = async (): Promise<void> => {
    setChecked(true);
    if (asksBench || !acknowledged || starts.some((entry) => entry.fault !== '')) return;
    setBusy(true);
    setFault('');
    try {
      const run = await startRun(
        lab.id,
        {
          versionId: summary.id,
          startDialsDeg: starts.map(({ dialDeg }) => dialDeg),
          cautionAcknowledged: true,
          staleAcknowledged: knowsVoid,
        },
        key,
      );
      // What stands above the button was read before it was pressed.
      keepKnownVoids(run);
      await navigate(`/labs/${lab.id}/bench/runs/${run.summary.id}`);
    } catch (error) {
      const stale = staleFault(error);
      if (stale !== null) setVoidWords(stale);
      else setFault(error instanceof Error ? error.message : 'The server gave no reason.');
      setBusy(false);
    }
  };
  const submit = (event: SyntheticEvent): void => {
    event.preventDefault();
    void start();
  };

  return (
    <form onSubmit={submit} noValidate className="grid max-w-5xl gap-8 pt-6">
      <header className="flex flex-wrap items-start gap-x-5 gap-y-2">
        <VersionSeal state="saved" number={summary.number} />
        <div className="min-w-0 flex-1">
          <h1 className="text-title">
            Run {summary.protocolName}, version {summary.number}, at {bench.name}
          </h1>
          <p className="mt-1">
            “{summary.message}”, saved {formatMoment(new Date(summary.savedAt), new Date())} by{' '}
            {summary.savedBy}. {count} {count === 1 ? 'setting' : 'settings'},{' '}
            {bench.plates.length === 1 ? 'one plate' : `${bench.plates.length} plates`}, {bench.wavelengthNm}
            <span className="gap-before">nm</span>.{' '}
            <TextLink to={`/labs/${lab.id}/plan/${summary.protocolId}/versions/${summary.number}`}>
              Read the version
            </TextLink>{' '}
            or <TextLink to={`/labs/${lab.id}/bench/start`}>choose another</TextLink>.
          </p>
        </div>
      </header>

      <VersionWarnings version={version} live={asksBench ? undefined : live.data} unknown={live.isError} />

      <section aria-labelledby="start-caution" className="border-t-[1.5px] border-ink pt-3">
        <h2 id="start-caution" className="text-section mb-3">
          Before the beam is on
        </h2>
        <LaserCaution
          laserClass={bench.laserClass}
          hazardWavelengthsNm={bench.hazardWavelengthsNm}
          variant="full"
        />
        <label className="mt-4 flex min-h-11 cursor-pointer items-center gap-3">
          <input
            type="checkbox"
            className="size-5 shrink-0 accent-ink"
            checked={acknowledged}
            aria-describedby={checked && !acknowledged ? 'start-caution-fault' : undefined}
            onChange={(event) => setAcknowledged(event.currentTarget.checked)}
          />
          {needsCaution(bench.laserClass)
            ? 'I have read this caution, and I know what my laser-safety officer asks for at this bench.'
            : 'I know what my laser-safety officer asks for at this bench.'}
        </label>
        {checked && !acknowledged && (
          <p id="start-caution-fault" role="alert" className="text-s font-strong text-fault">
            Read the caution and acknowledge it before the run starts.
          </p>
        )}
      </section>

      <section aria-labelledby="start-dials" className="border-t-[1.5px] border-ink pt-3">
        <h2 id="start-dials" className="text-section">
          Where the dials stand now
        </h2>
        <p className="text-s text-ink-2 mt-1">
          With these the bench can say which way and how far to turn from the first setting on. Leave a field
          empty where nobody has looked.
        </p>
        <div className="mt-3 flex flex-wrap gap-x-6 gap-y-4">
          {bench.plates.map((plate, index) => (
            <NumberField
              key={plate.id}
              className="w-60"
              label={`${plate.name} says, degrees`}
              help={placeWords(index)}
              value={typed[index] ?? ''}
              fault={checked ? starts[index]?.fault : undefined}
              onChange={(event) => {
                const { value } = event.currentTarget;
                setTyped((before) => before.map((text, at) => (at === index ? value : text)));
              }}
            />
          ))}
        </div>
      </section>

      {voidWords !== '' && (
        <section aria-labelledby="start-void" className="border-t-[1.5px] border-ink pt-3">
          <h2 id="start-void" className="text-section">
            Start with dials that are void?
          </h2>
          <p role="alert" className="mt-1 font-strong text-fault">
            {voidWords}
          </p>
          <label className="mt-2 flex min-h-11 cursor-pointer items-center gap-3">
            <input
              type="checkbox"
              className="size-5 shrink-0 accent-ink"
              checked={knowsVoid}
              onChange={(event) => setKnowsVoid(event.currentTarget.checked)}
            />
            I know, and I start all the same.
          </label>
        </section>
      )}

      <div className="flex flex-wrap items-center gap-4">
        <Button
          kind="filled"
          type="submit"
          waitsFor={
            busy
              ? 'the server to answer'
              : asksBench
                ? 'the bench’s present state'
                : voidWords !== '' && !knowsVoid
                  ? 'your word that the void dials are known'
                  : undefined
          }
        >
          Start the run
        </Button>
        {fault !== '' && (
          <p role="alert" className="font-strong text-fault">
            The run did not start. {fault}
          </p>
        )}
      </div>
    </form>
  );
}
