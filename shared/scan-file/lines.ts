import type { FaultList } from './fault-list';
import { MAX_LINE_LENGTH, MAX_SCAN_ROWS } from './types';

/** Rows, comments and blank lines together. */
const MAX_LINES = 2 * MAX_SCAN_ROWS;

export interface ScanLine {
  /** From 1. */
  readonly number: number;
  readonly text: string;
}

export interface ScanLines {
  /** Those with anything on them. */
  readonly lines: readonly ScanLine[];
  /** Whether a line break stands behind the last one. */
  readonly isLastEnded: boolean;
}

const TAB = 9;
const LINE_FEED = 10;
const CARRIAGE_RETURN = 13;
const SPACE = 32;
const DELETE = 127;

/** Cuts a text at \n, \r\n or \r. Lines that are too long, too many lines, and control characters are faults. */
export function splitLines(text: string, faults: FaultList): ScanLines {
  const lines: ScanLine[] = [];
  let number = 1;
  let start = 0;
  let control = -1;
  for (let at = 0; at <= text.length; at += 1) {
    const code = at === text.length ? LINE_FEED : text.charCodeAt(at);
    if (code !== LINE_FEED && code !== CARRIAGE_RETURN) {
      if ((code < SPACE && code !== TAB) || code === DELETE) control = code;
      continue;
    }
    if (number > MAX_LINES) {
      faults.addLine(number, `This file has more than ${MAX_LINES} lines.`, 'Keep one scan a file.');
      break;
    }
    takeLine({ number, text: text.slice(start, at) }, control, lines, faults);
    if (code === CARRIAGE_RETURN && text.charCodeAt(at + 1) === LINE_FEED) at += 1;
    start = at + 1;
    number += 1;
    control = -1;
  }
  return { lines, isLastEnded: text.endsWith('\n') || text.endsWith('\r') };
}

function takeLine(line: ScanLine, control: number, lines: ScanLine[], faults: FaultList): void {
  if (control !== -1) {
    const code = control.toString(16).toUpperCase().padStart(2, '0');
    faults.addLine(
      line.number,
      `This line holds a control character (0x${code}), which no table of numbers has.`,
      'Delete it, or choose the file that the measurement wrote.',
    );
  } else if (line.text.length > MAX_LINE_LENGTH) {
    faults.addLine(
      line.number,
      `This line has ${line.text.length} characters; the most is ${MAX_LINE_LENGTH}.`,
      'Write one row a line and keep only the columns of the scan.',
    );
  } else if (line.text.trim() !== '') {
    lines.push(line);
  }
}
