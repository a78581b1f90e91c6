import { useEffect, useLayoutEffect, useRef, useState } from 'react';
import type { Run } from '../../../shared/schemas/runs';
import type { Version } from '../../../shared/schemas/versions';
import { useBenchTheme } from '../../app/theme';
import { BenchNavigation } from '../../components/BenchNavigation';
import { ScaleWindow } from '../../components/ScaleWindow';
import { useLab } from '../labs';
import { BenchAside } from './BenchAside';
import { BlankScreen } from './BlankScreen';
import { BenchFoot } from './BenchFoot';
import { BenchHead } from './BenchHead';
import { voidReasons } from '../reliance';
import { benchTargets } from './bench-targets';
import { type BenchStore, createBenchStore } from './bench-store';
import { benchKeeping } from './kept-entry';
import { useUnknownVoids } from './known-voids';
import { LeaveRunDialog } from './LeaveRunDialog';
import { announcement, dialText } from './move-words';
import { OtherReadingSheet } from './OtherReadingSheet';
import { PassedBench } from './PassedBench';
import { PausedBench } from './PausedBench';
import { PlateStation } from './PlateStation';
import { RecordStage } from './RecordStage';
import { SettingsSheet } from './SettingsSheet';
import { TroubleSheet } from './TroubleSheet';
import { useBench } from './use-bench';
import { useBenchCommands } from './use-bench-commands';
import { useBenchShape } from './use-bench-shape';
import { useRunState } from './use-run-state';
import { useSending } from './use-sending';
import { VoidBench } from './VoidBench';
import { WaitingBand } from './WaitingBand';

/** A touch that is felt, where the device has one to give. */
function vibrate(pattern: number | number[]): void {
  if ('vibrate' in navigator) navigator.vibrate(pattern);
}

type Sheet = 'none' | 'trouble' | 'other' | 'settings';

interface BenchScreenProps {
  readonly run: Run;
  readonly version: Version;
}

/** A run in progress: one plate to turn at a time, then the reading, then the next setting. */
export function BenchScreen({ run, version: { content } }: BenchScreenProps) {
  useBenchTheme();
  const { lab, user, may } = useLab();
  const runId = run.summary.id;
  const plates = content.bench.plates;
  const [keeping] = useState(() => benchKeeping(user.id, runId));
  const [store] = useState<BenchStore>(() => createBenchStore(keeping, plates.length));
  // Before anything is painted, so that no press meets a confirmation that no longer holds.
  useLayoutEffect(() => store.getState().meet(run), [store, run]);
  const bench = useBench(run, content, store);
  const sending = useSending(lab.id, runId, store, keeping);
  const runState = useRunState(lab.id, runId);
  const shape = useBenchShape();
  const [sheet, setSheet] = useState<Sheet>('none');
  const [blank, setBlank] = useState(false);
  const close = (): void => setSheet('none');

  const { steps, setting } = bench;
  const mayRecord = may('runs.record');
  const { voids, goOn } = useUnknownVoids(run);
  const goesOn = run.summary.state === 'running' && mayRecord;
  const isHeldUp = goesOn && voids.length > 0;
  const running = goesOn && !isHeldUp;
  const now = running ? (steps?.now ?? null) : null;
  const nowPlate = now === null ? undefined : plates[now.plateIndex];
  const ready = running && steps !== null && steps.dialledDeg !== null;
  const waitingCount = bench.entry.waiting.length;
  const waitsForReadings =
    waitingCount === 0
      ? undefined
      : `${waitingCount === 1 ? 'one reading' : `${waitingCount} readings`} to reach the server`;

  const main = (): void => {
    if (now !== null) {
      bench.confirm(now.plateIndex, now.wantedDeg);
      vibrate(40);
    } else if (ready) {
      bench.record();
      vibrate([40, 60, 40]);
    }
  };
  // A press too many, a key held down, a glove that rests on the button: none of them confirms the next plate unseen.
  const pressedAt = useRef(Number.NEGATIVE_INFINITY);
  const onMain = (): void => {
    const at = performance.now();
    const tooSoon = at - pressedAt.current < 350;
    pressedAt.current = at;
    if (!tooSoon) main();
  };
  const onOther = running && steps !== null ? () => setSheet('other') : null;

  const commands = useBenchCommands({
    enabled: sheet === 'none' && !blank,
    running,
    onMain,
    onOther,
    onTrouble: () => setSheet('trouble'),
    onBack: () => bench.canGoBack && bench.back(),
    onSettings: () => setSheet('settings'),
  });

  const told =
    now !== null && nowPlate !== undefined
      ? announcement(nowPlate.name, now, nowPlate.mount, bench.entry.side)
      : ready
        ? `Every dial of setting ${setting + 1} is confirmed. Record it.`
        : '';
  const mainLabel =
    now !== null && nowPlate !== undefined
      ? `${nowPlate.name} says ${dialText(now.wantedDeg, nowPlate.mount.resolutionDeg)}`
      : ready
        ? bench.next === null
          ? 'Record the last setting'
          : `Record and go to ${bench.next + 1}`
        : null;
  const again = steps === null ? undefined : bench.newest[setting];

  useEffect(() => {
    document.title = `Run ${run.summary.number}, ${run.summary.protocolName} – Quarterturn`;
  }, [run.summary.number, run.summary.protocolName]);

  return (
    <>
      <div className="bench" data-shape={shape} inert={sheet !== 'none' || blank}>
        <BenchNavigation
          homeHref={`/labs/${lab.id}`}
          targets={benchTargets(lab.id)}
          aside={<BenchAside savedAt={sending.savedAt} waiting={waitingCount} kept={bench.entry.kept} />}
        />
        <WaitingBand
          waiting={bench.entry.waiting}
          kept={bench.entry.kept}
          sending={sending}
          onDiscard={bench.entry.discard}
        />
        <BenchHead content={content} summary={run.summary} setting={setting} before={again} />
        <main id="page" tabIndex={-1} className="bench-stage">
          <p role="status" aria-live="polite" className="sr-only">
            {told}
          </p>
          {run.summary.state === 'paused' ? (
            <PausedBench
              summary={run.summary}
              settingNumber={steps === null ? null : setting + 1}
              mayRecord={mayRecord}
              busy={runState.busy}
              fault={runState.fault}
              onResume={runState.resume}
            />
          ) : isHeldUp ? (
            <VoidBench
              runNumber={run.summary.number}
              reasons={voidReasons(voids)}
              onPause={(note) => runState.pause(note)}
              onGoOn={goOn}
            />
          ) : steps === null ? (
            <PassedBench
              bench={bench}
              labels={content.targets.map(({ label }) => label)}
              mayRecord={mayRecord}
              finishWaitsFor={runState.busy ? 'the server to answer' : waitsForReadings}
              fault={runState.fault}
              onFinish={runState.finish}
            />
          ) : (
            <>
              <div className="bench-line">
                <div aria-hidden="true" className="bench-beam" />
                <ol className="bench-plates" data-count={plates.length} data-now={now?.plateIndex ?? 'none'}>
                  {steps.plates.map((step) => {
                    const plate = plates[step.plateIndex];
                    return plate === undefined ? null : (
                      <PlateStation
                        key={plate.id}
                        {...{ plate, step, shape }}
                        side={bench.entry.side}
                        plateCount={plates.length}
                      />
                    );
                  })}
                </ol>
              </div>
              {runState.fault !== '' && (
                <p role="alert" className="bench-fault hatched">
                  {runState.fault}
                </p>
              )}
              {ready && (
                <RecordStage note={bench.entry.note} onNote={bench.entry.setNote} onRecord={onMain} />
              )}
              {shape !== 'landscape' && now !== null && nowPlate !== undefined && (
                <div className="bench-scale">
                  <p>
                    when {nowPlate.name} says {dialText(now.wantedDeg, nowPlate.mount.resolutionDeg)}, the
                    scale under its index looks like this
                  </p>
                  <ScaleWindow
                    readingDeg={now.wantedDeg}
                    scale={nowPlate.mount}
                    viewedFrom={bench.entry.side}
                  />
                </div>
              )}
            </>
          )}
        </main>
        <BenchFoot
          bench={bench}
          content={content}
          shape={shape}
          readOnly={
            mayRecord ? null : `You are reading run ${run.summary.number}; nothing can be recorded from here.`
          }
          mainLabel={mainLabel}
          onMain={onMain}
          onOther={onOther}
          onTrouble={running ? () => setSheet('trouble') : null}
          onSettings={() => setSheet('settings')}
        />
      </div>
      {sheet === 'trouble' && (
        <TroubleSheet
          settingNumber={steps === null ? null : setting + 1}
          pauseWaitsFor={waitsForReadings}
          onSkip={(reason) => {
            bench.skip(reason);
            close();
          }}
          onPause={(note) => {
            runState.pause(note);
            close();
          }}
          onClose={close}
        />
      )}
      {sheet === 'other' && steps !== null && (
        <OtherReadingSheet
          content={content}
          settingIndex={setting}
          steps={steps}
          onKeep={(plateIndex, dialDeg) => {
            bench.confirm(plateIndex, dialDeg);
            close();
          }}
          onClose={close}
        />
      )}
      {sheet === 'settings' && (
        <SettingsSheet
          bench={bench}
          content={content}
          commands={commands}
          onGo={(index) => {
            bench.goTo(index);
            close();
          }}
          onBlank={() => {
            close();
            setBlank(true);
          }}
          onClose={close}
        />
      )}
      {blank && <BlankScreen onWake={() => setBlank(false)} />}
      <LeaveRunDialog
        running={running}
        runNumber={run.summary.number}
        settingNumber={steps === null ? null : setting + 1}
        recordHref={`/labs/${lab.id}/bench/runs/${runId}`}
      />
    </>
  );
}
