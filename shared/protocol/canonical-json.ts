import canonicalize from 'canonicalize';
import { sha256 } from '@noble/hashes/sha2.js';
import { bytesToHex, utf8ToBytes } from '@noble/hashes/utils.js';

/**
 * The one text of a JSON value: RFC 8785 (sorted keys, shortest numbers).
 * @throws TypeError for what JSON can't hold, and for half of a surrogate pair, which is no Unicode and so has no UTF-8.
 */
export function canonicalJson(value: unknown): string {
  requireWellFormed(value);
  return sortedJson(value);
}

/**
 * As `canonicalJson`, for what may hold half of a surrogate pair: it is written as JavaScript does, `\ud800`, which RFC
 * 8785 forbids. To tell values apart, never to be kept as a canonical text.
 * @throws TypeError for what JSON can't hold.
 */
export function sortedJson(value: unknown): string {
  const text = canonicalize(value);
  if (text === undefined) throw new TypeError('Canonical JSON needs a JSON value.');
  return text;
}

/** Before it is written: JSON.stringify hides half of a pair behind an escape, and the text looks well formed. */
function requireWellFormed(value: unknown): void {
  if (typeof value === 'string') {
    if (!value.isWellFormed()) throw new TypeError('Canonical JSON cannot hold half of a surrogate pair.');
  } else if (Array.isArray(value)) {
    value.forEach(requireWellFormed);
  } else if (typeof value === 'object' && value !== null) {
    for (const [key, inner] of Object.entries(value)) {
      requireWellFormed(key);
      requireWellFormed(inner);
    }
  }
}

/** SHA-256 of a text in UTF-8, 64 hexadecimal digits. */
export function contentHash(canonicalText: string): string {
  return bytesToHex(sha256(utf8ToBytes(canonicalText)));
}
