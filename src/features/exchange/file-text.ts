import type { CabinetFileFormat } from '../../../shared/cabinet-document';
import { maxDocumentBytes } from '../../../shared/cabinet-document/limits';

/** A file as it was read, and what it is by its content. */
export interface CabinetFile {
  /** Null where it was pasted. */
  readonly name: string | null;
  readonly fileText: string;
  readonly format: CabinetFileFormat;
}

export type FileReading =
  { readonly ok: true; readonly file: CabinetFile } | { readonly ok: false; readonly sentence: string };

/** Of JSON the first sign is a brace; no header of ours has one. */
function formatOf(text: string): CabinetFileFormat {
  return /^\s*\{/u.test(text) ? 'json' : 'csv';
}

export const pastedFile = (fileText: string): CabinetFile => ({
  name: null,
  fileText,
  format: formatOf(fileText),
});

/** Reads a file as UTF-8, exactly: a character that cannot be read would be imported as another. */
export async function readFile(file: File): Promise<FileReading> {
  if (file.size > maxDocumentBytes) {
    const size = (file.size / 1024 / 1024).toFixed(1);
    const sentence = `${file.name} has ${size} MB, and ${maxDocumentBytes / 1024 / 1024} MB is the most that is imported at once. Import it in parts.`;
    return { ok: false, sentence };
  }
  let fileText: string;
  try {
    fileText = new TextDecoder('utf-8', { fatal: true }).decode(await file.arrayBuffer());
  } catch {
    const sentence = `${file.name} is no text in UTF-8. Save it as “CSV UTF-8” and choose it again.`;
    return { ok: false, sentence };
  }
  return { ok: true, file: { name: file.name, fileText, format: formatOf(fileText) } };
}
