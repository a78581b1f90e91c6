import * as math from 'mathjs';
import { expect, test } from 'vitest';
import { type BudgetProblem, errorBudget } from '../../shared/optics/budget';
import { type MonteCarloSummary, monteCarlo, startMonteCarlo } from '../../shared/optics/monte-carlo';
import { InfidelityDraws } from '../../shared/optics/monte-carlo-draws';
import { selectRank } from '../../shared/optics/order-statistic';
import { radians } from '../../shared/optics/units';
import { randomProblem } from './budget-problems';
import { complex, infidelity, randomStream, stack, stokesOf, times } from './independent';

function drawn(problem: BudgetProblem, seed: number, draws: number): Float64Array {
  const values = new Float64Array(draws);
  new InfidelityDraws(problem, seed).fill(values, 0, draws);
  return values;
}

test.each(['prepare', 'apply'] as const)(
  'where σ are small, first order and Monte Carlo agree within four standard errors: goals of kind %s, one to six plates',
  (kind) => {
    const random = randomStream(21);
    const deviations: number[] = [];
    for (let round = 0; round < 72; round += 1) {
      const problem = randomProblem(random, { kind, plateCount: 1 + (round % 6), sigmaDeg: 0.3 });
      const { mean, standardError } = monteCarlo(problem, { draws: 20_000, seed: round });
      const off = (mean - errorBudget(problem).expectedInfidelity) / standardError;
      expect(Math.abs(off), `round ${round}`).toBeLessThan(4);
      deviations.push(off);
    }
    // And they scatter as they should: a bias, or an error bar too wide, would show in their mean or their size.
    const size = Math.sqrt(deviations.reduce((sum, off) => sum + off * off, 0) / deviations.length);
    expect(size).toBeGreaterThan(0.7);
    expect(size).toBeLessThan(1.3);
    expect(Math.abs(deviations.reduce((sum, off) => sum + off, 0))).toBeLessThan(
      4 * Math.sqrt(deviations.length),
    );
  },
);

test.each(['prepare', 'apply'] as const)(
  'the 5 % and 95 % points of first order are those of the draws: goals of kind %s, also beside their target',
  (kind) => {
    const random = randomStream(22);
    for (let round = 0; round < 16; round += 1) {
      const exact = randomProblem(random, { kind, plateCount: 1 + (round % 6), sigmaDeg: 0.2 });
      // All errors normal, as first order takes them: a dial's step is even, which its percentiles would show.
      const plates = exact.plates.map((plate) => ({
        ...plate,
        dialResolutionRad: radians(0),
        fastAxisRad: radians(plate.fastAxisRad + (round % 2 === 0 ? 0 : 0.002)),
      }));
      const problem = { ...exact, plates };
      const budget = errorBudget(problem);
      const values = drawn(problem, round, 40_000);
      const below = (limit: number): number =>
        values.filter((value) => value <= limit).length / values.length;
      const standardError = Math.sqrt((0.05 * 0.95) / values.length);
      // Four standard errors, and what the plane's quantile (1e-2 of the low end beside a target) and second order add.
      expect(Math.abs(below(budget.expectedLow) - 0.05)).toBeLessThan(4 * standardError + 0.001);
      expect(Math.abs(below(budget.expectedHigh) - 0.95)).toBeLessThan(4 * standardError + 0.001);
    }
  },
);

test('each draw is exact, however large: what comes out is what the plates by the book make of the drawn parameters', () => {
  // One parameter at a time, as large as it likes, at a place where 1 − F tells it back.
  const none = radians(0);
  const plate = {
    retardanceRad: radians(2.1),
    fastAxisRad: radians(0.4),
    sigmaRetardanceRad: radians(0.8),
    sigmaOffsetRad: none,
    dialResolutionRad: none,
    dialRepeatabilityRad: none,
  };
  const input = [complex(0.8), times(complex(0.6), complex(0.6, 0.8))] as const;
  const target = [complex(0.6), complex(0, 0.8)] as const;
  const goal = { kind: 'prepare', input: stokesOf(input), target: stokesOf(target) } as const;
  const problem = { goal, plates: [plate], sigmaPolariserRad: none, extinction: null, shared: [] };
  const values = drawn(problem, 5, 300);
  // The same draw with a σ a million times smaller gives the normal numbers back, to first order.
  const tiny = 0.8e-6;
  const small = drawn({ ...problem, plates: [{ ...plate, sigmaRetardanceRad: radians(tiny) }] }, 5, 300);
  const made = (retardanceRad: number): number => {
    const matrix = stack([retardanceRad], [0.4]);
    const [[m00, m01], [m10, m11]] = matrix;
    const add = (a: { re: number; im: number }, b: { re: number; im: number }) =>
      complex(a.re + b.re, a.im + b.im);
    const state = [
      add(times(m00, input[0]), times(m01, input[1])),
      add(times(m10, input[0]), times(m11, input[1])),
    ] as const;
    return infidelity(target, state);
  };
  const slope = (made(2.1 + 1e-5) - made(2.1 - 1e-5)) / 2e-5;
  const curvature = (made(2.1 + 1e-4) - 2 * made(2.1) + made(2.1 - 1e-4)) / 1e-8;
  values.forEach((value, k) => {
    const first = ((small[k] ?? NaN) - made(2.1)) / slope;
    const normal = (first - (curvature * first * first) / (2 * slope)) / tiny;
    expect(Math.abs(value - made(2.1 + 0.8 * normal))).toBeLessThan(1e-7);
  });
});

test('one parameter alone: the mean over an even step and over a normal error are those of the closed form', () => {
  // A half-wave plate off by η: 1 − F = sin² 2η, whose mean is (1 − e^{−8σ²})/2 and (1 − sinc 2s)/2 over a step s.
  const base = randomProblem(randomStream(1), { kind: 'prepare', plateCount: 1, sigmaDeg: 0 });
  const none = radians(0);
  const plate = {
    retardanceRad: radians(Math.PI),
    fastAxisRad: none,
    sigmaRetardanceRad: none,
    sigmaOffsetRad: none,
    dialResolutionRad: none,
    dialRepeatabilityRad: none,
  };
  const problem = (changed: Partial<typeof plate>): BudgetProblem => ({
    ...base,
    goal: { kind: 'prepare', input: [1, 0, 0], target: [1, 0, 0] },
    plates: [{ ...plate, ...changed }],
    extinction: null,
    shared: [],
  });
  for (const size of [0.01, 0.1, 0.4, 1]) {
    const normal = (1 - Math.exp(-8 * size * size)) / 2;
    for (const changed of [{ sigmaOffsetRad: radians(size) }, { dialRepeatabilityRad: radians(size) }]) {
      const { mean, standardError } = monteCarlo(problem(changed), { draws: 50_000, seed: 3 });
      expect(Math.abs(mean - normal)).toBeLessThan(4 * standardError);
    }
    const even = (1 - Math.sin(2 * size) / (2 * size)) / 2;
    const step = monteCarlo(problem({ dialResolutionRad: radians(size) }), { draws: 50_000, seed: 3 });
    expect(Math.abs(step.mean - even)).toBeLessThan(4 * step.standardError);
    expect(step.largest).toBeLessThanOrEqual(size < 1.5 ? Math.sin(Math.min(size, Math.PI / 2)) ** 2 : 1);
  }
});

test('the mean, its standard error and the largest draw are those that mathjs works out', () => {
  const problem = randomProblem(randomStream(30), { kind: 'apply', plateCount: 3, sigmaDeg: 1 });
  const values = [...drawn(problem, 12, 5000)];
  const summary = monteCarlo(problem, { draws: 5000, seed: 12 });
  expect(Math.abs(summary.mean / math.mean(values) - 1)).toBeLessThan(1e-13);
  const deviation = Number(math.std(values));
  expect(Math.abs(summary.standardError / (deviation / Math.sqrt(5000)) - 1)).toBeLessThan(1e-12);
  expect(summary.largest).toBe(math.max(values));
  // The mean of squares that first order rests on: Σ (1 − F) over the draws is ⅔ of the mean square of the miss.
  const misses = math.map(values, (value) => Math.sqrt(1.5 * value));
  expect(Math.abs((2 / 3) * math.mean(math.dotMultiply(misses, misses)) - summary.mean)).toBeLessThan(1e-15);
});

test('percentiles are draws of the right rank, whatever the number of draws', () => {
  const problem = randomProblem(randomStream(31), { kind: 'prepare', plateCount: 2, sigmaDeg: 1 });
  for (const draws of [1, 2, 3, 19, 20, 21, 40, 100, 999, 1000, 1001, 12_345]) {
    const { low, median, high, largest } = monteCarlo(problem, { draws, seed: 4 });
    const sorted = [...drawn(problem, 4, draws)].sort((a, b) => a - b);
    const ranked = (percent: number) => sorted[Math.ceil((percent * draws) / 100) - 1];
    expect([low, median, high, largest]).toEqual([ranked(5), ranked(50), ranked(95), sorted.at(-1)]);
  }
});

test('the draws within a limit are counted one by one, not by bins', () => {
  const problem = randomProblem(randomStream(44), { kind: 'prepare', plateCount: 3, sigmaDeg: 0.5 });
  const values = drawn(problem, 3, 5000);
  const run = startMonteCarlo(problem, 3);
  run.advance(5000);
  for (const limit of [0, values[17] ?? NaN, 3e-5, 1e-4, 1]) {
    expect(run.countWithin(limit)).toBe(values.filter((value) => value <= limit).length);
  }
});

test('selecting a rank agrees with sorting, also with many equal values', () => {
  const random = randomStream(9);
  for (let round = 0; round < 300; round += 1) {
    const kinds = 1 + Math.floor(random() * (round % 3 === 0 ? 3 : 1000));
    const values = Float64Array.from({ length: 1 + Math.floor(random() * 60) }, () =>
      Math.floor(random() * kinds),
    );
    const rank = Math.floor(random() * values.length);
    const sorted = [...values].sort((a, b) => a - b);
    expect(selectRank(values, rank)).toBe(sorted[rank]);
    expect([...values].sort((a, b) => a - b)).toEqual(sorted);
  }
});

test('the same seed gives the same bits however the run is cut up, and another seed other ones', () => {
  for (const kind of ['prepare', 'apply'] as const) {
    const problem = randomProblem(randomStream(33), { kind, plateCount: 3, sigmaDeg: 1 });
    const whole = monteCarlo(problem, { draws: 5000, seed: 99 });
    const pieces = startMonteCarlo(problem, 99);
    for (const piece of [1, 0, 255, 256, 257, 1000, 3231]) pieces.advance(piece);
    expect(pieces.draws).toBe(5000);
    expect(pieces.summary()).toEqual(whole);
    expect(monteCarlo(problem, { draws: 5000, seed: 99 })).toEqual(whole);
    expect(monteCarlo(problem, { draws: 5000, seed: 100 }).mean).not.toBe(whole.mean);
    expect(monteCarlo(problem, { draws: 5000, seed: 99 + 2 ** 32 }).mean).not.toBe(whole.mean);
  }
});

test('stopped half-way a run has a valid summary of what was drawn, and can go on from there', () => {
  const problem = randomProblem(randomStream(34), { kind: 'apply', plateCount: 2, sigmaDeg: 1 });
  const run = startMonteCarlo(problem, 1);
  expect(run.summary()).toBeNull();
  run.advance(700);
  expect(run.summary()).toEqual(monteCarlo(problem, { draws: 700, seed: 1 }));
  // A summary rearranges nothing of the run's own.
  run.advance(301);
  expect(run.summary()).toEqual(monteCarlo(problem, { draws: 1001, seed: 1 }));
});

function counted({ histogram }: MonteCarloSummary): number {
  return histogram.below + histogram.counts.reduce((sum, count) => sum + count, 0);
}

test('the histogram counts every draw in its place between fixed edges, ten for each decade', () => {
  for (const sigmaDeg of [0, 1e-5, 0.3, 60]) {
    const problem = randomProblem(randomStream(35), { kind: 'prepare', plateCount: 3, sigmaDeg });
    const summary = monteCarlo(problem, { draws: 3000, seed: 2 });
    const { edges, counts, below } = summary.histogram;
    expect(counted(summary)).toBe(3000);
    expect([edges.length, edges[0], edges[60], edges.at(-1)]).toEqual([121, 1e-12, 1e-6, 1]);
    edges.forEach((edge, k) => expect(Math.abs(Math.log10(edge) - (k / 10 - 12))).toBeLessThan(1e-14));
    const values = drawn(problem, 2, 3000);
    counts.forEach((count, k) => {
      const [from = NaN, to = NaN] = [edges[k], edges[k + 1]];
      const inside = values.filter((v) => v >= from && (v < to || (k === 119 && v === 1)));
      expect(inside).toHaveLength(count);
    });
    expect(values.filter((value) => value < 1e-12)).toHaveLength(below);
  }
});

test('an angle that runs away from first order still gives a fidelity', () => {
  for (const kind of ['prepare', 'apply'] as const) {
    const problem = randomProblem(randomStream(36), { kind, plateCount: 4, sigmaDeg: 400 });
    const { largest, mean } = monteCarlo(problem, { draws: 20_000, seed: 5 });
    expect(largest).toBeLessThanOrEqual(kind === 'prepare' ? 1 : 2 / 3);
    // Every state, every turn as likely as any other: ½, and ⅔ · ¾ for the mean of sin²(ε/2) over all turns.
    expect(Math.abs(mean - 0.5)).toBeLessThan(0.02);
  }
});

test('what can’t be drawn is refused', () => {
  const problem = randomProblem(randomStream(37), { kind: 'prepare', plateCount: 2, sigmaDeg: 1 });
  const negative = problem.plates.map((plate) => ({ ...plate, dialRepeatabilityRad: radians(-1) }));
  expect(() => startMonteCarlo({ ...problem, plates: negative }, 1)).toThrow(RangeError);
  expect(() => startMonteCarlo({ ...problem, extinction: 2 }, 1)).toThrow(RangeError);
  expect(() => startMonteCarlo({ ...problem, sigmaPolariserRad: radians(NaN) }, 1)).toThrow(RangeError);
  for (const seed of [-1, 0.5, NaN, 2 ** 53])
    expect(() => startMonteCarlo(problem, seed)).toThrow(RangeError);
  for (const draws of [-1, 0.5, NaN])
    expect(() => startMonteCarlo(problem, 1).advance(draws)).toThrow(RangeError);
  expect(() => monteCarlo(problem, { draws: 0, seed: 1 })).toThrow(RangeError);
});
