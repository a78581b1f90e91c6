import { needsCaution } from '../../../shared/laser-caution';
import type { RecordReading, RunSummary, Version } from '../../../shared/schemas';
import type { AuditEntry } from '../../audit/record-event';
import type { StateChange } from './run-work';

/**
 * Of a run that was started. What was acknowledged is said as it stood on the page: the full caution and what the
 * laser-safety officer asks for, or, for a class that has no caution of its own, the officer's word alone.
 */
export function startedEntry(run: Pick<RunSummary, 'id' | 'number'>, version: Version): AuditEntry {
  const { laserClass, hazardWavelengthsNm } = version.content.bench;
  return {
    kind: 'run.started',
    subjectId: run.id,
    details: {
      number: run.number,
      versionId: version.summary.id,
      acknowledged: {
        laserClass,
        hazardWavelengthsNm,
        statement: needsCaution(laserClass) ? 'caution-and-officer' : 'officer',
      },
    },
  };
}

export function readingEntry(runId: string, readingId: string, reading: RecordReading): AuditEntry {
  return { kind: 'reading.recorded', subjectId: runId, details: { readingId, reading } };
}

export function stateEntry(runId: string, change: StateChange): AuditEntry {
  switch (change.kind) {
    case 'pause':
      return { kind: 'run.paused', subjectId: runId, details: { note: change.note } };
    case 'resume':
      return { kind: 'run.resumed', subjectId: runId };
    case 'finish':
      return { kind: 'run.finished', subjectId: runId };
  }
}
