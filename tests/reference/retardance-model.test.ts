import fc from 'fast-check';
import { afterAll, expect, test } from 'vitest';
import {
  birefringence,
  compareWithModel,
  designRetardance,
  MATERIAL_IDS,
  type MaterialId,
  materialOf,
  type ModelledPlate,
  modelRetardance,
  retardanceAt,
} from '../../shared/optics/dispersion';
import { Deviations } from './deviations';

const deviations = new Deviations();
afterAll(() => deviations.print('Retardance away from its calibration, worst deviation'));

const plate = (
  construction: ModelledPlate['construction'],
  material: MaterialId | null = 'quartz',
  order = 0,
): ModelledPlate => ({ construction, material, order });

const at = (wavelengthNm: number, temperatureC: number | null = null) => ({ wavelengthNm, temperatureC });

// references.md 4.2, computed there from Ghosh's formulas.
test('a zero-order quartz half-wave plate for 810 nm has 187.381° at 780 nm', () => {
  for (const construction of ['true-zero-order', 'compound-zero-order'] as const) {
    const used = retardanceAt(
      plate(construction),
      { retardanceDeg: 180, wavelengthNm: 810, temperatureC: 21 },
      at(780, 21),
    );
    expect(used.source).toBe('model');
    const deviation = Math.abs(used.retardanceDeg - 187.381);
    expect(
      deviations.note('Quartz half-wave plate for 810 nm at 780 nm: 187.381° (4.2)', deviation),
    ).toBeLessThan(5.1e-4);
    expect(used.shiftDeg).toBeCloseTo(used.retardanceDeg - 180, 12);
    // The simple rule λ0/λ leaves dispersion out.
    expect((180 * 810) / 780).toBeCloseTo(186.923, 3);
  }
});

test('a true zero-order quartz quarter-wave plate is 17.49 µm thick for 632.8 nm and 22.78 µm for 810 nm', () => {
  for (const [nm, um] of [
    [632.8, 17.49],
    [810, 22.78],
  ] as const) {
    const thickness = designRetardance(plate('true-zero-order'), 'quarter', nm)?.thicknessUm ?? NaN;
    const deviation = Math.abs(thickness - um);
    expect(deviations.note('Thickness λ/(4Δn) of quartz in µm (4.2)', deviation)).toBeLessThan(0.0051);
  }
  const seventh = designRetardance(plate('multi-order', 'quartz', 7), 'half', 810);
  expect(seventh).toMatchObject({ retardanceDeg: 180, wholeDeg: 2700 });
  expect(seventh?.thicknessUm).toBeCloseTo((7.5 * 0.81) / birefringence('quartz', 810), 9);
  expect(designRetardance(plate('achromatic', null), 'half', 810)?.thicknessUm).toBeNull();
  expect(designRetardance(plate('true-zero-order'), 'other', 810)).toBeNull();
});

// Etzel, Rose, Wang, Appl. Opt. 39, 5796 (2000); the degrees by references.md 4.3.
test.each([
  ['quartz', 90, -0.111],
  ['quartz', 180, -0.221],
  ['magnesium-fluoride', 180, -0.097],
] as const)(
  '%s, %d°: ten kelvin more take off what Etzel, Rose and Wang measured',
  (material, deg, shift) => {
    const here = { retardanceDeg: deg, wavelengthNm: 810, temperatureC: 20 };
    const used = retardanceAt(plate('true-zero-order', material), here, at(810, 30));
    const deviation = Math.abs(used.shiftDeg - shift);
    expect(
      deviations.note('Etzel, Rose, Wang 2000: shift by 10 K in degrees (3 decimals)', deviation),
    ).toBeLessThan(5.1e-4);
    expect(used.source).toBe('model');
    expect(used.perKelvinDeg).toBeCloseTo(shift / 10, 4);
  },
);

test('γ Δn of quartz is −1.11e-6 per kelvin at 633 nm', () => {
  const gamma = materialOf('quartz').temperature?.perKelvin ?? NaN;
  const deviation = Math.abs(gamma * birefringence('quartz', 633) + 1.11e-6);
  expect(deviations.note('Quartz γΔn at 633 nm, per kelvin (4.3)', deviation)).toBeLessThan(5.1e-9);
});

test('a multi-order plate moves with its whole retardance, folded only at the end', () => {
  const calibration = { retardanceDeg: 178, wavelengthNm: 810, temperatureC: 20 };
  const zero = retardanceAt(plate('true-zero-order'), calibration, at(805, 23));
  const tenth = retardanceAt(plate('multi-order', 'quartz', 10), calibration, at(805, 23));
  expect(tenth.shiftDeg / zero.shiftDeg).toBeCloseTo(3778 / 178, 9);
  expect(tenth.perNmDeg / zero.perNmDeg).toBeCloseTo(3778 / 178, 9);
  expect(tenth.perKelvinDeg / zero.perKelvinDeg).toBeCloseTo(3778 / 178, 9);
  const far = retardanceAt(plate('multi-order', 'quartz', 10), calibration, at(532));
  expect(Math.abs(far.shiftDeg)).toBeGreaterThan(360);
  expect(far.retardanceDeg).toBeGreaterThanOrEqual(0);
  expect(far.retardanceDeg).toBeLessThan(360);
});

const measured = fc.record({
  retardanceDeg: fc.double({ min: 1, max: 359, noNaN: true }),
  wavelengthNm: fc.double({ min: 250, max: 2000, noNaN: true }),
  temperatureC: fc.double({ min: 10, max: 80, noNaN: true }),
});
const bench = fc.record({
  wavelengthNm: fc.double({ min: 250, max: 2000, noNaN: true }),
  temperatureC: fc.double({ min: 10, max: 80, noNaN: true }),
});
const anyPlate = fc.record({
  construction: fc.constantFrom(
    'true-zero-order' as const,
    'compound-zero-order' as const,
    'multi-order' as const,
  ),
  material: fc.constantFrom(...MATERIAL_IDS),
  order: fc.integer({ min: 0, max: 40 }),
});

test('there and on is the same as straight, and there and back is where it was', () => {
  fc.assert(
    fc.property(anyPlate, measured, bench, bench, (made, calibration, half, end) => {
      const there = retardanceAt(made, calibration, half);
      const whole = calibration.retardanceDeg + 360 * made.order + there.shiftDeg;
      // The order moves with the whole: hand the next step the order that it has there.
      const order = Math.floor(whole / 360);
      const onward = { ...half, retardanceDeg: there.retardanceDeg };
      const on = retardanceAt({ ...made, order }, onward, end);
      const straight = retardanceAt(made, calibration, end);
      const relative = Math.abs(there.shiftDeg + on.shiftDeg - straight.shiftDeg) / (whole + 360);
      expect(
        deviations.note('Retardance by way of another wavelength against straight, relative', relative),
      ).toBeLessThan(1e-11);
      const back = retardanceAt({ ...made, order }, onward, calibration);
      expect(Math.abs(there.shiftDeg + back.shiftDeg) / (whole + 360)).toBeLessThan(1e-11);
    }),
    { numRuns: 300 },
  );
});

test('perNmDeg and perKelvinDeg are the derivatives of what is used', () => {
  fc.assert(
    fc.property(anyPlate, measured, bench, (made, calibration, place) => {
      const used = retardanceAt(made, calibration, place);
      const shiftBy = (nm: number, kelvin: number) =>
        retardanceAt(made, calibration, {
          wavelengthNm: place.wavelengthNm + nm,
          temperatureC: place.temperatureC + kelvin,
        }).shiftDeg;
      const whole = calibration.retardanceDeg + 360 * made.order + used.shiftDeg;
      const slope = (h: number) => (shiftBy(h, 0) - shiftBy(-h, 0)) / (2 * h);
      const richardson = (4 * slope(0.25) - slope(0.5)) / 3;
      const byNm = Math.abs(richardson - used.perNmDeg) / whole;
      expect(
        deviations.note('d(retardance)/dλ against a difference, relative to the whole', byNm),
      ).toBeLessThan(1e-8);
      const byKelvin = Math.abs((shiftBy(0, 1) - shiftBy(0, -1)) / 2 - used.perKelvinDeg) / whole;
      expect(
        deviations.note('d(retardance)/dT against a difference, relative to the whole', byKelvin),
      ).toBeLessThan(1e-11);
    }),
    { numRuns: 300 },
  );
});

test('measured where it is used, a retardance comes through in its own bits', () => {
  fc.assert(
    fc.property(anyPlate, measured, (made, calibration) => {
      const used = retardanceAt(made, calibration, calibration);
      expect(used.retardanceDeg).toBe(calibration.retardanceDeg);
      expect(used.shiftDeg).toBe(0);
      expect(used.source).toBe('calibration');
    }),
  );
  const calibration = { retardanceDeg: 90, wavelengthNm: 810, temperatureC: null };
  expect(retardanceAt(plate('true-zero-order'), calibration, at(810, 25)).source).toBe('calibration');
  expect(retardanceAt(plate('true-zero-order'), calibration, at(810.01)).source).toBe('model');
});

test.each([
  ['achromatic', plate('achromatic'), 'achromatic'],
  ['unknown construction', plate('unknown'), 'construction'],
  ['unknown material', plate('true-zero-order', null), 'material'],
] as const)(
  '%s: the measured value is used as it is, and says when it was measured elsewhere',
  (_, made, word) => {
    const calibration = { retardanceDeg: 178.2, wavelengthNm: 810, temperatureC: 20 };
    for (const [nm, celsius, source] of [
      [810, 20, 'calibration'],
      [810.05, 20.9, 'calibration'],
      [809.94, null, 'no-model'],
      [810, 21.5, 'no-model'],
      [780, 20, 'no-model'],
    ] as const) {
      const used = retardanceAt(made, calibration, at(nm, celsius));
      expect(used).toMatchObject({
        retardanceDeg: 178.2,
        shiftDeg: 0,
        source,
        perNmDeg: 0,
        perKelvinDeg: 0,
      });
      expect(used.reason).toContain(word);
    }
    expect(modelRetardance(made, 810, 180, at(780)).ok).toBe(false);
    expect(compareWithModel(made, 810, 180, calibration)).toBeNull();
  },
);

test('a bench beyond the range of the formula has no model, and is told the range', () => {
  const used = retardanceAt(
    plate('true-zero-order'),
    { retardanceDeg: 90, wavelengthNm: 1550, temperatureC: null },
    at(2100),
  );
  expect(used.source).toBe('no-model');
  expect(used.reason).toContain('198 to 2053.1 nm');
});

test('a temperature that no coefficient covers is left out and said to be', () => {
  const calibration = { retardanceDeg: 90, wavelengthNm: 810, temperatureC: 20 };
  const used = retardanceAt(plate('true-zero-order', 'sapphire'), calibration, at(780, 30));
  expect(used.source).toBe('model');
  expect(used.reason).toContain('sapphire');
  expect(retardanceAt(plate('true-zero-order', 'sapphire'), calibration, at(780, 20)).reason).toBeNull();
});

test('an order that is no whole number of waves is refused', () => {
  for (const order of [-1, 0.5, NaN]) {
    const calibration = { retardanceDeg: 90, wavelengthNm: 810, temperatureC: null };
    expect(() => retardanceAt(plate('multi-order', 'quartz', order), calibration, at(810))).toThrow(
      RangeError,
    );
  }
});

test('a calibration is set beside the model, and the order it was measured in is found', () => {
  const made = plate('multi-order', 'quartz', 10);
  const model = modelRetardance(made, 810, 180, at(532, 20));
  if (!model.ok) throw new Error(model.reason);
  const orderThere = Math.floor(model.wholeDeg / 360);
  const calibration = { retardanceDeg: model.retardanceDeg + 1.5, wavelengthNm: 532, temperatureC: 20 };
  expect(orderThere).toBeGreaterThan(10);
  const compared = compareWithModel(made, 810, 180, calibration);
  expect(compared).toMatchObject({ modelledDeg: model.retardanceDeg, orderThere });
  expect(compared?.deviationDeg).toBeCloseTo(1.5, 9);
  // A zero-order half-wave plate for 800 nm is past a whole wave at 400 nm.
  const blue = compareWithModel(plate('true-zero-order'), 800, 180, {
    retardanceDeg: 30,
    wavelengthNm: 400,
    temperatureC: null,
  });
  expect(blue?.orderThere).toBe(1);
});
