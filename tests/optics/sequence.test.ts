import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  type MountMotion,
  mountMove,
  planOrder,
  planOrderSteps,
  planSequence,
  planSequenceSteps,
  readingsFor,
  type SequenceProblem,
  TooManyStationsError,
  UnreachableRowError,
} from '../../shared/optics/sequence';
import { fastAxisFromDial, degrees } from '../../shared/optics';
import { randomStream } from './independent';

const ring: MountMotion = {
  direction: 1,
  offsetDeg: 0,
  resolutionDeg: 0.1,
  rangeDeg: null,
  speedDegPerS: 10,
  backlashDeg: 0,
  approach: 'either',
};

/*
 * The rule of a move, written a second time and without looking: try both ways round a ring, one way on a stage, and
 * add twice the play where the last stretch would end in the wrong sense.
 */
function travelByHand(mount: MountMotion, from: number, to: number): number {
  const ways =
    mount.rangeDeg === null ? [-720, -360, 0, 360, 720].map((turn) => to - from + turn) : [to - from];
  return Math.min(
    ...ways.map((way) => {
      if (Math.abs(way) < 1e-9) return 0;
      const wrong = way > 0 ? 'falling' : 'rising';
      return Math.abs(way) + (mount.approach === wrong ? 2 * mount.backlashDeg : 0);
    }),
  );
}

function stepCost({ mounts, cost, moves }: SequenceProblem, from: readonly number[], to: readonly number[]) {
  const travels = mounts.map((mount, k) => travelByHand(mount, from[k] ?? NaN, to[k] ?? NaN));
  if (cost === 'travel') return travels.reduce((sum, travel) => sum + travel, 0);
  const times = travels.map((travel, k) => travel / (mounts[k]?.speedDegPerS ?? NaN));
  return moves === 'together' ? Math.max(...times) : times.reduce((sum, time) => sum + time, 0);
}

/** Every reading of a mount for a fast axis, found by trying each half turn and rounding. */
function readingsByHand(mount: MountMotion, fastAxisDeg: number): number[] {
  const found: number[] = [];
  for (let turn = -8; turn <= 8; turn += 1) {
    const exact = mount.offsetDeg + mount.direction * fastAxisDeg + 180 * turn;
    if (mount.rangeDeg === null) {
      if (exact >= 0 && exact < 360) found.push(exact);
      continue;
    }
    const [min, max] = mount.rangeDeg;
    const rounded = Math.round(exact / mount.resolutionDeg) * mount.resolutionDeg;
    const low = mount.approach === 'rising' ? min + mount.backlashDeg : min;
    const high = mount.approach === 'falling' ? max - mount.backlashDeg : max;
    if (rounded >= low - 1e-9 && rounded <= high + 1e-9) found.push(rounded);
  }
  return mount.rangeDeg === null
    ? found.map((exact) => Math.round(exact / mount.resolutionDeg) * mount.resolutionDeg)
    : found;
}

/** All ways through the rows in their order, by brute force. */
function cheapestByHand(problem: SequenceProblem): number {
  let ways: { readonly at: readonly number[] | null; readonly cost: number }[] = [
    { at: problem.startDialsDeg, cost: 0 },
  ];
  for (const { branches, held } of problem.rows) {
    const stations = branches
      .filter((_, k) => held === null || k === held)
      .flatMap((axes) =>
        problem.mounts.reduce<number[][]>(
          (heads, mount, k) =>
            heads.flatMap((head) =>
              readingsByHand(mount, axes[k] ?? NaN).map((reading) => [...head, reading]),
            ),
          [[]],
        ),
      );
    ways = ways.flatMap(({ at, cost }) =>
      stations.map((to) => ({ at: to, cost: at === null ? cost : cost + stepCost(problem, at, to) })),
    );
  }
  return Math.min(...ways.map(({ cost }) => cost));
}

function permutations(count: number): number[][] {
  if (count === 0) return [[]];
  return permutations(count - 1).flatMap((rest) =>
    Array.from({ length: count }, (_, at) => [...rest.slice(0, at), count - 1, ...rest.slice(at)]),
  );
}

const mountMotion = fc.record({
  direction: fc.constantFrom<1 | -1>(1, -1),
  offsetDeg: fc.integer({ min: 0, max: 3599 }).map((tenths) => tenths / 10),
  resolutionDeg: fc.constantFrom(0.1, 0.25, 1),
  rangeDeg: fc.constantFrom<readonly [number, number] | null>(null, [-10, 360], [-200, 200], [0, 540]),
  speedDegPerS: fc.constantFrom(1, 7.5, 20),
  backlashDeg: fc.constantFrom(0, 0.5, 4),
  approach: fc.constantFrom<MountMotion['approach']>('rising', 'falling', 'either'),
});

function problems(rows: number, branches: number): fc.Arbitrary<SequenceProblem> {
  return fc.integer({ min: 1, max: 2 }).chain((mounts) => {
    const axes = fc.array(
      fc.integer({ min: 0, max: 17999 }).map((hundredths) => hundredths / 100),
      { minLength: mounts, maxLength: mounts },
    );
    return fc.record({
      mounts: fc.array(mountMotion, { minLength: mounts, maxLength: mounts }),
      rows: fc.array(
        fc
          .record({
            branches: fc.array(axes, { minLength: 1, maxLength: branches }),
            held: fc.constantFrom(true, false, false),
          })
          .map(({ branches: list, held }) => ({ branches: list, held: held ? list.length - 1 : null })),
        { minLength: 1, maxLength: rows },
      ),
      startDialsDeg: fc.option(
        fc.array(fc.integer({ min: 0, max: 359 }), { minLength: mounts, maxLength: mounts }),
      ),
      cost: fc.constantFrom<SequenceProblem['cost']>('travel', 'time'),
      moves: fc.constantFrom<SequenceProblem['moves']>('together', 'one-by-one'),
    });
  });
}

function random(count: number, seed: number, change: Partial<SequenceProblem> = {}): SequenceProblem {
  const next = randomStream(seed);
  const mounts = change.mounts ?? [ring, ring, ring];
  return {
    mounts,
    rows: Array.from({ length: count }, () => ({
      held: null,
      branches: Array.from({ length: 4 }, () => mounts.map(() => 180 * next())),
    })),
    startDialsDeg: mounts.map(() => 0),
    cost: 'travel',
    moves: 'one-by-one',
    ...change,
  };
}

function cpuSeconds(work: () => void): number {
  const before = process.cpuUsage();
  work();
  const { user, system } = process.cpuUsage(before);
  return (user + system) / 1e6;
}

const costOf = (
  problem: SequenceProblem,
  plan: { readonly travelDeg: number; readonly seconds: number | null },
) => (problem.cost === 'travel' ? plan.travelDeg : (plan.seconds ?? NaN));

describe('a move of one mount', () => {
  it('takes the shorter way round a ring and the only way on a stage', () => {
    expect(mountMove(ring, 350, 10)).toMatchObject({ travelDeg: 20, numbers: 'rise', viaDeg: null });
    const stage: MountMotion = { ...ring, rangeDeg: [0, 360] };
    expect(mountMove(stage, 350, 10)).toMatchObject({ travelDeg: 340, numbers: 'fall' });
  });

  it('goes past the reading by the play and comes back when it would end in the wrong sense', () => {
    const played: MountMotion = { ...ring, backlashDeg: 2, approach: 'rising' };
    expect(mountMove(played, 10, 30)).toMatchObject({ travelDeg: 20, viaDeg: null, numbers: 'rise' });
    expect(mountMove(played, 30, 10)).toMatchObject({ travelDeg: 24, viaDeg: 8, numbers: 'fall' });
    expect(mountMove(played, 30, 1)).toMatchObject({ viaDeg: 359 });
    expect(mountMove(played, 30, 30)).toMatchObject({ travelDeg: 0, viaDeg: null, numbers: 'stay' });
  });

  it('goes the long way round a ring when the play makes that the shorter one', () => {
    const played: MountMotion = { ...ring, backlashDeg: 3, approach: 'rising' };
    expect(mountMove(played, 181, 0)).toMatchObject({ travelDeg: 179, numbers: 'rise' });
    expect(mountMove(played, 179, 0)).toMatchObject({ travelDeg: 181, numbers: 'rise' });
    expect(mountMove(played, 176, 0)).toMatchObject({ travelDeg: 182, numbers: 'fall', viaDeg: 357 });
  });

  it('agrees with the rule written a second time', () => {
    fc.assert(
      fc.property(
        mountMotion,
        fc.integer({ min: 0, max: 3599 }),
        fc.integer({ min: 0, max: 3599 }),
        (mount, a, b) => {
          expect(mountMove(mount, a / 10, b / 10).travelDeg).toBeCloseTo(
            travelByHand(mount, a / 10, b / 10),
            9,
          );
        },
      ),
      { seed: 4 },
    );
  });
});

describe('the readings of a plate', () => {
  it('all put the fast axis where it was asked for, to the dial’s step', () => {
    fc.assert(
      fc.property(mountMotion, fc.double({ min: -360, max: 360, noNaN: true }), (mount, fastAxisDeg) => {
        for (const reading of readingsFor(mount, fastAxisDeg)) {
          const off = fastAxisFromDial(degrees(reading), mount) - fastAxisDeg;
          const apart = Math.abs(off - 180 * Math.round(off / 180));
          expect(apart).toBeLessThanOrEqual(mount.resolutionDeg / 2 + 1e-9);
        }
      }),
      { seed: 5 },
    );
  });

  it('are two on a ring, and as many on a stage as its range and its play leave', () => {
    expect(readingsFor({ ...ring, offsetDeg: 83.54 }, 10)).toEqual([93.5, 273.5]);
    expect(readingsFor({ ...ring, rangeDeg: [-200, 200] }, 10)).toEqual([-170, 10, 190]);
    expect(readingsFor({ ...ring, rangeDeg: [0, 360], backlashDeg: 2, approach: 'rising' }, 1)).toEqual([
      181,
    ]);
    expect(readingsFor({ ...ring, rangeDeg: [0, 100] }, 150)).toEqual([]);
  });
});

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
