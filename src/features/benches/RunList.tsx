import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { TextLink } from '../../components/TextLink';
import { formatMoment } from '../../lib/format';
import { QueryState } from '../../lib/QueryState';
import { useLab } from '../labs';
import { runHref, runProgressWords, runsQuery } from '../results';

/** How many finished runs stand here before the rest is left to Results. */
const finishedShown = 6;

/** Runs at the lab's benches: those that stand open first, then the last that were finished. */
export function RunList() {
  const { lab, may } = useLab();
  const [now] = useState(() => new Date());
  const runs = useQuery(runsQuery(lab.id));
  const items = runs.data?.items;
  const open = items?.filter(({ state }) => state !== 'finished') ?? [];
  const finished = items?.filter(({ state }) => state === 'finished').slice(0, finishedShown) ?? [];
  return (
    <section aria-labelledby="runs" className="border-ink self-start border-t-[1.5px] pt-4">
      <div className="mb-1 flex items-baseline justify-between gap-4">
        <h2 id="runs" className="text-section">
          Runs
        </h2>
        <TextLink to={`/labs/${lab.id}/results`}>All runs</TextLink>
      </div>
      {items === undefined ? (
        <QueryState query={runs} what="the runs" />
      ) : items.length === 0 ? (
        <p className="text-ink-2">None yet.</p>
      ) : (
        <ul>
          {[...open, ...finished].map((run) => (
            <li
              key={run.id}
              className="border-hair flex items-baseline justify-between gap-4 border-b py-2.5"
            >
              <div>
                <p>
                  Run {run.number} of <b>{run.protocolName}</b> {run.versionNumber}
                </p>
                <p className="text-s text-ink-2">
                  {run.benchName}, {runProgressWords(run)}
                </p>
                <p className="text-s text-ink-2">
                  {run.startedBy}, {formatMoment(new Date(run.finishedAt ?? run.startedAt), now)}
                  {run.pauseNote === '' ? '' : `: “${run.pauseNote}”`}
                </p>
              </div>
              <TextLink to={runHref(lab.id, run, may('runs.record'))} className="shrink-0">
                {run.state !== 'finished' && may('runs.record') ? 'Go on' : 'See the record'}
                <span className="sr-only"> of run {run.number}</span>
              </TextLink>
            </li>
          ))}
        </ul>
      )}
    </section>
  );
}
