import type { Mount, WriteMount } from '../../../../shared/schemas/mounts';
import { readOptionalNumber, readTypedNumber, typedFromNumber, typedFromOptional } from '../../../lib/forms';

/** A mount as it is typed. */
export interface MountValues {
  readonly name: string;
  readonly drive: WriteMount['drive'];
  readonly direction: '1' | '-1';
  readonly resolutionDeg: string;
  readonly repeatabilityDeg: string;
  /** Both '' for a ring that turns all the way round. */
  readonly rangeFromDeg: string;
  readonly rangeToDeg: string;
  /** Of a motor only. */
  readonly speedDegPerS: string;
  readonly backlashDeg: string;
  readonly approach: string;
  readonly note: string;
}

/** A field that a person types or chooses in; drive and direction are pairs of cells. */
export type MountTextField = Exclude<keyof MountValues, 'drive' | 'direction'>;

export const emptyMount: MountValues = {
  name: '',
  drive: 'hand',
  direction: '1',
  resolutionDeg: '',
  repeatabilityDeg: '',
  rangeFromDeg: '',
  rangeToDeg: '',
  speedDegPerS: '',
  backlashDeg: '0',
  approach: 'either',
  note: '',
};

export function valuesOfMount(mount: Mount & Pick<WriteMount, 'drive' | 'note'>): MountValues {
  return {
    name: mount.name,
    drive: mount.drive,
    direction: mount.direction === 1 ? '1' : '-1',
    resolutionDeg: typedFromNumber(mount.resolutionDeg),
    repeatabilityDeg: typedFromNumber(mount.repeatabilityDeg),
    rangeFromDeg: typedFromOptional(mount.rangeDeg?.from ?? null),
    rangeToDeg: typedFromOptional(mount.rangeDeg?.to ?? null),
    speedDegPerS: typedFromOptional(mount.speedDegPerS),
    backlashDeg: typedFromNumber(mount.backlashDeg),
    approach: mount.approach,
    note: mount.note,
  };
}

/** What a request's schema is held against. */
export function readMount(values: MountValues) {
  return {
    name: values.name,
    drive: values.drive,
    direction: Number(values.direction),
    resolutionDeg: readTypedNumber(values.resolutionDeg),
    repeatabilityDeg: readTypedNumber(values.repeatabilityDeg),
    rangeDeg: readRange(values),
    // The field is hidden for a mount that is turned by hand, whatever was written in it before.
    speedDegPerS: values.drive === 'motor' ? readOptionalNumber(values.speedDegPerS) : null,
    backlashDeg: readTypedNumber(values.backlashDeg),
    approach: values.approach,
    note: values.note,
  };
}

function readRange({ rangeFromDeg, rangeToDeg }: MountValues) {
  if (rangeFromDeg.trim() === '' && rangeToDeg.trim() === '') return null;
  return { from: readTypedNumber(rangeFromDeg), to: readTypedNumber(rangeToDeg) };
}

/** Where the form has another name for a part of a mount. */
export function mountFieldOf(path: string): 'rangeFromDeg' | 'rangeToDeg' | null {
  if (path === 'rangeDeg.from') return 'rangeFromDeg';
  return path === 'rangeDeg.to' || path === 'rangeDeg' ? 'rangeToDeg' : null;
}
