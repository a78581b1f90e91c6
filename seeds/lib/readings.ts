import type { RecordReading, Version } from '../../shared/schemas';

/** What was really dialled: as asked, but for these settings, whose dials missed by some steps of the mount. */
export function dialled(
  version: Version,
  count: number,
  missedSteps: Readonly<Record<number, readonly number[]>> = {},
  skipped: Readonly<Record<number, string>> = {},
): RecordReading[] {
  return version.content.targets.slice(0, count).map((target, settingIndex) => {
    const reason = skipped[settingIndex];
    if (reason !== undefined) return { outcome: 'skipped', settingIndex, note: reason };
    const dials = target.solutions[target.chosenSolution]?.dialsDeg ?? [];
    const missed = missedSteps[settingIndex] ?? [];
    return {
      outcome: 'done',
      settingIndex,
      dialledDeg: dials.map((dial, plate) => {
        const step = version.content.bench.plates[plate]?.mount.resolutionDeg ?? 0;
        const said = dial + (missed[plate] ?? 0) * step;
        return Number((((said % 360) + 360) % 360).toFixed(3)) % 360;
      }),
      note: '',
    };
  });
}
