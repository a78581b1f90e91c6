import {
  type CabinetDocument,
  cabinetFormat,
  type DocumentCalibration,
  type DocumentMount,
  type DocumentPlate,
  type DocumentSeat,
} from '../../shared/cabinet-document';
import { newCalibration, newMount, newPlate } from '../support/plates';

/** The first of March 2026, and each day after it. */
export const day = (number: number): string => new Date(Date.UTC(2026, 2, number)).toISOString();

export const mount = (name: string, change: Partial<DocumentMount> = {}): DocumentMount => ({
  ...newMount({ name }),
  retiredAt: null,
  ...change,
});

export function calibration(
  dayNumber: number,
  change: Partial<DocumentCalibration> = {},
): DocumentCalibration {
  const {
    wavelengthNm,
    temperatureC,
    retardanceDeg,
    retardanceSigmaDeg,
    offsetDeg,
    offsetSigmaDeg,
    method,
    note,
  } = newCalibration();
  return {
    wavelengthNm,
    temperatureC,
    retardanceDeg,
    retardanceSigmaDeg,
    offsetDeg,
    offsetSigmaDeg,
    method,
    note,
    openQuestions: [],
    settles: null,
    measuredAt: day(dayNumber),
    recordedBy: 'Ines Okafor',
    ...change,
  };
}

/** A seat from one day to another, or going on. */
export function seat(
  mountName: string,
  from: number,
  to: number | null,
  calibrations: DocumentCalibration[] = [],
  retiredAt: string | null = null,
): DocumentSeat {
  return {
    mount: { name: mountName, retiredAt },
    seatedAt: day(from),
    leftAt: to === null ? null : day(to),
    leftWhy: to === null ? null : 'Cleaned.',
    calibrations,
  };
}

export function plate(
  name: string,
  seats: DocumentSeat[] = [],
  change: Partial<DocumentPlate> = {},
): DocumentPlate {
  const {
    kind,
    designWavelengthNm,
    construction,
    material,
    order,
    serial,
    clearApertureMm,
    coatingNm,
    damageNote,
    note,
  } = newPlate();
  return {
    name,
    kind,
    designWavelengthNm,
    construction,
    material,
    order,
    serial,
    clearApertureMm,
    coatingNm,
    damageNote,
    note,
    retiredAt: null,
    seats,
    ...change,
  };
}

export const cabinet = (mounts: DocumentMount[], plates: DocumentPlate[] = []): CabinetDocument => ({
  format: cabinetFormat,
  mounts,
  plates,
});
