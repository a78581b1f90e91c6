import { type Convention, CONVENTION_SETS } from '../../../shared/optics';
import { EVERY_CONVENTION } from './flag-words';
import type { Chosen } from './compared-rows';

export type WrittenKind = 'state' | 'unitary';

/** What the page's address says. */
export interface WrittenAddress {
  readonly kind: WrittenKind;
  /** Null where the address names none. */
  readonly source: string | null;
  /** A set's id or the three flags; null where the address names none that is known. */
  readonly chosen: Chosen | null;
  /** What the address names as a convention and nobody knows. */
  readonly unknown: string | null;
}

/** The three flags as one word of an address: "kz-wt.receiver.L". */
export function flagCode({ phase, handedness, s3Sign }: Convention): string {
  return `${phase}.${handedness}.${s3Sign}`;
}

/** What an address, a select or a link names: a set's id, else flags. */
export function chosenCode({ setId, convention }: Chosen): string {
  return setId ?? flagCode(convention);
}

/** The convention behind such a code, null for one that nobody knows. */
export function chosenOf(code: string): Chosen | null {
  const set = CONVENTION_SETS.find(({ id }) => id === code);
  if (set !== undefined) return { convention: set.convention, setId: set.id };
  const flags = EVERY_CONVENTION.find((convention) => flagCode(convention) === code);
  return flags === undefined ? null : { convention: flags, setId: null };
}

export function readAddress(search: URLSearchParams): WrittenAddress {
  const unitary = search.get('unitary');
  const code = search.get('in');
  const chosen = code === null ? null : chosenOf(code);
  return {
    kind: unitary === null ? 'state' : 'unitary',
    source: unitary ?? search.get('state'),
    chosen,
    unknown: code !== null && chosen === null ? code : null,
  };
}

/**
 * What is written and in which convention, as an address that means the same to whoever opens it: flags, never "mine".
 */
export function addressSearch(kind: WrittenKind, source: string, chosen: Chosen): URLSearchParams {
  return new URLSearchParams({ [kind]: source, in: chosenCode(chosen) });
}

/** A link to the page, with an expression and the flags that it is written in. */
export function conventionsHref(kind: WrittenKind, source: string, convention: Convention): string {
  return `/conventions?${addressSearch(kind, source, { convention, setId: null }).toString()}`;
}
