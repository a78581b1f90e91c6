import { groupDigits, missingSign } from './signs';
import { fixed, type ScientificParts } from './uncertain';

/**
 * 1 − F as `2.5` and −5. Rounding errors just under 0 are 0; a value that is missing or no number has `—` and no power.
 */
export function formatInfidelity(infidelity: number | null, decimals = 1): ScientificParts {
  if (infidelity === null || !Number.isFinite(infidelity)) return { mantissa: missingSign, exponent: null };
  if (infidelity <= 0) return { mantissa: '0', exponent: null };
  const [mantissa = '0', exponent = '0'] = infidelity.toExponential(decimals).split('e');
  return { mantissa, exponent: Number(exponent) };
}

/** 1 − F in plain ASCII, as it is copied: `2.5e-5`. */
export function infidelityAscii(infidelity: number | null, decimals = 1): string {
  const { mantissa, exponent } = formatInfidelity(infidelity, decimals);
  return exponent === null ? (mantissa === missingSign ? '' : mantissa) : `${mantissa}e${exponent}`;
}

/** F as the readout, grouped: `0.999 975`. As many digits as it takes to show two of 1 − F, at least six, at most twelve. */
export function formatFidelity(fidelity: number | null): string {
  if (fidelity === null || !Number.isFinite(fidelity)) return missingSign;
  const clamped = Math.min(1, Math.max(0, fidelity));
  const infidelity = 1 - clamped;
  const digits = infidelity <= 0 ? 6 : Math.min(12, Math.max(6, Math.ceil(-Math.log10(infidelity)) + 1));
  return groupDigits(fixed(clamped, digits));
}
