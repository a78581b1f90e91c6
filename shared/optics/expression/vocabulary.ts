import { longestWord, type Wanted } from './words';

/** One thing that can be written: for completion at the cursor and for looking up. */
export interface VocabularyEntry {
  /** What completion puts in. A function ends with its open bracket. */
  readonly insert: string;
  readonly name: string;
  readonly kind: 'state' | 'unitary' | 'number' | 'unit' | 'word';
  /** How it is written with its arguments. */
  readonly signature: string;
  /** One plain sentence. */
  readonly help: string;
  /** A whole expression that reads as a state or, for unitaries, as a unitary. */
  readonly example: string;
}

type Row = readonly [insert: string, signature: string, help: string, example: string];

function entries(kind: VocabularyEntry['kind'], rows: readonly Row[]): readonly VocabularyEntry[] {
  return rows.map(([insert, signature, help, example]) => ({
    insert,
    name: insert.endsWith('(') || insert.endsWith('[') ? insert.slice(0, -1).trimEnd() : insert.trimEnd(),
    kind,
    signature,
    help,
    example,
  }));
}

const STATES = entries('state', [
  ['H', 'H', 'Horizontal light, |0⟩.', 'H'],
  ['V', 'V', 'Vertical light, |1⟩.', 'V'],
  ['D', 'D', 'Linear light at +45°, |+⟩.', 'D'],
  ['A', 'A', 'Linear light at −45°, |−⟩.', 'A'],
  ['L', 'L', 'Left circular light, by the lab’s hand.', 'L'],
  ['R', 'R', 'Right circular light, by the lab’s hand.', 'R'],
  ['|H>', '|H>', 'A state as a ket; every letter has one.', '(|H> + |V>)/sqrt(2)'],
  ['|0>', '|0>', 'Horizontal light as a qubit’s 0.', '|0>'],
  ['|1>', '|1>', 'Vertical light as a qubit’s 1.', '|1>'],
  ['|+>', '|+>', '(|0⟩ + |1⟩)/√2, linear light at +45°.', '|+>'],
  ['|->', '|->', '(|0⟩ − |1⟩)/√2, linear light at −45°.', '|->'],
  ['|+i>', '|+i>', '(|0⟩ + i|1⟩)/√2 as written: its hand follows the lab’s phase.', '|+i>'],
  ['|-i>', '|-i>', '(|0⟩ − i|1⟩)/√2 as written: its hand follows the lab’s phase.', '|-i>'],
  ['[', '[a, b]', 'The amplitudes of H and V as a column.', '[1, i]'],
  ['linear(', 'linear(angle)', 'Linear light at an angle counter-clockwise from H.', 'linear(22.5deg)'],
  [
    'ellipse(',
    'ellipse(azimuth, ellipticity)',
    'An ellipse by the angle of its long axis and its ellipticity, −45° to 45°.',
    'ellipse(20deg, 10deg)',
  ],
  [
    'bloch(',
    'bloch(theta, phi)',
    'cos θ/2 H + e^(iφ) sin θ/2 V, a point of the sphere by its two angles.',
    'bloch(109.47deg, 120deg)',
  ],
  ['stokes(', 'stokes(s1, s2, s3)', 'A state by its Stokes parameters.', 'stokes(0.6, 0, 0.8)'],
]);

const UNITARIES = entries('unitary', [
  ['identity', 'identity', 'Leaves every state as it is.', 'identity'],
  ['X', 'X', 'Exchanges H and V.', 'X'],
  ['Y', 'Y', 'The Pauli matrix [[0, −i], [i, 0]].', 'Y'],
  ['Z', 'Z', 'Changes the sign of V.', 'Z'],
  ['hadamard', 'hadamard', 'Takes H to D and V to A.', 'hadamard'],
  ['S', 'S', 'Turns the phase of V by 90°, the root of Z.', 'S'],
  ['T', 'T', 'Turns the phase of V by 45°, the root of S.', 'T'],
  ['sqrtX', 'sqrtX', 'Half of X.', 'sqrtX'],
  ['sqrtY', 'sqrtY', 'Half of Y.', 'sqrtY'],
  ['sqrtZ', 'sqrtZ', 'Half of Z, the same as S.', 'sqrtZ'],
  [
    'rotate(',
    'rotate(axis, angle)',
    'A turn of the sphere about x, y, z, a Bloch vector [a, b, c] or a state.',
    'rotate([1, 0, 1], 180deg)',
  ],
  [
    'zyz(',
    'zyz(a, b, c)',
    'Rz(a) Ry(b) Rz(c): the turn by c about z comes first.',
    'zyz(30deg, 45deg, 60deg)',
  ],
  [
    'from ',
    'from A to B',
    'The shortest turn of the sphere that takes one state to another.',
    'from H to ellipse(20deg, 10deg)',
  ],
  [
    'matrix [[',
    'matrix [[a, b], [c, d]]',
    'A unitary by its entries, rows first.',
    'matrix [[1, 1], [1, -1]]/sqrt(2)',
  ],
  ['dagger(', 'dagger(U)', 'The turn back; U† means the same.', 'dagger(S)'],
  [
    'exp(-i ',
    'exp(-i angle (a X + b Y + c Z))',
    'e to −i times an angle times a real sum of Pauli matrices.',
    'exp(-i 22.5deg (X + Z))',
  ],
  [
    'qwp(',
    'qwp(fast axis)',
    'A quarter-wave plate; plates side by side are in beam order.',
    'qwp(45deg) hwp(10deg)',
  ],
  ['hwp(', 'hwp(fast axis)', 'A half-wave plate with its fast axis at an angle from H.', 'hwp(22.5deg)'],
  ['plate(', 'plate(retardance, fast axis)', 'A plate of any retardance.', 'plate(120deg, 30deg)'],
]);

const NUMBERS = entries('number', [
  ['i', 'i', 'The imaginary unit.', '(H + i V)/sqrt(2)'],
  ['pi', 'pi', 'π; beside nothing else it is an angle in radians.', 'linear(pi/8)'],
  ['e', 'e^(i angle)', 'The base of exponentials.', 'H + e^(i 45deg) V'],
  ['sqrt(', 'sqrt(number)', 'The square root; √2 means the same.', '(H + V)/sqrt(2)'],
  ['exp(', 'exp(number)', 'e to a number, or to i times an angle.', 'H + exp(i 45deg) V'],
  ['cos(', 'cos(angle)', 'The cosine of an angle with its unit.', 'cos(22.5deg) H + sin(22.5deg) V'],
  ['sin(', 'sin(angle)', 'The sine of an angle with its unit.', 'cos(30deg) H + i sin(30deg) V'],
]);

const UNITS = entries('unit', [
  ['deg', '45deg', 'Degrees; 45° means the same.', 'linear(45deg)'],
  ['rad', '0.5rad', 'Radians, the unit of π too.', 'linear(0.5rad)'],
]);

const WORDS = entries('word', [
  ['to ', 'from A to B', 'Stands between the two states of a shortest turn.', 'from H to D'],
]);

/** Everything that can be completed or looked up, states first. */
export const VOCABULARY: readonly VocabularyEntry[] = [
  ...STATES,
  ...UNITARIES,
  ...NUMBERS,
  ...UNITS,
  ...WORDS,
];

/** The stretch of the source that a completion replaces, 0-based without its end, and what may stand there. */
export interface Completions {
  readonly from: number;
  readonly to: number;
  readonly entries: readonly VocabularyEntry[];
}

// No word is longer; a run of letters is looked through from each of its places.
const LONGEST_PREFIX = 16;

/**
 * What can complete the word that ends at the cursor. `column` is the cursor's, 1-based: 1 is before the first character.
 * With nothing before the cursor to complete, everything that can begin there.
 */
export function completionsAt(source: string, column: number, mode: Wanted): Completions {
  const to = Math.max(0, Math.min(source.length, column - 1));
  const all = mode === 'state' ? VOCABULARY : [...UNITARIES, ...STATES, ...NUMBERS, ...UNITS, ...WORDS];
  const ket = ketStart(source, to);
  if (ket !== null) return { from: ket, to, entries: startingWith(all, source.slice(ket, to)) };
  let start = to;
  while (start > 0 && to - start < LONGEST_PREFIX && isLetter(source.charAt(start - 1))) start -= 1;
  if (start === to) return { from: to, to, entries: all };
  // "iha" is i and the beginning of hadamard: leave whole words at the front alone.
  for (let from = start; from < to;) {
    const found = startingWith(all, source.slice(from, to));
    if (found.length > 0) return { from, to, entries: found };
    const word = longestWord(source, from, to);
    if (word === null) break;
    from += word[0].length;
  }
  return { from: start, to, entries: [] };
}

function startingWith(all: readonly VocabularyEntry[], prefix: string): readonly VocabularyEntry[] {
  const exact = all.filter(({ insert }) => insert.startsWith(prefix));
  if (exact.length > 0) return exact;
  const lower = prefix.toLowerCase();
  // A single letter in the wrong case may mean a state, a gate or an axis; only longer ones are guessed.
  return prefix.length < 2 ? [] : all.filter(({ insert }) => insert.toLowerCase().startsWith(lower));
}

/** Where the ket begins that is open at the cursor. */
function ketStart(source: string, to: number): number | null {
  for (let at = to - 1; at >= Math.max(0, to - 3); at -= 1) {
    const character = source.charAt(at);
    if (character === '|') return at;
    if (!/[\dA-Zi+−-]/u.test(character)) return null;
  }
  return null;
}

function isLetter(character: string): boolean {
  return /[a-z]/iu.test(character);
}
