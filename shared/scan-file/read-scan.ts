import { settleUnits, type UnitMapping, type UnitReading } from './column-units';
import { decode } from './decode';
import { findDecimalSign } from './decimal-sign';
import { FaultList } from './fault-list';
import { layoutSignature } from './layout-signature';
import { splitLines } from './lines';
import { checkMapping, mappingOf, mappingNotes } from './mapping';
import { isNoValue } from './number-cell';
import { CellFaults, type NumberColumns, numberColumns, readPoints } from './points';
import { previewOf } from './preview';
import { columnLabel, proposeColumns, type Proposed } from './propose-columns';
import { stepsOf } from './steps';
import { type CellTable, FEWEST_COLUMNS, findTable, textColumns } from './table';
import {
  type ColumnMapping,
  SCAN_ROLES,
  type ScanEncoding,
  type ScanPoint,
  type ScanReading,
  type Understood,
} from './types';

/**
 * Reads a scan's file: its points, or questions about its columns, or what is wrong with it. Encoding, delimiter, decimal sign,
 * comments, header and units are found from the content; nothing that can be read in two ways is guessed. Never throws.
 * With a `mapping`, the columns are what it says, whatever the file proposes.
 *
 * A last line with all its columns but no line break is read, since many programs write none, and a note says that its last
 * number can't be told from one that was cut short.
 */
export function readScanFile(bytes: Uint8Array, mapping: ColumnMapping | null = null): ScanReading {
  const faults = new FaultList();
  const decoded = decode(bytes);
  if (!decoded.ok) {
    faults.addLine(decoded.line, decoded.what, decoded.remedy);
    return refused(faults, null);
  }
  const scan = splitLines(decoded.text, faults);
  const table = faults.isEmpty ? findTable(scan, faults) : null;
  if (table === null) return refused(faults, null);
  const isCutSuspect = !scan.isLastEnded && table.rows.at(-1)?.line === scan.lines.at(-1)?.number;
  return new TableReader(table, decoded.encoding, isCutSuspect, faults).read(mapping);
}

function refused(faults: FaultList, understood: Understood | null): ScanReading {
  return { kind: 'faults', faults: faults.faults, moreFaults: faults.more, understood };
}

class TableReader {
  private readonly numbers: NumberColumns;
  private readonly cellFaults: CellFaults;
  private readonly proposed: Proposed;
  private readonly isComma: boolean;
  private readonly notes: string[];
  private readonly understood: Understood;

  constructor(
    private readonly table: CellTable,
    encoding: ScanEncoding,
    isCutSuspect: boolean,
    private readonly faults: FaultList,
  ) {
    const text = textColumns(table);
    this.cellFaults = new CellFaults(table.header, faults);
    const { sign, doubt } = findDecimalSign(table, text);
    if (doubt !== null) this.cellFaults.add(doubt.line, doubt.column, doubt.what, doubt.remedy);
    this.isComma = sign === 'comma';
    this.numbers = numberColumns(table, text, this.isComma);
    const steps = new Map([...this.numbers].map(([column, values]) => [column, stepsOf(values)] as const));
    this.proposed = proposeColumns(table.header, steps);
    this.notes = fileNotes(table, encoding, isCutSuspect);
    this.understood = {
      preview: previewOf(table, encoding, sign),
      proposal: this.proposed.proposal,
      signature: layoutSignature(table),
      notes: this.notes,
    };
  }

  read(given: ColumnMapping | null): ScanReading {
    const mapping = given ?? mappingOf(this.proposed);
    if (given !== null) {
      for (const { line, column, what, remedy } of checkMapping(given, this.table)) {
        this.cellFaults.add(line, column, what, remedy);
      }
      this.notes.push(...mappingNotes(given, this.table.header));
    }
    if (!this.faults.isEmpty) return refused(this.faults, this.understood);
    if (mapping === null) return this.asks(this.proposed.questions);
    const units = settleUnits(this.table.header, mapping);
    this.notes.push(...units.notes);
    return this.withUnits(units);
  }

  private withUnits({ mapping, questions, isDialAssumed }: UnitReading): ScanReading {
    if (mapping === null) return this.asks(questions);
    const points = readPoints(this.table, this.numbers, mapping, this.isComma, this.cellFaults);
    if (!this.faults.isEmpty) return refused(this.faults, this.understood);
    if (isDialAssumed) this.noteRadians(points);
    this.noteUnused(mapping);
    return {
      kind: 'table',
      ...this.understood,
      points,
      powerUnit: mapping.powerUnit,
      mapping: columnsOf(mapping),
    };
  }

  /**
   * Cells are judged before columns are asked about: no answer helps a file with faults in it. Columns of text are let be where
   * enough others are left, but not one of words that stand where a number is missing.
   */
  private asks(questions: readonly string[]): ScanReading {
    const isTextAllowed = this.numbers.size >= FEWEST_COLUMNS;
    for (const [at, { line, cells }] of this.table.rows.entries()) {
      for (const [column, cell] of cells.entries()) {
        const value = this.numbers.get(column)?.[at];
        if (value === undefined ? isTextAllowed && !isNoValue(cell) : !Number.isNaN(value)) continue;
        this.cellFaults.addNoNumber(line, column, cell, this.isComma);
      }
    }
    if (!this.faults.isEmpty) return refused(this.faults, this.understood);
    return { kind: 'asks', ...this.understood, questions };
  }

  private noteRadians(points: readonly ScanPoint[]): void {
    if (points.some(({ dialDeg }) => Math.abs(dialDeg) > FULL_TURN_RAD)) return;
    this.notes.push('The dial goes no further than 2π. Are these radians? Name the unit if they are.');
  }

  private noteUnused(mapping: ColumnMapping): void {
    const used = SCAN_ROLES.map((role) => mapping[role]?.column);
    const unused = this.table.header.columns.flatMap((_, column) =>
      used.includes(column) ? [] : [columnLabel(this.table.header, column)],
    );
    if (unused.length > 0) this.notes.push(`Not used: ${unused.join(', ')}.`);
  }
}

function columnsOf({ dial, crossed, parallel, crossedSigma, parallelSigma }: UnitMapping): ColumnMapping {
  return { dial, crossed, parallel, crossedSigma, parallelSigma };
}

/** Rounded up, for files that write 6.2832. */
const FULL_TURN_RAD = 6.284;

function fileNotes(table: CellTable, encoding: ScanEncoding, isCutSuspect: boolean): string[] {
  const notes: string[] = [];
  if (encoding === 'Latin-1') notes.push('The file is not UTF-8 and is read as Latin-1.');
  if (isCutSuspect) {
    const line = table.rows.at(-1)?.line ?? 1;
    notes.push(
      `The last line, ${line}, has no line break behind it. If the file was cut off there, its last number is too short.`,
    );
  }
  return notes;
}
