import type { Mailbox } from '../../mail';

const months = [
  'January',
  'February',
  'March',
  'April',
  'May',
  'June',
  'July',
  'August',
  'September',
  'October',
  'November',
  'December',
] as const;

/** "16 June 2026", by UTC: a mail does not know where it is read. */
export function dateWords(date: Date): string {
  return `${date.getUTCDate()} ${months[date.getUTCMonth()] ?? ''} ${date.getUTCFullYear()}`;
}

/** How a mail begins. */
export function greeting({ name, address }: Mailbox): string {
  return `${name === '' ? address : name},`;
}

/** "signal arm", "signal arm and diode table". */
export function listed(names: readonly string[]): string {
  const last = names.at(-1) ?? '';
  return names.length < 2 ? last : `${names.slice(0, -1).join(', ')} and ${last}`;
}

/** "1 plate", "3 plates". */
export function countOf(count: number, noun: string): string {
  return `${count} ${noun}${count === 1 ? '' : 's'}`;
}

/** 4.2 × 10⁻⁴ as plain text writes it: "4.2e-4". */
export function infidelityWords(value: number): string {
  return value === 0 ? '0' : value.toExponential(1).replace('e+0', '');
}
