import { describe, expect, it } from 'vitest';
import { createPlateSchema, updatePlateSchema } from '../../../shared/schemas/cabinet';
import { calibrationInputSchema } from '../../../shared/schemas/calibrations';
import { writeMountSchema } from '../../../shared/schemas/mounts';
import { emptyCalibration, readCalibration } from '../../../src/features/cabinet/calibration-form-values';
import { mountDifferences } from '../../../src/features/cabinet/mounts/mount-conflict';
import {
  mountFieldOf,
  readMount,
  valuesOfMount,
} from '../../../src/features/cabinet/mounts/mount-form-values';
import { emptyNewPlate, newPlateFieldOf, readNewPlate } from '../../../src/features/cabinet/new-plate-values';
import { plateDifferences } from '../../../src/features/cabinet/plate-conflict';
import { plateFieldOf, readPlate, valuesOfPlate } from '../../../src/features/cabinet/plate-form-values';
import { mountFixture, plateFixture } from './plate-fixture';

const now = new Date(2026, 3, 30, 10, 52);
const typed = {
  ...emptyCalibration(plateFixture().calibration, now),
  retardanceDeg: '86.9',
  retardanceSigmaDeg: '0.4',
  offsetDeg: '301.73',
  offsetSigmaDeg: '9e-2',
  method: 'between crossed polarisers, 31 points',
};

function sentences(change: Partial<typeof typed>): readonly string[] {
  const result = calibrationInputSchema.safeParse(readCalibration({ ...typed, ...change }));
  return result.success ? [] : result.error.issues.map(({ message }) => message);
}

describe('a calibration as it is typed', () => {
  it('is read with a point, an exponent or a true minus, and never with a comma', () => {
    expect(sentences({})).toEqual([]);
    expect(readCalibration(typed)).toMatchObject({
      offsetSigmaDeg: 0.09,
      retardanceDeg: 86.9,
      wavelengthNm: 810,
    });
    expect(readCalibration({ ...typed, offsetDeg: '\u22121.5' }).offsetDeg).toBe(-1.5);
    expect(sentences({ retardanceDeg: '86,9' })).toEqual(['A retardance is a number, like 180.4.']);
  });

  it('starts from the last wavelength, and from no value and no way of measuring', () => {
    expect(emptyCalibration(plateFixture().calibration, now)).toMatchObject({
      wavelengthNm: '810',
      method: '',
      retardanceDeg: '',
      offsetDeg: '',
      measuredAt: '2026-04-30T10:52',
      axisOpen: false,
    });
  });

  it('is refused with what is right, for a number that is out of range or missing', () => {
    expect(sentences({ retardanceDeg: '400' })).toEqual(['A retardance is from 0.1 to 359.9°.']);
    expect(sentences({ offsetDeg: '' })).toEqual(['A zero is a number, like 301.73.']);
    expect(sentences({ measuredAt: '' })).toEqual(['Say when it was measured: the day and the time.']);
    expect(sentences({ method: '  ' })).toEqual(['Write the way it was measured.']);
  });

  it('says what it left open, and settles what the one before left open and it does not', () => {
    const before = { id: 'before', openQuestions: ['axis', 'branch'] } as const;
    const standing = { ...before, openQuestions: [...before.openQuestions] };
    const read = (change: Partial<typeof typed>) => readCalibration({ ...typed, ...change }, standing);
    expect(read({ axisOpen: true, branchOpen: true })).toMatchObject({
      openQuestions: ['axis', 'branch'],
      settlesId: null,
    });
    expect(read({ branchOpen: true })).toMatchObject({ openQuestions: ['branch'], settlesId: 'before' });
    expect(readCalibration({ ...typed, blind: true })).toMatchObject({
      openQuestions: ['blind'],
      settlesId: null,
    });
  });
});

describe('a plate that is edited', () => {
  it('comes back from its form as it went in', () => {
    const plate = plateFixture({
      serial: 'QW-0418',
      clearApertureMm: 22.5,
      coatingNm: { from: 650, to: 1050 },
      damageNote: 'A burn at the rim.',
    });
    expect(updatePlateSchema.parse(readPlate(valuesOfPlate(plate)))).toEqual({
      name: plate.name,
      kind: plate.kind,
      designWavelengthNm: plate.designWavelengthNm,
      construction: plate.construction,
      material: plate.material,
      order: plate.order,
      serial: 'QW-0418',
      clearApertureMm: 22.5,
      coatingNm: { from: 650, to: 1050 },
      damageNote: 'A burn at the rim.',
      note: plate.note,
    });
  });

  it('has whole waves only where it is multi-order, and then at least one', () => {
    const values = valuesOfPlate(plateFixture());
    const read = (construction: typeof values.construction, order: string) =>
      updatePlateSchema.safeParse(readPlate({ ...values, construction, order }));
    // Written, then built as another: the field is hidden and counts for nothing.
    expect(read('compound-zero-order', '7').data?.order).toBe(0);
    expect(read('multi-order', '7').data?.order).toBe(7);
    const faultsOf = ({ error }: ReturnType<typeof read>) =>
      error?.issues.map(({ path, message }) => `${path.join('.')}: ${message}`) ?? [];
    expect(faultsOf(read('multi-order', '0'))).toEqual([
      'order: A multi-order plate has at least one whole wave. Write the order that its maker states, or choose another construction.',
    ]);
    expect(faultsOf(updatePlateSchema.safeParse({ ...readPlate(values), order: 3 }))).toEqual([
      'order: Only a multi-order plate has whole waves. Write 0, or say that it is multi-order.',
    ]);
  });

  it('says which end of a coating range is missing or wrong, and takes neither as not known', () => {
    const values = valuesOfPlate(plateFixture());
    const coated = (coatingFromNm: string, coatingToNm: string) =>
      updatePlateSchema.safeParse(readPlate({ ...values, coatingFromNm, coatingToNm }));
    expect(coated('', '').data?.coatingNm).toBeNull();
    const fields = (from: string, to: string) =>
      coated(from, to).error?.issues.map(({ path }) => plateFieldOf(path.join('.')));
    expect(fields('650', '')).toEqual(['coatingToNm']);
    expect(fields('1050', '650')).toEqual(['coatingToNm']);
  });

  it('shows both sides of what two people changed, and nothing else', () => {
    const theirs = plateFixture({ name: 'Q-B2', revision: 4 });
    expect(plateDifferences(theirs, { ...valuesOfPlate(plateFixture()), note: 'scratched' })).toEqual([
      { field: 'name', theirs: 'Q-B2', yours: 'Q-B' },
      { field: 'note', theirs: '', yours: 'scratched' },
    ]);
  });
});

describe('a mount that is edited', () => {
  const motor = mountFixture({
    drive: 'motor',
    speedDegPerS: 20,
    backlashDeg: 0.05,
    approach: 'rising',
    rangeDeg: { from: -20, to: 340 },
  });

  it('comes back from its form as it went in, without a speed once it is turned by hand', () => {
    const read = writeMountSchema.parse(readMount(valuesOfMount(motor)));
    expect({ ...motor, ...read }).toEqual(motor);
    expect(Object.keys(read).toSorted()).toEqual(Object.keys(writeMountSchema.shape).toSorted());
    expect(readMount({ ...valuesOfMount(motor), drive: 'hand' }).speedDegPerS).toBeNull();
  });

  it('says which of the two readings of a range is missing, and takes neither as a full ring', () => {
    const ranged = (rangeFromDeg: string, rangeToDeg: string) =>
      writeMountSchema.safeParse(readMount({ ...valuesOfMount(motor), rangeFromDeg, rangeToDeg }));
    expect(ranged('', '').data?.rangeDeg).toBeNull();
    expect(ranged('-20', '175').data?.rangeDeg).toEqual({ from: -20, to: 175 });
    expect(ranged('0', '').error?.issues.map(({ path }) => mountFieldOf(path.join('.')))).toEqual([
      'rangeToDeg',
    ]);
    expect(ranged('0', '90').error?.issues.map(({ message }) => message)).toEqual([
      'A plate needs half a turn of its mount: write a last reading at least 180° above the first.',
    ]);
  });

  it('shows both sides of what two people changed', () => {
    const yours = { ...valuesOfMount(motor), speedDegPerS: '25' };
    expect(mountDifferences({ ...motor, note: 'oiled' }, yours)).toEqual([
      { field: 'speed, degrees a second', theirs: '20', yours: '25' },
      { field: 'note', theirs: 'oiled', yours: '' },
    ]);
  });
});

describe('a plate that comes into the cabinet', () => {
  const plate = { ...valuesOfPlate(plateFixture()), name: 'Q-G' };
  const start = { ...emptyNewPlate(now), plate };

  it('may sit nowhere, in a mount that is there, or in one that comes with it, measured or not', () => {
    const seatOf = (change: Partial<typeof start>) =>
      createPlateSchema.parse(readNewPlate({ ...start, ...change })).seat;
    expect(seatOf({ seat: 'none', calibrates: 'now' })).toEqual({ kind: 'none' });
    const { id } = mountFixture();
    expect(seatOf({ seat: 'mount', mountId: id, since: '2026-04-29T09:00' })).toEqual({
      kind: 'mount',
      mountId: id,
      since: new Date(2026, 3, 29, 9).toISOString(),
      calibration: null,
    });
    const mount = valuesOfMount(mountFixture());
    expect(seatOf({ seat: 'new-mount', mount, calibrates: 'now', calibration: typed })).toMatchObject({
      kind: 'new-mount',
      mount: { name: 'M13' },
      calibration: { offsetDeg: 301.73, openQuestions: [], settlesId: null },
    });
  });

  it('has every fault at the field that a person sees', () => {
    const faults = (change: Partial<typeof start>) =>
      createPlateSchema
        .safeParse(readNewPlate({ ...start, ...change }))
        .error?.issues.map(({ path }) => newPlateFieldOf(path.join('.')));
    expect(faults({ plate: { ...plate, name: '' }, seat: 'none' })).toEqual(['plate.name']);
    expect(faults({ plate: { ...plate, coatingFromNm: '650' }, seat: 'none' })).toEqual([
      'plate.coatingToNm',
    ]);
    expect(faults({ seat: 'mount' })).toEqual(['mountId']);
    const mount = { ...valuesOfMount(mountFixture()), name: '', rangeFromDeg: '0' };
    expect(faults({ mount })).toEqual(['mount.name', 'mount.rangeToDeg']);
    const calibration = { ...typed, measuredAt: '' };
    expect(faults({ mount: valuesOfMount(mountFixture()), calibrates: 'now', calibration })).toEqual([
      'calibration.measuredAt',
    ]);
    expect(newPlateFieldOf('seat.kind')).toBeNull();
  });
});
