/** Where in a document something is: `['plates', 2, 'seats', 0, 'leftAt']`. */
export type PartPath = readonly (string | number)[];

/** What is wrong with a file, where, and what to write. */
export interface FileFault {
  /** Of CSV, as a spreadsheet counts: the header is row 1. Null for JSON, and for the file as a whole. */
  readonly row: number | null;
  /** Of CSV, the header of the column; of JSON, the dotted path. Null where it is the whole row or file. */
  readonly column: string | null;
  readonly message: string;
}

/** A file that goes on being wrong is no cabinet. */
export const maxFaults = 100;

/** Faults as they are found, up to a number that a person can work through. */
export class FaultList {
  private readonly found: FileFault[] = [];
  private readonly cells = new Set<string>();

  /** Of a cell of a table the first fault is kept: what follows from it says nothing new. */
  add(fault: FileFault): void {
    if (fault.row !== null && fault.column !== null) {
      const cell = `${fault.row} ${fault.column}`;
      if (this.cells.has(cell)) return;
      this.cells.add(cell);
    }
    if (this.found.length < maxFaults) this.found.push(fault);
    else if (this.found.length === maxFaults) {
      const message = `There are more than ${maxFaults} faults. Mend these first; the rest of the file was not read.`;
      this.found.push({ row: null, column: null, message });
    }
  }

  /** Whether reading on would say nothing new. */
  isFull(): boolean {
    return this.found.length > maxFaults;
  }

  isEmpty(): boolean {
    return this.found.length === 0;
  }

  /** By row, the whole file first. */
  list(): readonly FileFault[] {
    return this.found.toSorted((one, other) => (one.row ?? 0) - (other.row ?? 0));
  }
}
