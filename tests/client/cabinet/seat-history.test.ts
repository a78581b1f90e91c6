import { describe, expect, it } from 'vitest';
import { countWords } from '../../../src/features/cabinet/count-words';
import { historyPoints } from '../../../src/features/cabinet/history/seat-history';
import { besideModel, besideModelWords } from '../../../src/features/cabinet/plate-model';
import { counts } from './cabinet-harness';
import { detailFixture, plateFixture, seatFixture } from './plate-fixture';

const plate = plateFixture();
const [newest] = detailFixture(plate).calibrations;
if (newest === undefined) throw new Error('the plate is calibrated');

const first = seatFixture(5, {
  seatedAt: '2025-11-01T09:00:00.000Z',
  leftAt: '2026-01-10T09:00:00.000Z',
  leftWhy: 'Cleaned.',
});
const measured = (number: number, seatId: string, change: Partial<typeof newest>) => ({
  ...newest,
  id: seatFixture(number).id,
  seatId,
  ...change,
});

describe('the history of a plate', () => {
  it('counts each zero from the first of its seat, the short way round the dial', () => {
    const seats = [seatFixture(4), first];
    const { zeros, moves } = historyPoints(plate, {
      seats,
      calibrations: [
        measured(11, seats[0]?.id ?? '', { offsetDeg: 0.2 }),
        measured(10, seats[0]?.id ?? '', { offsetDeg: 359.9 }),
        measured(9, first.id, { offsetDeg: 12 }),
      ],
    });
    expect(zeros.map(({ value }) => Number(value.toFixed(9)))).toEqual([0, 0, 0.3]);
    expect(moves).toEqual([{ at: Date.parse('2026-01-10T09:00:00.000Z'), what: 'new-seat' }]);
  });

  it('takes no quarter turn for a drift where fast and slow were open', () => {
    const seat = seatFixture(4);
    const { zeros } = historyPoints(plate, {
      seats: [seat],
      calibrations: [
        measured(10, seat.id, { offsetDeg: 31.8 }),
        measured(9, seat.id, { offsetDeg: 301.73, openQuestions: ['axis'] }),
      ],
    });
    expect(zeros.at(-1)?.value).toBeCloseTo(0.07, 9);
  });

  it('ends with the taking out of a plate that sits nowhere', () => {
    const { moves, retardances } = historyPoints(plate, { seats: [first], calibrations: [] });
    expect(moves).toEqual([{ at: Date.parse('2026-01-10T09:00:00.000Z'), what: 'taken-out' }]);
    expect(retardances).toEqual([]);
  });
});

describe('a measurement beside the dispersion of its material', () => {
  const beside = (change: Partial<typeof newest>, kind: 'quarter' | 'other' = 'quarter') =>
    besideModel({ ...plate, kind }, { ...newest, ...change });

  it('is that of quartz (Ghosh 1999) for a zero-order plate of quartz, carried from 808 to 810 nm', () => {
    // 90° · 808/810 · Δn(810)/Δn(808): the quotient of wavelengths gives 89.778°, and Δn of quartz falls with the wavelength.
    const modelledDeg = beside({ wavelengthNm: 810 })?.modelledDeg ?? 0;
    expect(modelledDeg).toBeLessThan(89.778);
    expect(modelledDeg).toBeGreaterThan(89.7);
    expect(beside({ wavelengthNm: 808, temperatureC: 20 })?.modelledDeg).toBeCloseTo(90, 9);
  });

  it('is said in degrees and σ, and only where there is a model', () => {
    expect(besideModelWords({ material: 'quartz', modelledDeg: 90, deviationDeg: 0.8, sigmas: 1.6 })).toBe(
      '0.8° above quartz, 1.6σ',
    );
    expect(besideModelWords({ material: 'quartz', modelledDeg: 90, deviationDeg: 0.01, sigmas: null })).toBe(
      'as quartz has it',
    );
    expect(beside({}, 'other')).toBeNull();
    expect(besideModel({ ...plate, construction: 'achromatic' }, newest)).toBeNull();
    expect(beside({ retardanceSigmaDeg: 0 })?.sigmas).toBeNull();
  });
});

describe('what lies in the cabinet, in words', () => {
  it('counts plates in use, seats and open axes', () => {
    const { plates } = counts;
    expect(countWords(counts)).toBe('1 plate, seated.');
    expect(
      countWords({
        ...counts,
        plates: { ...plates, calibrated: 8, 'open-question': 2, 'not-seated': 1, overdue: 1, retired: 4 },
        openAxes: 2,
      }),
    ).toBe('12 plates, 11 of them seated; two fast axes not settled.');
    expect(countWords({ ...counts, plates: { ...plates, calibrated: 0 } })).toBe('0 plates.');
    expect(countWords({ ...counts, plates: { ...plates, 'not-calibrated': 1 } })).toBe(
      '2 plates, all seated; one not calibrated in its seat.',
    );
  });
});
