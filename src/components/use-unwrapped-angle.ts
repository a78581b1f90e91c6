import { useState } from 'react';
import { wrapSigned } from '../../shared/optics/units';

/**
 * The angle to draw at, running on past full turns, so that a transition goes the short way round, as the hand would turn it:
 * from 350 to 10 by 20, not back by 340.
 */
export function useUnwrappedAngle(angleDeg: number): number {
  const [drawn, setDrawn] = useState(angleDeg);
  const next = drawn + wrapSigned(angleDeg - drawn, 360);
  if (Math.abs(next - drawn) > 1e-9) setDrawn(next);
  return next;
}
