import { dialDecimals, roundDial } from '../../../shared/optics/dial';
import { degrees, wrap } from '../../../shared/optics/units';
import { missingSign, withTrueMinus } from './signs';
import { fixed } from './uncertain';

/** A dial reading, a bare number at its mount's resolution, always with that many decimals: `187.0`. 359.97 is `0.0`, never `360.0`. */
export function formatDial(readingDeg: number | null, resolutionDeg = 0.1): string {
  if (readingDeg === null || !Number.isFinite(readingDeg)) return missingSign;
  const decimals = dialDecimals(resolutionDeg);
  const text = fixed(roundDial(degrees(readingDeg), resolutionDeg), decimals);
  return Number(text) >= 360 ? fixed(0, decimals) : text;
}

/** θ of a fast axis in table degrees, [0, 180), two decimals and no sign of degree: `114.73`. */
export function formatTheta(fastAxisDeg: number | null): string {
  if (fastAxisDeg === null || !Number.isFinite(fastAxisDeg)) return missingSign;
  const text = fixed(wrap(fastAxisDeg, 180), 2);
  return text === '180.00' ? '0.00' : text;
}

/** An angle with its sign of degree closed up: `−37.8°`. */
export function formatAngle(angleDeg: number | null, decimals = 1): string {
  if (angleDeg === null || !Number.isFinite(angleDeg)) return missingSign;
  return `${withTrueMinus(fixed(angleDeg, decimals))}°`;
}

/** A change, always signed unless it is nothing: `+0.1`, `−0.3`, `0.0`. */
export function formatChange(change: number | null, decimals = 1): string {
  if (change === null || !Number.isFinite(change)) return missingSign;
  const text = fixed(change, decimals);
  return Number(text) > 0 ? `+${text}` : withTrueMinus(text);
}
