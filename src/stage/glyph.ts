import { type Convention, showEllipse } from '../../shared/optics/convention';
import { ellipseOf } from '../../shared/optics/ellipse';
import type { Stokes } from '../../shared/optics/stokes';
import { toDegrees } from '../../shared/optics/units';
import { formatAngle } from '../lib/format';
import { LINEAR_WITHIN_DEG, NAMED_WITHIN_DEG } from '../sphere/path-words';
import { basisStates } from '../sphere/scene';
import { angleBetweenDeg } from '../sphere/vec';

interface StateGlyph {
  readonly psiDeg: number;
  readonly chiDeg: number;
  readonly sense: 'clockwise' | 'counter-clockwise' | 'none';
  /** The basis state's letter in this lab, where the state is one. */
  readonly letter: string | null;
  readonly azimuth: string;
  /** With the sign of S3 as this lab shows it. */
  readonly shownChiDeg: number;
}

/** What a small ellipse needs, from a canonical state. */
export function glyphOf(state: Stokes, convention: Convention): StateGlyph {
  const { azimuthRad, ellipticityRad } = ellipseOf(state);
  const psiDeg = toDegrees(azimuthRad);
  const chiDeg = toDegrees(ellipticityRad);
  const basis = basisStates(convention).find((one) => angleBetweenDeg(one.state, state) < NAMED_WITHIN_DEG);
  return {
    psiDeg,
    chiDeg,
    sense: Math.abs(chiDeg) < LINEAR_WITHIN_DEG ? 'none' : chiDeg > 0 ? 'counter-clockwise' : 'clockwise',
    letter: basis?.letter ?? null,
    azimuth: formatAngle(psiDeg),
    shownChiDeg: toDegrees(showEllipse(state, convention).shownEllipticityRad),
  };
}
