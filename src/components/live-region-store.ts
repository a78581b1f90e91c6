import { create } from 'zustand';

type Politeness = 'polite' | 'assertive';

interface Announcement {
  readonly text: string;
  /** Changes with every announcement, so that the same words twice are read twice. */
  readonly count: number;
}

interface LiveRegionState {
  readonly polite: Announcement;
  readonly assertive: Announcement;
  /** What was just done, for everybody to read; its text is '' when it is long enough ago. */
  readonly done: Announcement;
  /** The foot of the page, where sentences stand for a while; null where a page has none. */
  readonly foot: HTMLElement | null;
  readonly announce: (text: string, politeness?: Politeness) => void;
  readonly sayDone: (sentence: string) => void;
  readonly stand: (foot: HTMLElement | null) => void;
}

const nothing: Announcement = { text: '', count: 0 };

export const useLiveRegion = create<LiveRegionState>()((set) => ({
  polite: nothing,
  assertive: nothing,
  done: nothing,
  foot: null,
  announce: (text, politeness = 'polite') => {
    set((state) => ({ [politeness]: { text, count: state[politeness].count + 1 } }));
  },
  sayDone: (text) => {
    set(({ done }) => ({ done: { text, count: done.count + 1 } }));
  },
  stand: (foot) => {
    set({ foot });
  },
}));

/** Says something to who can't see it happen: saved, three readings wait. Faults are `assertive`. */
export function announce(text: string, politeness: Politeness = 'polite'): void {
  useLiveRegion.getState().announce(text, politeness);
}

/** Says at the foot of the page what was just done, where the page itself changes too little or too far away to show it. */
export function sayDone(sentence: string): void {
  useLiveRegion.getState().sayDone(sentence);
}
