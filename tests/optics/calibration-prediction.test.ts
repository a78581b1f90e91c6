import { expect, test } from 'vitest';
import {
  distanceFromModel,
  predictRetardance,
  type PredictionProblem,
} from '../../shared/optics/calibration';
import { modelRetardance } from '../../shared/optics/dispersion';

const problem: PredictionProblem = {
  plate: { construction: 'multi-order', material: 'quartz', order: 4 },
  designWavelengthNm: 810,
  nominalDeg: { value: 90, sigma: 1.2 },
  surroundings: { wavelengthNm: 800, temperatureC: 24 },
  wavelengthSigmaNm: 0.1,
  temperatureSigmaK: 0.5,
};

test('a prediction has the model’s value, and a σ made of tolerance, wavelength and temperature', () => {
  const found = predictRetardance(problem);
  if (!found.ok) throw new Error(found.reason);
  const whole = (wavelengthNm: number, temperatureC: number, nominalDeg = 90) => {
    const modelled = modelRetardance(problem.plate, 810, nominalDeg, { wavelengthNm, temperatureC });
    return modelled.ok ? modelled.wholeDeg : NaN;
  };
  expect(found.wholeDeg).toBe(whole(800, 24));
  // By differences of the model itself.
  expect(found.partsDeg.wavelength).toBeCloseTo(Math.abs(whole(800.05, 24) - whole(799.95, 24)), 5);
  expect(found.partsDeg.temperature).toBeCloseTo(Math.abs(whole(800, 24.25) - whole(800, 23.75)), 5);
  expect(found.partsDeg.tolerance).toBeCloseTo(whole(800, 24, 91.2) - whole(800, 24), 9);
  const { tolerance, wavelength, temperature } = found.partsDeg;
  expect(found.sigmaDeg).toBeCloseTo(Math.hypot(tolerance, wavelength, temperature), 12);
  const unknown = predictRetardance({
    ...problem,
    surroundings: { wavelengthNm: 800, temperatureC: null },
  });
  expect(unknown).toMatchObject({ ok: true, partsDeg: { temperature: 0 } });
});

test('a plate without a model is answered with the reason', () => {
  const plate = { construction: 'achromatic', material: null, order: 0 } as const;
  const answer = predictRetardance({ ...problem, plate });
  expect(answer.ok ? '' : answer.reason).toContain('achromatic');
});

test('measurement and model are compared in both σ, the shorter way round, on the nearer branch where that is open', () => {
  expect(distanceFromModel({ value: 91, sigma: 0.3 }, { value: 90, sigma: 0.4 }, false)).toEqual({
    measuredDeg: 91,
    predictedDeg: 90,
    deviationDeg: 1,
    sigmaDeg: 0.5,
    sigmas: 2,
    larger: 'measured',
    verdict: 'agrees',
    branch: 'as-measured',
  });
  const around = distanceFromModel({ value: 359, sigma: 1 }, { value: 2, sigma: 0 }, false);
  expect(around).toMatchObject({ deviationDeg: -3, sigmas: 3, larger: 'predicted', verdict: 'in-between' });
  const other = distanceFromModel({ value: 172, sigma: 0.1 }, { value: 187.5, sigma: 0 }, true);
  expect(other).toMatchObject({ measuredDeg: 188, branch: 'other', larger: 'measured', verdict: 'apart' });
  expect(other.sigmas).toBeCloseTo(5, 9);
  const exact = distanceFromModel({ value: 90, sigma: 0 }, { value: 90, sigma: 0 }, false);
  expect(exact).toMatchObject({ sigmas: null, larger: 'neither', verdict: 'agrees' });
  expect(distanceFromModel({ value: 91, sigma: 0 }, { value: 90, sigma: 0 }, false).verdict).toBe('apart');
});
