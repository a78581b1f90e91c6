import { ExpressionError, type Span } from './span';
import type { KetLabel } from './tree';
import { longestWord, misleadingWord, unknownWord, type Wanted, type Word } from './words';

export type Symbol = '+' | '-' | '*' | '/' | '^' | '(' | ')' | '[' | ']' | ',' | '√';

export type Token = { readonly span: Span } & (
  | { readonly kind: 'number'; readonly value: number }
  | { readonly kind: 'symbol'; readonly symbol: Symbol }
  | { readonly kind: 'ket'; readonly label: KetLabel }
  | Word
);

const SPACES = ' \t\n\r\u00a0\u2002\u2003\u2009\u200a\u202f\u2060\ufeff';

function symbolOf(character: string): Symbol | null {
  switch (character) {
    case '+':
    case '*':
    case '/':
    case '^':
    case '(':
    case ')':
    case '[':
    case ']':
    case ',':
    case '√':
      return character;
    case '-':
    case '−':
    case '–':
      return '-';
    case '·':
    case '⋅':
    case '×':
    case '∙':
      return '*';
    case '÷':
    case '∕':
    case '⁄':
      return '/';
    default:
      return null;
  }
}

function isDigit(character: string | undefined): boolean {
  return character !== undefined && character >= '0' && character <= '9';
}

function isLetter(character: string | undefined): boolean {
  return (
    character !== undefined &&
    ((character >= 'a' && character <= 'z') || (character >= 'A' && character <= 'Z') || character === 'π')
  );
}

/** Splits a source into tokens in one pass. @throws ExpressionError at the first character that isn't of the grammar. */
export function tokenise(source: string, wanted: Wanted = 'state'): readonly Token[] {
  const tokens: Token[] = [];
  let at = 0;
  while (at < source.length) {
    const character = source.charAt(at);
    if (SPACES.includes(character)) {
      at += 1;
      continue;
    }
    const symbol = symbolOf(character);
    if (symbol !== null) {
      tokens.push({ kind: 'symbol', symbol, span: { start: at, end: at + 1 } });
      at += 1;
    } else if (character === '°' || character === 'º') {
      tokens.push({ kind: 'unit', name: 'deg', span: { start: at, end: at + 1 } });
      at += 1;
    } else if (character === '†') {
      tokens.push({ kind: 'word', name: '†', span: { start: at, end: at + 1 } });
      at += 1;
    } else if (isDigit(character) || (character === '.' && isDigit(source[at + 1]))) {
      const token = readNumber(source, at);
      tokens.push(token);
      at = token.span.end;
    } else if (isLetter(character)) {
      at = readWords(source, at, tokens, wanted);
    } else if (character === '|') {
      const token = readKet(source, at);
      tokens.push(token);
      at = token.span.end;
    } else {
      throw unexpected(source, at);
    }
  }
  return tokens;
}

function unexpected(source: string, at: number): ExpressionError {
  const code = source.codePointAt(at) ?? 0;
  const end = at + (code > 0xffff ? 2 : 1);
  const span = { start: at, end };
  const shown =
    code < 0x20 || (code >= 0x7f && code < 0xa0) ? 'A control character' : `"${source.slice(at, end)}"`;
  return new ExpressionError(
    span,
    `${shown} has no meaning here. Write states, gates, numbers, + − * / ^ and brackets.`,
  );
}

// By hand rather than by a regular expression: one look at each character, whatever the input.
function readNumber(source: string, start: number): Token & { kind: 'number' } {
  let at = start;
  while (isDigit(source[at])) at += 1;
  if (source[at] === '.') {
    at += 1;
    while (isDigit(source[at])) at += 1;
  }
  const mark = source[at];
  if (mark === 'e' || mark === 'E') {
    const sign = source[at + 1];
    const digits = sign === '+' || sign === '-' ? at + 2 : at + 1;
    // "2e^(i…)" is twice e to a power; only digits behind the e make an exponent.
    if (isDigit(source[digits])) {
      at = digits;
      while (isDigit(source[at])) at += 1;
    }
  }
  const span = { start, end: at };
  const value = Number(source.slice(start, at));
  if (!Number.isFinite(value)) {
    throw new ExpressionError(span, 'This number is too large. Numbers reach to 1.8e308.');
  }
  return { kind: 'number', value, span };
}

// "iV" and "2piH" are products without a space: take the longest word that fits, again and again.
function readWords(source: string, start: number, tokens: Token[], wanted: Wanted): number {
  let end = start;
  while (isLetter(source[end])) end += 1;
  const misleading = misleadingWord(source.slice(start, end), { start, end });
  if (misleading !== null) throw misleading;
  let at = start;
  while (at < end) {
    const match = longestWord(source, at, end);
    if (match === null) throw unknownWord(source, { start, end }, wanted);
    const [text, word] = match;
    tokens.push(wordToken(word, { start: at, end: at + text.length }));
    at += text.length;
  }
  return end;
}

// Literals rather than a spread, which was measured to cost fourteen times as much.
function wordToken(word: Word, span: Span): Token {
  switch (word.kind) {
    case 'constant':
      return { kind: 'constant', name: word.name, span };
    case 'unit':
      return { kind: 'unit', name: word.name, span };
    case 'state':
      return { kind: 'state', name: word.name, span };
    case 'gate':
      return { kind: 'gate', name: word.name, span };
    case 'axis':
      return { kind: 'axis', name: word.name, span };
    case 'function':
      return { kind: 'function', name: word.name, span };
    case 'word':
      return { kind: 'word', name: word.name, span };
  }
}

const KETS = new Map<string, KetLabel>([
  ['H', 'H'],
  ['V', 'V'],
  ['D', 'D'],
  ['A', 'A'],
  ['L', 'L'],
  ['R', 'R'],
  ['0', '0'],
  ['1', '1'],
  ['+', '+'],
  ['-', '-'],
  ['+i', '+i'],
  ['-i', '-i'],
]);

function readKet(source: string, start: number): Token {
  let at = start + 1;
  let label = '';
  // No ket is longer than this; a missing ">" must not make us look at the rest again and again.
  const limit = Math.min(source.length, start + 12);
  while (at < limit) {
    const character = source.charAt(at);
    at += 1;
    if (character === '>' || character === '⟩' || character === '〉' || character === '›') {
      const ket = KETS.get(label);
      const span = { start, end: at };
      if (ket !== undefined) return { kind: 'ket', label: ket, span };
      throw new ExpressionError(
        span,
        `There is no ket named "${label}". Write |H>, |V>, |D>, |A>, |L>, |R>, |0>, |1>, |+>, |->, |+i> or |-i>.`,
      );
    }
    if (character === '−' || character === '–') label += '-';
    else if (!SPACES.includes(character)) label += character;
  }
  throw new ExpressionError({ start, end: start + 1 }, 'This ket is not closed. Write it as |H> or |+i>.');
}
