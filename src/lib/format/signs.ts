/** U+2212, the minus of every number on a page. */
export const minusSign = '\u2212';
/** U+202F between groups of three in plain text. The faces lack it, so `NumberText` draws it as a margin. */
export const thinGap = '\u202F';
/** What stands where a number is missing; never 0 or blank. */
export const missingSign = '\u2014';

/** A hyphen in front of digits or an exponent becomes the true minus. */
export function withTrueMinus(text: string): string {
  return text.replaceAll('-', minusSign);
}

/** What a copied number pastes as: ASCII, no gaps, so that a spreadsheet and our own fields read it. */
export function toPlainAscii(text: string): string {
  return text.replaceAll(minusSign, '-').replace(/[\u202F\u2009\u00A0]/g, '');
}

/**
 * Groups of three from 1 000 on, `12 345`, and after the point where there are more than four digits, `0.999 975`: four may stay
 * together (NIST SP 811, 10.5.3, from memory). Takes plain digits with an optional sign and point.
 */
export function groupDigits(text: string): string {
  const match = /^([-\u2212+]?)(\d+)(?:\.(\d+))?$/.exec(text);
  if (match === null) return text;
  const [, sign = '', whole = '', fraction] = match;
  const left = whole.length > 3 ? whole.replace(/\B(?=(?:\d{3})+$)/g, thinGap) : whole;
  if (fraction === undefined) return sign + left;
  const right = fraction.length > 4 ? (fraction.match(/\d{1,3}/g) ?? []).join(thinGap) : fraction;
  return `${sign}${left}.${right}`;
}
