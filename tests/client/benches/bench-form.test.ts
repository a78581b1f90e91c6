import { describe, expect, it } from 'vitest';
import { createBenchSchema } from '../../../shared/schemas/benches';
import { emptyBench, eyewearWavelengths, readBench } from '../../../src/features/benches/bench-form-values';
import { benchWarnings } from '../../../src/features/benches/bench-warnings';
import { inputFault } from '../../../src/features/benches/InputReading';
import { plateFixture } from '../cabinet/plate-fixture';

const typed = {
  ...emptyBench,
  name: 'signal arm',
  wavelengthNm: '810',
  polariserSigmaDeg: '0.05',
  hazardWavelengthsNm: '405 nm, 810',
  plates: [
    { plateId: '0190a000-0000-7000-8000-000000000001' },
    { plateId: '0190a000-0000-7000-8000-000000000004' },
  ],
};

function faults(change: Partial<typeof typed>) {
  const result = createBenchSchema.safeParse(readBench({ ...typed, ...change }));
  return result.success ? [] : result.error.issues.map(({ path, message }) => [path.join('.'), message]);
}

describe('a bench as it is typed', () => {
  it('reads several wavelengths, and a class that is not stated as none', () => {
    expect(faults({})).toEqual([]);
    expect(readBench(typed)).toMatchObject({ hazardWavelengthsNm: [405, 810], laserClass: null });
  });

  it('takes one to six plates, all of them different', () => {
    expect(faults({ plates: typed.plates.slice(0, 1) })).toEqual([]);
    expect(faults({ plates: [{ plateId: '' }] })).toEqual([
      ['plateIds', 'A bench has at least one plate. Choose the one that light meets first.'],
    ]);
    expect(faults({ plates: [...typed.plates, ...typed.plates.slice(0, 1)] })).toEqual([
      ['plateIds', 'One plate cannot stand in two places. Choose another.'],
    ]);
    const seven = Array.from({ length: 7 }, (_, k) => ({
      plateId: `0190a000-0000-7000-8000-00000000001${k}`,
    }));
    expect(faults({ plates: seven })).toEqual([['plateIds', 'A bench has at most 6 plates in its beam.']]);
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

describe('what a person should know before plates stand in a bench', () => {
  it('warns of another wavelength and of another bench, by name', () => {
    const [elsewhere, taken] = benchWarnings(
      [plateFixture()],
      { wavelengthNm: 780, temperatureC: null },
      null,
    );
    expect(elsewhere).toMatch(
      /Q-B was calibrated at 810\u202fnm\. At 780\u202fnm it is taken as 92\.\d\d°, \+3\.\d\d° by what is published/,
    );
    expect(taken).toMatch(/Q-B stands in the beam of signal arm\. Choose another/);
  });

  it('says of a plate whose material nobody knows that it is used as measured', () => {
    const unknown = plateFixture({ construction: 'unknown', material: null, benches: [] });
    expect(benchWarnings([unknown], { wavelengthNm: 780, temperatureC: null }, null)).toEqual([
      'Q-B was calibrated at 810\u202fnm, and this bench runs at 780\u202fnm. How it follows that is not known, so its 88.9° are used as measured: calibrate it at 780\u202fnm.',
    ]);
  });

  it('says each sentence once of a plate that is chosen twice', () => {
    const plate = plateFixture();
    const bench = { wavelengthNm: 780, temperatureC: null };
    expect(benchWarnings([plate, plate], bench, null)).toEqual(benchWarnings([plate], bench, null));
  });

  it('says nothing of calibrations at a wavelength that the bench would be refused with', () => {
    const plate = plateFixture({ benches: [] });
    for (const wavelengthNm of [8.1, 81_000, Number.NaN]) {
      expect(benchWarnings([plate], { wavelengthNm, temperatureC: null }, null)).toEqual([]);
    }
  });

  it('is silent about the bench itself at its own wavelength', () => {
    expect(
      benchWarnings(
        [plateFixture()],
        { wavelengthNm: 810, temperatureC: null },
        plateFixture().benches[0]?.id ?? '',
      ),
    ).toEqual([]);
  });
});
