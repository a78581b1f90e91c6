import canonicalize from 'canonicalize';
import { sha256 } from '@noble/hashes/sha2.js';
import { bytesToHex, utf8ToBytes } from '@noble/hashes/utils.js';

/**
 * The one text of a JSON value: RFC 8785 (sorted keys, shortest numbers).
 * @throws TypeError for what JSON can't hold, and for half of a surrogate pair, which UTF-8 would silently replace.
 */
export function canonicalJson(value: unknown): string {
  const text = canonicalize(value);
  if (text === undefined) throw new TypeError('Canonical JSON needs a JSON value.');
  if (!text.isWellFormed()) throw new TypeError('Canonical JSON cannot hold half of a surrogate pair.');
  return text;
}

/** SHA-256 of a text in UTF-8, 64 hexadecimal digits. */
export function contentHash(canonicalText: string): string {
  return bytesToHex(sha256(utf8ToBytes(canonicalText)));
}
