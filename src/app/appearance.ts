/** What a person may choose about how pages look on this device. */
export type ThemeChoice = 'day' | 'evening' | 'system';
export type ThemeName = 'day' | 'evening' | 'dark-room';
export type LampLevel = 'low' | 'mid' | 'high';
export type LampInk = 'amber' | 'red';
export type BenchTheme = 'dark-room' | 'day';

export interface Appearance {
  readonly choice: ThemeChoice;
  /** The bench is dark unless the operator picked daylight. */
  readonly benchTheme: BenchTheme;
  /** 60, 100 or 140 % of the dark room's luminances. */
  readonly lamp: LampLevel;
  /** Red for detectors that see amber. */
  readonly lampInk: LampInk;
}

export const defaultAppearance: Appearance = {
  choice: 'system',
  benchTheme: 'dark-room',
  lamp: 'mid',
  lampInk: 'amber',
};

/** The theme to show: the bench first, then the choice, then what the system says. */
export function themeFor(appearance: Appearance, onBench: boolean, systemIsDark: boolean): ThemeName {
  if (onBench) return appearance.benchTheme;
  if (appearance.choice === 'system') return systemIsDark ? 'evening' : 'day';
  return appearance.choice;
}

function oneOf<T extends string>(value: unknown, allowed: readonly T[], otherwise: T): T {
  return allowed.find((item) => item === value) ?? otherwise;
}

/** Reads what was kept; anything unknown falls back to its default, so that an old or broken entry never blocks a page. */
export function parseAppearance(text: string | null): Appearance {
  if (text === null) return defaultAppearance;
  let kept: unknown;
  try {
    kept = JSON.parse(text);
  } catch {
    return defaultAppearance;
  }
  const field = (name: keyof Appearance): unknown =>
    typeof kept === 'object' && kept !== null ? Reflect.get(kept, name) : undefined;
  return {
    choice: oneOf(field('choice'), ['day', 'evening', 'system'], defaultAppearance.choice),
    benchTheme: oneOf(field('benchTheme'), ['dark-room', 'day'], defaultAppearance.benchTheme),
    lamp: oneOf(field('lamp'), ['low', 'mid', 'high'], defaultAppearance.lamp),
    lampInk: oneOf(field('lampInk'), ['amber', 'red'], defaultAppearance.lampInk),
  };
}
