import { parseTypedNumber, withTrueMinus } from '../format';

/** The number that was typed, or NaN where there is none, which the schema's sentence then explains. */
export function readTypedNumber(text: string): number {
  const typed = parseTypedNumber(text);
  return typed.ok ? typed.value : NaN;
}

/** As `readTypedNumber`; an empty field is "not stated". */
export function readOptionalNumber(text: string): number | null {
  return text.trim() === '' ? null : readTypedNumber(text);
}

/** A stored number as it stands in a field to begin with: its shortest digits, a true minus. */
export function typedFromNumber(value: number): string {
  return withTrueMinus(String(value));
}

export function typedFromOptional(value: number | null): string {
  return value === null ? '' : typedFromNumber(value);
}
