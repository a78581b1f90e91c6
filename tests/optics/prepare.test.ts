import { expect, test } from 'vitest';
import { prepare, radians, type Solved, type Stokes } from '../../shared/optics';
import { apart, denseMinima, denseZeros, inputH, type SearchProblem } from './dense-search';
import { apply, infidelity, randomState, randomStream, stack, stokesOf, type Vector } from './independent';

const DEGREE = Math.PI / 180;

function solve({ input, target, retardancesRad: [first, second] }: SearchProblem): Solved {
  return prepare({
    input: stokesOf(input),
    target: stokesOf(target),
    retardancesRad: [radians(first), radians(second)],
  });
}

/** Largest |⟨t⊥|ψ⟩| over the settings, through matrices that share nothing with the solver. */
function worstMiss(problem: SearchProblem, { solutions }: Solved): number {
  return Math.max(
    0,
    ...solutions.map(({ fastAxesRad }) => {
      const state = apply(stack(problem.retardancesRad, fastAxesRad), problem.input);
      return Math.sqrt(infidelity(problem.target, state));
    }),
  );
}

/** A half-wave and a quarter-wave plate as labs have them, in either order, or two plates of any retardance. */
function imperfectPair(random: () => number): readonly [number, number] {
  const half = (180 + 20 * (random() - 0.5)) * DEGREE;
  const quarter = (90 + 12 * (random() - 0.5)) * DEGREE;
  const kind = random();
  if (kind < 0.4) return [half, quarter];
  if (kind < 0.8) return [quarter, half];
  return [(20 + 320 * random()) * DEGREE, (20 + 320 * random()) * DEGREE];
}

function randomProblem(random: () => number): SearchProblem {
  return {
    input: random() < 0.5 ? inputH : randomState(random),
    target: randomState(random),
    retardancesRad: imperfectPair(random),
  };
}

test('10 000 random targets and imperfect pairs: each setting makes its target to 1e-12 by an independent matrix product', () => {
  const random = randomStream(1);
  const counts = new Map<string, number>();
  let worst = 0;
  for (let k = 0; k < 10_000; k += 1) {
    const problem = randomProblem(random);
    const answer = solve(problem);
    const label = answer.kind === 'exact' ? `exact ${answer.solutions.length}` : answer.kind;
    counts.set(label, (counts.get(label) ?? 0) + 1);
    expect(answer.solutions.length).toBeGreaterThan(0);
    if (answer.kind === 'exact') worst = Math.max(worst, worstMiss(problem, answer));
    else expect(answer.shortfallRad).toBeGreaterThan(0);
  }
  process.stdout.write(
    `two plates, 10 000 cases: worst miss ${worst.toExponential(1)}, ${JSON.stringify([...counts])}\n`,
  );
  expect(worst).toBeLessThan(1e-12);
  // Zeros of one trigonometric polynomial of degree 2: never more than four, and not odd for a target in general position.
  expect([...counts.keys()].filter((label) => !['exact 2', 'exact 4', 'nearest'].includes(label))).toEqual(
    [],
  );
  expect(counts.get('exact 4')).toBeGreaterThan(7000);
}, 60_000);

test('the set is complete: a dense search finds the same settings and no other', () => {
  const random = randomStream(2);
  let searched = 0;
  for (let k = 0; k < 1500; k += 1) {
    const problem = randomProblem(random);
    const answer = solve(problem);
    const dense = denseZeros(problem, 90);
    const ours = answer.kind === 'exact' ? answer.solutions : [];
    const missing = dense.filter(
      ({ fastAxesRad }) => !ours.some((known) => apart(known.fastAxesRad, fastAxesRad) < 1e-4),
    );
    expect(missing, JSON.stringify(problem)).toEqual([]);
    expect(dense.length, JSON.stringify(problem)).toBe(ours.length);
    searched += 1;
  }
  expect(searched).toBe(1500);
}, 60_000);

test('close to the edge of reach two settings meet, and the solver still finds both or says by how much it misses', () => {
  const random = randomStream(3);
  let edges = 0;
  for (let k = 0; k < 400; k += 1) {
    const retardancesRad = imperfectPair(random);
    // A state on the edge: where turning either plate moves the light along the same line. Walk there from both sides.
    const inside = (chi: number): Solved =>
      solve({ input: inputH, target: ellipse(0.3, chi), retardancesRad });
    let [low, high] = [0, Math.PI / 4];
    if (inside(low).shortfallRad > 0 || inside(high).shortfallRad === 0) continue;
    for (let step = 0; step < 45; step += 1) {
      const middle = (low + high) / 2;
      if (inside(middle).shortfallRad === 0) low = middle;
      else high = middle;
    }
    edges += 1;
    for (const beyond of [1e-3, 1e-5, 1e-7]) {
      const answer = inside(high + beyond);
      if (high + beyond > Math.PI / 4 || answer.kind === 'exact') continue;
      // The ellipticity is half an angle on the sphere, and the edge is met at some slant.
      expect(answer.shortfallRad).toBeLessThan(2.01 * beyond + 1e-11);
      expect(answer.solutions[0]?.infidelity).toBeCloseTo(Math.sin(answer.shortfallRad / 2) ** 2, 14);
    }
    const within = inside(low - 1e-5);
    expect(
      worstMiss({ input: inputH, target: ellipse(0.3, low - 1e-5), retardancesRad }, within),
    ).toBeLessThan(1e-12);
    expect(within.solutions.length).toBeGreaterThanOrEqual(2);
  }
  expect(edges).toBeGreaterThan(50);
}, 60_000);

function ellipse(azimuth: number, ellipticity: number): Vector {
  const [c, s] = [Math.cos(azimuth), Math.sin(azimuth)];
  const [a, b] = [Math.cos(ellipticity), Math.sin(ellipticity)];
  return [
    { re: c * a, im: -s * b },
    { re: s * a, im: c * b },
  ];
}

test('out of reach, every local optimum is returned with its true infidelity, best first', () => {
  const random = randomStream(4);
  let cases = 0;
  for (let k = 0; k < 4000 && cases < 120; k += 1) {
    const problem: SearchProblem = {
      input: random() < 0.5 ? inputH : randomState(random),
      target: randomState(random),
      retardancesRad: [(10 + 130 * random()) * DEGREE, (10 + 130 * random()) * DEGREE],
    };
    const answer = solve(problem);
    if (answer.kind !== 'nearest') continue;
    cases += 1;
    const dense = denseMinima(problem, 60);
    for (const { fastAxesRad, infidelity: value } of dense) {
      const ours = answer.solutions.find((known) => apart(known.fastAxesRad, fastAxesRad) < 2e-3);
      expect(ours, JSON.stringify({ problem, fastAxesRad, value })).toBeDefined();
      expect(ours?.infidelity).toBeCloseTo(value, 12);
    }
    expect(answer.solutions.length).toBe(dense.length);
    for (const { fastAxesRad, infidelity: claimed } of answer.solutions) {
      const state = apply(stack(problem.retardancesRad, fastAxesRad), problem.input);
      expect(infidelity(problem.target, state)).toBeCloseTo(claimed, 14);
    }
    const values = answer.solutions.map(({ infidelity: value }) => value);
    expect([...values].sort((a, b) => a - b)).toEqual(values);
  }
  expect(cases).toBe(120);
}, 60_000);

const H: Stokes = [1, 0, 0];

function degreesOf({ solutions }: Solved): readonly (readonly number[])[] {
  return solutions.map(({ fastAxesRad }) =>
    fastAxesRad.map((angle) => Math.round((angle / DEGREE) * 1e9) / 1e9),
  );
}

test('special targets by name: the input itself, its antipode, and linear light through ideal plates', () => {
  const ideal = [radians(Math.PI), radians(Math.PI / 2)] as const;
  const same = prepare({ input: H, target: H, retardancesRad: ideal });
  expect(same.kind).toBe('exact');
  expect(degreesOf(same)).toEqual([
    [0, 0],
    [0, 90],
    [90, 0],
    [90, 90],
  ]);
  const antipode = prepare({ input: H, target: [-1, 0, 0], retardancesRad: ideal });
  expect(degreesOf(antipode)).toEqual([
    [45, 0],
    [45, 90],
    [135, 0],
    [135, 90],
  ]);
  const diagonal = prepare({ input: H, target: [0, 1, 0], retardancesRad: ideal });
  expect(degreesOf(diagonal)).toEqual([
    [22.5, 45],
    [22.5, 135],
    [112.5, 45],
    [112.5, 135],
  ]);
});

test('circular light through ideal plates is a family whose free plate is the half-wave plate', () => {
  for (const s3 of [1, -1]) {
    for (const order of [0, 1] as const) {
      const pair = [Math.PI, Math.PI / 2].map(radians);
      const [first, second] = order === 0 ? pair : pair.reverse();
      if (first === undefined || second === undefined) throw new Error('two plates');
      const answer = prepare({ input: H, target: [0, 0, s3], retardancesRad: [first, second] });
      expect(answer.kind).toBe('family');
      expect(answer.shortfallRad).toBe(0);
      expect(answer.family?.freePlates).toEqual([order]);
      expect(answer.solutions).toHaveLength(8);
      expect(Math.max(...answer.solutions.map(({ infidelity: value }) => value))).toBeLessThan(1e-30);
    }
  }
});

test('two ideal half-wave plates are a family where they reach and a family of nearest settings where they don’t', () => {
  const halves = [radians(Math.PI), radians(Math.PI)] as const;
  const linear = prepare({ input: H, target: [0.6, 0.8, 0], retardancesRad: halves });
  expect([linear.kind, linear.shortfallRad, linear.family?.freePlates]).toEqual(['family', 0, [0]]);
  const elliptic = prepare({ input: H, target: [0.8, 0, 0.6], retardancesRad: halves });
  expect(elliptic.kind).toBe('family');
  expect(elliptic.shortfallRad).toBeCloseTo(Math.asin(0.6), 12);
});

test('plates that do nothing leave the light as it is and say how far the target is', () => {
  const nothing = [radians(0), radians(2 * Math.PI)] as const;
  expect(prepare({ input: H, target: H, retardancesRad: nothing }).shortfallRad).toBe(0);
  const away = prepare({ input: H, target: [0, 1, 0], retardancesRad: nothing });
  expect(away.shortfallRad).toBeCloseTo(Math.PI / 2, 12);
  expect(away.solutions[0]?.infidelity).toBeCloseTo(0.5, 12);
});

test('angles lie in [0, π), no setting is given twice, and the same question has the same answer', () => {
  const random = randomStream(5);
  for (let k = 0; k < 500; k += 1) {
    const problem = randomProblem(random);
    const answer = solve(problem);
    expect(JSON.stringify(solve(problem))).toBe(JSON.stringify(answer));
    answer.solutions.forEach(({ fastAxesRad }, index) => {
      for (const angle of fastAxesRad) expect(angle >= 0 && angle < Math.PI).toBe(true);
      for (const other of answer.solutions.slice(index + 1)) {
        expect(apart(fastAxesRad, other.fastAxesRad)).toBeGreaterThan(1e-9);
      }
    });
  }
});

test('a Stokes vector of length 0 and an endless retardance are refused', () => {
  const half = radians(Math.PI);
  expect(() => prepare({ input: [0, 0, 0], target: H, retardancesRad: [half, half] })).toThrow(RangeError);
  expect(() => prepare({ input: H, target: H, retardancesRad: [half, radians(NaN)] })).toThrow(RangeError);
});
