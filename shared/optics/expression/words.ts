import { ExpressionError, type Span } from './span';
import type { AxisName, ConstantName, FunctionName, GateName, StateName, UnitName } from './tree';

/** What the reader of an expression is asked for. */
export type Wanted = 'state' | 'unitary';

export type Word =
  | { readonly kind: 'constant'; readonly name: ConstantName }
  | { readonly kind: 'unit'; readonly name: UnitName }
  | { readonly kind: 'state'; readonly name: StateName }
  | { readonly kind: 'gate'; readonly name: GateName }
  | { readonly kind: 'axis'; readonly name: AxisName }
  | { readonly kind: 'function'; readonly name: FunctionName }
  | { readonly kind: 'word'; readonly name: 'from' | 'to' | 'matrix' | 'dagger' | '†' };

// Longest first, so that "ellipse" is never read as e and then "llipse".
const WORDS: readonly (readonly [string, Word])[] = [
  ['identity', { kind: 'gate', name: 'identity' }],
  ['hadamard', { kind: 'gate', name: 'hadamard' }],
  ['ellipse', { kind: 'function', name: 'ellipse' }],
  ['stokes', { kind: 'function', name: 'stokes' }],
  ['linear', { kind: 'function', name: 'linear' }],
  ['rotate', { kind: 'function', name: 'rotate' }],
  ['matrix', { kind: 'word', name: 'matrix' }],
  ['dagger', { kind: 'word', name: 'dagger' }],
  ['bloch', { kind: 'function', name: 'bloch' }],
  ['plate', { kind: 'function', name: 'plate' }],
  ['sqrtX', { kind: 'gate', name: 'sqrtX' }],
  ['sqrtY', { kind: 'gate', name: 'sqrtY' }],
  ['sqrtZ', { kind: 'gate', name: 'sqrtZ' }],
  ['sqrt', { kind: 'function', name: 'sqrt' }],
  ['from', { kind: 'word', name: 'from' }],
  ['exp', { kind: 'function', name: 'exp' }],
  ['cos', { kind: 'function', name: 'cos' }],
  ['sin', { kind: 'function', name: 'sin' }],
  ['zyz', { kind: 'function', name: 'zyz' }],
  ['qwp', { kind: 'function', name: 'qwp' }],
  ['hwp', { kind: 'function', name: 'hwp' }],
  ['deg', { kind: 'unit', name: 'deg' }],
  ['rad', { kind: 'unit', name: 'rad' }],
  ['pi', { kind: 'constant', name: 'pi' }],
  ['to', { kind: 'word', name: 'to' }],
  ['π', { kind: 'constant', name: 'pi' }],
  ['i', { kind: 'constant', name: 'i' }],
  ['e', { kind: 'constant', name: 'e' }],
  ['x', { kind: 'axis', name: 'x' }],
  ['y', { kind: 'axis', name: 'y' }],
  ['z', { kind: 'axis', name: 'z' }],
  ['H', { kind: 'state', name: 'H' }],
  ['V', { kind: 'state', name: 'V' }],
  ['D', { kind: 'state', name: 'D' }],
  ['A', { kind: 'state', name: 'A' }],
  ['L', { kind: 'state', name: 'L' }],
  ['R', { kind: 'state', name: 'R' }],
  ['X', { kind: 'gate', name: 'X' }],
  ['Y', { kind: 'gate', name: 'Y' }],
  ['Z', { kind: 'gate', name: 'Z' }],
  ['S', { kind: 'gate', name: 'S' }],
  ['T', { kind: 'gate', name: 'T' }],
];

const WORDS_BY_LETTER = new Map<string, readonly (readonly [string, Word])[]>(
  WORDS.map(([text]) => [text.charAt(0), WORDS.filter(([other]) => other.startsWith(text.charAt(0)))]),
);

/** The longest word that starts at a place and ends before another. */
export function longestWord(source: string, at: number, end: number): readonly [string, Word] | null {
  for (const entry of WORDS_BY_LETTER.get(source.charAt(at)) ?? []) {
    if (at + entry[0].length <= end && source.startsWith(entry[0], at)) return entry;
  }
  return null;
}

/** Names that a person may bring from elsewhere, in small letters, with the word here. */
const ELSEWHERE = new Map<string, string>([
  ['dag', 'dagger'],
  ['adjoint', 'dagger'],
  ['rotation', 'rotate'],
  ['rot', 'rotate'],
  ['not', 'X'],
  ['id', 'identity'],
  ['eye', 'identity'],
  ['had', 'hadamard'],
  ['sx', 'sqrtX'],
  ['retarder', 'plate'],
  ['waveplate', 'plate'],
]);

/** Letters that would split into words and mean something else than was meant. null when they are none of these. */
export function misleadingWord(text: string, span: Span): ExpressionError | null {
  if (text === 'sqrtx' || text === 'sqrty' || text === 'sqrtz') {
    const root = `sqrt${text.charAt(4).toUpperCase()}`;
    return new ExpressionError(span, `"${text}" is no name here. Write ${root}.`, root);
  }
  const axis = text.length === 2 && text.startsWith('R') ? text.charAt(1).toLowerCase() : '';
  if (axis !== 'x' && axis !== 'y' && axis !== 'z') return null;
  return new ExpressionError(
    span,
    `A turn about ${axis} is written rotate(${axis}, 30deg) here; R is light.`,
  );
}

const STATES_ARE = 'Write H, V, D, A, L or R, a ket such as |+i>, or bloch, stokes, ellipse, linear.';
const UNITARIES_ARE =
  'Write a gate such as X or hadamard, rotate, zyz, matrix, from … to …, or plates: qwp, hwp, plate.';

/** What is wrong with letters that can't be split into words, with the likeliest word in their place. */
export function unknownWord(source: string, span: Span, wanted: Wanted): ExpressionError {
  const text = source.slice(span.start, span.end);
  const shown = text.length > 24 ? `${text.slice(0, 24)}…` : text;
  if (text === 'j') return new ExpressionError(span, 'The imaginary unit is written i here.', 'i');
  if (text === 'I') {
    return new ExpressionError(
      span,
      '"I" is no name here. The gate is written identity, the imaginary unit i.',
      wanted === 'unitary' ? 'identity' : 'i',
    );
  }
  const upper = text.toUpperCase();
  if (text.length === 1 && 'HVDALR'.includes(upper)) {
    return new ExpressionError(span, `"${text}" is no name here. Write the state as ${upper}.`, upper);
  }
  if (text.length === 1 && 'ST'.includes(upper)) {
    return new ExpressionError(span, `"${text}" is no name here. Write the gate as ${upper}.`, upper);
  }
  const likely = likelyWord(text);
  if (likely !== null) {
    return new ExpressionError(span, `"${shown}" is no name here. Write ${likely}.`, likely);
  }
  const lower = text.toLowerCase();
  const unit = lower.startsWith('degree') ? 'deg' : lower.startsWith('radian') ? 'rad' : null;
  if (unit !== null) return new ExpressionError(span, `"${shown}" is written ${unit} here.`, unit);
  return new ExpressionError(
    span,
    `"${shown}" is no name here. ${wanted === 'unitary' ? UNITARIES_ARE : STATES_ARE}`,
  );
}

/** The word in other letter case, by another name, or with one letter wrong, missing, too many or two exchanged. */
function likelyWord(text: string): string | null {
  if (text.length > 12) return null;
  const lower = text.toLowerCase();
  const elsewhere = ELSEWHERE.get(lower);
  if (elsewhere !== undefined) return elsewhere;
  const sameLetters = WORDS.find(([word]) => word.toLowerCase() === lower && word.length > 1);
  if (sameLetters !== undefined) return sameLetters[0];
  // Words of three letters are too close to each other to guess between.
  return WORDS.find(([word]) => word.length > 3 && oneSlip(lower, word.toLowerCase()))?.[0] ?? null;
}

function oneSlip(typed: string, word: string): boolean {
  let head = 0;
  while (head < word.length && typed.charAt(head) === word.charAt(head)) head += 1;
  const restOfTyped = typed.slice(head);
  const restOfWord = word.slice(head);
  if (restOfTyped.slice(1) === restOfWord.slice(1)) return true;
  if (restOfTyped.slice(1) === restOfWord || restOfTyped === restOfWord.slice(1)) return true;
  const [a = '', b = ''] = restOfTyped;
  return b + a === restOfWord.slice(0, 2) && restOfTyped.slice(2) === restOfWord.slice(2);
}
