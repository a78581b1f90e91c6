import { afterAll, expect, test } from 'vitest';
import {
  type Budget,
  type BudgetProblem,
  errorBudget,
  expectedInfidelity,
  type UncertainPlate,
} from '../../shared/optics/budget';
import { stackQuaternion } from '../../shared/optics/retarder';
import { radians } from '../../shared/optics/units';
import { Deviations } from './deviations';

/*
 * Collected references, sections 5 and 10: average gate fidelity of a turn by ε (Horodecki³, Phys. Rev. A 60, 1888 (1999);
 * Nielsen, Phys. Lett. A 303, 249 (2002); values by qutip's average_gate_fidelity), the budget of one plate, and what common
 * retardance tolerances cost (computed there, independently of this library).
 */
const deviations = new Deviations();
afterAll(() => deviations.print('Error budget against published and collected values, worst deviation'));

const DEGREE = Math.PI / 180;
const EXACT = radians(0);

function plate(retardanceDeg: number, sigmas: Partial<UncertainPlate>): UncertainPlate {
  return {
    retardanceRad: radians(retardanceDeg * DEGREE),
    fastAxisRad: radians(0.37),
    sigmaRetardanceRad: EXACT,
    sigmaOffsetRad: EXACT,
    dialResolutionRad: EXACT,
    dialRepeatabilityRad: EXACT,
    ...sigmas,
  };
}

/** A plate that is to do what it does when nothing is off. */
function applied(one: UncertainPlate): BudgetProblem {
  const goal = { kind: 'apply', target: stackQuaternion([one]) } as const;
  return { goal, plates: [one], sigmaPolariserRad: EXACT, extinction: null, shared: [] };
}

function budgetOf(one: UncertainPlate): Budget {
  return errorBudget(applied(one));
}

test('the average fidelity of a turn that is off by ε = 0.1, 0.5 and 1', () => {
  for (const [epsilon, fidelity] of [
    [0.1, 0.9983347217593419],
    [0.5, 0.959194187296791],
    [1, 0.8467674352893799],
  ] as const) {
    const wanted = plate(140, {});
    const off = plate(140 + epsilon / DEGREE, {});
    const found = 1 - expectedInfidelity({ ...applied(wanted), plates: [off] });
    expect(deviations.note('5: F_avg of a turn by ε (qutip)', Math.abs(found - fidelity))).toBeLessThan(
      1e-15,
    );
  }
});

test('one plate: an error Δ of its retardance is a turn by Δ, an error η of its angle one by 4 sin(δ/2) η', () => {
  for (const [retardanceDeg, sigmaDeg, infidelity, digits] of [
    [180, 0.1, 8.12e-6, 5e-9],
    [180, 1, 8.12e-4, 5e-7],
    [90, 1, 4.06e-4, 5e-7],
  ] as const) {
    const found = budgetOf(plate(retardanceDeg, { sigmaOffsetRad: radians(sigmaDeg * DEGREE) }));
    const off = Math.abs(found.expectedInfidelity - infidelity);
    expect(deviations.note('5: 1 − F_avg of an angle error, three digits printed', off)).toBeLessThan(digits);
    const formula = (4 * Math.sin((retardanceDeg * DEGREE) / 2) * sigmaDeg * DEGREE) ** 2 / 6;
    expect(
      deviations.note('5: ε = 4 sin(δ/2) η', Math.abs(found.expectedInfidelity / formula - 1)),
    ).toBeLessThan(1e-14);
    // Exactly, without first order: F_e = (1 − 2 sin²(δ/2) sin² η)² is that of the plate turned by η.
    const wanted = plate(retardanceDeg, {});
    const turned = { ...wanted, fastAxisRad: radians(wanted.fastAxisRad + sigmaDeg * DEGREE) };
    const exact = expectedInfidelity({ ...applied(wanted), plates: [turned] });
    const sines = Math.sin((retardanceDeg * DEGREE) / 2) * Math.sin(sigmaDeg * DEGREE);
    const processFidelity = (1 - 2 * sines * sines) ** 2;
    expect(
      deviations.note('5: F_e of an angle error', Math.abs(1 - 1.5 * exact - processFidelity)),
    ).toBeLessThan(1e-15);
  }
  for (const delta of [0.01, 0.1]) {
    const found = budgetOf(plate(90, { sigmaRetardanceRad: radians(delta) })).expectedInfidelity;
    expect(
      deviations.note('5: 1 − F_avg ≈ ε²/6 of a retardance error', Math.abs(found / (delta ** 2 / 6) - 1)),
    ).toBeLessThan(1e-14);
  }
});

test('what a retardance off by λ/300, λ/500 and λ/100 costs one plate', () => {
  for (const [part, process, average] of [
    [300, 1.097e-4, 7.31e-5],
    [500, 3.95e-5, 2.63e-5],
    [100, 9.87e-4, 6.58e-4],
  ] as const) {
    const found = expectedInfidelity({ ...applied(plate(180, {})), plates: [plate(180 + 360 / part, {})] });
    // Half a unit of the last digit printed.
    const source = '10: λ/300, λ/500, λ/100 (relative; three or four digits printed)';
    expect(deviations.note(source, Math.abs(found / average - 1))).toBeLessThan(2e-3);
    expect(deviations.note(source, Math.abs((1.5 * found) / process - 1))).toBeLessThan(1e-3);
    const sigmaRetardanceRad = radians((360 / part) * DEGREE);
    const firstOrder = budgetOf(plate(180, { sigmaRetardanceRad })).expectedInfidelity;
    expect(deviations.note(source, Math.abs(firstOrder / average - 1))).toBeLessThan(2e-3);
  }
});
