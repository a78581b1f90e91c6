import { useQuery } from '@tanstack/react-query';
import { useDeferredValue, useEffect, useMemo, useRef, useState } from 'react';
import { useSearchParams } from 'react-router-dom';
import type { PublishedComposite } from '../../../shared/optics/robust';
import { BeamWrong } from '../../components/BeamState';
import { SectionHead } from '../../components/SectionHead';
import { TextLink } from '../../components/TextLink';
import { useTitle } from '../../lib/use-title';
import { useStudy } from '../../workers/use-study';
import { benchesQuery } from '../benches';
import { flagWords } from '../conventions';
import { useLab } from '../labs';
import { type Design, listedSettings, searchedDesign } from './design';
import { DesignView } from './DesignView';
import { type Answered, FoundSettings } from './FoundSettings';
import { publishedDesign } from './published-design';
import { PublishedTable } from './PublishedTable';
import { QuestionForm } from './QuestionForm';
import { asksQuestion } from './robust-form';
import { type AskedQuestion, readQuestion } from './robust-question';
import { useRobustForm } from './use-robust-form';
import './robust.css';

/** How far a published composite is looked at when no range of its kind is asked about. */
const PUBLISHED_WIDTH = 0.1;

type LookedAt =
  | { readonly kind: 'setting'; readonly number: number }
  | { readonly kind: 'published'; readonly composite: PublishedComposite };

/** Composite settings that stand an error all plates share. Nothing here is kept but the page's address. */
export function Component() {
  const { lab } = useLab();
  useTitle('Robust designs');
  const [search] = useSearchParams();
  const { form, change, settle } = useRobustForm();
  const benchList = useQuery(benchesQuery(lab.id));
  const benches = useMemo(
    () => (benchList.data?.items ?? []).filter(({ retiredAt }) => retiredAt === null),
    [benchList.data],
  );
  const bench = benches.find(({ id }) => id === form.benchId);
  const written = useDeferredValue(form);
  const question = useMemo(
    () => readQuestion(written, bench, lab.convention),
    [written, bench, lab.convention],
  );
  const { study, start, cancel } = useStudy('robust');
  const [asked, setAsked] = useState<AskedQuestion | null>(null);
  const [answered, setAnswered] = useState<Answered | null>(null);
  const [lookedAt, setLookedAt] = useState<LookedAt>({ kind: 'setting', number: 1 });
  const figure = useRef<HTMLDivElement>(null);

  const ask = () => {
    if (!question.ok) return;
    setAsked(question.asked);
    start({ kind: 'robust', question: question.asked.question });
    settle();
  };

  // A link that asks a whole question is answered when it is opened, once what it needs is there.
  const [openedBy] = useState(() => asksQuestion(search));
  const waits = useRef(openedBy);
  const ready = question.ok && (form.benchId === null || benchList.isSuccess) ? question.asked : null;
  useEffect(() => {
    if (!waits.current || ready === null) return undefined;
    const timer = window.setTimeout(() => {
      waits.current = false;
      setAsked(ready);
      start({ kind: 'robust', question: ready.question });
    });
    return () => window.clearTimeout(timer);
  }, [ready, start]);

  // What was found stays readable while another search runs.
  if (study.state === 'done' && asked !== null && answered?.study !== study.result.study) {
    setAnswered({ asked, study: study.result.study });
    setLookedAt({ kind: 'setting', number: 1 });
  }
  const settings = useMemo(
    () => (answered === null ? [] : listedSettings(answered.asked, answered.study)),
    [answered],
  );
  const design = useMemo((): Design | null => {
    if (lookedAt.kind === 'published') {
      const width = answered?.asked.error === 'retardance' ? answered.asked.question.problem.width : null;
      return publishedDesign(lookedAt.composite, width ?? PUBLISHED_WIDTH);
    }
    const setting = settings[lookedAt.number - 1];
    return answered === null || setting === undefined
      ? null
      : searchedDesign(answered.asked, answered.study, setting);
  }, [lookedAt, answered, settings]);
  const shortfallDeg = lookedAt.kind === 'setting' ? (answered?.study.plain.shortfallDeg ?? 0) : 0;
  const isCurrent =
    answered !== null &&
    question.ok &&
    JSON.stringify(answered.asked.question) === JSON.stringify(question.asked.question);
  const lookAtPublished = (composite: PublishedComposite) => {
    setLookedAt({ kind: 'published', composite });
    requestAnimationFrame(() => {
      figure.current?.scrollIntoView({ block: 'start' });
      figure.current?.focus({ preventScroll: true });
    });
  };

  return (
    <>
      <div className="flex flex-wrap items-baseline gap-x-5 gap-y-1 pt-3">
        <h1 className="m-0 text-title">Robust designs</h1>
        <p className="text-ink-2">
          several plates set so that an error they share does little; nothing here is kept
        </p>
      </div>
      <p className="mt-1 text-s text-ink-2">
        {flagWords(lab.convention)}. <TextLink to={`/labs/${lab.id}/plan`}>Back to the plan</TextLink>
      </p>
      <QuestionForm
        form={form}
        benches={benches}
        faults={question.ok || (form.benchId !== null && !benchList.isFetched) ? {} : question.faults}
        working={study.state === 'working'}
        onChange={(part) => {
          waits.current = false;
          change(part);
        }}
        onSearch={ask}
        onCancel={cancel}
      />
      {benchList.isError && (
        <BeamWrong className="mt-6" title="The benches could not be fetched">
          {benchList.error.message} Plates typed by retardance can be searched without them.
        </BeamWrong>
      )}

      <FoundSettings
        search={study}
        starts={asked?.question.problem.starts ?? 1}
        answered={answered}
        isCurrent={isCurrent}
        settings={settings}
        selected={lookedAt.kind === 'setting' ? lookedAt.number : null}
        onSelect={(number) => setLookedAt({ kind: 'setting', number })}
        onCancel={cancel}
      />
      {design !== null && (
        <DesignView
          design={design}
          convention={lab.convention}
          shortfallDeg={shortfallDeg}
          tolerance={form.tolerance}
          onTolerance={(tolerance) => change({ tolerance })}
          headRef={figure}
        />
      )}

      <section aria-labelledby="published-head" className="mt-10">
        <SectionHead
          id="published-head"
          note="against a common relative error of the retardances; angles counter-clockwise from H as the receiver sees them"
        >
          Published composites
        </SectionHead>
        <PublishedTable
          lookedAt={lookedAt.kind === 'published' ? lookedAt.composite.id : null}
          onLookAt={lookAtPublished}
        />
      </section>
    </>
  );
}
