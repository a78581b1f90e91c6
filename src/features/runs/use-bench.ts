import { useMemo } from 'react';
import { useStore } from 'zustand';
import type { Reading, Run } from '../../../shared/schemas/runs';
import type { VersionContent } from '../../../shared/schemas/versions';
import { newIdempotencyKey } from '../../lib/api';
import { settingSteps, type SettingSteps, type StepMount } from './bench-steps';
import { type BenchState, type BenchStore, readingBody } from './bench-store';
import { wantedDials } from './dial-cost';
import type { WaitingReading } from './kept-entry';
import {
  newestReadings,
  nextOpen,
  resumeSetting,
  type SettingOutcome,
  settingOutcomes,
} from './run-progress';
import { lastDone, standingDials, type TurnedSince } from './standing-dials';

/** A reading as the bench sees it: acknowledged, or still waiting on this device. */
export interface BenchReading extends Pick<
  Reading,
  'sequence' | 'settingIndex' | 'outcome' | 'dialledDeg' | 'note' | 'recordedAt'
> {
  /** Null while it waits. */
  readonly recordedBy: string | null;
}

/** What the server has, then what waits here as if it had arrived, so that the bench goes on without the network. */
function allReadings(run: Run, waiting: readonly WaitingReading[]): BenchReading[] {
  const newest = run.readings.reduce((sequence, reading) => Math.max(sequence, reading.sequence), 0);
  return [
    ...run.readings,
    ...waiting.map(({ body, typedAt }, index) => ({
      sequence: newest + index + 1,
      settingIndex: body.settingIndex,
      outcome: body.outcome,
      dialledDeg: body.outcome === 'done' ? body.dialledDeg : [],
      note: body.note,
      recordedAt: typedAt,
      recordedBy: null,
    })),
  ];
}

export interface Bench {
  readonly entry: BenchState;
  readonly mounts: readonly StepMount[];
  readonly settingCount: number;
  /** Place of the open setting, from 0; equal to `settingCount` when all are passed. */
  readonly setting: number;
  readonly outcomes: readonly SettingOutcome[];
  readonly readings: readonly BenchReading[];
  /** The newest reading of each setting. */
  readonly newest: readonly (BenchReading | undefined)[];
  /** Null when all settings are passed. */
  readonly steps: SettingSteps | null;
  /** The setting that recording this one opens; null when none is left. */
  readonly next: number | null;
  readonly canGoBack: boolean;
  readonly confirm: (plateIndex: number, dialDeg: number) => void;
  readonly record: () => void;
  readonly skip: (reason: string) => void;
  readonly goTo: (setting: number) => void;
  readonly back: () => void;
}

/** One run at the bench: what the version wants, what has been read, where the dials stand, and what comes next. */
export function useBench(run: Run, content: VersionContent, store: BenchStore): Bench {
  const entry = useStore(store);
  const settingCount = content.targets.length;
  const { waiting, confirmedDeg, turnedSince, side, note } = entry;
  const readings = useMemo(() => allReadings(run, waiting), [run, waiting]);
  const outcomes = settingOutcomes(readings, settingCount);
  const setting = Math.min(entry.setting ?? resumeSetting(readings, settingCount), settingCount);
  const standingDeg = standingDials(run.startDialsDeg, readings, turnedSince);
  const mounts = content.bench.plates.map(({ mount }) => mount);
  const steps =
    setting < settingCount
      ? settingSteps({ mounts, wantedDeg: wantedDials(content, setting), standingDeg, confirmedDeg, side })
      : null;
  const next = nextOpen(
    outcomes.map((outcome, index) => (index === setting && outcome === 'open' ? 'done' : outcome)),
    setting,
  );

  /** Dials that were turned here and that no reading will tell of. */
  const turned = (): TurnedSince | null =>
    confirmedDeg.some((dial) => dial !== null)
      ? {
          sequence: lastDone(readings)?.sequence ?? 0,
          dialsDeg: standingDeg.map((stood, plate) => confirmedDeg[plate] ?? stood),
        }
      : turnedSince;

  const goTo = (index: number): void => {
    const last = lastDone(readings);
    const nowTurned = turned();
    const untouched = nowTurned === null || nowTurned.sequence < (last?.sequence ?? 0);
    // The last reading can be put right as long as the dials still stand as it says.
    const takenUp = last !== null && last.settingIndex === index && untouched;
    entry.openSetting(index, {
      turnedSince: nowTurned,
      ...(takenUp ? { confirmedDeg: last.dialledDeg, note: last.note } : {}),
    });
  };

  const put = (body: WaitingReading['body'], since: TurnedSince | null): void =>
    entry.record(
      { key: newIdempotencyKey(), body, typedAt: new Date().toISOString() },
      next ?? settingCount,
      since,
    );

  return {
    entry,
    mounts,
    settingCount,
    setting,
    outcomes,
    readings,
    newest: newestReadings(readings, settingCount),
    steps,
    next,
    canGoBack: setting > 0 || confirmedDeg.some((dial) => dial !== null),
    confirm: (plateIndex, dialDeg) => {
      if (entry.setting === null) entry.openSetting(setting, { turnedSince: null });
      entry.confirm(plateIndex, dialDeg);
    },
    record: () => {
      if (steps !== null && steps.dialledDeg !== null)
        put(readingBody(setting, steps.dialledDeg, note), null);
    },
    skip: (reason) => put({ outcome: 'skipped', settingIndex: setting, note: reason.trim() }, turned()),
    goTo,
    back: () => {
      if (setting < settingCount && entry.takeBack()) return;
      if (setting > 0) goTo(setting - 1);
    },
  };
}
