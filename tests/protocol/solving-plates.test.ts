import { expect, test } from 'vitest';
import { modelRetardance, retardanceAt } from '../../shared/optics/dispersion';
import { type SolvingPlate, usedRetardance } from '../../shared/protocol/solving-plates';
import { type PlateChange, solvingPlate } from '../support/plates';

/** A quartz half-wave plate of the tenth order for 810 nm, calibrated where it says. */
function plate(wavelengthNm: number, change: PlateChange<SolvingPlate> = {}): SolvingPlate {
  const made = { construction: 'multi-order', material: 'quartz', order: 10 } as const;
  const model = modelRetardance(made, 810, 180, { wavelengthNm, temperatureC: 20 });
  if (!model.ok) throw new Error(model.reason);
  return solvingPlate({
    ...made,
    kind: 'half',
    calibration: { wavelengthNm, temperatureC: 20, retardanceDeg: model.retardanceDeg, offsetDeg: 0 },
    ...change,
  });
}

test('a plate that is measured orders away from where its maker states the order still comes back to its design', () => {
  // At 532 nm it is past the sixteenth whole wave.
  for (const wavelengthNm of [532, 633, 780, 810, 1064]) {
    const used = usedRetardance(plate(wavelengthNm), { wavelengthNm: 810, temperatureC: 20 });
    expect(used.retardanceDeg).toBeCloseTo(180, 7);
  }
  // The maker's order taken as that at 532 nm would be another plate.
  const far = plate(532);
  const wrong = retardanceAt(far, far.calibration, { wavelengthNm: 810, temperatureC: 20 });
  expect(Math.abs(wrong.retardanceDeg - 180)).toBeGreaterThan(10);
});

test('an order is taken as it is stated where nobody says what the plate was made for, or no model holds', () => {
  const at = { wavelengthNm: 700, temperatureC: 20 };
  for (const change of [{ kind: 'other' }, { material: null }, { designWavelengthNm: 4000 }] as const) {
    const stated = plate(780, change);
    expect(usedRetardance(stated, at)).toEqual(retardanceAt(stated, stated.calibration, at));
  }
});
