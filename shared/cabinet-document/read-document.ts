import { canonicalJson } from '../protocol/canonical-json';
import { checkDocument } from './check-document';
import { type CabinetDocument, cabinetFormat } from './document';
import { maxDocumentBytes, maxDocumentRows } from './limits';
import { inOrder } from './document-order';
import { FaultList, type FileFault } from './faults';
import { readCsv } from './read-csv';
import { isRecord, readParts } from './read-parts';
import { writeCsv } from './write-csv';

export const cabinetFileFormats = ['csv', 'json'] as const;
export type CabinetFileFormat = (typeof cabinetFileFormats)[number];

export type CabinetReading =
  | { readonly ok: true; readonly document: CabinetDocument }
  | { readonly ok: false; readonly faults: readonly FileFault[] };

/** A cabinet as the text of a file; `readCabinet` gives back the very same document. */
export function writeCabinet(document: CabinetDocument, format: CabinetFileFormat): string {
  return format === 'csv' ? writeCsv(document) : canonicalJson(inOrder(document));
}

/**
 * Reads a file of a cabinet, exactly or not at all: a document in its order, or every fault with its row and column, up to a
 * hundred. Never throws. `now` is the moment after which nothing has happened yet.
 */
export function readCabinet(text: string, format: CabinetFileFormat, now: Date): CabinetReading {
  const faults = new FaultList();
  const document = readText(text.startsWith('\ufeff') ? text.slice(1) : text, format, now, faults);
  return document === null ? { ok: false, faults: faults.list() } : { ok: true, document: inOrder(document) };
}

function readText(
  text: string,
  format: CabinetFileFormat,
  now: Date,
  faults: FaultList,
): CabinetDocument | null {
  if (text.length > maxDocumentBytes || new TextEncoder().encode(text).length > maxDocumentBytes) {
    const message = `The file is larger than ${maxDocumentBytes / 1024 / 1024} MB. Import it in parts.`;
    faults.add({ row: null, column: null, message });
    return null;
  }
  const binary = text.indexOf('\u0000');
  if (binary !== -1) {
    const row = text.slice(0, binary).split('\n').length;
    const message = 'There is a null character here, so this is no text. Choose a CSV or JSON file.';
    faults.add({ row, column: null, message });
    return null;
  }
  return format === 'csv' ? readCsv(text, now, faults) : readJson(text, now, faults);
}

function readJson(text: string, now: Date, faults: FaultList): CabinetDocument | null {
  const say = (column: string | null, message: string): null => {
    faults.add({ row: null, column, message });
    return null;
  };
  let raw: unknown;
  try {
    // The reviver takes as long as all the rest, and hardly a file needs it.
    raw = /[:,[\s]-0/u.test(text) ? JSON.parse(text, oneZero) : JSON.parse(text);
  } catch {
    return say(null, 'This is no JSON, or it is cut off. Choose a file that an export wrote.');
  }
  if (!isRecord(raw)) return say(null, 'The file holds no JSON object. Choose a file that an export wrote.');
  if (raw['format'] !== cabinetFormat) return say('format', `The format is not “${cabinetFormat}”.`);
  const strange = Object.keys(raw).find((key) => !['format', 'mounts', 'plates'].includes(key));
  if (strange !== undefined) return say(strange.slice(0, 40), 'There is no such field. Leave it out.');
  if (countRows(raw) > maxDocumentRows) {
    return say(
      null,
      `A file has at most ${maxDocumentRows} mounts, and as many calibrations. Import it in parts.`,
    );
  }
  const report = (path: readonly (string | number)[], message: string): boolean => {
    const name = nameAt(raw, path);
    const named = name === null || message.includes(name) ? message : `${name}: ${message}`;
    faults.add({ row: null, column: path.join('.').slice(0, 120), message: named });
    return !faults.isFull();
  };
  const document = readParts({ mounts: raw['mounts'], plates: raw['plates'] }, report);
  if (document !== null) checkDocument(document, now, report);
  return faults.isEmpty() ? document : null;
}

/** JSON can write −0, which no other format keeps apart from 0. */
function oneZero(_key: string, value: unknown): unknown {
  return value === 0 ? 0 : value;
}

/** Of the plate or mount that a path is in, for who can't count to it; null where it has none that could be meant. */
function nameAt(
  raw: Readonly<Record<string, unknown>>,
  [list, place, field]: readonly (string | number)[],
): string | null {
  if (typeof list !== 'string' || typeof place !== 'number' || field === 'name') return null;
  const part = listOf(raw[list])[place];
  const name = isRecord(part) ? part['name'] : null;
  return typeof name === 'string' && name.trim() !== '' ? name.slice(0, 20) : null;
}

const listOf = (value: unknown): readonly unknown[] => (Array.isArray(value) ? value : []);

/** As many rows as CSV would have for the mounts or for the plates, whichever is more: counted before anything is read. */
function countRows(raw: Readonly<Record<string, unknown>>): number {
  let rows = 0;
  for (const plate of listOf(raw['plates'])) {
    const seats = isRecord(plate) ? listOf(plate['seats']) : [];
    rows += seats.length === 0 ? 1 : 0;
    for (const seat of seats) rows += isRecord(seat) ? Math.max(1, listOf(seat['calibrations']).length) : 1;
  }
  return Math.max(rows, listOf(raw['mounts']).length);
}
