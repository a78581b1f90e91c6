/** Where the first byte stands that begins no character of UTF-8; −1 where all do. The table is Unicode's 3-7. */
export function firstInvalidUtf8(bytes: Uint8Array): number {
  let at = 0;
  while (at < bytes.length) {
    const length = sequenceLength(bytes, at);
    if (length === 0) return at;
    at += length;
  }
  return -1;
}

/** Bytes of the well-formed character at `at`; 0 where there is none. */
function sequenceLength(bytes: Uint8Array, at: number): number {
  const lead = bytes[at] ?? 0;
  if (lead < 0x80) return 1;
  const length = lead < 0xc2 ? 0 : lead < 0xe0 ? 2 : lead < 0xf0 ? 3 : lead < 0xf5 ? 4 : 0;
  const low = lead === 0xe0 ? 0xa0 : lead === 0xf0 ? 0x90 : 0x80;
  const high = lead === 0xed ? 0x9f : lead === 0xf4 ? 0x8f : 0xbf;
  for (let next = 1; next < length; next += 1) {
    const byte = bytes[at + next] ?? 0;
    if (byte < (next === 1 ? low : 0x80) || byte > (next === 1 ? high : 0xbf)) return 0;
  }
  return length;
}
