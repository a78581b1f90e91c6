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
  readonly announce: (text: string, politeness?: Politeness) => void;
}

const nothing: Announcement = { text: '', count: 0 };

export const useLiveRegion = create<LiveRegionState>()((set) => ({
  polite: nothing,
  assertive: nothing,
  announce: (text, politeness = 'polite') => {
    set((state) => ({ [politeness]: { text, count: state[politeness].count + 1 } }));
  },
}));

/** Says something to who can't see it happen: saved, three readings wait. Faults are `assertive`. */
export function announce(text: string, politeness: Politeness = 'polite'): void {
  useLiveRegion.getState().announce(text, politeness);
}
