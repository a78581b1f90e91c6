/** Someone that mail can be sent to. */
export interface Mailbox {
  readonly name: string;
  readonly address: string;
}

/**
 * One plain address: no quoted local part, no comment, no route, nothing that a header or an SMTP command is made of.
 * Stricter than RFC 5321, and so never read in two ways.
 */
const plainAddress = /^[^\p{C}\p{Z}"'`\\<>()[\]{},:;@]{1,64}@[^\p{C}\p{Z}"'`\\<>()[\]{},:;@]{1,190}$/u;
const unprintable = /[\p{Cc}\p{Cf}\p{Cs}\p{Zl}\p{Zp}]/gu;

/**
 * The mailbox of a person as their account gives name and address, neither of them written by us. A name loses what cannot
 * be printed; null where the address is no plain one.
 */
export function mailboxOf(person: { readonly name: string; readonly email: string | null }): Mailbox | null {
  const { name, email } = person;
  if (email === null || !isPlainAddress(email)) return null;
  return { name: name.replaceAll(unprintable, ' ').trim().slice(0, 200), address: email };
}

export function isPlainAddress(text: string): boolean {
  return plainAddress.test(text);
}

/** @throws RangeError for a subject that is no single line: whoever wrote it let something in that a header is made of. */
export function requireLine(subject: string): string {
  if (subject.trim() === '' || subject.length > 200 || subject.search(unprintable) !== -1) {
    throw new RangeError('a subject is one line that can be printed');
  }
  return subject;
}
