import { MOST_FAULTS, type ScanFault } from './types';

/** Keeps the first faults and counts the others. */
export class FaultList {
  private readonly kept: ScanFault[] = [];
  private count = 0;

  add(fault: ScanFault): void {
    this.count += 1;
    if (this.kept.length < MOST_FAULTS) this.kept.push(fault);
  }

  /** A fault of a whole line. */
  addLine(line: number, what: string, remedy: string): void {
    this.add({ line, column: null, columnName: null, what, remedy });
  }

  get isEmpty(): boolean {
    return this.count === 0;
  }

  get faults(): readonly ScanFault[] {
    return this.kept;
  }

  get more(): number {
    return this.count - this.kept.length;
  }
}

/** One fault as one line of text. */
export function describeFault({ line, column, columnName, what, remedy }: ScanFault): string {
  const name = columnName === null ? '' : ` (${columnName})`;
  const place = column === null ? `Line ${line}` : `Line ${line}, column ${column}${name}`;
  return `${place}: ${what} ${remedy}`;
}

/** A cell or a name as a message shows it. */
export function shown(text: string): string {
  if (text.length <= LONGEST_SHOWN) return `“${text}”`;
  // No character of two code units is cut in half.
  return `“${text.slice(0, LONGEST_SHOWN).replace(/[\uD800-\uDBFF]$/u, '')}…”`;
}

const LONGEST_SHOWN = 30;
