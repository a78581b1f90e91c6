/** What stands between the cells; the last never does, for text of one column. */
export type Delimiter = ',' | ';' | '\t' | '\u001f';

/**
 * What stands between the cells of a text: the tab or the semicolon when half the lines have one, else the comma when a line
 * has one outside quotes and brackets, else nothing: expressions are full of commas inside brackets.
 */
export function findDelimiter(text: string): Delimiter {
  const lines = { all: 0, '\t': 0, ';': 0, ',': 0 };
  for (const seen of shapes(text)) {
    lines.all += 1;
    if (seen.tab) lines['\t'] += 1;
    if (seen.semicolon) lines[';'] += 1;
    if (seen.comma) lines[','] += 1;
  }
  if (lines['\t'] > 0 && 2 * lines['\t'] >= lines.all) return '\t';
  if (lines[';'] > 0 && 2 * lines[';'] >= lines.all) return ';';
  return lines[','] > 0 ? ',' : '\u001f';
}

interface LineShape {
  tab: boolean;
  semicolon: boolean;
  comma: boolean;
}

/** Which delimiters each line with anything on it has outside quotes and brackets; comments aside. One pass. */
function shapes(text: string): readonly LineShape[] {
  const found: LineShape[] = [];
  let line: LineShape = { tab: false, semicolon: false, comma: false };
  let [depth, inQuotes, atCellStart, isEmpty, isComment] = [0, false, true, true, false];
  for (let at = 0; at <= text.length; at += 1) {
    const character = text.charAt(at);
    if (inQuotes && character !== '') {
      if (character === '"' && text.charAt(at + 1) === '"') at += 1;
      else if (character === '"') inQuotes = false;
      continue;
    }
    if (character === '\n' || character === '\r' || character === '') {
      if (!isEmpty && !isComment) found.push(line);
      line = { tab: false, semicolon: false, comma: false };
      [depth, inQuotes, atCellStart, isEmpty, isComment] = [0, false, true, true, false];
      continue;
    }
    if (isComment) continue;
    if (isEmpty && character === '#') isComment = true;
    if (character !== ' ') isEmpty = false;
    if (character === '"' && atCellStart) {
      inQuotes = true;
      atCellStart = false;
      continue;
    }
    if (character === '(' || character === '[') depth += 1;
    if ((character === ')' || character === ']') && depth > 0) depth -= 1;
    const isOutside = depth === 0;
    if (character === '\t') line.tab = true;
    if (character === ';' && isOutside) line.semicolon = true;
    if (character === ',' && isOutside) line.comma = true;
    atCellStart = character === '\t' || (isOutside && (character === ';' || character === ','));
  }
  return found;
}

/** Cells that were cut inside brackets, put together again: `D1`, `bloch(90deg` and ` 45deg)` are two cells. */
export function joinedCells(cells: readonly string[], delimiter: Delimiter): readonly string[] {
  const joined: string[] = [];
  let open = false;
  let depth = 0;
  for (const cell of cells) {
    const last = joined.length - 1;
    if (open) joined[last] = `${joined[last] ?? ''}${delimiter}${cell}`;
    else joined.push(cell);
    depth = Math.max(0, depth + depthOf(cell));
    open = depth > 0;
  }
  return joined;
}

function depthOf(cell: string): number {
  let depth = 0;
  for (const character of cell) {
    if (character === '(' || character === '[') depth += 1;
    if (character === ')' || character === ']') depth -= 1;
  }
  return depth;
}
