import type { Bench } from '../../../shared/schemas/benches';
import type { VersionContent } from '../../../shared/schemas/versions';

export interface StalePlate {
  readonly name: string;
  /** What became of the plate since the version froze it. */
  readonly reason: 'recalibrated' | 'not in this place';
  readonly measuredAt: string | null;
}

/** The plates whose frozen calibration is no longer the bench's: the version's dials were made for another state of them. */
export function stalePlates(content: VersionContent, bench: Bench): StalePlate[] {
  return content.bench.plates.flatMap((frozen, index): StalePlate[] => {
    const live = bench.plates[index];
    if (live?.id !== frozen.id) return [{ name: frozen.name, reason: 'not in this place', measuredAt: null }];
    if (live.calibration.id === frozen.calibration.id) return [];
    return [{ name: frozen.name, reason: 'recalibrated', measuredAt: live.calibration.measuredAt }];
  });
}
