import { eigs } from 'mathjs';
import { levenbergMarquardt } from 'ml-levenberg-marquardt';
import { afterAll, expect, test } from 'vitest';
import {
  evenHarmonics,
  fitInputStokes,
  fitLinearScan,
  fitRotatingScan,
  linearScanCurve,
  rotatingPlateRow,
  type ScanRow,
  stokesOfHarmonics,
} from '../../shared/optics/calibration';
import { asNormalSigmas, asStudentSigmas } from '../../shared/optics/calibration/evidence';
import { degrees, toRadians } from '../../shared/optics/units';
import { apartBy, cleanPowers, Dice, PLAIN, readings, scanOf } from '../optics/calibration-scans';
import { apply, complex, plate, type Vector } from '../optics/independent';
import { Deviations } from './deviations';

const deviations = new Deviations();
afterAll(() => deviations.print('Calibration by scan, worst deviation'));

const DEGREE = Math.PI / 180;
const rad = (angleDeg: number) => toRadians(degrees(angleDeg));

/** references.md 7: P⊥ = sin²(δ/2) sin²2θ and P∥ the rest. */
function printedRows(retardanceDeg: number, leak = 0): readonly ScanRow[] {
  return readings(0, 5, 37).map((dialDeg) => {
    const share = (Math.sin((retardanceDeg / 2) * DEGREE) * Math.sin(2 * dialDeg * DEGREE)) ** 2;
    const crossed = leak + (1 - 2 * leak) * share;
    return {
      dialDeg,
      crossed: { power: crossed, sigma: null },
      parallel: { power: 1 - crossed, sigma: null },
    };
  });
}

// references.md 7, computed there from the Mueller product.
test('fits pass through the printed powers at 45°: 0.489529, 0.5, 0.510471 and 1.0966e-4', () => {
  const fitted = (retardanceDeg: number) => {
    const fit = fitLinearScan(scanOf(printedRows(retardanceDeg)));
    if (!fit.ok) throw new Error(fit.message);
    expect(fit.retardance?.retardanceDeg).toBeCloseTo(retardanceDeg, 7);
    return linearScanCurve(fit)(45);
  };
  for (const [retardanceDeg, printed] of [
    [88.8, 0.489529],
    [90, 0.5],
    [91.2, 0.510471],
  ] as const) {
    const away = Math.abs(fitted(retardanceDeg) - printed);
    expect(deviations.note('P⊥ at 45° of 88.8°, 90°, 91.2° (references 7)', away)).toBeLessThan(5.1e-7);
  }
  const parallel = Math.abs(1 - fitted(178.8) - 1.0966e-4);
  expect(deviations.note('P∥ at 45° of 178.8° (references 7)', parallel)).toBeLessThan(5.1e-9);
});

// references.md 7: a leak b of the polarisers looks like a retardance error of 2 arcsin √b.
test('a leak that nobody stated passes for 3.62°, 1.15° and 0.36° off a half-wave plate', () => {
  for (const [leak, printedDeg] of [
    [1e-3, 3.62],
    [1e-4, 1.15],
    [1e-5, 0.36],
  ] as const) {
    const rows = printedRows(180, leak).map((row) => ({ ...row, crossed: null }));
    const fit = fitLinearScan(scanOf(rows, { leak: { value: 0, sigma: 0 } }));
    if (!fit.ok || fit.retardance === null) throw new Error('refused');
    const away = Math.abs(180 - fit.retardance.retardanceDeg - printedDeg);
    // Half a unit of the last printed digit, and what √(b/(1 − b)) differs from √b.
    const slack = 0.005 + printedDeg * leak;
    expect(deviations.note('leak 1e-3, 1e-4, 1e-5 seen as degrees (references 7)', away)).toBeLessThan(slack);
  }
});

/** references.md 7, S3 positive for R, analyser along x. */
function printedPower(
  stokesR: readonly [number, number, number, number],
  retardance: number,
  theta: number,
): number {
  const [s0, s1, s2, s3R] = stokesR;
  const s = Math.sin(retardance / 2) ** 2;
  return (
    (s0 +
      s1 * (1 - s) -
      s3R * Math.sin(retardance) * Math.sin(2 * theta) +
      s1 * s * Math.cos(4 * theta) +
      s2 * s * Math.sin(4 * theta)) /
    2
  );
}

test('the row of plate and analyser is the printed one with the sign of S3 turned', () => {
  const dice = new Dice(1);
  for (let k = 0; k < 200; k += 1) {
    const light = [1, dice.between(-1, 1), dice.between(-1, 1), dice.between(-1, 1)] as const;
    const [retardance, theta, analyser] = [dice.between(0, 6.3), dice.between(0, 3.2), dice.between(0, 3.2)];
    const row = rotatingPlateRow(theta, retardance, 0);
    const ours = row[0] + row[1] * light[1] + row[2] * light[2] - row[3] * light[3];
    const away = Math.abs(ours - printedPower(light, retardance, theta));
    expect(deviations.note('I(θ) behind an analyser along x (references 7)', away)).toBeLessThan(1e-14);
    // Any azimuth: turning everything on the table by the same angle changes no power.
    const turned = rotatingPlateRow(theta + analyser, retardance, analyser);
    const [c, s] = [Math.cos(2 * analyser), Math.sin(2 * analyser)];
    expect(turned[1] * c + turned[2] * s).toBeCloseTo(row[1], 13);
    expect(turned[2] * c - turned[1] * s).toBeCloseTo(row[2], 13);
    expect(turned[3]).toBeCloseTo(row[3], 13);
  }
});

// references.md 7: S0 = A − C, S1 = 2C, S2 = 2D, S3 = B for a quarter-wave plate; A, B, C, D as printed there.
test('the printed Fourier relations hold for 5, 6, 8 and 12 even angles, closed form and least squares alike', () => {
  const dice = new Dice(2);
  for (const count of [5, 6, 8, 12]) {
    for (let k = 0; k < 20; k += 1) {
      const [s1, s2, s3R] = [dice.between(-0.5, 0.5), dice.between(-0.5, 0.5), dice.between(-0.5, 0.5)];
      const angles = readings(0, 180 / count, count);
      const powers = angles.map((theta) => printedPower([1, s1, s2, s3R], Math.PI / 2, theta * DEGREE));
      const sum = (weight: (theta: number) => number) =>
        powers.reduce((total, power, i) => total + power * weight((angles[i] ?? 0) * DEGREE), 0);
      const a = (2 / count) * sum(() => 1);
      const b = (-4 / count) * sum((theta) => Math.sin(2 * theta));
      const c = (4 / count) * sum((theta) => Math.cos(4 * theta));
      const d = (4 / count) * sum((theta) => Math.sin(4 * theta));
      const harmonics = evenHarmonics(powers);
      const closed = stokesOfHarmonics(harmonics, Math.PI / 2) ?? [];
      const fitted = fitInputStokes({
        rows: angles.map((dialDeg, i) => ({ dialDeg, power: powers[i] ?? 0, sigma: 1e-3 })),
        direction: 1,
        offsetDeg: 0,
        retardanceDeg: 90,
        analyserDeg: 0,
        leak: 0,
        leftOut: [],
      });
      if (!fitted.ok) throw new Error(fitted.message);
      [a - c, 2 * c, 2 * d, -b].forEach((printed, i) => {
        const truth = [1, s1, s2, -s3R][i] ?? NaN;
        for (const value of [printed, closed[i] ?? NaN, fitted.stokes[i] ?? NaN])
          expect(
            deviations.note('S from A, B, C, D at N = 5, 6, 8, 12 (references 7)', Math.abs(value - truth)),
          ).toBeLessThan(1e-13);
      });
      expect(harmonics.cos2).toBeCloseTo(0, 13);
    }
  }
});

test('unknown light through a plate of any retardance, offset, direction, azimuth and leak comes back', () => {
  const dice = new Dice(3);
  for (let k = 0; k < 50; k += 1) {
    const [s1, s2, s3] = [dice.between(-0.5, 0.5), dice.between(-0.5, 0.5), dice.between(-0.5, 0.5)];
    const [retardanceDeg, offsetDeg, analyserDeg] = [
      dice.between(40, 140),
      dice.between(0, 180),
      dice.between(0, 180),
    ];
    const direction = dice.pick([1, -1] as const);
    const rows = readings(7, 17, 20).map((dialDeg) => {
      const row = rotatingPlateRow(
        direction * rad(dialDeg - offsetDeg),
        rad(retardanceDeg),
        rad(analyserDeg),
      );
      return { dialDeg, power: 3 * (row[0] + 0.98 * (row[1] * s1 + row[2] * s2 + row[3] * s3)), sigma: null };
    });
    const found = fitInputStokes({
      rows,
      direction,
      offsetDeg,
      retardanceDeg,
      analyserDeg,
      leak: 0.01,
      leftOut: [],
    });
    if (!found.ok) throw new Error(found.message);
    [1, s1, s2, s3].forEach((value, i) => expect(found.stokes[i]).toBeCloseTo(3 * value, 11));
    expect(found.degreeOfPolarisation).toBeCloseTo(Math.hypot(s1, s2, s3), 11);
  }
});

// references.md 7 (computed there; the optimum also in Ambirajan & Look 1995 and Sabatke et al. 2000, from memory there).
test('polarimeters have the printed condition numbers: √3, 3.612, 1.936, 3.400', () => {
  const condition = (retardanceDeg: number, anglesDeg: readonly number[]) => {
    const rows = anglesDeg.map((theta) => rotatingPlateRow(theta * DEGREE, retardanceDeg * DEGREE, 0));
    const normal = [0, 1, 2, 3].map((i) =>
      [0, 1, 2, 3].map((j) => rows.reduce((sum, row) => sum + (row[i] ?? 0) * (row[j] ?? 0), 0)),
    );
    const values = [eigs(normal).values].flat().map(Number);
    return Math.sqrt(Math.max(...values) / Math.min(...values));
  };
  const sixteen = readings(0, 180 / 16, 16);
  const optimum = [15.118, -15.118, 51.693, -51.693];
  for (const [found, printed, slack] of [
    [condition(131.81, optimum), Math.sqrt(3), 2e-4],
    [condition(90, sixteen), 3.612, 5.1e-4],
    [condition(131.81, sixteen), 1.936, 5.1e-4],
    // The printed value goes with the angles of its section 12, ±15.1° and ±51.7°; those above give 3.401, in numpy too.
    [condition(90, [15.1, -15.1, 51.7, -51.7]), 3.4, 5.1e-4],
  ] as const) {
    const away = Math.abs(found - printed);
    expect(deviations.note('condition numbers of polarimeters (references 7)', away)).toBeLessThan(slack);
  }
});

/** Power along H behind a plate, by complex matrices: H passes the first component. */
function passed(light: Vector, retardanceDeg: number, thetaDeg: number): number {
  const [{ re, im }] = apply(plate(retardanceDeg * DEGREE, thetaDeg * DEGREE), light);
  return re * re + im * im;
}

// references.md 7, fact 1: D through a fast-x quarter-wave plate is L = (1, +i)/√2, which turns counter-clockwise.
test('counter-clockwise light tells the fast axis from the slow one, by matrices that share nothing with the fit', () => {
  const half = Math.SQRT1_2;
  const made = apply(plate(90 * DEGREE, 0), [complex(half), complex(half)]);
  const phase = Math.atan2(made[1].im, made[1].re) - Math.atan2(made[0].im, made[0].re);
  expect(phase).toBeCloseTo(Math.PI / 2, 12);
  const counterClockwise: Vector = [complex(half), complex(0, half)];
  for (const offsetDeg of [12, 102]) {
    const rows = readings(0, 10, 36).map((dialDeg) => ({
      dialDeg,
      power: passed(counterClockwise, 80, dialDeg - offsetDeg),
      sigma: 1e-3,
    }));
    const fit = fitRotatingScan({
      rows,
      direction: 1,
      input: [0, 0, 1],
      analyserDeg: 0,
      leak: null,
      before: null,
      nominal: null,
      leftOut: [],
    });
    if (!fit.ok) throw new Error(fit.message);
    expect(apartBy(180, fit.offset.offsetDeg, offsetDeg)).toBeLessThan(1e-6);
    expect(fit.settled.map(({ kind }) => kind)).toEqual(['axis', 'branch']);
  }
});

test('(θ0, δ) and (θ0 + 90°, 360° − δ) are one plate to any light, and (θ0 + 90°, δ) undoes it', () => {
  const dice = new Dice(4);
  for (let k = 0; k < 100; k += 1) {
    const [retardanceDeg, thetaDeg] = [dice.between(0, 360), dice.between(0, 180)];
    const light: Vector = [complex(dice.normal(), dice.normal()), complex(dice.normal(), dice.normal())];
    const one = passed(light, retardanceDeg, thetaDeg);
    expect(passed(light, 360 - retardanceDeg, thetaDeg + 90)).toBeCloseTo(one, 12);
    const through = apply(plate(retardanceDeg * DEGREE, thetaDeg * DEGREE), light);
    const back = apply(plate(retardanceDeg * DEGREE, (thetaDeg + 90) * DEGREE), through);
    back.forEach(({ re, im }, i) => {
      expect(re).toBeCloseTo(light[i]?.re ?? NaN, 12);
      expect(im).toBeCloseTo(light[i]?.im ?? NaN, 12);
    });
  }
});

test('a general least-squares package from npm finds the same offset, retardance and leak to 1e-8', () => {
  for (let seed = 0; seed < 20; seed += 1) {
    const dice = new Dice(seed);
    const truth = { ...PLAIN, offsetDeg: dice.between(5, 85), retardanceDeg: dice.between(40, 150) };
    const dialsDeg = readings(dice.between(0, 30), dice.between(2, 14), 40);
    const sigma = 2e-3;
    const rows = cleanPowers(truth, dialsDeg).map(({ dialDeg, crossed, parallel }) => ({
      dialDeg,
      crossed: { power: crossed + sigma * dice.normal(), sigma },
      parallel: { power: parallel + sigma * dice.normal(), sigma },
    }));
    const fit = fitLinearScan(scanOf(rows));
    if (!fit.ok || fit.retardance === null) throw new Error('refused');
    // Weights by hand, in units of σ: the package then has nothing to weigh.
    const inSigmas = fit.rows.map(({ value, sigma: own }, k) => ({
      value: value / own,
      own,
      x: (dialsDeg[k] ?? 0) * DEGREE,
    }));
    const { parameterValues } = levenbergMarquardt(
      { x: inSigmas.map((_, k) => k), y: inSigmas.map(({ value }) => value) },
      ([x0 = 0, delta = 0, b = 0]) =>
        (k) => {
          const { x, own } = inSigmas[k] ?? { x: 0, own: 1 };
          return (b + (1 - 2 * b) * (Math.sin(delta / 2) * Math.sin(2 * (x - x0))) ** 2) / own;
        },
      {
        initialValues: [(truth.offsetDeg + 3) * DEGREE, (truth.retardanceDeg - 5) * DEGREE, 0.01],
        damping: 1e-2,
        gradientDifference: 1e-5,
        centralDifference: true,
        maxIterations: 60,
        errorTolerance: 1e-24,
      },
    );
    const ours = [
      fit.offset.offsetDeg * DEGREE,
      fit.retardance.retardanceDeg * DEGREE,
      fit.parameters.leak.value,
    ];
    ours.forEach((value, i) => {
      const away = Math.abs(value - (parameterValues[i] ?? NaN));
      expect(deviations.note('ml-levenberg-marquardt: offset, retardance (rad), leak', away)).toBeLessThan(
        1e-8,
      );
    });
  }
});

// Guide to the expression of uncertainty in measurement (JCGM 100:2008), table G.2; values from memory, confirmed with scipy.
test('estimated σ are taken for as much as Student’s law allows, or a little less: 95.45 % and 99.73 %', () => {
  const table = [
    [3, 3.31, 9.22],
    [5, 2.65, 5.51],
    [10, 2.28, 3.96],
    [20, 2.13, 3.42],
    [50, 2.05, 3.16],
  ] as const;
  for (const [freedom, two, three] of table) {
    for (const [sigmas, printed] of [
      [2, two],
      [3, three],
    ] as const) {
      const over = asNormalSigmas(printed, freedom) - sigmas;
      deviations.note('Student’s t as normal σ (GUM, table G.2)', Math.abs(over));
      expect(over).toBeGreaterThan(-0.06);
      // Half a unit of the last printed digit.
      expect(over).toBeLessThan(0.005);
      expect(asStudentSigmas(asNormalSigmas(printed, freedom), freedom)).toBeCloseTo(printed, 9);
    }
  }
});
