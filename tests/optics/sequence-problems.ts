import fc from 'fast-check';
import type { MountMotion, SequenceProblem } from '../../shared/optics/sequence';
import { randomStream } from './independent';

/* Lists of settings to be gone through, and what going through them costs, found without looking at the product. */

export const ring: MountMotion = {
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
export function travelByHand(mount: MountMotion, from: number, to: number): number {
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
export function cheapestByHand(problem: SequenceProblem): number {
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

export function permutations(count: number): number[][] {
  if (count === 0) return [[]];
  return permutations(count - 1).flatMap((rest) =>
    Array.from({ length: count }, (_, at) => [...rest.slice(0, at), count - 1, ...rest.slice(at)]),
  );
}

export const mountMotion = fc.record({
  direction: fc.constantFrom<1 | -1>(1, -1),
  offsetDeg: fc.integer({ min: 0, max: 3599 }).map((tenths) => tenths / 10),
  resolutionDeg: fc.constantFrom(0.1, 0.25, 1),
  rangeDeg: fc.constantFrom<readonly [number, number] | null>(null, [-10, 360], [-200, 200], [0, 540]),
  speedDegPerS: fc.constantFrom(1, 7.5, 20),
  backlashDeg: fc.constantFrom(0, 0.5, 4),
  approach: fc.constantFrom<MountMotion['approach']>('rising', 'falling', 'either'),
});

export function problems(rows: number, branches: number): fc.Arbitrary<SequenceProblem> {
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

export function random(count: number, seed: number, change: Partial<SequenceProblem> = {}): SequenceProblem {
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

export function cpuSeconds(work: () => void): number {
  const before = process.cpuUsage();
  work();
  const { user, system } = process.cpuUsage(before);
  return (user + system) / 1e6;
}

export const costOf = (
  problem: SequenceProblem,
  plan: { readonly travelDeg: number; readonly seconds: number | null },
) => (problem.cost === 'travel' ? plan.travelDeg : (plan.seconds ?? NaN));
