import { type ReactNode, useState } from 'react';
import { describeFault } from '../../../shared/scan-file';
import { recordProblem } from '../../../shared/scan-calibration';
import type { CabinetPlate } from '../../../shared/schemas/cabinet';
import { BeamEmpty, BeamWorking } from '../../components/BeamState';
import { Button } from '../../components/Button';
import { ErrorNote } from '../../components/ErrorNote';
import { TextButton } from '../../components/TextLink';
import { FormProblem } from '../../lib/forms';
import { LeaveOutReason, withLine } from './LeaveOutReason';
import { LeftOutLines, LeftOutList } from './LeftOutLines';
import { PointsTable } from './PointsTable';
import { reopenedBy } from './record-rules';
import { ScanPlot } from './ScanPlot';
import { ScanResults } from './ScanResults';
import type { NewScanState } from './use-new-scan';

/** What came of the file: its faults, what has to be said first, or the fit with its plot. */
export function ScanOutcome({
  state,
  plate,
}: {
  readonly state: NewScanState;
  readonly plate: CabinetPlate;
}) {
  const { file, work, scan } = state;
  if (file === null) {
    return (
      <BeamEmpty title="No scan yet" className="max-w-md">
        Choose the file that the measurement wrote. It stays on this page until the calibration is recorded.
      </BeamEmpty>
    );
  }
  return (
    <div aria-busy={work.state === 'working'}>
      {work.state === 'working' && (
        <BeamWorking doing={workWords(state)} className="mb-4 max-w-md">
          <TextButton onClick={work.stop}>Stop</TextButton>
        </BeamWorking>
      )}
      {work.state === 'stopped' && (
        <p className="mb-4">
          The fit was stopped. <TextButton onClick={work.again}>Fit again</TextButton>
        </p>
      )}
      <Refused state={state} />
      {scan !== null && state.columnProblem === null && (
        <>
          <ScanPlot scan={scan} plateName={plate.name} />
          <PointsTable scan={scan} />
          <LeftOutLines scan={scan} leftOut={state.leftOut} onChange={state.setLeftOut} />
          <div className="mt-6">
            <ScanResults scan={scan} plate={plate} before={plate.calibration} />
          </div>
        </>
      )}
      <RecordPart state={state} plate={plate} />
    </div>
  );
}

function workWords({ table }: NewScanState): string {
  return table === null ? 'Reading the file' : `Fitting ${table.points.length} rows`;
}

/** Why there is no fit, and what to do. */
function Refused({ state }: { readonly state: NewScanState }) {
  const { reply, columnProblem } = state;
  if (columnProblem !== null) return <Asks title="The columns are not all told">{columnProblem}</Asks>;
  switch (reply?.kind) {
    case 'faults': {
      const { faults, moreFaults, understood } = reply;
      return (
        <Note
          title={
            faults.length + moreFaults === 1
              ? 'This file has a fault'
              : `This file has ${faults.length + moreFaults} faults`
          }
        >
          <div
            className="max-h-96 overflow-y-auto"
            tabIndex={0}
            role="region"
            aria-label="Faults of the file"
          >
            <ul className="space-y-1">
              {faults.map((fault, place) => (
                <li key={`${fault.line} ${fault.column ?? ''} ${place}`}>{describeFault(fault)}</li>
              ))}
            </ul>
          </div>
          {moreFaults > 0 && <p className="mt-2">And {moreFaults} more faults like these.</p>}
          {understood !== null && <p className="mt-2">Mend the file, save it, and choose it again.</p>}
        </Note>
      );
    }
    case 'asks':
      return (
        <Asks title="The file doesn’t say everything">
          <ul className="space-y-1">
            {reply.questions.map((question) => (
              <li key={question}>{question}</li>
            ))}
          </ul>
          <p className="mt-2">Choose what each column is in the head of the rows.</p>
        </Asks>
      );
    case 'refused':
      return (
        <Note title="These points can’t be fitted">
          {reply.message}
          {reply.line !== null && <LeaveRefused key={reply.line} state={state} line={reply.line} />}
        </Note>
      );
    case 'failed':
      return <Note title="There is no fit">{reply.sentence}</Note>;
    case 'table':
      return state.work.state === 'done' && !state.isBeforePending ? (
        <Asks title="The fit waits">{waitWords(state)}</Asks>
      ) : null;
    case 'fitted':
    case undefined:
      return null;
  }
}

function waitWords({ light, before }: NewScanState): string {
  if (light.light === null) {
    const [fault] = Object.values(light.faults);
    return `Say how the light went. ${fault ?? 'The state that comes in can’t be read yet.'}`;
  }
  if (before.detail.isError || before.bytes.isError)
    return 'The scan that is to be taken together with it did not come. Take this one by itself, or load the page again.';
  return 'Say the wavelength at which it was measured.';
}

/** A row that can't be fitted has no place in the plot: it is left out here, with a reason as any other. */
function LeaveRefused({ state, line }: { readonly state: NewScanState; readonly line: number }) {
  const [isAsked, setIsAsked] = useState(false);
  return (
    <div className="mt-2">
      <TextButton aria-expanded={isAsked} onClick={() => setIsAsked(!isAsked)}>
        Leave line {line} out…
      </TextButton>
      {isAsked && (
        <LeaveOutReason
          line={line}
          onLeave={(row) => state.setLeftOut(withLine(state.leftOut, row))}
          onKeep={() => setIsAsked(false)}
        />
      )}
      <LeftOutList leftOut={state.leftOut} onChange={state.setLeftOut} />
    </div>
  );
}

/** Nothing is wrong: a person has to say something first. */
function Asks({ title, children }: { readonly title: string; readonly children: ReactNode }) {
  return (
    <div role="status">
      <BeamEmpty title={title} className="mb-4 max-w-140">
        {children}
      </BeamEmpty>
    </div>
  );
}

function Note({ title, children }: { readonly title: string; readonly children: ReactNode }) {
  return (
    <ErrorNote title={title} className="mb-4">
      {children}
    </ErrorNote>
  );
}

function RecordPart({ state, plate }: { readonly state: NewScanState; readonly plate: CabinetPlate }) {
  const { scan, recording, waitsFor } = state;
  const problem = scan === null ? null : recordProblem(scan);
  const relying = plate.benches.map(({ name }) => name).join(' and ');
  return (
    <div className="border-ink mt-6 space-y-3 border-t-[1.5px] pt-4">
      {problem !== null && <p>{problem}</p>}
      {scan !== null && state.settlesId !== null && (
        <p>Recorded so, it settles what the calibration before left open.</p>
      )}
      {scan !== null && reopenedBy(scan, plate.calibration) && (
        <p>
          What this scan leaves open was settled before: recorded, it is open again.{' '}
          {scan.found.kind === 'known'
            ? 'Taken together with a scan between polarisers, or with more light, it may keep it settled.'
            : 'A scan behind known light taken together with it keeps it settled.'}
        </p>
      )}
      <p className="text-s text-ink-2">
        The file is kept as it is, with how it was read. It cannot be changed afterwards; a correction is
        another one.
        {relying === ''
          ? ''
          : ` Drafts for ${relying} solve with it at once; versions keep the one they were saved with.`}
      </p>
      <FormProblem error={recording.error} />
      <Button kind="filled" waitsFor={waitsFor} onClick={state.record}>
        Record this calibration
      </Button>
    </div>
  );
}
