import { otherKind } from './file-kind';
import { MAX_SCAN_BYTES, type ScanEncoding } from './types';
import { firstInvalidUtf8 } from './utf8';

export type Decoded =
  | { readonly ok: true; readonly text: string; readonly encoding: ScanEncoding }
  | { readonly ok: false; readonly line: number; readonly what: string; readonly remedy: string };

const SAVE_UTF8 = 'Save it as plain text in UTF-8, then choose it again.';

/**
 * What of Latin-1 a lab's header holds: ° µ ± and the like, and letters of western languages. Left out are the bytes with which
 * UTF-8 begins Latin letters, Greek and signs (Â Ã Î Ï â ï): a file with those is mixed or damaged, and no guess is made.
 */
const LATIN_1 = new Set(
  Array.from('\u00a0§°±²³µ·º½ÄÖÜäöüßÉéèêëàáåÅæøØçñóòôúùûíì', (character) => character.charCodeAt(0)),
);

/** The text of a file, or why it is none. Never throws. */
export function decode(bytes: Uint8Array): Decoded {
  if (bytes.length > MAX_SCAN_BYTES) {
    const size = (bytes.length / 1024 / 1024).toFixed(1);
    return refused(1, `This file has ${size} MB; the most is 10 MB.`, 'Keep one scan a file.');
  }
  const kind = otherKind(bytes);
  if (kind !== null) return refused(1, `This is ${kind.name}, not a text of numbers.`, kind.remedy);
  if (bytes[0] === 0xff && bytes[1] === 0xfe) return utf16(bytes, 'utf-16le', 'UTF-16 little-endian');
  if (bytes[0] === 0xfe && bytes[1] === 0xff) return utf16(bytes, 'utf-16be', 'UTF-16 big-endian');
  const nul = bytes.indexOf(0);
  if (nul !== -1) return refusedNul(lineOf(bytes, nul));
  return oneByteText(bytes);
}

function oneByteText(bytes: Uint8Array): Decoded {
  const hasMark = bytes[0] === 0xef && bytes[1] === 0xbb && bytes[2] === 0xbf;
  const invalid = firstInvalidUtf8(bytes);
  if (invalid === -1) {
    // The decoder takes the mark away.
    const text = new TextDecoder('utf-8').decode(bytes);
    return { ok: true, text, encoding: hasMark ? 'UTF-8 with a byte order mark' : 'UTF-8' };
  }
  if (!hasMark && bytes.every((byte) => byte < 0x80 || LATIN_1.has(byte))) {
    // Between 0xa0 and 0xff, all that gets here, Windows-1252 is Latin-1.
    return { ok: true, text: new TextDecoder('windows-1252').decode(bytes), encoding: 'Latin-1' };
  }
  return refused(
    lineOf(bytes, invalid),
    `A byte here (0x${(bytes[invalid] ?? 0).toString(16).toUpperCase()}) is not UTF-8, and the file is not all Latin-1 either: it mixes encodings, is damaged, or is no text.`,
    SAVE_UTF8,
  );
}

function utf16(bytes: Uint8Array, label: 'utf-16le' | 'utf-16be', encoding: ScanEncoding): Decoded {
  const text = new TextDecoder(label).decode(bytes);
  // Lone surrogates and a last odd byte become U+FFFD, which no instrument writes on purpose.
  const bad = text.indexOf('\ufffd');
  if (bad !== -1) {
    return refused(
      lineOfText(text, bad),
      `A character here is not ${encoding}; the file is damaged or was cut off.`,
      SAVE_UTF8,
    );
  }
  const nul = text.indexOf('\u0000');
  return nul === -1 ? { ok: true, text, encoding } : refusedNul(lineOfText(text, nul));
}

function refusedNul(line: number): Decoded {
  return refused(
    line,
    'A byte here is zero, which no text has; the file is binary, or UTF-16 without its byte order mark.',
    SAVE_UTF8,
  );
}

function refused(line: number, what: string, remedy: string): Decoded {
  return { ok: false, line, what, remedy };
}

function lineOf(bytes: Uint8Array, end: number): number {
  let line = 1;
  for (let at = 0; at < end; at += 1) {
    if (bytes[at] === 0x0a || (bytes[at] === 0x0d && bytes[at + 1] !== 0x0a)) line += 1;
  }
  return line;
}

function lineOfText(text: string, end: number): number {
  let line = 1;
  for (let at = 0; at < end; at += 1) {
    const character = text.charAt(at);
    if (character === '\n' || (character === '\r' && text.charAt(at + 1) !== '\n')) line += 1;
  }
  return line;
}
