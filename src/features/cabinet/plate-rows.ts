import type { Plate } from '../../../shared/schemas/cabinet';
import { calibrationAge } from './calibration-age';

export type PlateColumn = 'name' | 'kind' | 'retardance' | 'wavelength' | 'zero' | 'mount' | 'due';

export interface PlateFilter {
  readonly text: string;
  readonly withRetired: boolean;
}

function sortKey(plate: Plate, column: PlateColumn, dueDays: number, now: Date): string | number {
  switch (column) {
    case 'name':
      return plate.name;
    case 'kind':
      return plate.kind;
    case 'retardance':
      return plate.calibration.retardanceDeg;
    case 'wavelength':
      return plate.calibration.wavelengthNm;
    case 'zero':
      return plate.calibration.offsetDeg;
    case 'mount':
      return plate.mount.name;
    case 'due':
      return calibrationAge(plate.calibration.measuredAt, dueDays, now).daysLeft;
  }
}

const words = new Intl.Collator('en', { numeric: true, sensitivity: 'base' });

/** The plates that a search finds, in the order of a column; equal ones by name, so that H-2 stands before H-10. */
export function plateRows(
  plates: readonly Plate[],
  filter: PlateFilter,
  sort: { readonly column: PlateColumn; readonly descending: boolean },
  dueDays: number,
  now: Date,
): readonly Plate[] {
  const wanted = filter.text.trim().toLowerCase();
  const found = plates.filter(
    (plate) =>
      (filter.withRetired || plate.retiredAt === null) &&
      [plate.name, plate.mount.name, plate.kind, plate.note, ...plate.benches.map(({ name }) => name)].some(
        (text) => text.toLowerCase().includes(wanted),
      ),
  );
  const sign = sort.descending ? -1 : 1;
  return found.sort((one, other) => {
    const a = sortKey(one, sort.column, dueDays, now);
    const b = sortKey(other, sort.column, dueDays, now);
    const difference =
      typeof a === 'number' && typeof b === 'number' ? a - b : words.compare(String(a), String(b));
    return difference === 0 ? words.compare(one.name, other.name) : sign * difference;
  });
}
