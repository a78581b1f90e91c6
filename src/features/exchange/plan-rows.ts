import type {
  DocumentMount,
  DocumentPlateHead,
  FieldValue,
  ImportChange,
  ImportPlan,
} from '../../../shared/cabinet-document';
import { formatDate, formatTime, formatUncertain, missingSign, withTrueMinus } from '../../lib/format';

export type PlanWord = 'new' | 'changes' | 'ends';

/** One row of the table of what an import would do. */
export interface PlanRow {
  readonly key: string;
  /** "plate H-7", "H-7 in M-3". */
  readonly what: string;
  readonly word: PlanWord;
  readonly field: string;
  readonly now: string;
  readonly after: string;
}

const fieldNames: Readonly<Record<string, string>> = {
  name: 'name',
  kind: 'kind',
  designWavelengthNm: 'design wavelength, nm',
  construction: 'construction',
  material: 'material',
  order: 'order, waves',
  serial: 'serial number',
  clearApertureMm: 'clear aperture, mm',
  coatingNm: 'coating, nm',
  damageNote: 'damage note',
  note: 'note',
  drive: 'drive',
  direction: 'direction',
  resolutionDeg: 'finest step, degrees',
  repeatabilityDeg: 'repeatability σ, degrees',
  rangeDeg: 'range, degrees',
  speedDegPerS: 'speed, degrees a second',
  backlashDeg: 'backlash, degrees',
  approach: 'approach',
};

const plain = (value: number): string => withTrueMinus(String(value));

function valueWords(value: FieldValue): string {
  if (value === null || value === '') return missingSign;
  if (typeof value === 'number') return plain(value);
  return typeof value === 'string' ? value : `${plain(value.from)} to ${plain(value.to)}`;
}

function momentWords(moment: string): string {
  const date = new Date(moment);
  return `${formatDate(date)}, ${formatTime(date)}`;
}

function mountWords(mount: DocumentMount): string {
  const drive = mount.drive === 'motor' ? 'by motor' : 'by hand';
  const retired = mount.retiredAt === null ? '' : `, retired ${momentWords(mount.retiredAt)}`;
  return `${drive}, steps of ${plain(mount.resolutionDeg)}°${retired}`;
}

function plateWords(plate: DocumentPlateHead): string {
  const retired = plate.retiredAt === null ? '' : `, retired ${momentWords(plate.retiredAt)}`;
  const kind = plate.kind === 'other' ? 'other retarder' : `${plate.kind}-wave plate`;
  return `${kind} for ${plain(plate.designWavelengthNm)} nm${retired}`;
}

function calibrationWords({ calibration }: Extract<ImportChange, { kind: 'calibration-added' }>): string {
  const retardance = formatUncertain(calibration.retardanceDeg, calibration.retardanceSigmaDeg);
  const zero = formatUncertain(calibration.offsetDeg, calibration.offsetSigmaDeg);
  return `${retardance}°, zero ${zero}° at ${plain(calibration.wavelengthNm)} nm, by ${calibration.recordedBy}`;
}

/** The changes of a plan as rows: one for what is new or ends, one a field for what changes. */
export function planRows({ changes }: ImportPlan): readonly PlanRow[] {
  return changes.flatMap((change, index) =>
    rowsOf(change).map((row, nth) => ({ ...row, key: `${index} ${nth}` })),
  );
}

function rowsOf(change: ImportChange): readonly Omit<PlanRow, 'key'>[] {
  switch (change.kind) {
    case 'mount-added':
      return [
        {
          what: `mount ${change.mount.name}`,
          word: 'new',
          field: 'mount',
          now: missingSign,
          after: mountWords(change.mount),
        },
      ];
    case 'plate-added':
      return [
        {
          what: `plate ${change.plate.name}`,
          word: 'new',
          field: 'plate',
          now: missingSign,
          after: plateWords(change.plate),
        },
      ];
    case 'mount-changed':
      return change.fields.map(({ field, before, after }) => ({
        what: `mount ${change.mount.name}`,
        word: 'changes',
        field: fieldNames[field] ?? field,
        now: valueWords(before),
        after: valueWords(after),
      }));
    case 'plate-changed':
      return change.fields.map(({ field, before, after }) => ({
        what: `plate ${change.plate.name}`,
        word: 'changes',
        field: fieldNames[field] ?? field,
        now: valueWords(before),
        after: valueWords(after),
      }));
    case 'seat-ended':
      return [
        {
          what: `${change.plate.name} in ${change.seat.mount.name}`,
          word: 'ends',
          field: 'seat',
          now: `since ${momentWords(change.seat.seatedAt)}`,
          after: `ends ${momentWords(change.leftAt)}: ${change.leftWhy}`,
        },
      ];
    case 'seat-added': {
      const { mount, seatedAt, leftAt, leftWhy } = change.seat;
      return [
        {
          what: `${change.plate.name} in ${mount.name}`,
          word: 'new',
          field: 'seat',
          now: missingSign,
          after:
            leftAt === null
              ? `since ${momentWords(seatedAt)}`
              : `from ${momentWords(seatedAt)} to ${momentWords(leftAt)}: ${leftWhy ?? ''}`,
        },
      ];
    }
    case 'calibration-added':
      return [
        {
          what: `${change.plate.name} in ${change.seat.mount.name}`,
          word: 'new',
          field: `calibration of ${momentWords(change.calibration.measuredAt)}`,
          now: missingSign,
          after: calibrationWords(change),
        },
      ];
  }
}
