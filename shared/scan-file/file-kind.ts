const EXPORT_TABLE = 'Open it in its program and save the table as CSV, then choose that file.';
const CHOOSE_OTHER = 'Choose the text file that the measurement wrote.';

/** What a file is that isn't a text of numbers, and what to do about it. */
export interface OtherKind {
  readonly name: string;
  readonly remedy: string;
}

interface Signature extends OtherKind {
  readonly bytes: readonly number[];
}

const ascii = (text: string): number[] => Array.from(text, (character) => character.charCodeAt(0));

/** First bytes, from the formats' own definitions (values from memory). */
const SIGNATURES: readonly Signature[] = [
  { name: 'a PNG picture', bytes: [0x89, ...ascii('PNG')], remedy: CHOOSE_OTHER },
  { name: 'a JPEG picture', bytes: [0xff, 0xd8, 0xff], remedy: CHOOSE_OTHER },
  { name: 'a GIF picture', bytes: ascii('GIF8'), remedy: CHOOSE_OTHER },
  { name: 'a TIFF picture', bytes: [...ascii('II*'), 0], remedy: CHOOSE_OTHER },
  { name: 'a TIFF picture', bytes: [...ascii('MM'), 0, 0x2a], remedy: CHOOSE_OTHER },
  { name: 'a PDF document', bytes: ascii('%PDF-'), remedy: CHOOSE_OTHER },
  {
    name: 'a file packed with gzip',
    bytes: [0x1f, 0x8b],
    remedy: 'Unpack it, then choose the file in it.',
  },
  {
    name: 'a spreadsheet of the old binary form (.xls)',
    bytes: [0xd0, 0xcf, 0x11, 0xe0, 0xa1, 0xb1, 0x1a, 0xe1],
    remedy: EXPORT_TABLE,
  },
  {
    name: 'a file packed with 7z',
    bytes: [...ascii('7z'), 0xbc, 0xaf, 0x27, 0x1c],
    remedy: 'Unpack it, then choose the file in it.',
  },
  {
    name: 'a file packed with xz',
    bytes: [0xfd, ...ascii('7zXZ'), 0],
    remedy: 'Unpack it, then choose the file in it.',
  },
  { name: 'an HDF5 file', bytes: [0x89, ...ascii('HDF')], remedy: EXPORT_TABLE },
  { name: 'a database file', bytes: ascii('SQLite format 3'), remedy: EXPORT_TABLE },
  { name: 'a rich-text document', bytes: ascii('{\\rtf'), remedy: 'Save it as plain text.' },
  { name: 'a web page', bytes: ascii('<!DOCTYPE'), remedy: EXPORT_TABLE },
  { name: 'a web page', bytes: ascii('<html'), remedy: EXPORT_TABLE },
  { name: 'an XML document', bytes: ascii('<?xml'), remedy: EXPORT_TABLE },
  { name: 'a JSON document', bytes: ascii('{"'), remedy: 'Write the table as CSV, then choose that file.' },
];

const ZIP = [...ascii('PK'), 3, 4];

/** What the first bytes say that the file is, where that is no text of numbers; null otherwise. */
export function otherKind(bytes: Uint8Array): OtherKind | null {
  if (startsWith(bytes, ZIP)) return zipKind(bytes);
  return SIGNATURES.find((signature) => startsWith(bytes, signature.bytes)) ?? null;
}

/** Both new forms of spreadsheets are archives; the names of their first members tell them from others. */
function zipKind(bytes: Uint8Array): OtherKind {
  let start = '';
  for (const byte of bytes.subarray(0, 4096)) start += String.fromCharCode(byte);
  if (start.includes('opendocument.spreadsheet')) {
    return { name: 'an OpenDocument spreadsheet (.ods)', remedy: EXPORT_TABLE };
  }
  if (start.includes('[Content_Types].xml') || start.includes('xl/')) {
    return { name: 'an Office Open XML file, as spreadsheets are (.xlsx)', remedy: EXPORT_TABLE };
  }
  return { name: 'a ZIP archive', remedy: 'Unpack it, then choose the file in it.' };
}

function startsWith(bytes: Uint8Array, start: readonly number[]): boolean {
  return bytes.length >= start.length && start.every((byte, at) => bytes[at] === byte);
}
