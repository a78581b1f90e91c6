import { afterAll, expect, test } from 'vitest';
import { compose, type Quaternion } from '../../shared/optics';
import { type Matrix, randomStream, stack } from '../optics/independent';
import { entryDistance, matrixOf, randomUnitary } from '../optics/unitary-search';
import { Deviations } from './deviations';
import { beamOrder, DEGREE, farthest, type Four, solve, type Three } from './three-plate-settings';

/*
 * R. Simon and N. Mukunda, Phys. Lett. A 138, 474 (1989) and 143, 165 (1990): three plates, two quarter- and one half-wave in
 * any order, make every unitary. Their formula and the tables below are from the project's collected references, sections 1.2
 * to 1.4: the formula from memory and confirmed numerically there, the tables computed there independently (numpy, scipy).
 */
const deviations = new Deviations();
afterAll(() => deviations.print('Three plates against collected values, worst deviation'));

function inDegrees([first, second, third]: Three): Three {
  return [first / DEGREE, second / DEGREE, third / DEGREE];
}

/** e^{−i angle σ/2} about an axis of Bloch coordinates. */
function turn(axis: 'y' | 'z', angle: number): Quaternion {
  const [c, s] = [Math.cos(angle / 2), Math.sin(angle / 2)];
  return axis === 'y' ? { w: c, x: 0, y: s, z: 0 } : { w: c, x: 0, y: 0, z: s };
}

function parts({ w, x, y, z }: Quaternion): Four {
  return [w, x, y, z];
}

// The orders of the plates along the beam, with the angles of 1.2 (left, middle, right) in radians.
const GADGETS = [
  {
    name: 'QHQ',
    retardancesDeg: [90, 180, 90],
    angles: (xi: number, eta: number, zeta: number): Three => [
      Math.PI / 4 + xi / 2,
      -Math.PI / 4 + (xi + eta - zeta) / 4,
      Math.PI / 4 - zeta / 2,
    ],
  },
  {
    name: 'QQH',
    retardancesDeg: [180, 90, 90],
    angles: (xi: number, eta: number, zeta: number): Three => [
      Math.PI / 4 + xi / 2,
      Math.PI / 4 + (xi + eta) / 2,
      -Math.PI / 4 + (xi + eta - zeta) / 4,
    ],
  },
  {
    name: 'HQQ',
    retardancesDeg: [90, 90, 180],
    angles: (xi: number, eta: number, zeta: number): Three => [
      -Math.PI / 4 + (xi + eta - zeta) / 4,
      Math.PI / 4 + (eta - zeta) / 2,
      Math.PI / 4 - zeta / 2,
    ],
  },
] as const;

test.each(GADGETS)(
  'Simon and Mukunda’s gadget $name: their angles are among the four found, and the product is theirs in SU(2), sign included for QHQ',
  ({ name, retardancesDeg, angles }) => {
    const random = randomStream(71);
    for (let k = 0; k < 500; k += 1) {
      const [xi, eta, zeta] = [2 * Math.PI * random(), Math.PI * random(), 4 * Math.PI * random()];
      const wanted = compose(turn('y', xi), compose(turn('z', -eta), turn('y', zeta)));
      // Their plates have +i on the labelled axis; with ours the same angles hold after η → −η (1.2).
      const published = beamOrder(angles(xi, -eta, zeta));
      const made = stack(
        retardancesDeg.map((deg) => deg * DEGREE),
        published,
      );
      const target: Matrix = matrixOf(...parts(wanted));
      const asIs = entryDistance(made, target);
      const opposite = entryDistance(made, matrixOf(-wanted.w, -wanted.x, -wanted.y, -wanted.z));
      const off = name === 'QHQ' ? asIs : Math.min(asIs, opposite);
      expect(deviations.note(`1.2 ${name}, matrix entries`, off)).toBeLessThan(1e-13);
      const answer = solve(parts(wanted), retardancesDeg);
      expect(answer.solutions).toHaveLength(4);
      const away = farthest(answer.solutions, [inDegrees(published)]);
      expect(deviations.note(`1.2 ${name}, angles (degrees)`, away)).toBeLessThan(1e-9);
    }
  },
);

test('all four settings of ideal plates in each order, in closed form, to 1e-9°', () => {
  const random = randomStream(72);
  for (let k = 0; k < 1500; k += 1) {
    const [w, x, y, z] = randomUnitary(random);
    const d = Math.atan2(Math.hypot(x, z), Math.hypot(w, y));
    const [p, m] = [Math.atan2(y, w), Math.atan2(z, -x)];
    const [a, b, c] = [(m + p) / 2, (d + m) / 2, (m - p) / 2].map((angle) => angle / DEGREE);
    if (a === undefined || b === undefined || c === undefined) throw new Error('three angles');
    const all: readonly Three[] = [
      [a, b, c],
      [a, b + 90, c],
      [a + 90, a + c - b, c + 90],
      [a + 90, a + c - b + 90, c + 90],
    ];
    for (const [source, retardancesDeg, published] of [
      ['1.3 QHQ', [90, 180, 90], all],
      ['1.3 QQH', [180, 90, 90], all.map(([q, h, r]): Three => [q, 2 * h - r, h])],
      ['1.3 HQQ', [90, 90, 180], all.map(([q, h, r]): Three => [h, 2 * h - q, r])],
    ] as const) {
      const answer = solve([w, x, y, z], retardancesDeg);
      expect(answer.solutions).toHaveLength(4);
      const off = farthest(answer.solutions, published.map(beamOrder));
      expect(deviations.note(`${source}, closed form (degrees)`, off)).toBeLessThan(1e-9);
      for (const { infidelity } of answer.solutions) expect(infidelity).toBeLessThan(1e-13);
    }
  }
});

// U3(θ, φ, λ) is Rz(φ) Ry(θ) Rz(λ) up to its phase.
const EXAMPLE = parts(
  compose(turn('z', 30 * DEGREE), compose(turn('y', 60 * DEGREE), turn('z', 45 * DEGREE))),
);

test.each<{ readonly plates: Three; readonly settings: readonly Three[] }>([
  {
    plates: [90, 180, 90],
    settings: [
      [66.433787, 64.572605, 30.623028],
      [66.433787, 154.572605, 30.623028],
      [156.433787, 32.484209, 120.623028],
      [156.433787, 122.484209, 120.623028],
    ],
  },
  {
    plates: [91, 178, 88],
    settings: [
      [66.914901, 154.241115, 29.444991],
      [67.716267, 65.717625, 31.660445],
      [154.454547, 121.304511, 120.247692],
      [156.673736, 32.852776, 121.117077],
    ],
  },
  {
    plates: [89.2, 180.7, 90.5],
    settings: [
      [66.202281, 64.424395, 30.558343],
      [66.499961, 154.962713, 31.334697],
      [156.129993, 32.099509, 120.154385],
      [156.905675, 122.626885, 120.441796],
    ],
  },
])(
  'the worked example U3(60°, 30°, 45°) with plates of $plates degrees, to the printed digits',
  ({ plates, settings }) => {
    const answer = solve(EXAMPLE, beamOrder(plates));
    expect(answer.solutions).toHaveLength(4);
    const off = farthest(answer.solutions, settings.map(beamOrder));
    expect(deviations.note('1.4 worked example, 6 printed decimals (degrees)', off)).toBeLessThan(6e-7);
  },
);

// Fractions with 4, 2 and 0 settings. Where a row prints fewer digits than its counts have, half a last digit is allowed.
test.each([
  { plates: [90, 180, 90], four: 1, two: 0, printed: 0 },
  { plates: [90, 90, 180], four: 1, two: 0, printed: 0 },
  { plates: [180, 90, 90], four: 1, two: 0, printed: 0 },
  { plates: [91, 180, 90], four: 0.9998, two: 0, printed: 1e-4 },
  { plates: [90, 178, 90], four: 0.9998, two: 0, printed: 1e-4 },
  { plates: [91, 178, 88], four: 0.9988, two: 0.001, printed: 1e-4 },
  { plates: [88, 178, 88], four: 0.9982, two: 0.001, printed: 1e-4 },
  { plates: [85, 170, 95], four: 0.981, two: 0.017, printed: 1e-3 },
  { plates: [95, 180, 85], four: 0.993, two: 0, printed: 1e-3 },
  { plates: [100, 180, 100], four: 0.968, two: 0, printed: 1e-3 },
  { plates: [90, 90, 90], four: 0.6, two: 0.29, printed: 1e-2 },
  { plates: [120, 120, 120], four: 0.71, two: 0.28, printed: 1e-2 },
] as const)(
  'how many settings a Haar-random unitary has with plates of $plates degrees',
  ({ plates, four, two, printed }) => {
    const random = randomStream(73);
    const draws = 4000;
    const counts = new Map<number, number>();
    for (let k = 0; k < draws; k += 1) {
      const { kind, solutions } = solve(randomUnitary(random), beamOrder(plates));
      const count = kind === 'exact' ? solutions.length : 0;
      counts.set(count, (counts.get(count) ?? 0) + 1);
    }
    expect([...counts.keys()].filter((count) => ![0, 2, 4].includes(count))).toEqual([]);
    for (const [count, fraction] of [
      [4, four],
      [2, two],
    ] as const) {
      const ours = (counts.get(count) ?? 0) / draws;
      // Both counts are of 4000 draws: four standard deviations of their difference, and a count of 1 where the fraction is 0.
      const noise = 4 * Math.sqrt((2 * fraction * (1 - fraction)) / draws);
      expect(Math.abs(ours - fraction)).toBeLessThanOrEqual(noise + printed / 2);
    }
  },
);

test('three half-wave plates, and a quarter- with two half-wave plates, don’t reach a generic unitary', () => {
  const random = randomStream(74);
  for (let k = 0; k < 60; k += 1) {
    const target = randomUnitary(random);
    for (const plates of [
      [180, 180, 180],
      [90, 180, 180],
      [180, 90, 180],
    ])
      expect(solve(target, plates).shortfallRad).toBeGreaterThan(0);
  }
});

test('random retardances of 20° to 340°: never more than four settings', () => {
  const random = randomStream(75);
  for (let k = 0; k < 6000; k += 1) {
    const plates = [0, 0, 0].map(() => 20 + 320 * random());
    const { kind, solutions } = solve(randomUnitary(random), plates);
    if (kind === 'exact') expect([2, 4]).toContain(solutions.length);
  }
}, 60_000);
