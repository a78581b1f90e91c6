import { expect, test } from 'vitest';
import type { Stokes } from '../../shared/optics';
import {
  fitLinearScan,
  fitRotatingScan,
  type LinearScanFit,
  type PowerReading,
  type ScanRow,
} from '../../shared/optics/calibration';
import {
  apartBy,
  cleanPowers,
  Dice,
  readings,
  rotatingPowers,
  scanOf,
  type Truth,
} from './calibration-scans';

function bench(dice: Dice, fromDeg = 20, toDeg = 340): Truth {
  return {
    offsetDeg: dice.between(0, 180),
    retardanceDeg: dice.between(fromDeg, toDeg),
    direction: dice.pick([1, -1]),
    leak: dice.pick([1e-5, 1e-4, 1e-3]),
    power: dice.pick([1, 0.37, 1e4, 5e-6]),
    drift: dice.between(-0.05, 0.05),
  };
}

/** Steps of 1° to 15° over a turn or half of one, from anywhere, in order or shuffled. */
function dials(dice: Dice, fewest: number): readonly number[] {
  const stepDeg = dice.between(1, 15);
  const count = Math.max(fewest, Math.floor(dice.pick([360, 360, 180]) / stepDeg) + 1);
  const inOrder = readings(dice.between(0, 360), stepDeg, count);
  return dice.between(0, 1) < 0.3 ? dice.shuffled(inOrder) : inOrder;
}

/** A detector that counts, one with a known noise, and one with a noise that nobody stated. */
function detector(dice: Dice, truth: Truth): (power: number) => PowerReading {
  const kind = dice.pick(['counts', 'noise', 'unstated'] as const);
  const full = dice.pick([1e4, 1e5, 1e6]);
  const level = dice.pick([3e-4, 1e-3, 3e-3]) * truth.power;
  return (power) => {
    if (kind === 'counts') {
      const counts = dice.count((power / truth.power) * full);
      const unit = truth.power / full;
      return { power: counts * unit, sigma: Math.sqrt(Math.max(counts, 1)) * unit };
    }
    const shown = power + level * dice.normal();
    // A meter that states no σ shows 0 below it, as many do.
    return kind === 'noise' ? { power: shown, sigma: level } : { power: Math.max(0, shown), sigma: null };
  };
}

function linearCase(seed: number): { readonly truth: Truth; readonly fit: LinearScanFit } {
  const dice = new Dice(seed);
  const truth = bench(dice);
  const clean = cleanPowers(truth, dials(dice, 12));
  const ports = dice.pick(['both', 'both', 'crossed', 'parallel'] as const);
  const read = detector(dice, truth);
  const rows: readonly ScanRow[] = clean.map(({ dialDeg, crossed, parallel }) => ({
    dialDeg,
    crossed: ports === 'parallel' ? null : read(crossed),
    parallel: ports === 'crossed' ? null : read(parallel),
  }));
  const stated = (value: number, share: number) => ({
    value: value * (1 + share * dice.normal()),
    sigma: value * share,
  });
  const fit = fitLinearScan(
    scanOf(rows, {
      direction: truth.direction,
      leak: ports === 'parallel' ? stated(truth.leak, 0.1) : null,
      power: ports === 'crossed' && dice.between(0, 1) < 0.7 ? stated(truth.power, 0.002) : null,
    }),
  );
  if (!fit.ok) throw new Error(`${seed}: ${fit.message}`);
  return { truth, fit };
}

/** Truth on the branch up to 180°. */
const folded = (retardanceDeg: number) => Math.min(retardanceDeg, 360 - retardanceDeg);

test('1000 scans between linear polarisers have the truth within 2σ in 95 ± 2 %, and never claim an axis or a branch', () => {
  const found = { offset: 0, retardances: 0, retardance: 0, interval: 0, blind: 0, blindInside: 0 };
  for (let k = 0; k < 1000; k += 1) {
    const { truth, fit } = linearCase(7 * k + 3);
    const offsetAway = apartBy(90, fit.offset.offsetDeg, truth.offsetDeg);
    if (offsetAway <= 2 * fit.offset.sigmaDeg) found.offset += 1;
    expect(fit.open.find(({ kind }) => kind === 'axis')).toEqual({
      kind: 'axis',
      offsetsDeg: [fit.offset.offsetDeg, fit.offset.offsetDeg + 90],
      sigmas: null,
    });
    expect(fit.settled).toEqual([]);
    const { retardance } = fit;
    const isTold = retardance !== null;
    expect(fit.open.some(({ kind }) => kind === 'retardance')).toBe(!isTold);
    expect(fit.open.some(({ kind }) => kind === 'branch')).toBe(isTold);
    if (!isTold) continue;
    const trueDeg = folded(truth.retardanceDeg);
    const isInside = trueDeg >= retardance.fromDeg && trueDeg <= retardance.toDeg;
    if (fit.open.some(({ kind }) => kind === 'blind')) {
      found.blind += 1;
      if (isInside) found.blindInside += 1;
      // The usable σ covers what the interval does.
      if (isInside)
        expect(Math.abs(trueDeg - retardance.retardanceDeg)).toBeLessThanOrEqual(
          2.000001 * retardance.sigmaDeg,
        );
      continue;
    }
    found.retardances += 1;
    if (Math.abs(trueDeg - retardance.retardanceDeg) <= 2 * retardance.sigmaDeg) found.retardance += 1;
    if (isInside) found.interval += 1;
  }
  expect(Math.abs(found.offset / 1000 - 0.95)).toBeLessThan(0.02);
  expect(found.retardances).toBeGreaterThan(800);
  expect(Math.abs(found.retardance / found.retardances - 0.95)).toBeLessThan(0.02);
  expect(Math.abs(found.interval / found.retardances - 0.95)).toBeLessThan(0.02);
  expect(found.blind).toBeGreaterThan(15);
});

test('near 180° the interval holds the truth at least as often, reaches 180° and is told as blind', () => {
  const inside = { count: 0, reaches: 0 };
  const cases = 1000;
  for (let k = 0; k < cases; k += 1) {
    const dice = new Dice(13 * k + 1);
    const truth = { ...bench(dice, 176, 184), leak: 1e-3 };
    const sigma = 5e-3 * truth.power;
    const rows = cleanPowers(truth, readings(dice.between(0, 90), 7.5, 49)).map(
      ({ dialDeg, crossed, parallel }) => ({
        dialDeg,
        crossed: { power: crossed + sigma * dice.normal(), sigma },
        parallel: { power: parallel + sigma * dice.normal(), sigma },
      }),
    );
    const fit = fitLinearScan(
      scanOf(rows, {
        direction: truth.direction,
        nominal: { kind: 'half', retardanceDeg: truth.retardanceDeg, sigmaDeg: 0.01 },
      }),
    );
    if (!fit.ok || fit.retardance === null) throw new Error(String(k));
    // sin²(δ/2) differs from 1 by at most 0.0012 here, and is not known to better than 0.001.
    expect(fit.open.map(({ kind }) => kind)).toEqual(['axis', 'branch', 'blind']);
    expect(fit.open.find(({ kind }) => kind === 'branch')).toMatchObject({ reason: 'half-wave' });
    const trueDeg = folded(truth.retardanceDeg);
    if (trueDeg >= fit.retardance.fromDeg && trueDeg <= fit.retardance.toDeg) inside.count += 1;
    if (fit.retardance.toDeg === 180) inside.reaches += 1;
  }
  expect(inside.count / cases).toBeGreaterThan(0.95);
  expect(inside.reaches / cases).toBeGreaterThan(0.7);
});

test('a nominal quarter-wave retardance settles the branch, never the wrong one, and a half-wave one never does', () => {
  let settled = 0;
  for (let k = 0; k < 300; k += 1) {
    const dice = new Dice(17 * k + 2);
    const truth = bench(dice, 60, 300);
    const sigma = 3e-3;
    const rows = cleanPowers({ ...truth, power: 1 }, readings(0, 10, 36)).map(
      ({ dialDeg, crossed, parallel }) => ({
        dialDeg,
        crossed: { power: crossed + sigma * dice.normal(), sigma },
        parallel: { power: parallel + sigma * dice.normal(), sigma },
      }),
    );
    const sigmaDeg = dice.pick([0.5, 2, 10]);
    const nominal = {
      kind: 'quarter',
      retardanceDeg: truth.retardanceDeg + sigmaDeg * dice.normal(),
      sigmaDeg,
    } as const;
    const fit = fitLinearScan(scanOf(rows, { direction: truth.direction, nominal }));
    const half = fitLinearScan(
      scanOf(rows, { direction: truth.direction, nominal: { ...nominal, kind: 'half' } }),
    );
    if (!fit.ok || !half.ok || fit.retardance === null) throw new Error(String(k));
    expect(half.settled).toEqual([]);
    expect(half.open.find(({ kind }) => kind === 'branch')).toMatchObject({ reason: 'half-wave' });
    const isSettled = fit.settled.some(({ kind }) => kind === 'branch');
    expect(fit.open.some(({ kind }) => kind === 'branch')).toBe(!isSettled);
    if (!isSettled) continue;
    settled += 1;
    expect(Math.sign(fit.retardance.retardanceDeg - 180)).toBe(Math.sign(truth.retardanceDeg - 180));
    expect(fit.retardance.fromDeg).toBeLessThan(fit.retardance.retardanceDeg);
    expect(fit.retardance.toDeg).toBeGreaterThan(fit.retardance.retardanceDeg);
  }
  expect(settled).toBeGreaterThan(200);
});

/** Light of ellipticity 5° to 45° of either hand, any azimuth. */
function ellipticLight(dice: Dice): Stokes {
  const chi = dice.pick([-1, 1]) * dice.between(5, 45) * (Math.PI / 180);
  const psi = dice.between(0, Math.PI);
  return [Math.cos(2 * chi) * Math.cos(2 * psi), Math.cos(2 * chi) * Math.sin(2 * psi), Math.sin(2 * chi)];
}

test('scans behind elliptical light settle axis and branch or say that they can’t: never the wrong plate, 95 ± 3 % within 2σ', () => {
  const cases = 300;
  const found = { flat: 0, settled: 0, told: 0, offset: 0, plain: 0, retardance: 0 };
  for (let k = 0; k < cases; k += 1) {
    const dice = new Dice(11 * k + 5);
    // Every third plate is a half-wave one, scanned between linear polarisers before.
    const isHalf = k % 3 === 0;
    const truth = isHalf ? bench(dice, 176, 184) : bench(dice);
    const input = ellipticLight(dice);
    const analyserDeg = dice.between(0, 180);
    const angles = dials(dice, 16);
    const sigma = dice.pick([3e-4, 1e-3, 3e-3]) * truth.power;
    const rows = rotatingPowers(truth, angles, input, analyserDeg).map((power, i) => ({
      dialDeg: angles[i] ?? 0,
      power: power + sigma * dice.normal(),
      sigma,
    }));
    const before = fitLinearScan(
      scanOf(
        cleanPowers(truth, readings(0, 5, 37)).map(({ dialDeg, crossed, parallel }) => ({
          dialDeg,
          crossed: { power: crossed + sigma * dice.normal(), sigma },
          parallel: { power: parallel + sigma * dice.normal(), sigma },
        })),
        { direction: truth.direction },
      ),
    );
    if (!before.ok) throw new Error(before.message);
    const fit = fitRotatingScan({
      rows,
      direction: truth.direction,
      input,
      analyserDeg,
      leak: { value: truth.leak, sigma: truth.leak / 10 },
      before: isHalf ? before : null,
      nominal: null,
      leftOut: [],
    });
    if (!fit.ok) {
      // Little light that changes, in few rows: a refusal is an answer, but a rare one.
      expect(fit.reason).toBe('flat');
      found.flat += 1;
      continue;
    }
    if (fit.retardance === null) throw new Error('a rotating scan tells the retardance');
    const isTurned = truth.retardanceDeg > 180;
    const trueDeg = folded(truth.retardanceDeg);
    const trueOffsetDeg = truth.offsetDeg + (isTurned ? 90 : 0);
    const isSettled = fit.axisSigmas >= 5;
    expect(fit.settled.map(({ kind }) => kind)).toEqual(isSettled ? ['axis', 'branch'] : []);
    expect(fit.open.some(({ kind }) => kind === 'axis')).toBe(!isSettled);
    if (isSettled) {
      found.settled += 1;
      expect(apartBy(180, fit.offset.offsetDeg, trueOffsetDeg)).toBeLessThan(45);
    }
    if (fit.open.some(({ kind }) => kind === 'supplement')) continue;
    found.told += 1;
    const away = apartBy(isSettled ? 180 : 90, fit.offset.offsetDeg, trueOffsetDeg);
    if (away <= 2 * fit.offset.sigmaDeg) found.offset += 1;
    if (fit.open.some(({ kind }) => kind === 'blind')) continue;
    found.plain += 1;
    const { retardanceDeg, sigmaDeg } = fit.retardance;
    const misses = isSettled ? [trueDeg] : [trueDeg, 360 - trueDeg];
    if (misses.some((one) => Math.abs(one - retardanceDeg) <= 2 * sigmaDeg)) found.retardance += 1;
  }
  expect(found.flat).toBeLessThan(5);
  expect(found.settled).toBeGreaterThan(200);
  expect(found.settled).toBeLessThan(cases);
  expect(found.told).toBeGreaterThan(280);
  expect(Math.abs(found.offset / found.told - 0.95)).toBeLessThan(0.03);
  expect(Math.abs(found.retardance / found.plain - 0.95)).toBeLessThan(0.03);
});
