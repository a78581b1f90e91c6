import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  formatAngle,
  formatChange,
  formatDial,
  formatFidelity,
  formatInfidelity,
  formatMoment,
  formatTheta,
  formatUncertain,
  groupDigits,
  infidelityAscii,
  parseTypedNumber,
  toPlainAscii,
  uncertainScientific,
} from '../../../src/lib/format';

describe('a value with its uncertainty', () => {
  it.each([
    [86.9, 0.4, '86.9(4)'],
    [-0.82, 0.05, '\u22120.82(5)'],
    [12.46, 0.04, '12.46(4)'],
    [-0.0269, 0.0013, '\u22120.0269(13)'],
    [11, 1.4, '11.0(14)'],
    [0, 0.05, '0.00(5)'],
    // 0.96 rounds to 1.0 and so has two digits at the place of the first.
    [86.9, 0.96, '86.9(10)'],
    // 0.195 rounds to 0.20, whose first digit is 2.
    [86.9, 0.1951, '86.9(2)'],
    [1234, 250, '1\u202F200 ± 300'],
    [100.02147, 0.00035, '100.0215(4)'],
  ])('%f with %f is %s', (value, sigma, expected) => {
    expect(formatUncertain(value, sigma)).toBe(expected);
  });

  it('has a dash for what is missing and stands alone without a usable sigma', () => {
    expect(formatUncertain(null, 0.4)).toBe('—');
    expect(formatUncertain(Number.NaN, 0.4)).toBe('—');
    expect(formatUncertain(86.9, null, 1)).toBe('86.9');
    expect(formatUncertain(86.9, Number.NaN, 1)).toBe('86.9');
    expect(formatUncertain(86.9, 0, 1)).toBe('86.9');
  });

  it('reads back to within half of its last digit', () => {
    const size = fc.double({ min: -1e6, max: 1e6, noNaN: true });
    const power = fc.double({ min: -8, max: 0.9, noNaN: true });
    fc.assert(
      fc.property(size, power, (value, exponent) => {
        const sigma = 10 ** exponent;
        const match = /^(-?[\d.]+)\((\d+)\)$/.exec(toPlainAscii(formatUncertain(value, sigma)));
        const [, shown = '', bracket = ''] = match ?? [];
        const unit = 10 ** -(shown.split('.')[1]?.length ?? 0);
        expect(Math.abs(Number(shown) - value)).toBeLessThanOrEqual(
          unit * 0.5 + 1e-9 * Math.abs(value) + 1e-12,
        );
        expect(Math.abs(Number(bracket) * unit - sigma)).toBeLessThanOrEqual(unit * 0.5 * (1 + 1e-6));
        // Two digits only when the first is 1; never three.
        expect(bracket).toMatch(/^(?:1\d|\d)$/);
      }),
      { numRuns: 2_000 },
    );
  });

  it('never writes NaN, Infinity or a hyphen, whatever it is given', () => {
    fc.assert(
      fc.property(fc.double(), fc.double(), (value, sigma) => {
        const text = formatUncertain(value, sigma);
        const parts = uncertainScientific(value, sigma);
        expect(text + parts.mantissa).not.toMatch(/NaN|Infinity|-/);
      }),
      { numRuns: 2_000 },
    );
  });

  it('can share one power of ten in a column', () => {
    expect(uncertainScientific(11e-4, 1.4e-4, -4)).toEqual({ mantissa: '11.0(14)', exponent: -4 });
    expect(uncertainScientific(1.8e-4, 0.5e-4)).toEqual({ mantissa: '1.8(5)', exponent: -4 });
  });
});

describe('fidelity', () => {
  it('is 1 − F in scientific form, F grouped in threes', () => {
    expect(formatInfidelity(2.5e-5)).toEqual({ mantissa: '2.5', exponent: -5 });
    expect(formatInfidelity(9.96e-5)).toEqual({ mantissa: '1.0', exponent: -4 });
    expect(formatInfidelity(-1e-16)).toEqual({ mantissa: '0', exponent: null });
    expect(formatInfidelity(null)).toEqual({ mantissa: '—', exponent: null });
    expect(infidelityAscii(2.5e-5)).toBe('2.5e-5');
    expect(formatFidelity(0.999975)).toBe('0.999\u202F975');
  });

  it('never rounds an imperfect fidelity up to 1', () => {
    fc.assert(
      fc.property(fc.double({ min: 1e-10, max: 0.5, noNaN: true }), (infidelity) => {
        expect(Number(toPlainAscii(formatFidelity(1 - infidelity)))).toBeLessThan(1);
      }),
    );
  });
});

describe('dials and angles', () => {
  it('has the decimals of its mount, and wraps before it would say 360', () => {
    expect(formatDial(187)).toBe('187.0');
    expect(formatDial(359.97)).toBe('0.0');
    expect(formatDial(-0.04)).toBe('0.0');
    expect(formatDial(12.3, 0.25)).toBe('12.25');
    expect(formatDial(null)).toBe('—');
    expect(formatTheta(179.999)).toBe('0.00');
    expect(formatTheta(114.73)).toBe('114.73');
    expect(formatAngle(-37.8)).toBe('\u221237.8°');
    expect(formatChange(0.1)).toBe('+0.1');
    expect(formatChange(-0.04)).toBe('0.0');
  });

  it('stays in [0, 360) for every reading', () => {
    fc.assert(
      fc.property(
        fc.double({ min: -1e4, max: 1e4, noNaN: true }),
        fc.constantFrom(0.01, 0.1, 0.25, 0.5, 1, 5 / 60),
        (reading, resolution) => {
          const shown = Number(formatDial(reading, resolution));
          expect(shown).toBeGreaterThanOrEqual(0);
          expect(shown).toBeLessThan(360);
        },
      ),
    );
  });
});

describe('a number as it is typed', () => {
  it('takes a true minus, an exponent and gaps, and refuses a comma', () => {
    expect(parseTypedNumber('\u22120.82')).toEqual({ ok: true, value: -0.82 });
    expect(parseTypedNumber('1e\u22123')).toEqual({ ok: true, value: 1e-3 });
    expect(parseTypedNumber('12\u202F345')).toEqual({ ok: true, value: 12_345 });
    expect(parseTypedNumber('86,9')).toEqual({ ok: false, fault: 'comma' });
    expect(parseTypedNumber('')).toEqual({ ok: false, fault: 'empty' });
    expect(parseTypedNumber('1e400')).toEqual({ ok: false, fault: 'too-large' });
    expect(parseTypedNumber('0x10')).toEqual({ ok: false, fault: 'not-a-number' });
    expect(parseTypedNumber('٣')).toEqual({ ok: false, fault: 'not-a-number' });
  });

  it('reads back every grouped number', () => {
    fc.assert(
      fc.property(fc.double({ min: -1e9, max: 1e9, noNaN: true }), (value) => {
        const text = value.toFixed(6);
        expect(parseTypedNumber(groupDigits(text))).toEqual({ ok: true, value: Number(text) });
      }),
    );
  });

  it('never throws, and is quick on a long line', () => {
    fc.assert(
      fc.property(fc.string(), (text) => {
        const number = parseTypedNumber(text);
        expect(number.ok ? Number.isFinite(number.value) : number.fault).toBeTruthy();
      }),
    );
    const start = performance.now();
    parseTypedNumber('9'.repeat(1_000_000));
    expect(performance.now() - start).toBeLessThan(500);
  });
});

describe('a moment', () => {
  it('is today, yesterday, a day of this year or a date', () => {
    const now = new Date(2026, 5, 16, 9, 0);
    expect(formatMoment(new Date(2026, 5, 16, 8, 5), now)).toBe('today 08:05');
    expect(formatMoment(new Date(2026, 5, 15, 17, 20), now)).toBe('yesterday 17:20');
    expect(formatMoment(new Date(2026, 4, 4, 17, 20), now)).toBe('4 May 17:20');
    expect(formatMoment(new Date(2025, 4, 4, 17, 20), now)).toBe('4 May 2025');
  });
});
