import { ellipseOf } from '../../shared/optics/ellipse';
import type { Stokes } from '../../shared/optics/stokes';

/** A point as the receiver sees it, in units of the whole amplitude: x along H, y along V, upwards. */
interface FieldPoint {
  readonly x: number;
  readonly y: number;
}

/** What the tip of the field draws in one period, with the two places where arrowheads stand. */
export interface EllipseOutline {
  readonly azimuthDeg: number;
  /** Half axes, in units of the whole amplitude; `minor` is 0 for linear light. */
  readonly major: number;
  readonly minor: number;
  /** +1 where the field turns counter-clockwise to the receiver, −1 where clockwise, 0 for linear light. */
  readonly sense: 1 | -1 | 0;
  readonly heads: readonly { readonly at: FieldPoint; readonly towardsDeg: number }[];
}

/** Flatter than this, in half axes, it is drawn as a line: no hand could be seen. */
const FLAT = 0.012;

export function ellipseOutline(state: Stokes): EllipseOutline {
  const { azimuthRad, ellipticityRad } = ellipseOf(state);
  const major = Math.cos(ellipticityRad);
  const minor = Math.abs(Math.sin(ellipticityRad));
  const sense = minor < FLAT ? 0 : ellipticityRad > 0 ? 1 : -1;
  const [sin, cos] = [Math.sin(azimuthRad), Math.cos(azimuthRad)];
  const turned = (along: number, across: number): FieldPoint => ({
    x: along * cos - across * sin,
    y: along * sin + across * cos,
  });
  const heads =
    sense === 0
      ? []
      : [1, -1].map((end) => {
          // Just past the end of the long axis, where the outline runs straight again.
          const phase = sense * 0.42;
          const at = turned(end * major * Math.cos(phase), end * minor * Math.sin(phase));
          const ahead = turned(-end * major * Math.sin(phase) * sense, end * minor * Math.cos(phase) * sense);
          return { at, towardsDeg: (Math.atan2(ahead.y, ahead.x) * 180) / Math.PI };
        });
  return { azimuthDeg: (azimuthRad * 180) / Math.PI, major, minor, sense, heads };
}
