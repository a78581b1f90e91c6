import { describe, expect, it } from 'vitest';
import { calibrationInputSchema } from '../../../shared/schemas/calibrations';
import { calibrationDoubts } from '../../../src/features/cabinet/calibration-doubts';
import { motionWords } from '../../../src/features/cabinet/mounts/mount-words';
import { mountFixture, plateFixture } from './plate-fixture';

// 88.9(4)° at 810 nm.
const last = plateFixture().calibration;
const retardance = (typed: Parameters<typeof calibrationDoubts>[0]) =>
  calibrationDoubts({ wavelengthNm: '810', ...typed }, last).retardance;

describe('what a person should look at again before a calibration stands', () => {
  it('is a retardance that is far from the last one, by σ and by degrees', () => {
    expect(retardance({ retardanceDeg: '178.9', retardanceSigmaDeg: '0.3' })).toBe(
      '88.9° last time: this is 90° away.',
    );
    // 4° off is within what a plate can have become, however small its σ.
    expect(retardance({ retardanceDeg: '92.9', retardanceSigmaDeg: '0.1' })).toBeNull();
    // 10° off at a σ of 3°: nobody claims to know it better.
    expect(retardance({ retardanceDeg: '98.9', retardanceSigmaDeg: '3' })).toBeNull();
  });

  it('names the last wavelength where it is another one', () => {
    expect(retardance({ retardanceDeg: '98.9', retardanceSigmaDeg: '0.1', wavelengthNm: '780' })).toBe(
      '88.9° last time, at 810\u202fnm: this is 10° away.',
    );
  });

  it('is a σ of 0, and nothing while a field is empty or a plate has no calibration yet', () => {
    expect(calibrationDoubts({ retardanceSigmaDeg: '0' }, null)).toEqual({
      retardance: null,
      retardanceSigma: 'With a σ of 0 the retardance counts as exact: nothing of it is in the budget.',
      offsetSigma: null,
    });
    expect(calibrationDoubts({ offsetSigmaDeg: '0.0' }, last).offsetSigma).toMatch(
      /^With a σ of 0 the zero/u,
    );
    expect(Object.values(calibrationDoubts({ retardanceDeg: '', retardanceSigmaDeg: '' }, last))).toEqual([
      null,
      null,
      null,
    ]);
  });
});

describe('numbers below 0 in sentences', () => {
  it('have the true minus', () => {
    expect(motionWords({ ...mountFixture(), rangeDeg: { from: -180, to: 175 } })).toBe(
      ', reaches \u2212180° to 175°',
    );
    const cold = calibrationInputSchema.shape.temperatureC.safeParse(-200);
    expect(cold.error?.issues.map(({ message }) => message)).toEqual([
      'A temperature is from \u221250 to 150 °C.',
    ]);
  });
});
