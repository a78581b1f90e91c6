import type { Contribution } from '../../../../shared/optics/budget';
import { radians, toDegrees } from '../../../../shared/optics/units';
import type { Plate } from '../../../../shared/schemas/cabinet';
import { withTrueMinus } from '../../../lib/format';

const gap = '\u202f';

const sharedNames = {
  wavelength: 'the wavelength',
  temperature: 'the temperature',
  polariser: 'the polariser’s angle',
  extinction: 'the polariser’s leak',
  retardance: 'retardance',
  zero: 'zero',
  dial: 'dial',
} as const;

/** "Q-B retardance", "the wavelength". */
export function contributionName({ kind, plate }: Contribution, plates: readonly Plate[]): string {
  return plate === null ? sharedNames[kind] : `${plates[plate]?.name ?? ''} ${sharedNames[kind]}`;
}

/** Its σ, or the leak itself, with two figures at most and its unit. */
export function sigmaText({ sigma, unit }: Contribution): string {
  const value = unit === 'rad' ? toDegrees(radians(sigma)) : sigma;
  const rounded = Number(value.toPrecision(2));
  const shown = withTrueMinus(unit === 'ratio' ? rounded.toExponential() : String(rounded));
  if (unit === 'ratio') return shown;
  return unit === 'rad' ? `${shown}°` : `${shown}${gap}${unit}`;
}
