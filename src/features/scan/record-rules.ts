import { recordProblem } from '../../../shared/scan-calibration';
import type { Calibration } from '../../../shared/schemas/calibrations';
import type { ScanReply } from './answer-scan';
import type { FittedScan } from './scan-points';

interface RecordState {
  readonly hasFile: boolean;
  readonly columnProblem: string | null;
  readonly reply: ScanReply | null;
  readonly isWorking: boolean;
  readonly isRecording: boolean;
  /** Of fields; recording is let be tried then, so that each says what is wrong with it. */
  readonly hasFaults: boolean;
  /** Whether the plate has a calibration from which one port alone may take the retardance. */
  readonly hasRetardanceBefore: boolean;
}

/** What recording waits for; undefined where it may be tried. */
export function recordWaitsFor(state: RecordState): string | undefined {
  const { hasFile, columnProblem, reply, isWorking, isRecording, hasFaults, hasRetardanceBefore } = state;
  if (isRecording) return 'the server';
  if (!hasFile) return 'a file';
  if (columnProblem !== null) return 'the columns';
  if (hasFaults) return undefined;
  if (isWorking || reply === null) return 'the fit';
  switch (reply.kind) {
    case 'faults':
      return 'a file without faults';
    case 'asks':
      return 'an answer about the columns';
    case 'refused':
    case 'failed':
      return 'a fit that succeeds';
    case 'table':
      return 'how the light went';
    case 'fitted':
      if (recordProblem(reply) !== null) return 'light that tells the retardance';
      return reply.values.retardance === null && !hasRetardanceBefore
        ? 'the power that enters, since nothing told the retardance before'
        : undefined;
  }
}

/** The standing calibration whose open question this scan answers; null where it answers none. */
export function settledBy({ values }: FittedScan, standing: Calibration | null): string | null {
  if (standing === null) return null;
  const isAnswered = standing.openQuestions.some((question) => !values.openQuestions.includes(question));
  return isAnswered ? standing.id : null;
}

/** What was settled in this seat and would be open again. */
export function reopenedBy({ values }: FittedScan, standing: Calibration | null): boolean {
  return (
    standing !== null && values.openQuestions.some((question) => !standing.openQuestions.includes(question))
  );
}
