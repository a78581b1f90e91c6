import fc from 'fast-check';
import { expect, test } from 'vitest';
import {
  fitInputStokes,
  fitLinearScan,
  fitRotatingScan,
  type LinearScan,
  type LinearScanFit,
  MOST_ROWS,
  type ScanRow,
  type Stated,
} from '../../shared/optics/calibration';
import {
  apartBy,
  cleanPowers,
  cleanRotatingRows,
  cleanRows,
  Dice,
  PLAIN,
  readings,
  rotatingPowers,
  scanOf,
} from './calibration-scans';

const SIGMA = 1e-3;

function rowsWith(fault: (thetaRad: number) => number, seed: number): readonly ScanRow[] {
  const dice = new Dice(seed);
  return cleanPowers(PLAIN, readings(0, 5, 72)).map(({ dialDeg, crossed, parallel }) => {
    const more = 1 + fault((dialDeg * Math.PI) / 180);
    return {
      dialDeg,
      crossed: { power: crossed * more + SIGMA * dice.normal(), sigma: SIGMA },
      parallel: { power: parallel + SIGMA * dice.normal(), sigma: SIGMA },
    };
  });
}

function linear(scan: LinearScan): LinearScanFit {
  const fit = fitLinearScan(scan);
  if (!fit.ok) throw new Error(fit.message);
  return fit;
}

test('wild rows are suggested, never left out, and left out only when told to', () => {
  const wild = [4, 11, 40, 41];
  const rows = rowsWith(() => 0, 2).map((row, k) =>
    wild.includes(k) && row.crossed !== null
      ? { ...row, crossed: { ...row.crossed, power: row.crossed.power + 0.3 } }
      : row,
  );
  const all = linear(scanOf(rows));
  expect(all.suspected).toEqual(wild);
  expect(all.rows.every(({ isUsed }) => isUsed)).toBe(true);
  expect(all.degreesOfFreedom).toBe(72 - 3);
  const without = linear(scanOf(rows, { leftOut: all.suspected }));
  expect(without.suspected).toEqual([]);
  expect(without.degreesOfFreedom).toBe(68 - 3);
  expect(without.rows.filter(({ isUsed }) => !isUsed).map(({ row }) => row)).toEqual(wild);
  for (const { isUsed, residualSigmas } of without.rows) expect(Math.abs(residualSigmas) > 20).toBe(!isUsed);
  expect(apartBy(90, without.offset.offsetDeg, PLAIN.offsetDeg)).toBeLessThan(4 * without.offset.sigmaDeg);
  // The same without σ, where the wild rows widen the scatter of a plain fit.
  const unstated = rows.map(({ dialDeg, crossed, parallel }) => ({
    dialDeg,
    crossed: crossed && { ...crossed, sigma: null, power: Math.max(0, crossed.power) },
    parallel: parallel && { ...parallel, sigma: null },
  }));
  const scattered = linear(scanOf(unstated));
  expect([scattered.suspected, scattered.sigmaFrom]).toEqual([wild, 'scatter']);
});

test('sound rows are hardly ever suspected', () => {
  let suspected = 0;
  for (let seed = 0; seed < 60; seed += 1)
    suspected += linear(scanOf(rowsWith(() => 0, seed))).suspected.length;
  expect(suspected / (60 * 72)).toBeLessThan(2e-3);
});

// Which fault makes which harmonic is common practice, from memory.
test('a wedge shows as a once-per-turn harmonic and diattenuation as a twice-per-turn one; a sound plate shows none', () => {
  expect(linear(scanOf(rowsWith(() => 0, 1))).warnings).toEqual([]);
  const wedge = linear(scanOf(rowsWith((theta) => 0.02 * Math.cos(theta - 0.4), 1)));
  expect(wedge.warnings).toContainEqual(
    expect.objectContaining({
      kind: 'fault-harmonic',
      harmonic: wedge.faults?.[0],
    }),
  );
  expect(wedge.faults?.[0]).toMatchObject({ perTurn: 1, hint: 'wedge-or-decentre' });
  const tilted = linear(scanOf(rowsWith((theta) => 0.02 * Math.cos(2 * theta + 1), 1)));
  expect(
    tilted.warnings.flatMap((one) => (one.kind === 'fault-harmonic' ? [one.harmonic.perTurn] : [])),
  ).toEqual([2]);
  expect(linear(scanOf(rowsWith(() => 0, 1).slice(0, 6))).faults).toBeNull();
});

test('σ that are too small show as a misfit', () => {
  const rows = rowsWith(() => 0, 3).map(({ dialDeg, crossed, parallel }) => ({
    dialDeg,
    crossed: crossed && { ...crossed, sigma: SIGMA / 3 },
    parallel: parallel && { ...parallel, sigma: SIGMA / 3 },
  }));
  expect(linear(scanOf(rows)).warnings.map(({ kind }) => kind)).toContain('misfit');
});

test('a dark level taken off twice shows as a negative leak', () => {
  const rows = rowsWith(() => 0, 5).map((row) => ({
    ...row,
    crossed: row.crossed && { ...row.crossed, power: row.crossed.power - 4 * SIGMA },
  }));
  expect(linear(scanOf(rows)).warnings.map(({ kind }) => kind)).toEqual(['negative-leak']);
});

test('no number, however hostile, gets past: every answer is finite or a refusal that says which row and what to do', () => {
  const hostile = fc.oneof(
    fc.double({ min: -1, max: 2, noNaN: true }),
    fc.constantFrom(0, NaN, Infinity, -Infinity, -1, 1e300, 1e-310, 1e-12, 5),
  );
  const sigmas = fc.oneof(fc.constant(null), fc.constantFrom(1e-3, 0, NaN, -1, 1e300, 1e-300));
  const reading = fc.option(fc.record({ power: hostile, sigma: sigmas }));
  const rows = fc.array(
    fc.record({
      dialDeg: fc.oneof(fc.integer({ min: 0, max: 359 }), fc.constantFrom(NaN, Infinity, 1e300, 45)),
      crossed: reading,
      parallel: reading,
    }),
    { maxLength: 12 },
  );
  const stated = fc.option(
    fc.record({ value: hostile, sigma: hostile }),
  ) satisfies fc.Arbitrary<Stated | null>;
  const expectSound = (value: unknown, path: string) => {
    if (typeof value === 'number') expect(Number.isFinite(value), `${path} is ${value}`).toBe(true);
    else if (typeof value === 'object' && value !== null)
      for (const [key, inner] of Object.entries(value)) expectSound(inner, `${path}.${key}`);
  };
  fc.assert(
    fc.property(rows, stated, stated, fc.boolean(), (all, leak, power, isTamed) => {
      const tame = all.map(({ dialDeg, crossed, parallel }, k) => ({
        dialDeg: Number.isFinite(dialDeg) ? dialDeg : 17 * k,
        crossed: { power: Math.min(2, Math.abs(crossed?.power ?? 1)) || 0.5, sigma: null },
        parallel: { power: Math.min(2, Math.abs(parallel?.power ?? 1)) || 0.5, sigma: null },
      }));
      const answer = fitLinearScan(scanOf(isTamed ? tame : all, isTamed ? {} : { leak, power }));
      if (answer.ok) {
        expectSound(answer, 'fit');
        return;
      }
      expect(answer.message).toMatch(/^[A-Z].*\.$/u);
      expect(answer.message.split('. ').length).toBeGreaterThan(1);
      if (answer.row !== null) expect(answer.message.startsWith(`Row ${answer.row + 1}: `)).toBe(true);
    }),
    { numRuns: 1500 },
  );
});

const plain = cleanRows(PLAIN, readings(0, 10, 19));
const withRow = (k: number, change: Partial<ScanRow>) =>
  scanOf(plain.map((row, i) => (i === k ? { ...row, ...change } : row)));

test('each refusal names its row, its reason and what to do', () => {
  const power = (value: number, sigma: number | null = null) => ({ crossed: { power: value, sigma } });
  const cases: readonly (readonly [LinearScan, string, number | null])[] = [
    [withRow(3, power(NaN)), 'power', 3],
    [withRow(3, power(Infinity)), 'power', 3],
    [withRow(5, power(-0.01)), 'power', 5],
    [withRow(6, { dialDeg: NaN }), 'angle', 6],
    [withRow(6, power(0.1, 0.1)), 'sigma', 6],
    [withRow(2, { parallel: null }), 'ports', 2],
    [withRow(0, { crossed: null, parallel: null }), 'ports', 0],
    [withRow(4, { crossed: { power: 0, sigma: null }, parallel: { power: 0, sigma: null } }), 'power', 4],
    [scanOf([]), 'rows', null],
    [scanOf(plain.slice(0, 3)), 'rows', null],
    [scanOf(Array.from({ length: MOST_ROWS + 1 }, () => plain[0]).flatMap((row) => row ?? [])), 'rows', null],
    [scanOf(plain.map((row) => ({ ...row, dialDeg: 12 }))), 'angles', null],
    [scanOf(cleanRows(PLAIN, readings(0, 45, 9))), 'angles', null],
    [scanOf(cleanRows({ ...PLAIN, retardanceDeg: 0 }, readings(0, 10, 19))), 'flat', null],
    [scanOf(plain, { leftOut: [19] }), 'left-out', null],
    [scanOf(plain, { leftOut: plain.map((_, k) => k) }), 'rows', null],
    [scanOf(plain, { leak: { value: -0.1, sigma: 0 } }), 'statement', null],
    [scanOf(plain, { power: { value: 0, sigma: 0 } }), 'statement', null],
    [scanOf(plain, { nominal: { kind: 'quarter', retardanceDeg: NaN, sigmaDeg: 1 } }), 'statement', null],
  ];
  for (const [scan, reason, row] of cases) {
    const answer = fitLinearScan(scan);
    expect([answer.ok, 'reason' in answer && answer.reason, 'row' in answer && answer.row]).toEqual([
      false,
      reason,
      row,
    ]);
  }
  // A wild row that is left out is no hindrance, and one below 0 by less than 5 of its σ is a reading.
  expect(fitLinearScan({ ...withRow(3, power(NaN)), leftOut: [3] }).ok).toBe(true);
  // Without a σ a hundredth of the largest power below 0 is scatter about a dark level that was taken off.
  expect(fitLinearScan(withRow(5, power(-0.002))).ok).toBe(true);
});

const scan = {
  direction: 1,
  input: [0, 0, 1],
  analyserDeg: 0,
  leak: null,
  before: null,
  nominal: null,
  leftOut: [],
} as const;

test('pure circular light can’t tell δ from 180° − δ, nor a quarter-wave plate’s δ to first order, and says so', () => {
  const dice = new Dice(8);
  const fitOf = (retardanceDeg: number) => {
    const dialsDeg = readings(0, 5, 72);
    const powers = rotatingPowers({ ...PLAIN, leak: 0, retardanceDeg }, dialsDeg, [0, 0, 1], 0);
    const rows = powers.map((power, k) => ({
      dialDeg: dialsDeg[k] ?? 0,
      power: power + SIGMA * dice.normal(),
      sigma: SIGMA,
    }));
    const fit = fitRotatingScan({ ...scan, rows });
    if (!fit.ok || fit.retardance === null) throw new Error('refused');
    return { ...fit, retardance: fit.retardance };
  };
  const sixty = fitOf(60);
  const supplement = sixty.open.find((one) => one.kind === 'supplement');
  const readingsDeg = supplement?.readings.map(({ retardanceDeg }) => Math.round(retardanceDeg)) ?? [];
  expect(readingsDeg.sort((a, b) => a - b)).toEqual([60, 120]);
  expect(sixty.axisSigmas).toBeGreaterThan(50);
  const ninety = fitOf(90);
  expect(ninety.open).toContainEqual(expect.objectContaining({ kind: 'blind', atDeg: 90 }));
  expect(ninety.retardance.fromDeg).toBeLessThan(90);
  expect(ninety.retardance.toDeg).toBeGreaterThan(90);
  expect(Math.abs(ninety.retardance.retardanceDeg - 90)).toBeLessThan(2 * ninety.retardance.sigmaDeg);
});

test('circular light alone shows nothing of a half-wave plate; with the linear scan before it, it says by how little it can settle', () => {
  const truth = { ...PLAIN, leak: 0, retardanceDeg: 180 };
  const rows = cleanRotatingRows(truth, readings(0, 5, 72), [0, 0, 1], 0, SIGMA);
  expect(fitRotatingScan({ ...scan, rows })).toMatchObject({ ok: false, reason: 'flat' });
  const before = linear(
    scanOf(
      cleanRows(truth, readings(0, 5, 72)).map((row) => ({
        ...row,
        crossed: row.crossed && { ...row.crossed, sigma: SIGMA },
        parallel: row.parallel && { ...row.parallel, sigma: SIGMA },
      })),
    ),
  );
  const fit = fitRotatingScan({ ...scan, rows, before });
  if (!fit.ok) throw new Error(fit.message);
  expect(fit.axisSigmas).toBeLessThan(1);
  expect(fit.open.map(({ kind }) => kind)).toEqual(expect.arrayContaining(['axis', 'branch']));
  expect(fit.candidates).toHaveLength(2);
  expect(apartBy(90, fit.offset.offsetDeg, PLAIN.offsetDeg)).toBeLessThan(1e-6);
});

test('a rotating scan refuses an impossible input, a strange analyser and the other mount’s scan', () => {
  const rows = cleanRotatingRows(PLAIN, readings(0, 5, 40), [0.6, 0, 0.8], 0, null);
  expect(fitRotatingScan({ ...scan, rows, input: [1, 1, 0] })).toMatchObject({ ok: false, reason: 'input' });
  expect(fitRotatingScan({ ...scan, rows, input: [NaN, 0, 0] })).toMatchObject({
    ok: false,
    reason: 'input',
  });
  expect(fitRotatingScan({ ...scan, rows, analyserDeg: Infinity })).toMatchObject({
    ok: false,
    reason: 'input',
  });
  const before = linear(scanOf(plain, { direction: -1 }));
  expect(fitRotatingScan({ ...scan, rows, before })).toMatchObject({ ok: false, reason: 'statement' });
  expect(fitRotatingScan({ ...scan, rows: rows.slice(0, 10) })).toMatchObject({ ok: false, reason: 'rows' });
  expect(fitRotatingScan({ ...scan, rows: [] })).toMatchObject({ ok: false, reason: 'rows' });
});

test('unknown light: a half-wave plate, too few rows and strange plates are refused', () => {
  const rows = cleanRotatingRows({ ...PLAIN, leak: 0 }, readings(0, 15, 24), [0.6, 0, 0.8], 0, null);
  const known = { rows, direction: 1, offsetDeg: 31.7, analyserDeg: 0, leak: 0, leftOut: [] } as const;
  expect(fitInputStokes({ ...known, retardanceDeg: 180 })).toMatchObject({ ok: false, reason: 'plate' });
  expect(fitInputStokes({ ...known, retardanceDeg: NaN })).toMatchObject({ ok: false, reason: 'plate' });
  expect(fitInputStokes({ ...known, retardanceDeg: 90, rows: rows.slice(0, 4) })).toMatchObject({
    reason: 'rows',
  });
});

test('ten thousand rows are fitted within a second', () => {
  const rows = cleanRows(PLAIN, readings(0, 0.036, MOST_ROWS));
  linear(scanOf(rows.slice(0, 500)));
  const start = process.cpuUsage().user;
  const fit = linear(scanOf(rows));
  // Processor time: other work on the machine must not fail a test.
  expect((process.cpuUsage().user - start) / 1e6).toBeLessThan(1);
  expect(fit.rows).toHaveLength(MOST_ROWS);
});
