import { monthNames } from '../../../shared/words';
import type { Mailbox } from '../../mail';

/** "16 June 2026", by UTC: a mail does not know where it is read. */
export function dateWords(date: Date): string {
  return `${date.getUTCDate()} ${monthNames[date.getUTCMonth()] ?? ''} ${date.getUTCFullYear()}`;
}

/** How a mail begins. */
export function greeting({ name, address }: Mailbox): string {
  return `${name === '' ? address : name},`;
}

/** "1 plate", "3 plates". */
export function countOf(count: number, noun: string): string {
  return `${count} ${noun}${count === 1 ? '' : 's'}`;
}

/** 4.2 × 10⁻⁴ as plain text writes it: "4.2e-4". */
export function infidelityWords(value: number): string {
  return value === 0 ? '0' : value.toExponential(1).replace('e+0', '');
}
