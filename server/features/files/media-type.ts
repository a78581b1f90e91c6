import { fileTypeFromBuffer } from 'file-type';
import { mediaTypeSchema, type MediaType } from '../../../shared/schemas';

/** What a text never holds: control characters but tab, line feed, form feed and carriage return. */
const notText = new Set([...Array(32).keys(), 127].filter((code) => ![9, 10, 12, 13].includes(code)));

export type Recognised =
  | { readonly ok: true; readonly mediaType: MediaType }
  /** What it is instead, for a sentence: "a ZIP archive (application/zip)". */
  | { readonly ok: false; readonly what: string };

/** What a file is, by its content: neither its name nor what its sender says of it counts. */
export async function recognise(bytes: Buffer): Promise<Recognised> {
  const found = await fileTypeFromBuffer(bytes);
  const known = mediaTypeSchema.safeParse(found?.mime);
  if (known.success) return { ok: true, mediaType: known.data };
  if (found !== undefined) return { ok: false, what: `${found.ext.toUpperCase()} (${found.mime})` };
  return isText(bytes)
    ? { ok: true, mediaType: 'text/plain' }
    : { ok: false, what: 'neither text nor a kind of file that is known here' };
}

/** UTF-8, a single-byte encoding, or UTF-16 with its mark: whoever reads the text looks closer. */
function isText(bytes: Buffer): boolean {
  const mark = bytes.subarray(0, 2).toString('hex');
  if (mark === 'fffe' || mark === 'feff') return true;
  return !bytes.some((byte) => notText.has(byte));
}
