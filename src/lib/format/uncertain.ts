import { groupDigits, missingSign, withTrueMinus } from './signs';

/** Where a value and its standard uncertainty are cut: the power of ten of the last digit, and the bracket's digits. */
interface UncertainPlace {
  readonly exponent: number;
  readonly bracket: string;
}

/** The exponent of the leading digit of a positive number. `toExponential` rounds in decimal, which `log10` doesn't. */
function leadingExponent(value: number): number {
  return Number(value.toExponential(15).split('e')[1]);
}

/** `value` rounded to whole units of 10^exponent, as decimal digits. */
function unitsOf(value: number, exponent: number): string {
  const [digits = '0', power = '0'] = value.toExponential(15).split('e');
  return Number(`${digits}e${Number(power) - exponent}`).toFixed(0);
}

/**
 * One digit of uncertainty, two if its first is 1 (GUM 7.2.6 allows at most two). 0.96 becomes 1.0, and 0.195 becomes 0.2, so
 * the first digit is judged after rounding. Null when sigma isn't a positive finite number.
 */
function uncertainPlace(sigma: number): UncertainPlace | null {
  if (!Number.isFinite(sigma) || sigma <= 0) return null;
  const lead = leadingExponent(sigma);
  const two = unitsOf(sigma, lead - 1);
  if (two.length === 2 && two.startsWith('1')) return { exponent: lead - 1, bracket: two };
  const one = unitsOf(sigma, lead);
  return one.length === 2 ? { exponent: lead, bracket: one } : { exponent: lead, bracket: one };
}

/**
 * `86.9(4)`, `−0.82(5)`, `12.46(14)`. An uncertainty left of the point is written out, `1 230 ± 30`, since a bracket there
 * would be misread. A missing value is `—`; without a usable sigma the value stands alone, in `decimals` if given. Sizes
 * that fixed digits can't hold come as `1.8(5) × 10^−9` in plain text; a page uses `uncertainScientific` for them.
 */
export function formatUncertain(value: number | null, sigma: number | null, decimals?: number): string {
  if (value === null || !Number.isFinite(value)) return missingSign;
  const place = sigma === null ? null : uncertainPlace(sigma);
  if (place === null)
    return withTrueMinus(groupDigits(decimals === undefined ? plainDigits(value) : fixed(value, decimals)));
  if (place.exponent > 0 && place.exponent < 12 && Math.abs(value) < 1e15) {
    const unit = 10 ** place.exponent;
    const rounded = Math.round(value / unit) * unit;
    const size = Number(place.bracket) * unit;
    return withTrueMinus(`${groupDigits(fixed(rounded, 0))} ± ${groupDigits(fixed(size, 0))}`);
  }
  if (place.exponent > 0 || place.exponent < -12 || Math.abs(value) >= 1e15) {
    const parts = uncertainScientific(value, sigma);
    return parts.exponent === null
      ? parts.mantissa
      : `${parts.mantissa} × 10^${withTrueMinus(String(parts.exponent))}`;
  }
  return withTrueMinus(`${groupDigits(fixed(value, -place.exponent))}(${place.bracket})`);
}

/** A number in two parts: what stands before `× 10`, and the exponent, or null when there is no power of ten to write. */
export interface ScientificParts {
  readonly mantissa: string;
  readonly exponent: number | null;
}

/** `1.8(5)` and −4. With `exponent` given the power is kept, so that a column shares one: `11.0(14) × 10⁻⁴`. */
export function uncertainScientific(
  value: number | null,
  sigma: number | null,
  exponent?: number,
): ScientificParts {
  if (value === null || !Number.isFinite(value)) return { mantissa: missingSign, exponent: null };
  const reference = value === 0 ? (sigma ?? 0) : Math.abs(value);
  if (reference === 0 || !Number.isFinite(reference)) return { mantissa: '0', exponent: null };
  const power = exponent ?? leadingExponent(reference);
  const scaled = shift(value, -power);
  const scaledSigma = sigma === null ? null : shift(sigma, -power);
  const place = scaledSigma === null ? null : uncertainPlace(scaledSigma);
  if (place === null) return { mantissa: withTrueMinus(fixed(scaled, 1)), exponent: power };
  const decimals = Math.min(20, Math.max(0, -place.exponent));
  const bracket =
    place.exponent > 0 ? place.bracket + '0'.repeat(Math.min(20, place.exponent)) : place.bracket;
  return { mantissa: withTrueMinus(`${fixed(scaled, decimals)}(${bracket})`), exponent: power };
}

/** value · 10^power without the error that a multiplication by 1e−5 brings into the last digit. */
function shift(value: number, power: number): number {
  const [digits = '0', own = '0'] = value.toExponential(15).split('e');
  return Number(`${digits}e${Number(own) + power}`);
}

/** `toFixed` that never writes −0.0. */
export function fixed(value: number, decimals: number): string {
  const text = value.toFixed(Math.min(100, Math.max(0, decimals)));
  return /^-0(?:\.0+)?$/.test(text) ? text.slice(1) : text;
}

function plainDigits(value: number): string {
  const rounded = Number(value.toPrecision(6));
  return Math.abs(rounded) >= 1e15 || (rounded !== 0 && Math.abs(rounded) < 1e-6)
    ? String(rounded)
    : fixed(rounded, Math.min(12, Math.max(0, 5 - leadingExponent(Math.abs(rounded) || 1)))).replace(
        /\.?0+$/,
        '',
      );
}
