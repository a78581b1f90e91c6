import { listed } from '../../../shared/words';
import type { ReactNode } from 'react';
import type { Action } from '../../../shared/permissions';
import type { OpenQuestion } from '../../../shared/schemas/calibrations';
import type { WaitingItem } from '../../../shared/schemas/home';
import { Quantity } from '../../components/NumberText';
import { Scientific } from '../../components/Scientific';
import { daysBetween, formatDate, formatDays, formatMoment, formatWeekday } from '../../lib/format';
import { staleWords } from './stale-words';
import { type CalibrationAge, calibrationAge } from '../cabinet';
import { runHref } from '../results';

/** One waiting thing in words: what, why, and the one way on. */
export interface WaitingWords {
  readonly title: ReactNode;
  readonly reason: ReactNode;
  readonly way: { readonly label: string; readonly to: string } | null;
}

export interface WaitingContext {
  readonly labId: string;
  readonly now: Date;
  /** The lab's own: a calibration falls due this many days after it was measured. */
  readonly dueDays: number;
  readonly may: (action: Action) => boolean;
}

function openTitle(plateName: string, questions: readonly OpenQuestion[]): string {
  if (questions.includes('axis')) return `Nobody has settled which axis of ${plateName} is the fast one`;
  if (questions.includes('branch')) return `The retardance of ${plateName} may be 360° less what is written`;
  return `The retardance of ${plateName} was measured where a scan is blind to it`;
}

/** What makes a plate ready again, for whoever may do it. */
function readyWay(
  { plateId, plateName, why }: Extract<WaitingItem, { kind: 'plate-not-ready' }>,
  base: string,
  may: WaitingContext['may'],
): WaitingWords['way'] {
  const to = `${base}/cabinet/${plateId}`;
  if (why === 'not-seated' && may('cabinet.write')) {
    return { label: `Seat ${plateName}`, to: `${to}?do=seat` };
  }
  if (why === 'not-calibrated' && may('calibrations.record')) {
    return { label: `Calibrate ${plateName}`, to: `${to}?do=calibrate` };
  }
  return { label: `Open ${plateName}`, to };
}

/** Counted as under the cabinet's rings, so that both name the same day. */
function dueTitle(plateName: string, { daysLeft, dueAt }: CalibrationAge): string {
  if (daysLeft < 0) return `${plateName} is ${formatDays(-daysLeft)} past its calibration`;
  if (daysLeft === 0) return `${plateName} is due for calibration today`;
  if (daysLeft >= 7) return `${plateName} is due for calibration in ${formatDays(daysLeft)}`;
  return `${plateName} is due for calibration on ${formatWeekday(dueAt)}`;
}

function measuredWhen(measuredAt: string, now: Date): string {
  const date = new Date(measuredAt);
  return daysBetween(date, now) < 2 ? formatMoment(date, now) : `on ${formatDate(date)}`;
}

/** The words of one item for one person. Where the person may not act, the way on leads to where it can be read. */
export function waitingWords(item: WaitingItem, { labId, now, dueDays, may }: WaitingContext): WaitingWords {
  const base = `/labs/${labId}`;
  switch (item.kind) {
    case 'run-stands': {
      const { run, nextSetting, lastDoneSetting } = item;
      const when = formatMoment(new Date(run.startedAt), now);
      return {
        title: (
          <>
            Run {run.number} stands {run.state === 'paused' ? 'paused' : 'open'}{' '}
            {nextSetting === null
              ? 'after its last setting'
              : `at setting ${nextSetting} of ${run.settingCount}`}{' '}
            on the <b>{run.benchName}</b>
          </>
        ),
        reason: (
          <>
            {run.protocolName} {run.versionNumber}, started by {run.startedBy} {when}
            {run.pauseNote === '' ? '.' : `: “${run.pauseNote}”.`}
            {lastDoneSetting !== null && (
              <>
                <br />
                The dials stand where setting {lastDoneSetting} left them.
              </>
            )}
          </>
        ),
        way: {
          label: may('runs.record') ? 'Open the run' : 'See the run',
          to: runHref(labId, run, may('runs.record')),
        },
      };
    }
    case 'draft-ahead':
      return {
        title:
          item.afterVersion === null ? (
            <>
              <b>{item.protocolName}</b> has no version yet
            </>
          ) : (
            <>
              The draft of <b>{item.protocolName}</b> has moved on since version {item.afterVersion}
            </>
          ),
        reason: (
          <>
            {item.targetCount === 1 ? 'One target' : `${item.targetCount} targets`}, last written by{' '}
            {item.savedBy} {formatMoment(new Date(item.savedAt), now)}.
            <br />
            The bench runs versions only.
          </>
        ),
        way: {
          label: may('protocols.write') ? 'Open the draft' : 'Read the draft',
          to: `${base}/plan/${item.protocolId}`,
        },
      };
    case 'dialled-not-within':
      return {
        title: (
          <>
            Run {item.run.number} of <b>{item.run.protocolName}</b>: {item.label} was not dialled within
            tolerance
          </>
        ),
        reason: (
          <>
            What the dials said gives 1 − F <Scientific value={item.dialledInfidelity} />, against{' '}
            <Scientific value={item.toleranceInfidelity} />.
          </>
        ),
        way: { label: 'See the run', to: `${base}/bench/runs/${item.run.id}/record` },
      };
    case 'calibration-due':
      return {
        title: dueTitle(item.plateName, calibrationAge(item.measuredAt, dueDays, now)),
        reason: (
          <>
            It was last measured {measuredWhen(item.measuredAt, now)}.
            <br />
            {item.benchNames.length === 0
              ? 'No bench has it in its beam.'
              : `It stands in the beam of the ${listed(item.benchNames)}.`}
          </>
        ),
        way: {
          label: may('calibrations.record') ? `Calibrate ${item.plateName}` : `Open ${item.plateName}`,
          to: `${base}/cabinet/${item.plateId}${may('calibrations.record') ? '?do=calibrate' : ''}`,
        },
      };
    case 'calibrated-elsewhere':
      return {
        title: (
          <>
            {item.plateName} stands at <Quantity text={String(item.benchNm)} unit="nm" /> and was measured at{' '}
            <Quantity text={String(item.calibratedAtNm)} unit="nm" />
          </>
        ),
        reason: (
          <>
            Nobody has measured it in the light of the {item.benchName}: its retardance there is predicted
            where its material is known, and else taken as measured.
          </>
        ),
        way: { label: `Open ${item.plateName}`, to: `${base}/cabinet/${item.plateId}` },
      };
    case 'plate-not-ready':
      return {
        title: (
          <>
            {item.plateName} {item.why === 'not-seated' ? 'sits in no mount' : 'is not calibrated'}, and the{' '}
            <b>{listed(item.benchNames)}</b> waits for it
          </>
        ),
        reason:
          item.why === 'not-seated'
            ? 'Seat it and calibrate it: a zero holds for one seat only.'
            : 'It was seated and not measured since. Its old zero is void.',
        way: readyWay(item, base, may),
      };
    case 'open-question':
      return {
        title: openTitle(item.plateName, item.questions),
        reason: (
          <>
            Its last calibration could not tell, and it stands in the beam of the {listed(item.benchNames)}.
          </>
        ),
        way: { label: `Open ${item.plateName}`, to: `${base}/cabinet/${item.plateId}` },
      };
    case 'stale-versions':
      return staleWords(item, base);
    case 'no-plates':
      return {
        title: 'The cabinet is empty',
        reason: may('cabinet.write')
          ? 'Angles are worked out for the plates you have. Begin with one or two, and with what was measured of them.'
          : 'A designer or the lead adds the plates; then angles can be worked out.',
        way: may('cabinet.write') ? { label: 'Add a plate', to: `${base}/cabinet?do=add` } : null,
      };
    case 'no-bench':
      return {
        title: 'No bench is set up',
        reason: may('benches.write')
          ? 'A bench says what light goes in and which plates it meets, one to six in order.'
          : 'A designer or the lead sets it up; then there is something to run at.',
        way: may('benches.write') ? { label: 'Add a bench', to: `${base}/bench/new` } : null,
      };
    case 'no-protocol':
      return {
        title: 'No protocol is written',
        reason: may('protocols.write')
          ? 'Write the states that an experiment needs; their dials stand beside them as you type.'
          : 'A designer or the lead writes the first one.',
        way: may('protocols.write') ? { label: 'Write a protocol', to: `${base}/plan/new` } : null,
      };
  }
}
