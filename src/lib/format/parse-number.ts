export type TypedNumber =
  | { readonly ok: true; readonly value: number }
  | { readonly ok: false; readonly fault: 'empty' | 'comma' | 'not-a-number' | 'too-large' };

// No two parts can take the same characters, so a long line of digits costs linear time.
const shape = /^[+-]?(?:\d+(?:\.\d*)?|\.\d+)(?:e[+-]?\d{1,4})?$/i;

/** Reads a number as people type it: `1e-3`, `.5`, a true minus, gaps between groups. A comma is refused, not guessed at. */
export function parseTypedNumber(text: string): TypedNumber {
  const plain = text.replaceAll('\u2212', '-').replace(/\s/g, '');
  if (plain === '') return { ok: false, fault: 'empty' };
  if (plain.length > 64) return { ok: false, fault: 'not-a-number' };
  if (/^[+-]?[\d.]*,\d+$/.test(plain)) return { ok: false, fault: 'comma' };
  if (!shape.test(plain)) return { ok: false, fault: 'not-a-number' };
  const value = Number(plain);
  return Number.isFinite(value) ? { ok: true, value } : { ok: false, fault: 'too-large' };
}

/** What to write instead of a number with a decimal comma: the same digits with a point. Points before the comma were gaps between groups. */
export function commaSentence(text: string): string {
  return `Write a point in place of the comma: ${text.replace(/[\s.]/g, '').replace(',', '.')}.`;
}
