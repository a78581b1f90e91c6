import { useQuery } from '@tanstack/react-query';
import { useParams } from 'react-router-dom';
import { useLab } from '../labs';
import { versionQuery } from '../versions';
import { BenchNotice } from './BenchNotice';
import { runQuery } from './queries';
import { RunRecord } from './RunRecord';

/** The record of a run, finished or not, in the reader's own theme. */
export function RunRecordPage() {
  const { lab } = useLab();
  const { runId = '' } = useParams();
  const run = useQuery(runQuery(lab.id, runId));
  const summary = run.data?.summary;
  const version = useQuery({
    ...versionQuery(lab.id, summary?.protocolId ?? '', String(summary?.versionNumber ?? '')),
    enabled: summary !== undefined,
  });
  return run.data !== undefined && version.data !== undefined ? (
    <RunRecord run={run.data} version={version.data} />
  ) : (
    <BenchNotice failed={run.error ?? version.error} atBench={false} />
  );
}

export { RunRecordPage as Component };
