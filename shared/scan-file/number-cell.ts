import { shown } from './fault-list';

const POINT_NUMBER = /^[+-]?(?:\d+(?:\.\d*)?|\.\d+)(?:e[+-]?\d+)?$/iu;
/** Digits on both sides: else "1, 2" between spaces would be numbers too. */
const COMMA_NUMBER = /^[+-]?\d+,\d+(?:e[+-]?\d+)?$/iu;
const WHOLE_NUMBER = /^[+-]?\d+(?:e[+-]?\d+)?$/iu;

export type CellForm = 'whole' | 'point' | 'comma' | 'other';

/** U+2212 is the typographer's minus, and some programs write it. */
export function withPlainMinus(cell: string): string {
  return cell.includes('\u2212') ? cell.replaceAll('\u2212', '-') : cell;
}

/** What a cell could be, whichever decimal sign the file has. */
export function cellForm(cell: string): CellForm {
  return formOfPlain(withPlainMinus(cell));
}

function formOfPlain(plain: string): CellForm {
  if (WHOLE_NUMBER.test(plain)) return 'whole';
  if (POINT_NUMBER.test(plain)) return 'point';
  return COMMA_NUMBER.test(plain) ? 'comma' : 'other';
}

/** The number in a cell; NaN where there is none, and `numberFault` says why. `isComma`: the file's decimal sign is the comma. */
export function numberOf(cell: string, isComma: boolean): number {
  const plain = withPlainMinus(cell);
  const form = formOfPlain(plain);
  if (form === 'other' || form === (isComma ? 'point' : 'comma')) return Number.NaN;
  const value = Number(form === 'comma' ? plain.replace(',', '.') : plain);
  const isLost = !Number.isFinite(value) || (value === 0 && hasDigit(plain));
  return isLost ? Number.NaN : value;
}

/** Whether a digit other than 0 stands before the exponent. */
function hasDigit(plain: string): boolean {
  return /^[^e1-9]*[1-9]/iu.test(plain);
}

export interface NumberFault {
  readonly what: string;
  readonly remedy: string;
}

/** What stands in a cell in which `numberOf` found no number. */
export function numberFault(cell: string, isComma: boolean): NumberFault {
  const plain = withPlainMinus(cell);
  const form = formOfPlain(plain);
  if (form === 'other') return notNumber(cell);
  if (form === (isComma ? 'point' : 'comma')) {
    return {
      what: `${shown(cell)} has ${isComma ? 'a point' : 'a comma'}, while the other numbers have ${isComma ? 'a comma' : 'a point'}.`,
      remedy: 'Write one decimal sign everywhere and no thousands separators.',
    };
  }
  return Number(plain.replace(',', '.')) === 0
    ? { what: `${shown(cell)} is too small for a number.`, remedy: 'Write 0, or drop the line.' }
    : { what: `${shown(cell)} is too large for a number.`, remedy: 'Correct it, or drop the line.' };
}

const NO_VALUE = /^[+-]?(?:nan|inf|infinity|n\/?a|null|none|-|--|1\.#\w+)$/iu;
/** #N/A, #DIV/0!, #WERT!: what spreadsheets write for a formula that failed, in any language. */
const SHEET_ERROR = /^#(?:n\/a|nv|[\p{L}/0]+[!?])/iu;
const FORMULA = /^(?:[=@]|[+-]+[\p{L}(]|[+-]?[\d.,]+[+*/-])/u;
const GROUPED = /^[+-]?\d{1,3}([ .,'’_\u00a0\u2009\u202f])\d{3}(?:\1\d{3})*(?:[.,]\d+)?$/u;
const BOTH_SIGNS = /^[+-]?\d[\d.]*,[\d.,]*$/u;
const HEXADECIMAL = /^[+-]?0x[\da-f]*$/iu;
const WITH_WORD = /^[+-]?[\d.,]+ ?[\p{L}°%]/u;

/** Whether a cell says in words that there is no number. */
export function isNoValue(cell: string): boolean {
  return NO_VALUE.test(withPlainMinus(cell));
}

/** Whether a spreadsheet's error stands at the start, which is no comment though it begins with #. */
export function isSheetError(text: string): boolean {
  return SHEET_ERROR.test(text);
}

/** Whether digits stand in groups of three with a space between them, as thousands are written. */
export function isSpaceGrouped(cell: string): boolean {
  return /^[+-]?\d{1,3}(?: \d{3})+(?:[.,]\d+)?$/u.test(withPlainMinus(cell));
}

/** Whether a cell stands where a number was meant: a number, a word for none, a formula, or anything that begins like one. */
export function isMeantAsNumber(cell: string): boolean {
  const plain = withPlainMinus(cell);
  return (
    /^[+\-.,]{0,2}\p{N}/u.test(plain) ||
    NO_VALUE.test(plain) ||
    SHEET_ERROR.test(plain) ||
    /^[=@]/u.test(plain)
  );
}

function notNumber(cell: string): NumberFault {
  const plain = withPlainMinus(cell);
  const dropLine = 'Put the measured number there, or drop the line.';
  if (cell === '') return refused('This cell is empty.', dropLine);
  if (isNoValue(cell)) return refused(`${shown(cell)} is no measured value.`, dropLine);
  if (SHEET_ERROR.test(plain)) {
    return refused(`${shown(cell)} is a spreadsheet’s error, not a number.`, dropLine);
  }
  if (GROUPED.test(plain) || BOTH_SIGNS.test(plain)) {
    return refused(
      `${shown(cell)} looks like a number with thousands separators, which are not read.`,
      'Write it without them.',
    );
  }
  if (HEXADECIMAL.test(plain)) {
    return refused(`${shown(cell)} is hexadecimal.`, 'Write it as a decimal number.');
  }
  if (FORMULA.test(plain)) {
    return refused(
      `${shown(cell)} is a formula, and formulas are not computed.`,
      'Save the file with values in place of formulas.',
    );
  }
  if (/^[+-]?[\p{N}.,]+$/u.test(plain) && /[^\d.,+-]/u.test(plain)) {
    return refused(`${shown(cell)} has digits other than 0 to 9.`, 'Write it with the digits 0 to 9.');
  }
  if (WITH_WORD.test(plain)) {
    return refused(
      `${shown(cell)} is more than a number.`,
      'Write the number alone; its unit belongs in the header.',
    );
  }
  return refused(
    `${shown(cell)} is not a number.`,
    'Put a number there, or begin the line with # if it is a comment.',
  );
}

function refused(what: string, remedy: string): NumberFault {
  return { what, remedy };
}
