import type { FieldErrors } from 'react-hook-form';
import { describe, expect, it } from 'vitest';
import { createPlateSchema } from '../../../shared/schemas/cabinet';
import {
  emptyNewPlate,
  newPlateFieldOf,
  type NewPlateValues,
  readNewPlate,
} from '../../../src/features/cabinet/new-plate-values';
import { valuesOfMount } from '../../../src/features/cabinet/mounts/mount-form-values';
import { valuesOfPlate } from '../../../src/features/cabinet/plate-form-values';
import { halfTypedSentence, schemaResolver } from '../../../src/lib/forms';
import { mountFixture, plateFixture } from '../cabinet/plate-fixture';

type Values = NewPlateValues;
const start = emptyNewPlate(new Date(2026, 3, 30, 10, 52));
const typed: Values = {
  ...start,
  plate: valuesOfPlate(plateFixture()),
  seat: 'new-mount',
  mount: valuesOfMount(mountFixture()),
  calibrates: 'now',
  calibration: {
    ...start.calibration,
    wavelengthNm: '810',
    retardanceDeg: '86.9',
    retardanceSigmaDeg: '0.4',
    offsetDeg: '301.73',
    offsetSigmaDeg: '0.09',
    method: 'between crossed polarisers, 31 points',
  },
};

const resolve = schemaResolver(createPlateSchema, readNewPlate, { fieldOf: newPlateFieldOf });

async function faults(change: Partial<Values>): Promise<FieldErrors<Values>> {
  const options = { fields: {}, shouldUseNativeValidation: false };
  return (await resolve({ ...typed, ...change }, undefined, options)).errors;
}

describe('a form held against its schema', () => {
  it('finds nothing wrong with numbers that have a point', async () => {
    expect(await faults({})).toEqual({});
  });

  it('answers a decimal comma with the same number and a point, however deep the field lies', async () => {
    const errors = await faults({
      mount: { ...typed.mount, resolutionDeg: '0,1' },
      calibration: { ...typed.calibration, offsetDeg: ' 301,73', retardanceDeg: '\u22121,5' },
    });
    expect(errors.mount?.resolutionDeg?.message).toBe('Write a point in place of the comma: 0.1.');
    expect(errors.calibration?.offsetDeg?.message).toBe('Write a point in place of the comma: 301.73.');
    expect(errors.calibration?.retardanceDeg?.message).toBe(
      'Write a point in place of the comma: \u22121.5.',
    );
  });

  it('takes half a moment for a fault, and no moment for none', async () => {
    const ref = document.createElement('input');
    const validity = (badInput: boolean) =>
      Object.defineProperty(ref, 'validity', { value: { badInput }, configurable: true });
    const options = {
      fields: { since: { name: 'since', ref } },
      names: ['since'] as const,
      shouldUseNativeValidation: false,
    };
    const errors = async () => (await resolve(typed, undefined, { ...options, names: ['since'] })).errors;
    validity(true);
    expect((await errors()).since?.message).toBe(halfTypedSentence);
    validity(false);
    expect(await errors()).toEqual({});
  });

  it('keeps the schema’s sentence for what is no number, and for a name that holds a comma', async () => {
    const errors = await faults({
      plate: { ...typed.plate, name: `1,${'5'.repeat(30)}`, designWavelengthNm: 'red' },
    });
    expect(errors.plate?.name?.message).toMatch(/longer than 20/);
    expect(errors.plate?.designWavelengthNm?.message).toBe('A wavelength is a number, like 810.');
  });
});
