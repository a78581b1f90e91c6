import { openQuestions } from '../schemas';
import { guarded, isFormulaLike, numberCell, readNumberCell, unguarded } from './csv-cells';
import { isRecord } from './read-parts';

/** What a column is a fact of. The facts of a plate, a mount and a seat stand again in every row of theirs. */
export type CsvPart = 'plate' | 'mount' | 'seat' | 'calibration';

/** text: anything a person wrote. word: one of a few, or a moment. number: shortest round trip. list: words with spaces between. */
type CellKind = 'text' | 'word' | 'number' | 'list';

export interface CsvColumn {
  /** The name in the header, with its unit. */
  readonly header: string;
  readonly part: CsvPart;
  /** Where the value is in the part. */
  readonly path: readonly [string] | readonly [string, string];
  readonly kind: CellKind;
  /** What an empty cell says, where that is not "nothing is known". */
  readonly whenEmpty: number | null;
  /** What to write, where a number alone doesn't tell. */
  readonly meaning: string | null;
}

const column = (
  part: CsvPart,
  header: string,
  path: string,
  kind: CellKind,
  more: Partial<Pick<CsvColumn, 'whenEmpty' | 'meaning'>> = {},
): CsvColumn => {
  const [first = '', second] = path.split('.');
  return {
    header,
    part,
    path: second === undefined ? [first] : [first, second],
    kind,
    whenEmpty: null,
    meaning: null,
    ...more,
  };
};

/** The columns in their order. The last is never empty behind a calibration, so that a file cut off mid-row shows. */
export const csvColumns: readonly CsvColumn[] = [
  column('plate', 'plate', 'name', 'text'),
  column('plate', 'plate_kind', 'kind', 'word'),
  column('plate', 'design_wavelength_nm', 'designWavelengthNm', 'number'),
  column('plate', 'construction', 'construction', 'word'),
  column('plate', 'material', 'material', 'word'),
  column('plate', 'order_waves', 'order', 'number', { whenEmpty: 0 }),
  column('plate', 'serial', 'serial', 'text'),
  column('plate', 'clear_aperture_mm', 'clearApertureMm', 'number'),
  column('plate', 'coating_from_nm', 'coatingNm.from', 'number'),
  column('plate', 'coating_to_nm', 'coatingNm.to', 'number'),
  column('plate', 'damage_note', 'damageNote', 'text'),
  column('plate', 'plate_note', 'note', 'text'),
  column('plate', 'plate_retired_at', 'retiredAt', 'word'),
  column('mount', 'mount', 'name', 'text'),
  column('mount', 'drive', 'drive', 'word'),
  column('mount', 'direction', 'direction', 'number', {
    meaning: 'Write 1 where its numbers rise counter-clockwise as the receiver sees it, -1 where clockwise.',
  }),
  column('mount', 'resolution_deg', 'resolutionDeg', 'number'),
  column('mount', 'repeatability_deg', 'repeatabilityDeg', 'number'),
  column('mount', 'range_from_deg', 'rangeDeg.from', 'number'),
  column('mount', 'range_to_deg', 'rangeDeg.to', 'number'),
  column('mount', 'speed_deg_per_s', 'speedDegPerS', 'number'),
  column('mount', 'backlash_deg', 'backlashDeg', 'number'),
  column('mount', 'approach', 'approach', 'word'),
  column('mount', 'mount_note', 'note', 'text'),
  column('mount', 'mount_retired_at', 'retiredAt', 'word'),
  column('seat', 'seated_at', 'seatedAt', 'word'),
  column('seat', 'left_at', 'leftAt', 'word'),
  column('seat', 'left_why', 'leftWhy', 'text'),
  column('calibration', 'calibration_number', 'number', 'number'),
  column('calibration', 'wavelength_nm', 'wavelengthNm', 'number'),
  column('calibration', 'temperature_degc', 'temperatureC', 'number'),
  column('calibration', 'retardance_deg', 'retardanceDeg', 'number'),
  column('calibration', 'retardance_sigma_deg', 'retardanceSigmaDeg', 'number'),
  column('calibration', 'offset_deg', 'offsetDeg', 'number'),
  column('calibration', 'offset_sigma_deg', 'offsetSigmaDeg', 'number'),
  column('calibration', 'method', 'method', 'text'),
  column('calibration', 'calibration_note', 'note', 'text'),
  column('calibration', 'open_questions', 'openQuestions', 'list'),
  column('calibration', 'settles_number', 'settles', 'number'),
  column('calibration', 'recorded_by', 'recordedBy', 'text'),
  column('calibration', 'measured_at', 'measuredAt', 'word'),
];

/** The cell of a column, from its part; a part that a row has none of leaves its cells empty. */
export function writtenCell({ path, kind }: CsvColumn, part: unknown): string {
  const value = path.reduce<unknown>((inner, key) => (isRecord(inner) ? inner[key] : null), part);
  if (Array.isArray(value)) return value.join(' ');
  if (typeof value === 'number') return numberCell(value);
  if (typeof value !== 'string') return '';
  return kind === 'text' ? guarded(value) : value;
}

/** What a cell says: nothing, a text, a number, or words. */
export type CellValue = string | number | null | readonly string[];

export type ReadCell =
  { readonly ok: true; readonly value: CellValue } | { readonly ok: false; readonly fault: string };

/** What a cell says; what is no value of its column is left for the part's schema to refuse. */
export function readCell({ header, kind, whenEmpty, meaning }: CsvColumn, cell: string): ReadCell {
  if (kind === 'text') {
    if (isFormulaLike(cell)) {
      return {
        ok: false,
        fault:
          'This text begins like a formula. Put an apostrophe before it; reading takes the apostrophe off again.',
      };
    }
    return { ok: true, value: unguarded(cell) };
  }
  const trimmed = cell.trim();
  if (kind === 'list')
    return { ok: true, value: trimmed === '' ? [] : trimmed.split(/\s+/u, openQuestions.length + 1) };
  if (trimmed === '') return { ok: true, value: whenEmpty };
  if (kind === 'word') return { ok: true, value: trimmed };
  const value = readNumberCell(trimmed);
  if (value !== null) return { ok: true, value };
  const shown = trimmed.length > 30 ? `${trimmed.slice(0, 30)}…` : trimmed;
  return {
    ok: false,
    fault: `${header} says “${shown}”, which is no number. ${meaning ?? 'Write digits with a decimal point, and no unit.'}`,
  };
}
