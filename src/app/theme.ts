import { useEffect } from 'react';
import { create } from 'zustand';
import {
  type Appearance,
  type BenchTheme,
  defaultAppearance,
  type LampInk,
  type LampLevel,
  parseAppearance,
  type ThemeChoice,
  themeFor,
} from './appearance';

// public/theme.js reads both before the first paint.
const keptAs = 'quarterturn.appearance';
const benchAs = 'quarterturn.bench';

interface ThemeState extends Appearance {
  readonly onBench: boolean;
  readonly systemIsDark: boolean;
  readonly choose: (choice: ThemeChoice) => void;
  readonly chooseBenchTheme: (benchTheme: BenchTheme) => void;
  readonly setLamp: (lamp: LampLevel) => void;
  readonly setLampInk: (lampInk: LampInk) => void;
  readonly setOnBench: (onBench: boolean) => void;
  readonly setSystemIsDark: (systemIsDark: boolean) => void;
}

function read(): Appearance {
  try {
    return parseAppearance(window.localStorage.getItem(keptAs));
  } catch {
    // A browser that forbids storage still shows the page.
    return defaultAppearance;
  }
}

function keep({ choice, benchTheme, lamp, lampInk }: Appearance, onBench: boolean): void {
  try {
    window.localStorage.setItem(keptAs, JSON.stringify({ choice, benchTheme, lamp, lampInk }));
    window.sessionStorage.setItem(benchAs, onBench ? '1' : '0');
  } catch {
    // As above: the choice then lasts as long as the page.
  }
}

/** How pages look on this device. Kept in the browser, since a tablet in a dark lab and a desk differ for the same person. */
export const useTheme = create<ThemeState>()((set) => ({
  ...read(),
  onBench: false,
  systemIsDark:
    typeof window.matchMedia === 'function' && window.matchMedia('(prefers-color-scheme: dark)').matches,
  choose: (choice) => {
    set({ choice });
  },
  chooseBenchTheme: (benchTheme) => {
    set({ benchTheme });
  },
  setLamp: (lamp) => {
    set({ lamp });
  },
  setLampInk: (lampInk) => {
    set({ lampInk });
  },
  setOnBench: (onBench) => {
    set({ onBench });
  },
  setSystemIsDark: (systemIsDark) => {
    set({ systemIsDark });
  },
}));

/** Writes the theme to the page and keeps it. Call it once, at the root. */
export function useThemeOnPage(): void {
  useEffect(() => {
    const write = (state: ThemeState): void => {
      const page = document.documentElement;
      page.dataset['theme'] = themeFor(state, state.onBench, state.systemIsDark);
      page.dataset['lamp'] = state.lamp;
      page.dataset['lampInk'] = state.lampInk;
      keep(state, state.onBench);
    };
    write(useTheme.getState());
    const stop = useTheme.subscribe(write);
    if (typeof window.matchMedia !== 'function') return stop;
    const query = window.matchMedia('(prefers-color-scheme: dark)');
    const follow = (): void => {
      useTheme.getState().setSystemIsDark(query.matches);
    };
    query.addEventListener('change', follow);
    return () => {
      query.removeEventListener('change', follow);
      stop();
    };
  }, []);
}

/** Makes the page the bench while it is shown: dark room, unless the operator chose daylight. */
export function useBenchTheme(): void {
  const setOnBench = useTheme((state) => state.setOnBench);
  useEffect(() => {
    setOnBench(true);
    return () => {
      setOnBench(false);
    };
  }, [setOnBench]);
}
