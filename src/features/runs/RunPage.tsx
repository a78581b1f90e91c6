import { useQuery } from '@tanstack/react-query';
import { useEffect } from 'react';
import { useParams } from 'react-router-dom';
import { useLab } from '../labs';
import { versionQuery } from '../versions';
import './bench.css';
import './bench-landscape.css';
import './bench-narrow.css';
import './bench-sheets.css';
import { BenchNotice } from './BenchNotice';
import { BenchScreen } from './BenchScreen';
import { runQuery } from './queries';
import { RunRecord } from './RunRecord';

/** So often a run that goes on looks whether its dials still hold. */
const lookEveryMs = 20_000;

/** A run at its own address: the bench while it goes on, its record once it is finished. */
export function RunPage() {
  const { lab } = useLab();
  const { runId = '' } = useParams();
  // Another tab or tablet may have recorded: whoever comes back to this one learns of it at once, however fresh it is.
  const run = useQuery({
    ...runQuery(lab.id, runId),
    refetchOnWindowFocus: 'always',
    refetchOnMount: 'always',
    // Nor does somebody at another bench tell when a plate is taken out of its mount.
    refetchInterval: ({ state }) => (state.data?.summary.state === 'running' ? lookEveryMs : false),
  });
  const { refetch } = run;
  useEffect(() => {
    // Two windows beside each other are both visible all the time: only the focus changes.
    const comesBack = (): void => void refetch();
    window.addEventListener('focus', comesBack);
    return () => window.removeEventListener('focus', comesBack);
  }, [refetch]);
  const summary = run.data?.summary;
  const version = useQuery({
    ...versionQuery(lab.id, summary?.protocolId ?? '', String(summary?.versionNumber ?? '')),
    enabled: summary !== undefined,
  });
  if (run.data !== undefined && version.data !== undefined) {
    return run.data.summary.state === 'finished' ? (
      <RunRecord run={run.data} version={version.data} />
    ) : (
      <BenchScreen key={runId} run={run.data} version={version.data} />
    );
  }
  return <BenchNotice failed={run.error ?? version.error} atBench />;
}

export { RunPage as Component };
