import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  type MountMotion,
  planOrder,
  planSequence,
  planSequenceSteps,
  type SequenceProblem,
  TooManyStationsError,
  UnreachableRowError,
} from '../../shared/optics/sequence';
import { cheapestByHand, costOf, cpuSeconds, problems, random, ring } from './sequence-problems';

describe('the cheapest way in the given order', () => {
  it('costs exactly what brute force over all solutions and readings finds', () => {
    let compared = 0;
    fc.assert(
      fc.property(problems(4, 3), (problem) => {
        const expected = cheapestByHand(problem);
        if (expected === Infinity) {
          expect(() => planSequence(problem)).toThrow(UnreachableRowError);
          return;
        }
        compared += 1;
        expect(costOf(problem, planSequence(problem))).toBeCloseTo(expected, 7);
      }),
      { seed: 6, numRuns: 150 },
    );
    expect(compared).toBeGreaterThan(100);
  });

  it('adds up: its steps are the moves between the dials it gives, and never dearer than the first solutions', () => {
    fc.assert(
      fc.property(problems(12, 4), (problem) => {
        const plan = planSequence({
          ...problem,
          mounts: problem.mounts.map((m) => ({ ...m, rangeDeg: null })),
        });
        expect(plan.dialsDeg).toHaveLength(problem.rows.length);
        const total = plan.perStep.reduce((sum, { travelDeg }) => sum + travelDeg, 0);
        expect(plan.travelDeg).toBeCloseTo(total, 9);
        plan.perStep.forEach(({ perMount }, k) => {
          expect(perMount.map(({ toDeg }) => toDeg)).toEqual(plan.dialsDeg[k]);
          if (k > 0) expect(perMount.map(({ fromDeg }) => fromDeg)).toEqual(plan.dialsDeg[k - 1]);
        });
        const first = { travelDeg: plan.firstTravelDeg, seconds: plan.firstSeconds };
        expect(costOf(problem, plan)).toBeLessThanOrEqual(costOf(problem, first) + 1e-7);
      }),
      { seed: 7 },
    );
  });

  it('keeps what a person holds, however dear', () => {
    const rows = [
      { held: null, branches: [[0], [40]] },
      { held: 1, branches: [[0], [90]] },
    ];
    const plan = planSequence({
      mounts: [ring],
      rows,
      startDialsDeg: [0],
      cost: 'travel',
      moves: 'together',
    });
    expect(plan.choices[1]).toBe(1);
    expect(plan.travelDeg).toBe(90);
  });

  it('uses a reading half a turn on where that is nearer', () => {
    const rows = [
      { held: null, branches: [[170]] },
      { held: null, branches: [[5]] },
    ];
    const plan = planSequence({
      mounts: [ring],
      rows,
      startDialsDeg: [170],
      cost: 'travel',
      moves: 'together',
    });
    expect(plan.dialsDeg).toEqual([[170], [185]]);
    expect(plan.travelDeg).toBe(15);
    expect(plan.firstTravelDeg).toBe(165);
  });

  it('counts on a stage that counts on, and never across its ends', () => {
    const stage: MountMotion = { ...ring, rangeDeg: [0, 540] };
    const rows = [170, 5].map((axis) => ({ held: null, branches: [[axis]] }));
    const problem: SequenceProblem = {
      mounts: [stage],
      rows,
      startDialsDeg: [350],
      cost: 'travel',
      moves: 'together',
    };
    expect(planSequence(problem).dialsDeg).toEqual([[350], [365]]);
    const short = { ...problem, mounts: [{ ...stage, rangeDeg: [0, 360] as const }] };
    expect(planSequence(short).travelDeg).toBe(165);
  });

  it('takes the longest mount when all move together, their sum when one moves after the other', () => {
    const rows = [{ held: null, branches: [[20, 50]] }];
    const base: SequenceProblem = {
      mounts: [ring, ring],
      rows,
      startDialsDeg: [0, 0],
      cost: 'time',
      moves: 'together',
    };
    expect(planSequence(base).seconds).toBe(5);
    expect(planSequence({ ...base, moves: 'one-by-one' }).seconds).toBe(7);
  });

  it('breaks ties in time by less travel', () => {
    // Either solution takes 9 s for the first mount; the second solution leaves the second mount alone.
    const rows = [
      {
        held: null,
        branches: [
          [90, 60],
          [90, 0],
        ],
      },
    ];
    const plan = planSequence({
      mounts: [ring, ring],
      rows,
      startDialsDeg: [0, 0],
      cost: 'time',
      moves: 'together',
    });
    expect(plan.choices).toEqual([1]);
    expect(plan.travelDeg).toBe(90);
  });

  it('prefers the solution further up the list where both cost the same', () => {
    const rows = [{ held: null, branches: [[30], [150]] }];
    const problem: SequenceProblem = {
      mounts: [ring],
      rows,
      startDialsDeg: [0],
      cost: 'travel',
      moves: 'together',
    };
    expect(planSequence(problem).choices).toEqual([0]);
  });

  it('has no seconds for a mount without a stated speed, and refuses to minimise them', () => {
    const byHand: MountMotion = { ...ring, speedDegPerS: null };
    const problem = random(3, 1, { mounts: [ring, byHand] });
    expect(planSequence(problem)).toMatchObject({ seconds: null, firstSeconds: null });
    expect(() => planSequence({ ...problem, cost: 'time' })).toThrow(/mount 2 has no stated speed/u);
  });

  it('names the target and the mount that can’t be dialled', () => {
    const short: MountMotion = { ...ring, rangeDeg: [0, 100] };
    const rows = [
      { held: null, branches: [[10]] },
      { held: null, branches: [[150]] },
    ];
    const attempt = () =>
      planSequence({ mounts: [short], rows, startDialsDeg: null, cost: 'travel', moves: 'together' });
    expect(attempt).toThrow(UnreachableRowError);
    expect(attempt).toThrow(/target 2 .* mount 1/u);
  });

  it('names the target that can be dialled in more ways than it looks through', () => {
    const stage: MountMotion = { ...ring, rangeDeg: [0, 1440] };
    const mounts = Array.from({ length: 6 }, () => stage);
    const rows = [
      { held: null, branches: [[10, 20, 30, 40, 50, 60]] },
      { held: null, branches: [[10, 20, 30, 40, 50, 60]] },
    ];
    const attempt = () =>
      planSequence({ mounts, rows, startDialsDeg: null, cost: 'travel', moves: 'together' });
    expect(attempt).toThrow(TooManyStationsError);
    expect(attempt).toThrow(/target 1 .* 8192/u);
  });

  it('is nothing for no targets', () => {
    expect(planSequence(random(0, 1))).toMatchObject({ choices: [], travelDeg: 0, seconds: 0, perStep: [] });
    expect(planOrder(random(0, 1))).toMatchObject({ order: [], boundDeg: 0 });
  });

  it('plans 200 targets of four solutions and three plates in well under a second, a row at a time', () => {
    const problem = random(200, 3, { cost: 'time', moves: 'together' });
    expect(cpuSeconds(() => planSequence(problem))).toBeLessThan(1);
    const done = [...planSequenceSteps(problem)].map(({ rowsDone }) => rowsDone);
    // Every row is laid out before the first is done.
    expect(done).toEqual([
      ...Array.from({ length: 200 }, () => 0),
      ...Array.from({ length: 200 }, (_, k) => k + 1),
    ]);
  });
});
