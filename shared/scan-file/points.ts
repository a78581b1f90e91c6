import type { UnitMapping } from './column-units';
import type { FaultList } from './fault-list';
import type { Header } from './header';
import { numberFault, numberOf } from './number-cell';
import type { CellTable } from './table';
import type { ScanPoint } from './types';
import { inDegrees, inPowerUnit } from './units';

/** Each column's numbers in the order of the rows, NaN where a cell has none; without the columns of text. */
export type NumberColumns = ReadonlyMap<number, Float64Array>;

export function numberColumns(
  { rows, columnCount }: CellTable,
  text: ReadonlySet<number>,
  isComma: boolean,
): NumberColumns {
  const columns = new Map<number, Float64Array>();
  for (let column = 0; column < columnCount; column += 1) {
    if (text.has(column)) continue;
    const values = new Float64Array(rows.length);
    for (const [at, { cells }] of rows.entries()) values[at] = numberOf(cells[column] ?? '', isComma);
    columns.set(column, values);
  }
  return columns;
}

/** Puts faults with the place of their cell. */
export class CellFaults {
  constructor(
    private readonly header: Header,
    private readonly faults: FaultList,
  ) {}

  add(line: number, column: number | null, what: string, remedy: string): void {
    if (column === null) {
      this.faults.addLine(line, what, remedy);
      return;
    }
    const columnName = this.header.columns[column]?.name ?? null;
    this.faults.add({ line, column: column + 1, columnName, what, remedy });
  }

  addNoNumber(line: number, column: number, cell: string, isComma: boolean): void {
    const { what, remedy } = numberFault(cell, isComma);
    this.add(line, column, what, remedy);
  }
}

type Choice = NonNullable<UnitMapping['crossed']>;

/**
 * The rows as points, powers in the mapping's one unit. Each cell that is no number is a fault; where there is one, the points
 * are not to be used.
 */
export function readPoints(
  { rows }: CellTable,
  numbers: NumberColumns,
  mapping: UnitMapping,
  isComma: boolean,
  faults: CellFaults,
): readonly ScanPoint[] {
  const { dial, crossed, parallel, crossedSigma, parallelSigma, powerUnit } = mapping;
  const converted = (at: number, column: number, convert: (value: number) => number): number => {
    const value = numbers.get(column)?.[at] ?? Number.NaN;
    const result = convert(value);
    if (Number.isFinite(result) && (result !== 0 || value === 0)) return result;
    const { line = 1, cells = [] } = rows[at] ?? {};
    if (Number.isNaN(value)) faults.addNoNumber(line, column, cells[column] ?? '', isComma);
    else {
      const what = 'This number can’t be converted from its unit: the result is out of range.';
      faults.add(line, column, what, 'Correct it, or drop the line.');
    }
    return Number.NaN;
  };
  const power = (at: number, choice: Choice | null): number | null =>
    choice === null
      ? null
      : converted(at, choice.column, (value) => inPowerUnit(value, choice.unit, powerUnit));
  const sigma = (at: number, choice: Choice | null): number | null => {
    const value = power(at, choice);
    if (choice !== null && value !== null && value < 0) {
      const remedy = 'Write how far the power may be off, 0 or more.';
      faults.add(rows[at]?.line ?? 1, choice.column, 'This σ is negative.', remedy);
    }
    return value;
  };
  return rows.map(({ line }, at) => ({
    line,
    dialDeg: converted(at, dial.column, (value) => inDegrees(value, dial.unit)),
    crossed: power(at, crossed),
    parallel: power(at, parallel),
    crossedSigma: sigma(at, crossedSigma),
    parallelSigma: sigma(at, parallelSigma),
  }));
}
