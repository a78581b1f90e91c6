import { knownUnit, type WrittenUnit } from './units';

/** One cell of a header. */
export interface ColumnName {
  /** Without the unit; null where nothing is left. */
  readonly name: string | null;
  readonly unit: WrittenUnit | null;
  readonly subject: ColumnSubject;
}

/** What the words of a name speak of. */
export interface ColumnSubject {
  /** Null where the words speak of nothing known, or of several things. */
  readonly quantity: 'dial' | 'crossed' | 'parallel' | null;
  readonly isSigma: boolean;
}

type Quantity = 'dial' | 'crossed' | 'parallel';

const CLOSING: Readonly<Record<string, string>> = { '(': ')', '[': ']', '{': '}' };
const LONGEST_UNIT = 6;

/** Reads "angle (deg)", "dial [°]", "Angle/rad", "P_cross (µW)", "power mW". */
export function readColumnName(cell: string): ColumnName {
  const { outside, groups } = bracketGroups(cell);
  let name = outside;
  let unit: WrittenUnit | null = null;
  for (const { opening, inside } of groups) {
    const known = knownUnit(inside);
    if (known !== null) unit ??= known;
    else if (isRemark(opening, inside)) name = `${name} ${inside}`;
    else unit ??= { kind: 'unknown', text: inside };
  }
  const rest = unit === null ? withoutUnit(name) : { name, unit };
  const plain = rest.name.replace(/\s+/gu, ' ').trim();
  return { name: plain === '' ? null : plain, unit: rest.unit, subject: subjectOf(plain) };
}

/** Whether a bracket holds words of the name, not a unit: "power (crossed)", "dial (stage 2)". */
function isRemark(opening: string, inside: string): boolean {
  const { quantity, isSigma } = subjectOf(inside);
  if (inside === '' || quantity !== null || isSigma) return true;
  return opening !== '[' && (inside.length > LONGEST_UNIT || /[\d\s]/u.test(inside));
}

interface BracketGroups {
  readonly outside: string;
  readonly groups: readonly { readonly opening: string; readonly inside: string }[];
}

function bracketGroups(cell: string): BracketGroups {
  const groups: { opening: string; inside: string }[] = [];
  let outside = '';
  let at = 0;
  while (at < cell.length) {
    const opening = cell.charAt(at);
    const closing = CLOSING[opening];
    const end = closing === undefined ? -1 : cell.indexOf(closing, at + 1);
    if (end === -1) {
      outside += opening;
      at += 1;
    } else {
      groups.push({ opening, inside: cell.slice(at + 1, end).trim() });
      outside += ' ';
      at = end + 1;
    }
  }
  return { outside, groups };
}

/** The longest end of a name that is a unit: behind a slash, a space, a comma, an underscore, or where a word's capital begins. */
function withoutUnit(name: string): { readonly name: string; readonly unit: WrittenUnit | null } {
  const text = name.trim();
  if (text.length > 100) return { name: text, unit: null };
  if (/.[°º˚]$/u.test(text)) return { name: text.slice(0, -1), unit: knownUnit('°') };
  for (let at = 1; at < text.length; at += 1) {
    const before = text.charAt(at - 1);
    const isCut = ' /,_-'.includes(before);
    const end = text.slice(at);
    // "I_V" names a polarisation, not volts.
    if (isCut && before === '_' && end.length === 1) continue;
    if (!isCut && !/^\p{Ll}\p{Lu}$/u.test(text.slice(at - 1, at + 1))) continue;
    const unit = knownUnit(end);
    if (unit !== null && (isCut || unit.kind === 'angle')) {
      return { name: text.slice(0, isCut ? at - 1 : at), unit };
    }
  }
  return { name: text, unit: null };
}

interface Words {
  readonly exact: readonly string[];
  readonly starts: readonly string[];
}

const STRONG: Readonly<Record<Quantity, Words>> = {
  dial: {
    exact: ['ang', 'dial', 'theta', 'pos', 'rot', 'azimuth', 'winkel', 'θ', 'ϑ'],
    starts: ['angle', 'position', 'rotat'],
  },
  crossed: { exact: ['⊥', '⟂'], starts: ['cross', 'perp', 'ortho', 'gekreuzt'] },
  parallel: { exact: ['∥', '‖', 'par'], starts: ['parallel'] },
};
/** They count only where nothing stronger is said: "transmission crossed" is crossed. */
const WEAK: Readonly<Record<Quantity, Words>> = {
  dial: { exact: [], starts: [] },
  crossed: { exact: ['min', 'minimum', 'refl'], starts: ['reflect'] },
  parallel: { exact: ['max', 'maximum'], starts: ['trans'] },
};
const SIGMA: Words = {
  exact: ['sigma', 'σ', 'std', 'stdev', 'stddev', 'sd', 'sem', 'err', 'error', 'errors', 'unc', '±'],
  starts: ['uncert', 'deviation'],
};
/** A column with one of these words is something else, whatever else it says. */
const ELSEWHERE: Words = {
  exact: ['time', 'temp', 'date', 'ratio', 'sum', 'total', 'index', 'ref', 'monitor', 'dark', 'background'],
  starts: ['temperature', 'wavelength', 'reference', 'timestamp'],
};

function subjectOf(name: string): ColumnSubject {
  const found = wordsOf(name);
  const isSigma = found.some((word) => isOneOf(word, SIGMA));
  if (found.some((word) => isOneOf(word, ELSEWHERE))) return { quantity: null, isSigma: false };
  const strong = quantitiesIn(found, STRONG);
  const quantities = strong.length > 0 ? strong : quantitiesIn(found, WEAK);
  const [quantity = null] = quantities;
  return { quantity: quantities.length === 1 ? quantity : null, isSigma };
}

function wordsOf(name: string): readonly string[] {
  return name
    .replaceAll('||', ' ∥ ')
    .replaceAll('+/-', ' ± ')
    .replace(/[⊥⟂∥‖±]/gu, ' $& ')
    .replace(/(\p{Ll})(\p{Lu})/gu, '$1 $2')
    .toLowerCase()
    .split(/[^\p{L}⊥⟂∥‖±]+/u)
    .filter((word) => word !== '');
}

function quantitiesIn(
  found: readonly string[],
  words: Readonly<Record<Quantity, Words>>,
): readonly Quantity[] {
  const all = ['dial', 'crossed', 'parallel'] as const;
  return all.filter((quantity) => found.some((word) => isOneOf(word, words[quantity])));
}

function isOneOf(word: string, { exact, starts }: Words): boolean {
  return exact.includes(word) || starts.some((start) => word.startsWith(start));
}
