import type { Path } from 'react-hook-form';
import { isoFromOptionalField } from '../../lib/forms';
import { type CalibrationValues, emptyCalibration, readCalibration } from './calibration-form-values';
import { emptyMount, mountFieldOf, type MountValues, readMount } from './mounts/mount-form-values';
import { emptyPlate, plateFieldOf, type PlateValues, readPlate } from './plate-form-values';

/** Where a new plate sits from the start. */
export type FirstSeat = 'none' | 'mount' | 'new-mount';

/** A plate that comes into the cabinet, as it is typed. */
export interface NewPlateValues {
  readonly plate: PlateValues;
  readonly seat: FirstSeat;
  /** Of the empty mount that was chosen; '' while none is. */
  readonly mountId: string;
  readonly mount: MountValues;
  /** '' where nobody says. */
  readonly since: string;
  readonly calibrates: 'not-yet' | 'now';
  readonly calibration: CalibrationValues;
}

export function emptyNewPlate(now: Date): NewPlateValues {
  return {
    plate: emptyPlate,
    seat: 'new-mount',
    mountId: '',
    mount: emptyMount,
    since: '',
    calibrates: 'not-yet',
    calibration: emptyCalibration(null, now),
  };
}

/** What a request's schema is held against. */
export function readNewPlate(values: NewPlateValues) {
  return { ...readPlate(values.plate), seat: readSeat(values) };
}

function readSeat(values: NewPlateValues) {
  const calibration = values.calibrates === 'now' ? readCalibration(values.calibration) : null;
  const since = isoFromOptionalField(values.since);
  switch (values.seat) {
    case 'none':
      return { kind: 'none' };
    case 'mount':
      return { kind: 'mount', mountId: values.mountId, since, calibration };
    case 'new-mount':
      return { kind: 'new-mount', mount: readMount(values.mount), since, calibration };
  }
}

const plateFields = new Set(Object.keys(emptyPlate));
const mountFields = new Set(Object.keys(emptyMount));

const isPlateField = (name: string): name is keyof PlateValues => plateFields.has(name);
const isMountField = (name: string): name is keyof MountValues => mountFields.has(name);
const isCalibrationField = (name: string): name is keyof CalibrationValues =>
  Object.hasOwn(emptyCalibration(null, new Date(0)), name);

/** The form's name of a part of the request; null where the form has none. */
export function newPlateFieldOf(path: string): Path<NewPlateValues> | null {
  if (path === 'seat.mountId') return 'mountId';
  if (path === 'seat.since') return 'since';
  const ofMount = /^seat\.mount\.(.+)$/.exec(path)?.[1];
  if (ofMount !== undefined) {
    const field = mountFieldOf(ofMount) ?? ofMount;
    return isMountField(field) ? `mount.${field}` : null;
  }
  const ofCalibration = /^seat\.calibration\.(.+)$/.exec(path)?.[1];
  if (ofCalibration !== undefined) {
    return isCalibrationField(ofCalibration) ? `calibration.${ofCalibration}` : null;
  }
  const field = plateFieldOf(path) ?? path;
  return isPlateField(field) ? `plate.${field}` : null;
}
