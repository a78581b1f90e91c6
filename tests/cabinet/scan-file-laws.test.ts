import fc from 'fast-check';
import { expect, test } from 'vitest';
import {
  type AngleUnit,
  MOST_FAULTS,
  type PowerUnit,
  readScanFile,
  type ScanReading,
} from '../../shared/scan-file';
import { firstInvalidUtf8 } from '../../shared/scan-file/utf8';
import { type Dialect, isPossible, mappingFor, type Row, writeScan } from './scan-file-writer';

/** π to 60 decimals (OEIS A000796), as a whole number of 10⁻⁶⁰. */
const PI = 3141592653589793238462643383279502884197169399375105820974944n;
const PI_ONE = 10n ** 60n;
const EXPONENTS: Readonly<Partial<Record<PowerUnit, bigint>>> = { W: 0n, mW: 3n, uW: 6n, nW: 9n };

/** A double as an exact whole number of 2⁻¹⁰⁷⁴. */
function exact(value: number): bigint {
  const view = new DataView(new ArrayBuffer(8));
  view.setFloat64(0, value);
  const bits = view.getBigUint64(0);
  const power = (bits >> 52n) & 0x7ffn;
  const fraction = bits & 0xfffffffffffffn;
  const size = power === 0n ? fraction : (fraction | 0x10000000000000n) << (power - 1n);
  return bits >> 63n === 0n ? size : -size;
}

/** One unit in the last place, as a whole number of 2⁻¹⁰⁷⁴. */
function ulp(value: number): bigint {
  const view = new DataView(new ArrayBuffer(8));
  view.setFloat64(0, Math.abs(value));
  view.setBigUint64(0, view.getBigUint64(0) + 1n);
  return exact(view.getFloat64(0)) - exact(Math.abs(value));
}

const size = (value: bigint): bigint => (value < 0n ? -value : value);

/** Whether `got` is within one unit in the last place of `value` · up / down. */
function isWithinUlp(got: number, value: number, up: bigint, down: bigint): boolean {
  return size(exact(got) * down - exact(value) * up) <= ulp(got) * down;
}

function angleFactor(unit: AngleUnit): readonly [bigint, bigint] {
  if (unit === 'rad') return [180n * PI_ONE, PI];
  if (unit === 'mrad') return [180n * PI_ONE, 1000n * PI];
  return [1n, unit === 'arcmin' ? 60n : 1n];
}

const angles = [
  { unit: 'deg', text: 'deg' },
  { unit: 'deg', text: '°' },
  { unit: 'rad', text: 'rad' },
  { unit: 'mrad', text: 'mrad' },
  { unit: 'arcmin', text: 'arcmin' },
] as const;
const powers = [
  { unit: 'W', text: 'W' },
  { unit: 'mW', text: 'mW' },
  { unit: 'uW', text: 'µW' },
  { unit: 'nW', text: 'nW' },
] as const;

const dialects: fc.Arbitrary<Dialect> = fc
  .record({
    delimiter: fc.constantFrom('comma', 'semicolon', 'tab', 'pipe', 'spaces'),
    decimal: fc.constantFrom('point', 'comma'),
    encoding: fc.constantFrom('utf-8', 'utf-8 bom', 'utf-16le', 'utf-16be', 'latin-1'),
    header: fc.constantFrom('names', 'comment', 'units below', 'none'),
    comment: fc.constantFrom('', '#', '%', '//', ';'),
    newline: fc.constantFrom('\n', '\r\n', '\r'),
    isEnded: fc.boolean(),
    isQuoted: fc.boolean(),
    hasUnicodeMinus: fc.boolean(),
    hasSigmas: fc.boolean(),
    angle: fc.constantFrom(...angles),
    crossed: fc.constantFrom(...powers),
    parallel: fc.constantFrom(...powers),
  } as const)
  .filter(isPossible);

/** Room for every conversion. "1.125" is left out: where a column has nothing else, its sign could group thousands, and that is refused. */
const numbers = fc
  .double({ noNaN: true, min: -1e290, max: 1e290 })
  .filter((value) => value === 0 || Math.abs(value) > 1e-290)
  .filter((value) => !/^-?[1-9]\d{0,2}\.\d{3}$/u.test(String(value)))
  .map((value) => value + 0);
const row: fc.Arbitrary<Row> = fc
  .tuple(numbers, numbers, numbers, numbers, numbers)
  .map(([dial, crossed, parallel, one, other]) => [dial, crossed, parallel, Math.abs(one), Math.abs(other)]);

function read(bytes: Uint8Array, dialect: Dialect): ScanReading {
  return readScanFile(bytes, dialect.header === 'none' ? mappingFor(dialect) : null);
}

test('a table in any dialect reads back: exactly, or to one unit in the last place where a unit is converted', () => {
  fc.assert(
    fc.property(fc.array(row, { minLength: 2, maxLength: 12 }), dialects, (rows, dialect) => {
      const reading = read(writeScan(rows, dialect), dialect);
      if (reading.kind !== 'table') throw new Error(JSON.stringify(reading));
      const { angle, crossed, parallel, hasSigmas } = dialect;
      expect(reading.points).toHaveLength(rows.length);
      expect(reading.powerUnit).toBe(crossed.unit);
      const [up, down] = angleFactor(angle.unit);
      const [from, to] = [EXPONENTS[parallel.unit] ?? 0n, EXPONENTS[crossed.unit] ?? 0n];
      reading.points.forEach((point, at) => {
        const [dial, one, other, oneSigma, otherSigma] = rows[at] ?? [0, 0, 0, 0, 0];
        expect(isWithinUlp(point.dialDeg, dial, up, down)).toBe(true);
        if (angle.unit === 'deg') expect(point.dialDeg).toBe(dial);
        expect(point.crossed).toBe(one);
        expect(point.parallel).not.toBe(null);
        expect(isWithinUlp(point.parallel ?? Number.NaN, other, 10n ** to, 10n ** from)).toBe(true);
        if (from === to) expect(point.parallel).toBe(other);
        expect(point.crossedSigma).toBe(hasSigmas ? oneSigma : null);
        if (point.parallelSigma !== null) {
          expect(isWithinUlp(point.parallelSigma, otherSigma, 10n ** to, 10n ** from)).toBe(true);
        }
        expect(point.parallelSigma === null).toBe(!hasSigmas);
      });
      const hasNote = reading.notes.some((note) => note.includes('no line break behind it'));
      expect(hasNote).toBe(!dialect.isEnded);
    }),
    { numRuns: 600 },
  );
});

test('either port of a file read by itself is what it is read beside the other, in its own unit', () => {
  const whole = fc.record({ rows: fc.array(row, { minLength: 2, maxLength: 6 }), dialect: dialects });
  fc.assert(
    fc.property(whole, ({ rows, dialect }) => {
      const bytes = writeScan(rows, dialect);
      const both = mappingFor(dialect);
      const crossed = readScanFile(bytes, { ...both, parallel: null, parallelSigma: null });
      const parallel = readScanFile(bytes, { ...both, crossed: null, crossedSigma: null });
      if (crossed.kind !== 'table' || parallel.kind !== 'table') throw new Error(JSON.stringify(crossed));
      expect([crossed.powerUnit, parallel.powerUnit]).toEqual([dialect.crossed.unit, dialect.parallel.unit]);
      const { hasSigmas } = dialect;
      expect(crossed.points.map((point) => [point.crossed, point.crossedSigma, point.parallel])).toEqual(
        rows.map(([, one, , sigma]) => [one, hasSigmas ? sigma : null, null]),
      );
      expect(parallel.points.map((point) => [point.parallel, point.parallelSigma, point.crossed])).toEqual(
        rows.map(([, , other, , sigma]) => [other, hasSigmas ? sigma : null, null]),
      );
      expect(crossed.points.map(({ dialDeg }) => dialDeg)).toEqual(
        parallel.points.map(({ dialDeg }) => dialDeg),
      );
    }),
    { numRuns: 200 },
  );
});

test('a file cut off at any byte reads whole rows exactly, or is refused with a line, or says that its last number may be short', () => {
  const values = fc.tuple(fc.integer({ min: -99, max: 9999 }), fc.constantFrom(1, 10, 100, 1e4));
  const amount = values.map(([whole, parts]) => whole / parts);
  const shortRows = fc
    .array(fc.tuple(amount, amount), { minLength: 3, maxLength: 6 })
    .map((pairs) =>
      pairs.map(([one, other], at): Row => [7.5 * at, one, other, Math.abs(other), Math.abs(one)]),
    );
  fc.assert(
    fc.property(shortRows, dialects, (rows, dialect) => {
      const bytes = writeScan(rows, dialect);
      const whole = read(bytes, dialect);
      fc.pre(whole.kind === 'table');
      for (let end = 0; end < bytes.length; end += 1) {
        const cut = read(bytes.subarray(0, end), dialect);
        if (cut.kind === 'faults') {
          expect(cut.faults[0]?.line).toBeGreaterThanOrEqual(1);
          continue;
        }
        if (cut.kind === 'asks') throw new Error(JSON.stringify([end, cut]));
        const isTold = cut.notes.some((note) => note.includes('its last number is too short'));
        const sure = isTold ? cut.points.slice(0, -1) : cut.points;
        expect(sure).toEqual(whole.points.slice(0, sure.length));
        const last = cut.points.at(-1);
        expect(last?.dialDeg).toBe(whole.points[cut.points.length - 1]?.dialDeg);
      }
    }),
    { numRuns: 100 },
  );
});

function expectSound(reading: ScanReading): void {
  if (reading.kind === 'faults') {
    expect(reading.faults.length).toBeGreaterThan(0);
    expect(reading.faults.length).toBeLessThanOrEqual(MOST_FAULTS);
    expect(reading.faults.every(({ line, what, remedy }) => line >= 1 && what !== '' && remedy !== '')).toBe(
      true,
    );
    if (reading.moreFaults > 0) expect(reading.faults).toHaveLength(MOST_FAULTS);
  } else if (reading.kind === 'asks') {
    expect(reading.questions.length).toBeGreaterThan(0);
  } else {
    for (const { dialDeg, crossed, parallel, crossedSigma, parallelSigma } of reading.points) {
      const all = [dialDeg, crossed ?? 0, parallel ?? 0, crossedSigma ?? 0, parallelSigma ?? 0];
      expect(all.every(Number.isFinite)).toBe(true);
      expect(crossed === null && parallel === null).toBe(false);
    }
  }
}

const column = fc.integer({ min: -1, max: 5 });
const mapping = fc.option(
  fc.record({
    dial: fc.record({ column, unit: fc.constantFrom('rad', null) }),
    crossed: fc.option(fc.record({ column, unit: fc.constantFrom('mW', null) })),
    parallel: fc.option(fc.record({ column, unit: fc.constantFrom('uW', 'V', null) })),
    crossedSigma: fc.option(fc.record({ column, unit: fc.constantFrom('%', null) })),
    parallelSigma: fc.constant(null),
  } as const),
);

test('random bytes never throw', () => {
  fc.assert(
    fc.property(fc.uint8Array({ maxLength: 400 }), mapping, (bytes, chosen) => {
      expectSound(readScanFile(bytes, chosen));
    }),
    { numRuns: 3000 },
  );
});

test('random texts of what tables are made of never throw, and give finite numbers only', () => {
  const pieces = [
    ...Array.from('0123456789.,;|"#%=+-()[]\t \n\n\n'),
    'e3',
    'nan',
    'dial',
    'crossed',
    'parallel',
    ' deg',
    'µW',
    '\u2212',
    '\u00a0',
  ];
  const texts = fc.array(fc.constantFrom(...pieces), { maxLength: 120 }).map((parts) => parts.join(''));
  fc.assert(
    fc.property(texts, mapping, (text, chosen) => {
      expectSound(readScanFile(new TextEncoder().encode(text), chosen));
    }),
    { numRuns: 6000 },
  );
});

test('one byte changed in a sound file never throws', () => {
  const bytes = fc
    .tuple(fc.array(row, { minLength: 2, maxLength: 4 }), dialects)
    .map(([rows, dialect]) => writeScan(rows, dialect));
  fc.assert(
    fc.property(bytes, fc.nat(), fc.nat(255), (sound, place, byte) => {
      const changed = Uint8Array.from(sound);
      changed[place % sound.length] = byte;
      expectSound(readScanFile(changed));
    }),
    { numRuns: 1000 },
  );
});

test('the first byte that is not UTF-8 is found where the platform’s strict decoder fails first', () => {
  const near = fc.constantFrom(
    0x41,
    0x7f,
    0x80,
    0x8f,
    0x90,
    0x9f,
    0xa0,
    0xbf,
    0xc0,
    0xc2,
    0xdf,
    0xe0,
    0xed,
    0xef,
    0xf0,
    0xf4,
    0xf5,
  );
  const decodes = (bytes: Uint8Array): boolean => {
    try {
      new TextDecoder('utf-8', { fatal: true }).decode(bytes);
      return true;
    } catch {
      return false;
    }
  };
  fc.assert(
    fc.property(fc.array(near, { maxLength: 8 }), (list) => {
      const bytes = Uint8Array.from(list);
      const at = firstInvalidUtf8(bytes);
      expect(at === -1).toBe(decodes(bytes));
      if (at !== -1) expect(decodes(bytes.subarray(0, at))).toBe(true);
    }),
    { numRuns: 5000 },
  );
});
