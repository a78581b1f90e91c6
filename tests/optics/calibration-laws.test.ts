import fc from 'fast-check';
import { expect, test } from 'vitest';
import {
  fitLinearScan,
  fitRotatingScan,
  type LinearScan,
  linearScanCurve,
  type LinearScanFit,
  rotatingScanCurve,
  type RotatingScanFit,
  type ScanRow,
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
  type Truth,
} from './calibration-scans';

const truths = fc.record({
  offsetDeg: fc.double({ min: 0, max: 180, noNaN: true }),
  retardanceDeg: fc.double({ min: 20, max: 340, noNaN: true }),
  direction: fc.constantFrom<1 | -1>(1, -1),
  leak: fc.constantFrom(1e-5, 1e-3),
  power: fc.constantFrom(1, 4e5),
  drift: fc.constantFrom(0, 0.04),
});

function linear(scan: LinearScan): LinearScanFit {
  const fit = fitLinearScan(scan);
  if (!fit.ok) throw new Error(fit.message);
  return fit;
}

/** Noise of a thousandth of the power, stated. */
function noisyRows(truth: Truth, dialsDeg: readonly number[], seed: number): readonly ScanRow[] {
  const dice = new Dice(seed);
  const sigma = 1e-3 * truth.power;
  return cleanPowers(truth, dialsDeg).map(({ dialDeg, crossed, parallel }) => ({
    dialDeg,
    crossed: { power: crossed + sigma * dice.normal(), sigma },
    parallel: { power: parallel + sigma * dice.normal(), sigma },
  }));
}

const close = (a: number, b: number, tolerance: number) => expect(Math.abs(a - b)).toBeLessThan(tolerance);

test('clean powers give the plate back: both ports, the parallel one, the crossed one with its power', () => {
  fc.assert(
    fc.property(truths, fc.double({ min: 1, max: 15, noNaN: true }), (truth, stepDeg) => {
      const foldedDeg = Math.min(truth.retardanceDeg, 360 - truth.retardanceDeg);
      fc.pre(foldedDeg < 179);
      const rows = cleanRows(truth, readings(3, stepDeg, Math.max(12, Math.floor(180 / stepDeg))));
      const leak = { value: truth.leak, sigma: 0 };
      const power = { value: truth.power, sigma: 0 };
      const scans = [
        { rows, leak: null, power: null },
        { rows: rows.map((row) => ({ ...row, crossed: null })), leak, power: null },
        { rows: rows.map((row) => ({ ...row, parallel: null })), leak: null, power },
      ];
      for (const scan of scans) {
        const fit = linear(scanOf(scan.rows, { ...scan, direction: truth.direction }));
        expect(apartBy(90, fit.offset.offsetDeg, truth.offsetDeg)).toBeLessThan(1e-7);
        close(fit.retardance?.retardanceDeg ?? NaN, foldedDeg, 1e-6);
        close(fit.parameters.leak.value, truth.leak, 1e-8);
        if (scan.rows !== rows) close(fit.parameters.drift.value, truth.drift, 1e-8);
        expect(fit.suspected).toEqual([]);
        expect(fit.warnings).toEqual([]);
      }
    }),
    { numRuns: 25 },
  );
});

test('a crossed scan without its power and a parallel one without leak or power tell the zero, and say what they want', () => {
  const rows = noisyRows({ ...PLAIN, drift: 0.05 }, readings(0, 5, 72), 4);
  const crossed = linear(scanOf(rows.map((row) => ({ ...row, parallel: null }))));
  const parallel = linear(scanOf(rows.map((row) => ({ ...row, crossed: null }))));
  expect(crossed.open).toContainEqual({ kind: 'retardance', wants: 'power' });
  expect(parallel.open).toContainEqual({ kind: 'retardance', wants: 'leak-or-power' });
  for (const fit of [crossed, parallel]) {
    expect([fit.retardance, fit.candidates]).toEqual([null, []]);
    expect(apartBy(90, fit.offset.offsetDeg, PLAIN.offsetDeg)).toBeLessThan(4 * fit.offset.sigmaDeg);
    close(fit.parameters.drift.value, 0.05, 5 * (fit.parameters.drift.sigma ?? 0));
  }
});

test('half a turn of the plate is no change, and a constant on all dials moves the offset by it', () => {
  fc.assert(
    fc.property(truths, fc.double({ min: -400, max: 400, noNaN: true }), (truth, shiftDeg) => {
      const rows = noisyRows(truth, readings(0, 6.5, 40), 8);
      const scan = scanOf(rows, { direction: truth.direction });
      const fit = linear(scan);
      const by = (moveDeg: number) =>
        linear({ ...scan, rows: rows.map((row) => ({ ...row, dialDeg: row.dialDeg + moveDeg })) });
      const [half, moved] = [by(180), by(shiftDeg)];
      expect(apartBy(90, half.offset.offsetDeg, fit.offset.offsetDeg)).toBeLessThan(1e-8);
      expect(apartBy(90, moved.offset.offsetDeg, fit.offset.offsetDeg + shiftDeg)).toBeLessThan(1e-8);
      close(moved.retardance?.retardanceDeg ?? NaN, fit.retardance?.retardanceDeg ?? NaN, 1e-6);
      close(moved.chiSquared, fit.chiSquared, 1e-6);
    }),
    { numRuns: 40 },
  );
});

test('the other direction of the dial gives the same offset between linear polarisers', () => {
  const rows = noisyRows(PLAIN, readings(0, 6.5, 40), 8);
  const [up, down] = [linear(scanOf(rows)), linear(scanOf(rows, { direction: -1 }))];
  close(up.offset.offsetDeg, down.offset.offsetDeg, 1e-9);
  close(up.retardance?.retardanceDeg ?? NaN, down.retardance?.retardanceDeg ?? NaN, 1e-8);
});

test('the order of rows with both ports changes nothing, the residuals follow their rows', () => {
  const rows = noisyRows(PLAIN, readings(0, 4, 60), 5);
  const order = new Dice(6).shuffled(rows.map((_, k) => k));
  const [fit, mixed] = [linear(scanOf(rows)), linear(scanOf(order.flatMap((k) => rows[k] ?? [])))];
  close(fit.offset.offsetDeg, mixed.offset.offsetDeg, 1e-10);
  close(fit.retardance?.retardanceDeg ?? NaN, mixed.retardance?.retardanceDeg ?? NaN, 1e-9);
  order.forEach((k, place) =>
    close(mixed.rows[place]?.residualSigmas ?? NaN, fit.rows[k]?.residualSigmas ?? NaN, 1e-8),
  );
});

// r → 1 − r: minima become maxima, the leak becomes what the plate lets through at most, and no plate modulates that much.
test('swapped ports move the offset by 45° and are told by a modulation that no plate makes, or refused', () => {
  for (const retardanceDeg of [172, 165]) {
    const truth = { ...PLAIN, retardanceDeg };
    const rows = noisyRows(truth, readings(0, 5, 72), 3);
    const swapped = rows.map(({ dialDeg, crossed, parallel }) => ({
      dialDeg,
      crossed: parallel,
      parallel: crossed,
    }));
    const [fit, other] = [linear(scanOf(rows)), linear(scanOf(swapped))];
    const { leak, modulation } = fit.parameters;
    // Held at a modulation of 1, the swapped fit weighs its rows a little differently: far less than the noise does.
    expect(apartBy(90, other.offset.offsetDeg, fit.offset.offsetDeg + 45)).toBeLessThan(
      0.1 * fit.offset.sigmaDeg,
    );
    expect(fit.warnings).toEqual([]);
    expect(other.warnings.map(({ kind }) => kind)).toContain('over-full');
    close(other.parameters.leak.value, 1 - leak.value - (1 - 2 * leak.value) * modulation.value, 0.02);
    expect(other.retardance?.retardanceDeg).toBe(180);
  }
  const sixth = noisyRows({ ...PLAIN, retardanceDeg: 60 }, readings(0, 5, 72), 3).map(
    ({ dialDeg, crossed, parallel }) => ({
      dialDeg,
      crossed: parallel,
      parallel: crossed,
    }),
  );
  expect(fitLinearScan(scanOf(sixth))).toMatchObject({ ok: false, reason: 'ports-swapped' });
});

/** χ² of rows against a curve, straight from its definition. */
function chiSquaredOf(rows: LinearScanFit['rows'], value: (k: number) => number): number {
  return rows.reduce((sum, row, k) => sum + ((row.value - value(k)) / row.sigma) ** 2, 0);
}

/** Half the second derivatives by central differences, inverted by elimination. */
function numericalCovariance(
  chi: (p: readonly number[]) => number,
  at: readonly number[],
  steps: readonly number[],
) {
  const moved = (i: number, a: number, j: number, b: number) =>
    chi(
      at.map((value, k) => value + (k === i ? a * (steps[i] ?? 0) : 0) + (k === j ? b * (steps[j] ?? 0) : 0)),
    );
  const matrix = at.map((_, i) =>
    at.map((__, j) => {
      const mixed = moved(i, 1, j, 1) - moved(i, 1, j, -1) - moved(i, -1, j, 1) + moved(i, -1, j, -1);
      return mixed / (8 * (steps[i] ?? 1) * (steps[j] ?? 1));
    }),
  );
  const n = at.length;
  const work = matrix.map((row, i) => [...row, ...row.map((_, j) => (i === j ? 1 : 0))]);
  for (let i = 0; i < n; i += 1) {
    const pivot = work[i]?.[i] ?? NaN;
    work[i] = (work[i] ?? []).map((value) => value / pivot);
    work.forEach((row, k) => {
      const share = row[i] ?? 0;
      if (k !== i) work[k] = row.map((value, j) => value - share * (work[i]?.[j] ?? 0));
    });
  }
  return work.map((row) => row.slice(n));
}

function expectSameCovariance(
  found: readonly (readonly number[])[],
  wanted: readonly (readonly number[])[],
  share: number,
) {
  found.forEach((row, i) =>
    row.forEach((value, j) => {
      const size = Math.sqrt((found[i]?.[i] ?? 0) * (found[j]?.[j] ?? 0));
      expect(Math.abs(value - (wanted[i]?.[j] ?? NaN)) / size).toBeLessThan(share);
    }),
  );
}

test('the covariance is the inverse of half the second derivatives of χ²', () => {
  const rows = noisyRows(PLAIN, readings(0, 5, 72), 9);
  const fit = linear(scanOf(rows));
  expect(fit.covarianceOf).toEqual(['offsetDeg', 'modulation', 'leak']);
  const { offsetDeg, modulation, leak } = fit.parameters;
  const chi = ([offset = 0, s = 0, b = 0]: readonly number[]) =>
    chiSquaredOf(fit.rows, (k) => {
      const sine = Math.sin((2 * Math.PI * ((rows[k]?.dialDeg ?? 0) - offset)) / 180);
      return b + (1 - 2 * b) * s * sine * sine;
    });
  const at = [offsetDeg.value, modulation.value, leak.value];
  close(chi(at), fit.chiSquared, 1e-8);
  const steps = [offsetDeg, modulation, leak].map(({ sigma }) => (sigma ?? 0) / 10);
  // Three harmonics and three parameters: nothing is left over for Gauss's and Newton's approximation to lose.
  expectSameCovariance(fit.covariance, numericalCovariance(chi, at, steps), 1e-5);
});

test('the covariance of a single port with drift, and that of a scan behind elliptical light, are such inverses too', () => {
  const truth = { ...PLAIN, drift: 0.03 };
  const dialsDeg = readings(0, 5, 72);
  const clean = cleanPowers(truth, dialsDeg).map(({ dialDeg, parallel }) => ({
    dialDeg,
    crossed: null,
    parallel: { power: parallel, sigma: 1e-3 },
  }));
  const leak = { value: truth.leak, sigma: 0 };
  const fit = linear(scanOf(clean, { leak }));
  expect(fit.covarianceOf).toEqual(['offsetDeg', 'modulation', 'power', 'drift']);
  const chi = ([offset = 0, s = 0, power = 0, drift = 0]: readonly number[]) =>
    chiSquaredOf(fit.rows, (k) => {
      const sine = Math.sin((2 * Math.PI * ((dialsDeg[k] ?? 0) - offset)) / 180);
      return power * (1 + (drift * k) / 71) * (1 - truth.leak - (1 - 2 * truth.leak) * s * sine * sine);
    });
  const free = fit.covarianceOf.map((name) => fit.parameters[name]);
  const steps = free.map(({ sigma }) => (sigma ?? 0) / 10);
  const at = free.map(({ value }) => value);
  expectSameCovariance(fit.covariance, numericalCovariance(chi, at, steps), 1e-4);

  const input = [0.36, 0.48, 0.8] as const;
  const rotating = fitRotatingScan({
    rows: cleanRotatingRows(truth, dialsDeg, input, 20, 1e-3),
    direction: 1,
    input,
    analyserDeg: 20,
    leak,
    before: null,
    nominal: null,
    leftOut: [],
  });
  if (!rotating.ok) throw new Error(rotating.message);
  expect(rotating.covarianceOf).toEqual(['offsetDeg', 'retardanceDeg', 'power', 'drift']);
  const rotatingChi = ([offsetDeg = 0, retardanceDeg = 0, power = 0, drift = 0]: readonly number[]) => {
    const powers = rotatingPowers({ ...truth, offsetDeg, retardanceDeg, power, drift }, dialsDeg, input, 20);
    return chiSquaredOf(rotating.rows, (k) => powers[k] ?? 0);
  };
  const those = rotating.covarianceOf.map((name) => rotating.parameters[name]);
  expectSameCovariance(
    rotating.covariance,
    numericalCovariance(
      rotatingChi,
      those.map(({ value }) => value),
      those.map(({ sigma }) => (sigma ?? 0) / 10),
    ),
    1e-4,
  );
});

test('clean powers behind elliptical light give the very plate back, in either direction of the dial', () => {
  const input = [0.36, -0.48, 0.8] as const;
  fc.assert(
    fc.property(truths, fc.double({ min: 0, max: 180, noNaN: true }), (truth, analyserDeg) => {
      const foldedDeg = Math.min(truth.retardanceDeg, 360 - truth.retardanceDeg);
      const rows = cleanRotatingRows(truth, readings(1, 7, 52), input, analyserDeg, 1e-6 * truth.power);
      const scan = {
        rows,
        direction: truth.direction,
        input,
        analyserDeg,
        leak: { value: truth.leak, sigma: 0 },
        before: null,
        nominal: null,
        leftOut: [],
      };
      const fit = fitRotatingScan(scan);
      if (!fit.ok) throw new Error(fit.message);
      const isTurned = truth.retardanceDeg > 180;
      expect(apartBy(180, fit.offset.offsetDeg, truth.offsetDeg + (isTurned ? 90 : 0))).toBeLessThan(1e-5);
      close(fit.retardance?.retardanceDeg ?? NaN, foldedDeg, 1e-5);
      expect(fit.candidates).toHaveLength(1);

      // What the maker knows of the plate picks its other name.
      const named = fitRotatingScan({
        ...scan,
        nominal: { kind: 'other', retardanceDeg: truth.retardanceDeg, sigmaDeg: 0.1 },
      });
      if (!named.ok) throw new Error(named.message);
      if (Math.abs(180 - foldedDeg) < 1) return;
      expect(apartBy(180, named.offset.offsetDeg, truth.offsetDeg)).toBeLessThan(1e-5);
      close(named.retardance?.retardanceDeg ?? NaN, truth.retardanceDeg, 1e-5);
    }),
    { numRuns: 25 },
  );
});

test('the curves pass through clean powers', () => {
  const dialsDeg = readings(2, 9, 41);
  const truth = { ...PLAIN, direction: -1 } as const;
  const shares = cleanPowers(truth, dialsDeg);
  const curve = linearScanCurve(linear(scanOf(cleanRows(truth, dialsDeg), { direction: -1 })));
  for (const { dialDeg, crossed } of shares) close(curve(dialDeg), crossed, 1e-9);
  const input = [0.36, 0.48, 0.8] as const;
  const rows = cleanRotatingRows(truth, dialsDeg, input, 35, null);
  const fit = fitRotatingScan({
    rows,
    direction: -1,
    input,
    analyserDeg: 35,
    leak: { value: truth.leak, sigma: 0 },
    before: null,
    nominal: null,
    leftOut: [],
  });
  if (!fit.ok) throw new Error(fit.message);
  const behind: (dialDeg: number) => number = rotatingScanCurve(fit satisfies RotatingScanFit);
  for (const { dialDeg, power } of rows) close(behind(dialDeg), power, 1e-9);
});
