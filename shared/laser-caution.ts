import type { LaserClass } from './schemas/benches';

/** Classes of IEC 60825-1 whose beam is not held to be able to hurt an eye at once; all others get the caution. */
const classesWithoutCaution: ReadonlySet<LaserClass> = new Set<LaserClass>(['1', '1M', '2', '2M']);

/** Whether the full caution is shown before a run. A class that the lab has not stated is treated as one that can hurt. */
export function needsCaution(laserClass: LaserClass): boolean {
  return !classesWithoutCaution.has(laserClass);
}
