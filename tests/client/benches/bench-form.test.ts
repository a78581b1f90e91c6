import { describe, expect, it } from 'vitest';
import { createBenchSchema } from '../../../shared/schemas/benches';
import { append, type Beam, emptyBeam } from '../../../src/features/benches/beam-order';
import { fieldOf } from '../../../src/features/benches/bench-fields';
import {
  emptyBench,
  eyewearWavelengths,
  readBench,
  valuesOfBench,
} from '../../../src/features/benches/bench-form-values';
import { inputFault } from '../../../src/features/benches/InputReading';
import { bench, cabinetPlate, id, order } from './fixture';

const typed = {
  ...emptyBench,
  name: 'signal arm',
  wavelengthNm: '810',
  polariserSigmaDeg: '0.05',
  hazardWavelengthsNm: '405 nm, 810',
  beam: beam([id(1), id(4)]),
};

function beam(preparation: readonly string[], analysis: readonly string[] = []): Beam {
  const prepared = preparation.reduce((at, plateId) => append(at, 'preparation', plateId), emptyBeam);
  return analysis.reduce((at, plateId) => append(at, 'analysis', plateId), prepared);
}

function faults(change: Partial<typeof typed>) {
  const result = createBenchSchema.safeParse(readBench({ ...typed, ...change }));
  return result.success ? [] : result.error.issues.map(({ path, message }) => [path.join('.'), message]);
}

describe('a bench as it is typed', () => {
  it('reads several wavelengths, and a class that is not stated as none', () => {
    expect(faults({})).toEqual([]);
    expect(readBench(typed)).toMatchObject({ hazardWavelengthsNm: [405, 810], laserClass: null });
  });

  it('takes one to six plates of preparation and none to six of analysis, all of them different', () => {
    expect(faults({ beam: beam([id(1)]) })).toEqual([]);
    expect(faults({ beam: beam([id(1)], [id(2), id(3)]) })).toEqual([]);
    expect(faults({ beam: beam([], [id(2)]) })).toEqual([
      ['plateIds', 'A bench has at least one plate. Choose the one that light meets first.'],
    ]);
    expect(faults({ beam: beam([id(1), id(1)]) })).toEqual([
      ['plateIds', 'One plate cannot stand in two places. Choose another.'],
    ]);
    expect(faults({ beam: beam([id(1)], [id(1)]) })).toEqual([
      ['analysisPlateIds', 'One plate cannot stand in two places. Choose another.'],
    ]);
  });

  it('reads a port as empty where neither name nor dark rate is written, and a ratio only where both ports are there', () => {
    expect(readBench(typed).detectors).toEqual({ passed: null, rejected: null, efficiencyRatio: null });
    const one = { passedName: 'APD 1', passedDarkPerS: '120', efficiencyRatio: '0.97' };
    expect(readBench({ ...typed, ...one }).detectors).toEqual({
      passed: { name: 'APD 1', darkRatePerS: 120 },
      rejected: null,
      efficiencyRatio: null,
    });
    expect(faults(one)).toEqual([]);
    const both = { ...one, rejectedName: 'APD 2', rejectedDarkPerS: '95' };
    expect(readBench({ ...typed, ...both }).detectors.efficiencyRatio).toBe(0.97);
    expect(faults({ ...one, passedName: '' })[0]).toEqual([
      'detectors.passed.name',
      "Write the detector's name.",
    ]);
    expect(faults({ ...one, passedDarkPerS: '' })[0]?.[0]).toBe('detectors.passed.darkRatePerS');
  });

  it('is the same bench again when nothing was typed', () => {
    const stored = bench({
      order: [...order('preparation', cabinetPlate(1, 'H-1')), ...order('analysis', cabinetPlate(2, 'Q-1'))],
      polariserExtinction: 1e-5,
      detectors: {
        passed: { name: 'APD 1', darkRatePerS: 120 },
        rejected: { name: 'APD 2', darkRatePerS: 0 },
        efficiencyRatio: 0.97,
      },
    });
    expect(readBench(valuesOfBench(stored))).toMatchObject({
      plateIds: [id(1)],
      analysisPlateIds: [id(2)],
      detectors: stored.detectors,
      polariserExtinction: 1e-5,
    });
  });

  it.each([
    ['plateIds', 'beam.preparation'],
    ['analysisPlateIds.1', 'beam.analysis.1'],
    ['detectors.rejected.darkRatePerS', 'rejectedDarkPerS'],
    ['detectors.efficiencyRatio', 'efficiencyRatio'],
    ['hazardWavelengthsNm.1', 'hazardWavelengthsNm'],
    ['nothing.of.it', null],
  ])('puts what is wrong with %s at %s', (path, field) => {
    expect(fieldOf(path)).toBe(field);
  });

  it('takes an empty temperature and extinction as not stated', () => {
    expect(readBench(typed)).toMatchObject({ temperatureC: null, polariserExtinction: null });
    expect(readBench({ ...typed, temperatureC: '21.5', polariserExtinction: '1e-5' })).toMatchObject({
      temperatureC: 21.5,
      polariserExtinction: 1e-5,
    });
    expect(faults({ polariserExtinction: '2' })[0]?.[0]).toBe('polariserExtinction');
  });

  it('asks what eyewear is for, and points at a wavelength that is none', () => {
    expect(faults({ hazardWavelengthsNm: '' })).toEqual([
      ['hazardWavelengthsNm', 'Name at least one wavelength that eyewear is for.'],
    ]);
    expect(faults({ hazardWavelengthsNm: '405, red' })[0]?.[0]).toBe('hazardWavelengthsNm.1');
  });

  it('names eyewear for no wavelength that the bench would be refused with', () => {
    expect(eyewearWavelengths('405, red, 810, 149, 99999, -5')).toEqual([405, 810]);
    expect(eyewearWavelengths('150 and 20000 nm')).toEqual([150, 20_000]);
  });

  it('says at which column an input state stops making sense', () => {
    const convention = { phase: 'kz-wt', handedness: 'receiver', s3Sign: 'L' } as const;
    expect(inputFault('H', convention)).toBeNull();
    expect(inputFault('H + ', convention)).toMatch(/^Column \d+: /);
  });
});
