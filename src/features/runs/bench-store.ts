import { createStore } from 'zustand';
import type { RecordReading, Run } from '../../../shared/schemas/runs';
import type { ViewedFrom } from '../../components/dial-words';
import {
  type BenchCursor,
  type BenchKeeping,
  emptyEntry,
  type KeptEntry,
  type WaitingReading,
} from './kept-entry';
import { lastSequence, onlyOwnSince, overtaken } from './overtaken';
import type { TurnedSince } from './standing-dials';

interface OpenedWith {
  /** Dials that were turned at the setting being left, with nothing recorded there; null to keep what is known. */
  readonly turnedSince: TurnedSince | null;
  /** What the setting begins with: the numbers and the note of the reading that it takes back up. */
  readonly confirmedDeg?: readonly (number | null)[];
  readonly note?: string;
}

export interface BenchState extends KeptEntry {
  /** Whether this browser keeps the entry through a reload. */
  readonly kept: boolean;
  readonly openSetting: (setting: number, opened: OpenedWith) => void;
  readonly confirm: (plateIndex: number, dialDeg: number) => void;
  /** Takes the last confirmation of the open setting back. False when there is none. */
  readonly takeBack: () => boolean;
  readonly setNote: (note: string) => void;
  readonly stand: (side: ViewedFrom) => void;
  /** Puts a reading in the queue to the server and opens the next setting. */
  readonly record: (waiting: WaitingReading, nextSetting: number, turnedSince: TurnedSince | null) => void;
  /** With the run as the server answered it; without, where another tab was answered. */
  readonly acknowledged: (key: string, run?: Run) => void;
  /** Takes note of what the server holds: where that is more than the entry was made over, nothing of it is confirmed any more. */
  readonly meet: (run: Run) => void;
  /** Takes a reading that the server will not have out of the queue: the person decided so. */
  readonly discard: (key: string) => void;
}

/** The cursor of one bench: setting, plates confirmed, what waits. Every change is kept at once. */
export function createBenchStore(keeping: BenchKeeping, plateCount: number) {
  const from = keeping.entry();
  const none = Array.from({ length: plateCount }, (): number | null => null);
  return createStore<BenchState>()((set, get) => {
    const change = (part: Partial<KeptEntry>) => {
      const { setting, confirmedDeg, note, turnedSince, side, madeOver, waiting } = { ...get(), ...part };
      const cursor: BenchCursor = { setting, confirmedDeg, note, turnedSince, side, madeOver };
      const kept = keeping.keepCursor(cursor) && waiting.every((reading) => keeping.keepReading(reading));
      set({ ...cursor, waiting, kept });
    };
    const takeOut = (key: string, madeOver = get().madeOver) => {
      keeping.dropReading(key);
      change({ madeOver, waiting: get().waiting.filter((reading) => reading.key !== key) });
    };
    return {
      ...emptyEntry,
      ...from,
      confirmedDeg: from.confirmedDeg.length === plateCount ? from.confirmedDeg : none,
      kept: true,
      openSetting: (setting, { turnedSince, confirmedDeg = none, note = '' }) =>
        change({
          setting,
          confirmedDeg: [...confirmedDeg],
          note,
          turnedSince: copied(turnedSince ?? get().turnedSince),
        }),
      confirm: (plateIndex, dialDeg) =>
        change({
          confirmedDeg: none.map((_, plate) =>
            plate === plateIndex ? dialDeg : (get().confirmedDeg[plate] ?? null),
          ),
        }),
      takeBack: () => {
        const { confirmedDeg } = get();
        const last = confirmedDeg.findLastIndex((dial) => dial !== null);
        if (last === -1) return false;
        change({ confirmedDeg: confirmedDeg.map((dial, plate) => (plate === last ? null : dial)) });
        return true;
      },
      setNote: (note) => change({ note }),
      stand: (side) => change({ side }),
      record: (waiting, nextSetting, turnedSince) =>
        change({
          waiting: [...get().waiting, waiting],
          setting: nextSetting,
          confirmedDeg: none,
          note: '',
          turnedSince: copied(turnedSince),
        }),
      acknowledged: (key, run) => {
        const { waiting, madeOver } = get();
        const own = waiting.find((reading) => reading.key === key);
        const alone = run !== undefined && own !== undefined && onlyOwnSince(run, madeOver, own);
        takeOut(key, alone ? lastSequence(run) : madeOver);
      },
      meet: (run) => {
        if (lastSequence(run) > get().madeOver) change(overtaken(get(), run));
      },
      discard: (key) => takeOut(key),
    };
  });
}

export type BenchStore = ReturnType<typeof createBenchStore>;

/** A kept entry's arrays are its own. */
function copied(turnedSince: TurnedSince | null): KeptEntry['turnedSince'] {
  return turnedSince === null
    ? null
    : { sequence: turnedSince.sequence, dialsDeg: [...turnedSince.dialsDeg] };
}

/** What goes to the server for the open setting. */
export function readingBody(
  settingIndex: number,
  dialledDeg: readonly number[],
  note: string,
): RecordReading {
  return { outcome: 'done', settingIndex, dialledDeg: [...dialledDeg], note: note.trim() };
}
