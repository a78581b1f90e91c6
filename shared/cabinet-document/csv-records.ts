/** One row of a CSV text. */
export interface CsvRecord {
  /** As a spreadsheet counts: a row whose cells run over lines is one. */
  readonly row: number;
  readonly cells: readonly string[];
  /** Why the row cannot be read; nothing behind it can. */
  readonly fault: string | null;
}

/**
 * The rows of a text by RFC 4180, one after the other, so that a reader can stop. Stricter than a spreadsheet: a quote that is
 * not closed, or that stands inside a plain cell, is a fault and no guess.
 */
export function* csvRecords(text: string, delimiter: ',' | ';'): Generator<CsvRecord> {
  const scanner = new Scanner(text, delimiter);
  for (let row = 1; !scanner.isAtEnd; row += 1) yield { row, ...scanner.record() };
}

class Scanner {
  private at = 0;

  constructor(
    private readonly text: string,
    private readonly delimiter: string,
  ) {}

  get isAtEnd(): boolean {
    return this.at >= this.text.length;
  }

  record(): Omit<CsvRecord, 'row'> {
    const cells: string[] = [];
    for (;;) {
      const cell = this.text.charAt(this.at) === '"' ? this.quoted() : this.plain();
      if (!cell.ok) {
        this.at = this.text.length;
        return { cells, fault: cell.fault };
      }
      cells.push(cell.text);
      const next = this.text.charAt(this.at);
      this.at += next === '\r' && this.text.charAt(this.at + 1) === '\n' ? 2 : 1;
      if (next !== this.delimiter) return { cells, fault: null };
    }
  }

  private plain(): ScannedCell {
    const start = this.at;
    while (!this.isAtEnd && !this.isCellEnd()) {
      if (this.text.charAt(this.at) === '"') {
        return {
          ok: false,
          fault:
            'A quote stands inside a cell that does not begin with one. Quote the whole cell and double the quotes in it.',
        };
      }
      this.at += 1;
    }
    return { ok: true, text: this.text.slice(start, this.at) };
  }

  private quoted(): ScannedCell {
    let text = '';
    for (;;) {
      const end = this.text.indexOf('"', this.at + 1);
      if (end === -1) {
        return {
          ok: false,
          fault: 'A quote is opened here and never closed. The file may be cut off in this row.',
        };
      }
      text += this.text.slice(this.at + 1, end);
      this.at = end + 1;
      if (this.text.charAt(this.at) !== '"') break;
      text += '"';
    }
    if (this.isAtEnd || this.isCellEnd()) return { ok: true, text };
    return {
      ok: false,
      fault: 'Text stands behind a closing quote. Double the quotes inside a quoted cell.',
    };
  }

  private isCellEnd(): boolean {
    const character = this.text.charAt(this.at);
    return character === this.delimiter || character === '\n' || character === '\r';
  }
}

type ScannedCell =
  { readonly ok: true; readonly text: string } | { readonly ok: false; readonly fault: string };
