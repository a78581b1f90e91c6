/** The most that one scan's file may be, in bytes. */
export const MAX_SCAN_BYTES = 10 * 1024 * 1024;
export const MAX_SCAN_ROWS = 100_000;
export const MAX_SCAN_COLUMNS = 64;
/** Characters of one line. */
export const MAX_LINE_LENGTH = 4096;
/** Faults that are listed; those behind them are counted. */
export const MOST_FAULTS = 50;
/** Rows that a preview shows. */
export const PREVIEW_ROWS = 8;

/** What one row of a scan says. Powers and their σ are all in the table's one power unit. */
export interface ScanPoint {
  /** The line of the file, from 1. */
  readonly line: number;
  readonly dialDeg: number;
  /** Null where the file has no such column; one of the two powers is there at least, in every row the same. */
  readonly crossed: number | null;
  readonly parallel: number | null;
  readonly crossedSigma: number | null;
  readonly parallelSigma: number | null;
}

export const ANGLE_UNITS = ['deg', 'rad', 'mrad', 'arcmin'] as const;
export type AngleUnit = (typeof ANGLE_UNITS)[number];

export const POWER_UNITS = [
  'W',
  'mW',
  'uW',
  'nW',
  'pW',
  'V',
  'mV',
  'uV',
  'A',
  'mA',
  'uA',
  'nA',
  'pA',
  'counts',
  'counts/s',
  '%',
  'arbitrary',
] as const;
export type PowerUnit = (typeof POWER_UNITS)[number];

/** A column, from 0, and the unit of its cells; null where the header's unit holds, or the usual one. */
export interface ColumnChoice<Unit> {
  readonly column: number;
  readonly unit: Unit | null;
}

/** Which column is what. A scan may have read one port only; a mapping with neither is refused. */
export interface ColumnMapping {
  readonly dial: ColumnChoice<AngleUnit>;
  readonly crossed: ColumnChoice<PowerUnit> | null;
  readonly parallel: ColumnChoice<PowerUnit> | null;
  readonly crossedSigma: ColumnChoice<PowerUnit> | null;
  readonly parallelSigma: ColumnChoice<PowerUnit> | null;
}

export const SCAN_ROLES = ['dial', 'crossed', 'parallel', 'crossedSigma', 'parallelSigma'] as const;
export type ScanRole = (typeof SCAN_ROLES)[number];

/** What the file itself says about its columns, each from 0; null where it doesn't say. */
export interface ColumnProposal {
  readonly columns: Readonly<Record<ScanRole, number | null>>;
  /** sure: the header names all. likely: something was told from the numbers or from neighbours. unclear: a person has to say. */
  readonly confidence: 'sure' | 'likely' | 'unclear';
  /** Whole sentences: what the proposal rests on. */
  readonly reason: string;
}

/** Where in the file, what is wrong there, and what to do about it. */
export interface ScanFault {
  /** From 1; of a fault of the whole file, 1 or the line at which it shows. */
  readonly line: number;
  /** From 1; null where the fault is the line's. */
  readonly column: number | null;
  /** As the header writes it; null without a header. */
  readonly columnName: string | null;
  readonly what: string;
  readonly remedy: string;
}

export type ScanEncoding =
  'UTF-8' | 'UTF-8 with a byte order mark' | 'UTF-16 little-endian' | 'UTF-16 big-endian' | 'Latin-1';

export type Delimiter = 'comma' | 'semicolon' | 'tab' | 'pipe' | 'spaces';

/** What stands in the numbers between the whole and its parts; none where all numbers are whole. */
export type DecimalSign = 'point' | 'comma' | 'none';

export interface PreviewColumn {
  /** From 1. */
  readonly number: number;
  /** Null where the header names none. */
  readonly name: string | null;
  /** As the header writes it. */
  readonly unit: string | null;
}

/** The file as it was understood, for a person to look at. */
export interface ScanPreview {
  readonly encoding: ScanEncoding;
  readonly delimiter: Delimiter;
  readonly decimalSign: DecimalSign;
  /** Lines with a comment sign, and those of text above the header. */
  readonly commentLineCount: number;
  readonly headerLine: number | null;
  readonly rowCount: number;
  readonly columns: readonly PreviewColumn[];
  /** The first `PREVIEW_ROWS`. */
  readonly rows: readonly { readonly line: number; readonly cells: readonly string[] }[];
}

/** A file that has a table: how it looks, and what it proposes. */
export interface Understood {
  readonly preview: ScanPreview;
  readonly proposal: ColumnProposal;
  /** The same for files with the same names, number of columns and delimiter; a lab's mapping can be kept under it. */
  readonly signature: string;
  /** What was assumed, a whole sentence or two each. */
  readonly notes: readonly string[];
}

export interface ScanTable extends Understood {
  readonly kind: 'table';
  readonly points: readonly ScanPoint[];
  /** Of the crossed power, or of the parallel one where that alone was read. */
  readonly powerUnit: PowerUnit;
  /** With the units that were used. */
  readonly mapping: ColumnMapping;
}

/** The cells are sound, and a person has to say what they are. */
export interface ScanQuestions extends Understood {
  readonly kind: 'asks';
  readonly questions: readonly string[];
}

export interface ScanFaults {
  readonly kind: 'faults';
  /** In the order of the lines, at most `MOST_FAULTS`. */
  readonly faults: readonly ScanFault[];
  readonly moreFaults: number;
  /** Null where the file did not get as far as a table. */
  readonly understood: Understood | null;
}

export type ScanReading = ScanTable | ScanQuestions | ScanFaults;
