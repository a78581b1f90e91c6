import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { planOrder, planOrderSteps, planSequence, type SequenceProblem } from '../../shared/optics/sequence';
import {
  cheapestByHand,
  costOf,
  cpuSeconds,
  permutations,
  problems,
  random,
  ring,
} from './sequence-problems';

describe('another order', () => {
  it('is the best of all permutations for a short list', () => {
    let compared = 0;
    fc.assert(
      fc.property(problems(4, 2), (problem) => {
        const costs = permutations(problem.rows.length).map((order) =>
          cheapestByHand({ ...problem, rows: order.flatMap((k) => problem.rows[k] ?? []) }),
        );
        if (costs.includes(Infinity)) return;
        compared += 1;
        const found = planOrder(problem);
        expect(found.method).toBe('exact');
        expect(costOf(problem, found.plan)).toBeCloseTo(Math.min(...costs), 7);
        expect([...found.order].sort((a, b) => a - b)).toEqual(problem.rows.map((_, k) => k));
      }),
      { seed: 8, numRuns: 40 },
    );
    expect(compared).toBeGreaterThan(25);
  });

  it('for a longer list lies between its bound and the present order, near the exact one where that is known', () => {
    let excess = 0;
    for (let seed = 0; seed < 4; seed += 1) {
      const change = { cost: seed % 2 === 0 ? 'travel' : 'time', moves: 'together' } as const;
      const problem = random(6, 40 + seed, seed < 2 ? change : { ...change, startDialsDeg: null });
      const exact = planOrder(problem);
      const found = planOrder(problem, { exactUpTo: 0 });
      const [best, good] = [costOf(problem, exact.plan), costOf(problem, found.plan)];
      const bound = found.boundDeg ?? found.boundSeconds ?? NaN;
      expect(found.method).toBe('heuristic');
      expect(bound).toBeGreaterThan(0);
      expect(bound).toBeLessThanOrEqual(best + 1e-9);
      expect(good).toBeGreaterThanOrEqual(best - 1e-9);
      expect(good).toBeLessThanOrEqual(costOf(problem, found.present) + 1e-9);
      excess = Math.max(excess, good / best - 1);
    }
    expect(excess).toBeLessThan(0.05);
  });

  it('leaves the present order alone when it is the best', () => {
    const rows = [10, 20, 30, 40].map((axis) => ({ held: null, branches: [[axis]] }));
    const problem: SequenceProblem = {
      mounts: [ring],
      rows,
      startDialsDeg: [0],
      cost: 'travel',
      moves: 'together',
    };
    expect(planOrder(problem)).toMatchObject({ order: [0, 1, 2, 3], savedDeg: 0, boundDeg: 40 });
    expect(planOrder(problem, { exactUpTo: 0 })).toMatchObject({
      order: [0, 1, 2, 3],
      savedDeg: 0,
      boundDeg: 40,
    });
  });

  it('gives the same answer twice and the saving it claims', () => {
    const problem = random(11, 9, { mounts: [ring, { ...ring, backlashDeg: 2, approach: 'rising' }] });
    const found = planOrder(problem);
    expect(planOrder(problem)).toEqual(found);
    const again = planSequence({ ...problem, rows: found.order.flatMap((k) => problem.rows[k] ?? []) });
    expect(again).toEqual(found.plan);
    expect(found.savedDeg).toBeCloseTo(planSequence(problem).travelDeg - again.travelDeg, 9);
    expect(found.savedDeg).toBeGreaterThan(0);
  });

  it('orders 200 targets of four solutions and three plates in a few seconds, in steps that can be left', () => {
    const problem = random(200, 11);
    let found: ReturnType<typeof planOrder> | null = null;
    const seconds = cpuSeconds(() => (found = planOrder(problem)));
    expect(found).toMatchObject({ method: 'heuristic' });
    expect(seconds).toBeLessThan(8);
    const steps = planOrderSteps(random(20, 12));
    const first = steps.next();
    expect(first).toMatchObject({ done: false, value: { phase: 'search' } });
  });
});
