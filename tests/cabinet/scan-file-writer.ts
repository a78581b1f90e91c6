import type { AngleUnit, ColumnMapping, Delimiter, PowerUnit } from '../../shared/scan-file';

/** How a file is written; every combination that `isPossible` allows has one meaning. */
export interface Dialect {
  readonly delimiter: Delimiter;
  readonly decimal: 'point' | 'comma';
  readonly encoding: 'utf-8' | 'utf-8 bom' | 'utf-16le' | 'utf-16be' | 'latin-1';
  readonly header: 'names' | 'comment' | 'units below' | 'none';
  readonly comment: '' | '#' | '%' | '//' | ';';
  readonly newline: '\n' | '\r\n' | '\r';
  readonly isEnded: boolean;
  readonly isQuoted: boolean;
  readonly hasUnicodeMinus: boolean;
  readonly hasSigmas: boolean;
  readonly angle: { readonly unit: AngleUnit; readonly text: string };
  readonly crossed: { readonly unit: PowerUnit; readonly text: string };
  readonly parallel: { readonly unit: PowerUnit; readonly text: string };
}

export type Row = readonly [
  dial: number,
  crossed: number,
  parallel: number,
  crossedSigma: number,
  parallelSigma: number,
];

const SIGNS: Readonly<Record<Delimiter, string>> = {
  comma: ',',
  semicolon: ';',
  tab: '\t',
  pipe: '|',
  spaces: '  ',
};

/** Decimal commas between commas need quotes; semicolons can't do two jobs; Latin-1 has no U+2212. */
export function isPossible(dialect: Dialect): boolean {
  const { delimiter, decimal, comment, encoding, isQuoted, hasUnicodeMinus } = dialect;
  if (delimiter === 'comma' && decimal === 'comma' && !isQuoted) return false;
  if (delimiter === 'semicolon' && comment === ';') return false;
  return !(encoding === 'latin-1' && hasUnicodeMinus);
}

export function writeScan(rows: readonly Row[], dialect: Dialect): Uint8Array {
  const { comment, newline, isEnded } = dialect;
  const remark = comment === '' ? [] : [`${comment} lamp on, 5 V; note | 7`];
  const body = rows.map((row) => cellsOf(row, dialect));
  const lines = [...remark, ...headerLines(dialect), ...body.slice(0, 1), ...remark, ...body.slice(1)];
  return encoded(`${lines.join(newline)}${isEnded ? newline : ''}`, dialect.encoding);
}

function cellsOf(row: Row, dialect: Dialect): string {
  const { decimal, isQuoted, hasUnicodeMinus, hasSigmas, delimiter } = dialect;
  const cells = row.slice(0, hasSigmas ? 5 : 3).map((value) => {
    const plain = decimal === 'comma' ? String(value).replace('.', ',') : String(value);
    const text = hasUnicodeMinus ? plain.replaceAll('-', '\u2212') : plain;
    return isQuoted ? `"${text}"` : text;
  });
  return cells.join(SIGNS[delimiter]);
}

function headerLines({ header, hasSigmas, delimiter, comment, ...units }: Dialect): readonly string[] {
  if (header === 'none') return [];
  const names = ['dial', 'crossed', 'parallel', 'sigma crossed', 'sigma parallel'].slice(
    0,
    hasSigmas ? 5 : 3,
  );
  const { angle, crossed, parallel } = units;
  const texts = [angle.text, crossed.text, parallel.text, crossed.text, parallel.text].slice(0, names.length);
  const sign = SIGNS[delimiter];
  if (header === 'units below') return [names.join(sign), texts.join(sign)];
  const line = names.map((name, at) => `${name} [${texts[at] ?? ''}]`).join(sign);
  return [header === 'comment' ? `${comment === '' ? '#' : comment} ${line}` : line];
}

/** For files without a header. */
export function mappingFor({ angle, crossed, parallel, hasSigmas }: Dialect): ColumnMapping {
  return {
    dial: { column: 0, unit: angle.unit },
    crossed: { column: 1, unit: crossed.unit },
    parallel: { column: 2, unit: parallel.unit },
    crossedSigma: hasSigmas ? { column: 3, unit: crossed.unit } : null,
    parallelSigma: hasSigmas ? { column: 4, unit: parallel.unit } : null,
  };
}

export function encoded(text: string, encoding: Dialect['encoding']): Uint8Array {
  switch (encoding) {
    case 'utf-8':
      return new TextEncoder().encode(text);
    case 'utf-8 bom':
      return new TextEncoder().encode(`\ufeff${text}`);
    case 'utf-16le':
    case 'utf-16be': {
      const bytes = new Uint8Array(2 * text.length + 2);
      const view = new DataView(bytes.buffer);
      Array.from(`\ufeff${text}`).forEach((character, at) =>
        view.setUint16(2 * at, character.charCodeAt(0), encoding === 'utf-16le'),
      );
      return bytes;
    }
    case 'latin-1':
      return Uint8Array.from(text, (character) => character.charCodeAt(0));
  }
}
