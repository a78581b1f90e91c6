import type { Contribution } from '../../../../shared/optics/budget';
import { radians, toDegrees } from '../../../../shared/optics/units';
import type { Plate } from '../../../../shared/schemas/cabinet';

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
  if (unit === 'ratio') return sigma.toExponential(0).replace('-', '\u2212');
  const value = unit === 'rad' ? toDegrees(radians(sigma)) : sigma;
  const shown = value >= 0.1 ? value.toFixed(1) : String(Number(value.toPrecision(1)));
  return unit === 'rad' ? `${shown}°` : `${shown}${gap}${unit}`;
}
