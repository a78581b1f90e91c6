import type { CirclePoint } from './trig-quadratic';

const LONGEST_STEP = 0.3;

/** The point turned by a small angle (its arctangent, exactly: no trigonometry needed on the way to a root). */
export function turned({ cos, sin }: CirclePoint, angle: number): CirclePoint {
  const by = angle > LONGEST_STEP ? LONGEST_STEP : angle < -LONGEST_STEP ? -LONGEST_STEP : angle;
  const c = cos - by * sin;
  const s = sin + by * cos;
  const scale = 1 / Math.sqrt(c * c + s * s);
  return { cos: c * scale, sin: s * scale };
}
