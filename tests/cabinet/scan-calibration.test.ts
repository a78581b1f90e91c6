import { describe, expect, test } from 'vitest';
import type { Stokes } from '../../shared/optics';
import {
  type DescribedPlate,
  fitScan,
  recordProblem,
  type ScanAnswer,
  type ScanToFit,
} from '../../shared/scan-calibration';
import type { ColumnMapping } from '../../shared/scan-file';
import { apartBy } from '../optics/calibration-scans';
import { knownLightText, linearRows, linearScanText, textOf } from '../support/scan-text';
import { encoded, type Dialect } from './scan-file-writer';

const QUARTER: DescribedPlate = {
  kind: 'quarter',
  designWavelengthNm: 810,
  construction: 'compound-zero-order',
  material: 'quartz',
  order: 0,
};

const bytesOf = (text: string, encoding: Dialect['encoding'] = 'utf-8') => encoded(text, encoding);

function fitOf(text: string | Uint8Array, change: Partial<ScanToFit> = {}): ScanAnswer {
  return fitScan({
    bytes: typeof text === 'string' ? bytesOf(text) : text,
    columns: null,
    light: { kind: 'linear', extinction: null, power: null },
    leftOutLines: [],
    plate: QUARTER,
    direction: 1,
    wavelengthNm: 810,
    temperatureC: null,
    measuredBefore: null,
    ...change,
  });
}

type Fitted = Extract<ScanAnswer, { kind: 'fitted' }>;

function fitted(answer: ScanAnswer): Fitted {
  if (answer.kind !== 'fitted') throw new Error(`Nothing was fitted: ${JSON.stringify(answer)}`);
  return answer;
}

const found = (text: string | Uint8Array, change: Partial<ScanToFit> = {}) => fitted(fitOf(text, change));

/** How far fitted values lie from the truth, in their own σ; the offset modulo 90°. */
function awayOf({ values }: Fitted, offsetDeg: number, retardanceDeg: number) {
  return {
    offset: apartBy(90, values.offsetDeg, offsetDeg) / values.offsetSigmaDeg,
    retardance:
      values.retardance === null
        ? Number.NaN
        : Math.abs(values.retardance.deg - retardanceDeg) / values.retardance.sigmaDeg,
  };
}

function withCommas(text: string): string {
  return text.replaceAll('.', ',');
}

describe('the truth comes back from a file', () => {
  const truth = { offsetDeg: 121.7, retardanceDeg: 93.4 };
  const scan = { truth, seed: 11 };
  const plain = linearScanText(scan);
  const inRadians = textOf(
    linearRows(scan).map(([dial = 0, ...powers]) => [(dial * Math.PI) / 180, ...powers]),
    'angle (rad);P_perp (mW);P_par (mW)',
  );
  test.each([
    ['semicolons', plain],
    ['decimal commas', withCommas(plain)],
    ['tabs', plain.replaceAll(';', '\t')],
    ['comments and text above', `# lamp on\nlab 3, Friday\n${plain.replace('\n', '\n# warm by now\n')}`],
    ['UTF-16', bytesOf(plain, 'utf-16le')],
    ['radians', inRadians],
  ])('%s', (_, text) => {
    const answer = found(text);
    const away = awayOf(answer, truth.offsetDeg, truth.retardanceDeg);
    expect(away.offset).toBeLessThan(4);
    expect(away.retardance).toBeLessThan(4);
    expect(answer.values.offsetSigmaDeg).toBeLessThan(0.2);
    expect(answer.table.points).toHaveLength(41);
  });

  test.each([1, -1] as const)('whichever way the numbers run: %d', (direction) => {
    const answer = found(linearScanText({ truth: { ...truth, direction }, seed: 3 }), { direction });
    expect(awayOf(answer, truth.offsetDeg, truth.retardanceDeg).offset).toBeLessThan(4);
  });

  test('columns in the wrong order come right by a mapping', () => {
    const columns: ColumnMapping = {
      dial: { column: 2, unit: null },
      crossed: { column: 0, unit: 'mW' },
      parallel: { column: 1, unit: 'mW' },
      crossedSigma: null,
      parallelSigma: null,
    };
    const rows = linearRows(scan).map(([dial = 0, crossed = 0, parallel = 0]) => [crossed, parallel, dial]);
    const swapped = found(textOf(rows, 'a;b;c'), { columns });
    expect(swapped.values).toEqual(found(plain).values);
  });

  test('one port tells both with the power that enters, and the zero only without it', () => {
    const text = linearScanText({ truth: { ...truth, leak: 0 }, seed: 5, ports: 'crossed' });
    const power = { value: 1, sigma: 0.001 };
    const extinction = { value: 0, sigma: 0 };
    const told = found(text, { light: { kind: 'linear', extinction, power } });
    const away = awayOf(told, truth.offsetDeg, truth.retardanceDeg);
    expect(away.offset).toBeLessThan(4);
    expect(away.retardance).toBeLessThan(4);
    const untold = found(text);
    expect(untold.values.retardance).toBe(null);
    expect(untold.distance).toBe(null);
    expect(untold.values.openQuestions).toEqual(['axis']);
    expect(awayOf(untold, truth.offsetDeg, 0).offset).toBeLessThan(4);
  });
});

describe('what a scan between polarisers leaves open', () => {
  const other: DescribedPlate = { ...QUARTER, kind: 'other' };
  const half: DescribedPlate = { ...QUARTER, kind: 'half' };
  const unnamed = { material: null } as const;
  const before = {
    wavelengthNm: 810,
    retardanceDeg: 118.6,
    retardanceSigmaDeg: 0.4,
    isBranchOpen: false,
  } as const;
  test.each([
    ['a quarter-wave plate of known material', QUARTER, 91, {}, ['axis']],
    ['one of unknown material', { ...QUARTER, ...unnamed }, 91, {}, ['axis']],
    [
      'a multi-order one of unknown material',
      { ...QUARTER, ...unnamed, construction: 'multi-order', order: 12 },
      91,
      {},
      ['axis', 'branch'],
    ],
    ['a half-wave plate', half, 168, {}, ['axis', 'branch']],
    ['one without a material', { ...half, ...unnamed }, 168, {}, ['axis', 'branch']],
    ['one so near to 180° that the scan is blind', half, 179.6, {}, ['axis', 'branch', 'blind']],
    ['an odd plate', other, 118.6, {}, ['axis', 'branch']],
    ['an odd plate that was measured before', other, 118.6, { measuredBefore: before }, ['axis']],
    [
      'an odd plate whose branch was open before',
      other,
      118.6,
      { measuredBefore: { ...before, isBranchOpen: true } },
      ['axis', 'branch'],
    ],
    [
      'an odd plate that was measured at another wavelength',
      other,
      118.6,
      { measuredBefore: { ...before, wavelengthNm: 780 } },
      ['axis', 'branch'],
    ],
  ] as const)('%s', (_, plate, retardanceDeg, change, open) => {
    const answer = found(linearScanText({ truth: { retardanceDeg }, seed: 21 }), { plate, ...change });
    expect(answer.values.openQuestions).toEqual(open);
    expect(recordProblem(answer)).toBe(null);
    const { retardance } = answer.values;
    if (retardance === null) throw new Error('There is no retardance.');
    expect(Math.abs(retardance.deg - retardanceDeg)).toBeLessThan(4 * retardance.sigmaDeg);
  });

  test('a quarter-wave plate beyond 180° is named so where its maker says so', () => {
    const plate: DescribedPlate = { ...other };
    const answer = found(linearScanText({ truth: { retardanceDeg: 241.4 }, seed: 2 }), {
      plate,
      measuredBefore: { ...before, retardanceDeg: 241 },
    });
    expect(Math.abs((answer.values.retardance?.deg ?? 0) - 241.4)).toBeLessThan(2);
  });
});

describe('distance from the dispersion model', () => {
  // At its design wavelength a quarter-wave plate retards 90°; σ is the maker's tolerance, 3.6° (references.md, 10; common practice).
  test.each([
    [91, 'agrees', 'measured'],
    [79, 'in-between', 'predicted'],
    [62, 'apart', 'predicted'],
  ] as const)('%d° of 90 ± 3.6', (retardanceDeg, verdict, larger) => {
    const { distance, values, prediction } = found(linearScanText({ truth: { retardanceDeg }, seed: 8 }));
    if (distance === null || !prediction.ok || values.retardance === null) throw new Error('No distance.');
    expect(prediction.retardanceDeg).toBeCloseTo(90, 9);
    expect(distance).toMatchObject({ verdict, larger });
    const { deg, sigmaDeg } = values.retardance;
    expect(distance.deviationDeg).toBeCloseTo(deg - 90, 9);
    expect(distance.sigmas).toBeCloseTo(Math.abs(deg - 90) / Math.hypot(sigmaDeg, 3.6), 9);
  });

  test('there is none for a plate that nobody describes, and the reason is given', () => {
    const { distance, prediction } = found(linearScanText(), { plate: { ...QUARTER, material: null } });
    expect(distance).toBe(null);
    expect(prediction.ok ? '' : prediction.reason).toMatch(/material/u);
  });
});

describe('lines', () => {
  const rows = linearRows({ seed: 4 }).map((row) => [...row]);
  const wild = rows.map(([dial = 0, crossed = 0, parallel = 0], at) =>
    at === 9 ? [dial, crossed + 0.2, parallel] : [dial, crossed, parallel],
  );
  const text = `# today\n${textOf(wild, 'dial (deg);crossed (mW);parallel (mW)')}`;

  test('a wild one is suspected, and left out only when a person says so', () => {
    const all = found(text);
    const { suspected } = all.found.fit;
    expect(suspected.map((row) => all.table.points[row]?.line)).toEqual([12]);
    const without = found(text, { leftOutLines: [12] });
    expect(without.found.fit.rows.filter(({ isUsed }) => !isUsed).map(({ row }) => row)).toEqual([9]);
    expect(without.found.fit.degreesOfFreedom).toBe(all.found.fit.degreesOfFreedom - 1);
    expect(without.values.offsetSigmaDeg).toBeLessThan(all.values.offsetSigmaDeg / 3);
  });

  test('a line that isn’t there leaves nothing out', () => {
    expect(found(text, { leftOutLines: [1, 999] }).values).toEqual(found(text).values);
  });

  test('a refusal names the line of the file, not the row', () => {
    const negative = rows.map(([dial = 0, crossed = 0, parallel = 0], at) =>
      at === 3 ? [dial, -crossed - 1, parallel] : [dial, crossed, parallel],
    );
    const answer = fitOf(`# today\n# warm\n${textOf(negative, 'dial (deg);crossed (mW);parallel (mW)')}`);
    if (answer.kind !== 'refused') throw new Error(answer.kind);
    expect(answer.line).toBe(7);
    expect(answer.message).toMatch(/^Line 7: the power .* is below 0/u);
  });

  test.each([
    [
      'a plate that does not turn',
      linearRows({ truth: { retardanceDeg: 0.01 } }),
      /does not follow the plate/u,
    ],
    ['too few rows', linearRows({ count: 3 }), /3 rows in use, too few/u],
    [
      'ports the other way round',
      linearRows({ truth: { retardanceDeg: 60 } }).map(([dial = 0, crossed = 0, parallel = 0]) => [
        dial,
        parallel,
        crossed,
      ]),
      /Check which port is crossed/u,
    ],
  ])('%s is refused in a sentence without a line', (_, hostile, words) => {
    const answer = fitOf(textOf(hostile, 'dial (deg);crossed (mW);parallel (mW)'));
    if (answer.kind !== 'refused') throw new Error(answer.kind);
    expect(answer.line).toBe(null);
    expect(answer.message).toMatch(words);
  });

  test('faults and questions of the file come through as they are', () => {
    expect(fitOf('dial (deg);crossed;parallel\n0;1;nan\n5;1;2\n').kind).toBe('faults');
    expect(fitOf('3;0;1\n1;5;2\n4;10;2\n1;15;7\n').kind).toBe('asks');
  });
});

describe('known light', () => {
  const truth = { offsetDeg: 121.7, retardanceDeg: 87.3, leak: 0 };
  const columns: ColumnMapping = {
    dial: { column: 0, unit: null },
    crossed: { column: 1, unit: null },
    parallel: null,
    crossedSigma: null,
    parallelSigma: null,
  };
  const light = (input: Stokes) =>
    ({ kind: 'known', input, analyserDeg: 0, extinction: null, before: null }) as const;
  const elliptical: Stokes = [0.48, 0.36, 0.8];

  test.each([
    ['the fast axis', truth.offsetDeg],
    ['the slow axis', truth.offsetDeg - 90],
  ])('elliptical light settles which axis it is: %s', (_, offsetDeg) => {
    const text = knownLightText(elliptical, 0, { truth: { ...truth, offsetDeg }, seed: 6 });
    const answer = found(text, { columns, light: light(elliptical) });
    expect(answer.values.openQuestions).toEqual([]);
    expect(apartBy(180, answer.values.offsetDeg, offsetDeg)).toBeLessThan(4 * answer.values.offsetSigmaDeg);
    expect(Math.abs((answer.values.retardance?.deg ?? 0) - 87.3)).toBeLessThan(1);
    expect(recordProblem(answer)).toBe(null);
  });

  test('circular light alone leaves δ or 180° − δ, and with the scan before nothing', () => {
    const circular: Stokes = [0, 0, 1];
    const odd = { ...truth, retardanceDeg: 70 };
    const plate: DescribedPlate = { ...QUARTER, kind: 'other' };
    const text = knownLightText(circular, 0, { truth: odd, seed: 7 });
    const alone = found(text, { columns, plate, light: light(circular) });
    expect(recordProblem(alone)).toMatch(/Scan behind elliptical light/u);

    const before = found(linearScanText({ truth: odd, seed: 8 }), { plate }).found;
    if (before.kind !== 'linear') throw new Error(before.kind);
    const together = found(text, { columns, plate, light: { ...light(circular), before: before.fit } });
    expect(recordProblem(together)).toBe(null);
    expect(together.values.openQuestions).toEqual([]);
    expect(apartBy(180, together.values.offsetDeg, odd.offsetDeg)).toBeLessThan(0.5);
    expect(Math.abs((together.values.retardance?.deg ?? 0) - 70)).toBeLessThan(1);
  });
});
