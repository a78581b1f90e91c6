import type { DialScale } from '../../shared/optics/dial';
import type { ViewedFrom } from './dial-words';

/** Ticks thin out with size, so that two never touch: the step between two in degrees, for a housing of this radius in px. */
export function tickStepDeg(radius: number): number {
  if (radius >= 120) return 1;
  if (radius >= 90) return 2;
  if (radius >= 52) return 5;
  if (radius >= 30) return 10;
  return 15;
}

/** How far apart the engraved numbers are. */
export function numberStepDeg(radius: number): 30 | 90 | null {
  if (radius >= 90) return 30;
  return radius >= 44 ? 90 : null;
}

/** One tick of the graduated ring. */
interface Tick {
  readonly dialDeg: number;
  readonly rank: 'long' | 'middle' | 'fine';
}

/** Long every 30°; between them the tens, or the fives where every degree has its tick; the rest are fine. */
export function ringTicks(stepDeg: number): readonly Tick[] {
  const middleStep = stepDeg === 1 ? 5 : stepDeg === 15 ? 15 : 10;
  return Array.from({ length: Math.round(360 / stepDeg) }, (_, index) => {
    const dialDeg = index * stepDeg;
    const rank = dialDeg % 30 === 0 ? 'long' : dialDeg % middleStep === 0 ? 'middle' : 'fine';
    return { dialDeg, rank };
  });
}

/** A table angle as it is seen: from the source side left and right change places. */
export function seenAngle(tableDeg: number, viewedFrom: ViewedFrom): number {
  return viewedFrom === 'source' ? 180 - tableDeg : tableDeg;
}

/**
 * Where the number `dialDeg` stands on the page, counter-clockwise from the right, when `readingDeg` is under an index at
 * `indexAtDeg`. A mount turned counter-clockwise by t reads `direction · t` more, so the number n stands
 * direction · (reading − n) counter-clockwise of the index.
 */
export function numberAngle(
  dialDeg: number,
  readingDeg: number,
  { direction }: Pick<DialScale, 'direction'>,
  indexAtDeg: number,
  viewedFrom: ViewedFrom,
): number {
  return seenAngle(indexAtDeg + direction * (readingDeg - dialDeg), viewedFrom);
}
