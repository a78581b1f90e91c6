import { useInfiniteQuery, useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import type { LastMade } from '../../../shared/schemas/home';
import type { RunSummary } from '../../../shared/schemas/runs';
import { BeamEmpty } from '../../components/BeamState';
import { Button } from '../../components/Button';
import { DataCell, DataRow, DataTable, HeadCell, RowHead, TableHead } from '../../components/DataTable';
import { FidelityChip } from '../../components/FidelityChip';
import { fidelityVerdict } from '../../components/fidelity-verdict';
import { Scientific } from '../../components/Scientific';
import { TextLink } from '../../components/TextLink';
import { formatMoment } from '../../lib/format';
import { QueryState } from '../../lib/QueryState';
import { homeQuery } from '../home';
import { useLab } from '../labs';
import { runPagesQuery } from './queries';
import { runHref, runProgressWords } from './run-words';

/** The worst target of a run as its dials really said, against the tolerance of its version. */
function WorstMade({ made }: { readonly made: LastMade | undefined }) {
  if (made === undefined) return <span className="text-ink-3">in its record</span>;
  const infidelity = {
    value: made.dialledInfidelity,
    low: made.dialledInfidelity,
    high: made.dialledInfidelity,
  };
  const verdict = fidelityVerdict(infidelity, made.toleranceInfidelity);
  return (
    <span className="flex flex-wrap items-center gap-x-4">
      <FidelityChip
        infidelity={infidelity}
        tolerance={made.toleranceInfidelity}
        kind="measured"
        width={150}
      />
      <span className="whitespace-nowrap">
        <b>{made.label}</b> <Scientific value={made.dialledInfidelity} />
        {verdict !== 'within' && <span className="text-fault font-strong"> {verdict}</span>}
      </span>
    </span>
  );
}

function RunRow(props: {
  readonly run: RunSummary;
  readonly made: LastMade | undefined;
  readonly now: Date;
}) {
  const { run, made, now } = props;
  const { lab, may } = useLab();
  return (
    <DataRow>
      <RowHead>
        <TextLink to={runHref(lab.id, run, may('runs.record'))}>Run {run.number}</TextLink>
        <span className="text-s text-ink-2 font-words mt-0.5 block">{runProgressWords(run)}</span>
      </RowHead>
      <DataCell>
        <b>{run.protocolName}</b> {run.versionNumber}
        <span className="text-s text-ink-2 block">{run.benchName}</span>
      </DataCell>
      <DataCell>
        {formatMoment(new Date(run.finishedAt ?? run.startedAt), now)}
        <span className="text-s text-ink-2 block">{run.startedBy}</span>
      </DataCell>
      <DataCell>
        <WorstMade made={made} />
      </DataCell>
    </DataRow>
  );
}

/** Every run of the lab, the newest first. */
export function Component() {
  const { lab, may } = useLab();
  const [now] = useState(() => new Date());
  const runs = useInfiniteQuery(runPagesQuery(lab.id));
  const home = useQuery(homeQuery(lab.id));
  const items = runs.data?.pages.flatMap((page) => page.items);
  return (
    <>
      <title>Results · Quarterturn</title>
      <header className="mb-5 flex flex-wrap items-baseline gap-x-5 pt-2">
        <h1 className="text-title">Results</h1>
        <p className="text-ink-2">What was dialled, run by run, against the tolerance of its version.</p>
      </header>
      {items === undefined ? (
        <QueryState query={runs} what="the runs" />
      ) : items.length === 0 ? (
        <BeamEmpty title="No runs yet">
          A run takes one version through the bench, setting by setting.{' '}
          {may('runs.record') ? (
            <TextLink to={`/labs/${lab.id}/bench/start`}>Start a run</TextLink>
          ) : (
            'An operator starts it.'
          )}
        </BeamEmpty>
      ) : (
        <>
          <DataTable caption="Runs, the newest first">
            <TableHead>
              <tr>
                <HeadCell className="max-sm:min-w-40">run</HeadCell>
                <HeadCell className="max-sm:min-w-40">version and bench</HeadCell>
                <HeadCell className="max-sm:min-w-40">when and who</HeadCell>
                <HeadCell className="max-sm:min-w-40">
                  worst target as dialled, 1 − F; [ is the tolerance, better to the right
                </HeadCell>
              </tr>
            </TableHead>
            <tbody>
              {items.map((run) => (
                <RunRow
                  key={run.id}
                  run={run}
                  made={home.data?.lastMade.find(({ runId }) => runId === run.id)}
                  now={now}
                />
              ))}
            </tbody>
          </DataTable>
          {runs.hasNextPage && (
            <p className="mt-5">
              <Button
                onClick={() => void runs.fetchNextPage()}
                waitsFor={runs.isFetchingNextPage ? 'the server' : undefined}
              >
                Show older runs
              </Button>
            </p>
          )}
        </>
      )}
    </>
  );
}
