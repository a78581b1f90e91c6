import { describe, expect, it } from 'vitest';
import { plateDifferences } from '../../../src/features/cabinet/plate-conflict';
import {
  calibrationFormSchema,
  emptyCalibration,
  plateFieldOf,
  readCalibration,
  readPlate,
  valuesOfPlate,
} from '../../../src/features/cabinet/plate-form-values';
import { updatePlateSchema } from '../../../shared/schemas/cabinet';
import { plateFixture } from './plate-fixture';

const typed = {
  ...emptyCalibration(plateFixture().calibration, new Date(2026, 3, 30, 10, 52)),
  retardanceDeg: '86.9',
  retardanceSigmaDeg: '0.4',
  offsetDeg: '301.73',
  offsetSigmaDeg: '9e-2',
  method: 'between crossed polarisers, 31 points',
};

function sentences(change: Partial<typeof typed>): readonly string[] {
  const result = calibrationFormSchema.safeParse(readCalibration({ ...typed, ...change }));
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
    expect(emptyCalibration(plateFixture().calibration, new Date(2026, 3, 30, 10, 52))).toMatchObject({
      wavelengthNm: '810',
      method: '',
      retardanceDeg: '',
      offsetDeg: '',
      measuredAt: '2026-04-30T10:52',
    });
  });

  it('is refused with what is right, for a number that is out of range or missing', () => {
    expect(sentences({ retardanceDeg: '400' })).toEqual(['A retardance is from 0.1 to 359.9°.']);
    expect(sentences({ offsetDeg: '' })).toEqual(['A zero is a number, like 301.73.']);
    expect(sentences({ measuredAt: '' })).toEqual(['Say when it was measured: the day and the time.']);
    expect(sentences({ method: '  ' })).toEqual(['Write the way it was measured.']);
  });
});

describe('a plate that is edited', () => {
  it('comes back from its form as it went in', () => {
    const plate = plateFixture();
    const read = updatePlateSchema.parse(readPlate(valuesOfPlate(plate)));
    expect(read).toEqual({
      name: plate.name,
      kind: plate.kind,
      designWavelengthNm: plate.designWavelengthNm,
      construction: plate.construction,
      material: plate.material,
      order: plate.order,
      note: plate.note,
      mount: plate.mount,
    });
  });

  it('has whole waves only where it is multi-order, and then at least one', () => {
    const values = valuesOfPlate(plateFixture());
    const read = (construction: string, order: string) =>
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

  it('says which of the two readings of a range is missing, and takes neither as a full ring', () => {
    const { mount, ...values } = valuesOfPlate(plateFixture());
    const ranged = (rangeFromDeg: string, rangeToDeg: string) =>
      updatePlateSchema.safeParse(readPlate({ ...values, mount: { ...mount, rangeFromDeg, rangeToDeg } }));
    expect(ranged('', '').data?.mount.rangeDeg).toBeNull();
    expect(ranged('-20', '175').data?.mount.rangeDeg).toEqual({ from: -20, to: 175 });
    expect(ranged('0', '').error?.issues.map(({ path }) => plateFieldOf(path.join('.')))).toEqual([
      'mount.rangeToDeg',
    ]);
    expect(ranged('0', '90').error?.issues.map(({ message }) => message)).toEqual([
      'A plate needs half a turn of its mount: write a last reading at least 180° above the first.',
    ]);
  });

  it('shows both sides of what two people changed, and nothing else', () => {
    const theirs = plateFixture({ name: 'Q-B2', revision: 4 });
    expect(plateDifferences(theirs, { ...valuesOfPlate(plateFixture()), note: 'scratched' })).toEqual([
      { field: 'name', theirs: 'Q-B2', yours: 'Q-B' },
      { field: 'note', theirs: '', yours: 'scratched' },
    ]);
  });
});
