import { expect, test } from 'vitest';
import { quadraticFormBelow, quadraticFormQuantile } from '../../shared/optics/quantile';
import type { SpaceSpread } from '../../shared/optics/budget-spread';
import { randomStream } from './independent';

type Triple = readonly [number, number, number];

function spread(variances: Triple, centre: Triple = [0, 0, 0]): SpaceSpread {
  return { variances, centre };
}

const off = (found: number, wanted: number): number => Math.abs(found / wanted - 1);

/*
 * Imhof, Biometrika 48, 419 (1961), Table 1, Q1 = 0.6χ²₁ + 0.3χ²₁ + 0.1χ²₁: P(Q1 > x). Davies, Appl. Statist. 29, 323 (1980),
 * Table 3, Q1 = 6χ²₁ + 3χ²₁ + χ²₁: P(Q1 < x). Both from memory, as reprinted in packages that compute such forms.
 */
test('the published probabilities of Imhof and of Davies', () => {
  for (const [x, above] of [
    [0.1, 0.9458],
    [0.7, 0.5064],
    [2, 0.124],
  ] as const) {
    expect(Math.abs(1 - quadraticFormBelow(spread([0.6, 0.3, 0.1]), x) - above)).toBeLessThan(5.1e-5);
  }
  for (const [x, below] of [
    [1, 0.0542],
    [7, 0.4936],
    [20, 0.876],
  ] as const) {
    expect(Math.abs(quadraticFormBelow(spread([6, 3, 1]), x) - below)).toBeLessThan(5.1e-5);
  }
});

// Printed in any table of chi-square.
test('chi-square with one, two and three degrees of freedom, whichever axes they lie along', () => {
  for (const [variances, low, high] of [
    [[1, 0, 0], 0.00393214, 3.8414588],
    [[0, 1, 0], 0.00393214, 3.8414588],
    [[0, 1, 1], 0.1025866, 5.9914645],
    [[1, 1, 1], 0.3518463, 7.8147279],
  ] as const) {
    expect(off(quadraticFormQuantile(spread(variances), 0.05), low)).toBeLessThan(3e-7);
    expect(off(quadraticFormQuantile(spread(variances), 0.95), high)).toBeLessThan(1e-8);
  }
});

/*
 * scipy 1.17.1: non-central chi-square (ncx2.ppf) for equal variances, ndtr for one axis, and for the rest Gauss–Legendre
 * quadrature (300 × 300 nodes) over two axes with the third in closed form by ndtr, solved by brentq.
 */
const BY_SCIPY = [
  [[6, 3, 1], [0, 0, 0], 0.9423731275424981, 28.892486454544922],
  [[1, 0.2, 0.01], [0, 0, 0], 0.056081976295799155, 4.08308027146948],
  [[1, 0.5, 0.25], [1, 1, 1], 1.0162055340241858, 10.709439742042306],
  [[1, 0.1, 0.02], [0, 2, 0], 2.6299284971441246, 8.58546170599801],
  [[1, 0.3, 0.05], [5, -1, 0.5], 12.719324252725103, 45.85660030261481],
  [[1, 0.3, 0.05], [0, 0.5, 6], 32.77622818497474, 42.91919743184708],
  [[1, 0.01, 0.001], [0, 0, 3], 8.861011633805225, 12.863887933475057],
  [[1, 0.6, 0.3], [20, 15, -9], 631.5653989507904, 787.2114974424918],
  [[1, 0.01, 0.0001], [0.2, 0.1, -0.05], 0.0198647171470586, 4.01698343195799],
  [[1, 1, 1], [0.7071067811865476, 0, 0], 0.41520920916455145, 9.058774983820603],
  [
    [1, 1, 1],
    [0.23570226039551587, 0.47140452079103173, -0.47140452079103173],
    0.41520920916455145,
    9.058774983820603,
  ],
  [[1, 1, 1], [3.1622776601683795, 0, 0], 3.728976831503036, 25.57544072256552],
  [
    [1, 1, 1],
    [1.0540925533894598, 2.1081851067789197, -2.1081851067789197],
    3.728976831503036,
    25.57544072256552,
  ],
  [[1, 1, 1], [31.622776601683793, 0, 0], 900.6232810678744, 1108.7866694264953],
  [
    [1, 1, 1],
    [10.540925533894598, 21.081851067789195, -21.081851067789195],
    900.6232810678744,
    1108.7866694264953,
  ],
  [[1, 1, 1], [1000, 0, 0], 996714.9966441292, 1003294.4144416424],
  [
    [1, 1, 1],
    [333.3333333333333, 666.6666666666666, -666.6666666666666],
    996714.9966441292,
    1003294.4144416424,
  ],
  [[1, 0, 0], [0, 0, 0], 0.003932140000019522, 3.841458820694126],
  [[1, 0, 0], [0, 2, -1], 5.003932140000019, 8.841458820694125],
  [[1, 0, 0], [0.3, 0, 0], 0.004302422213771482, 4.18224211464883],
  [[1, 0, 0], [0.3, 2, -1], 5.0043024222137715, 9.18224211464883],
  [[1, 0, 0], [3, 0, 0], 1.8365963618024461, 21.574665215805183],
  [[1, 0, 0], [3, 2, -1], 6.836596361802446, 26.574665215805183],
  [[1, 0, 0], [1000, 0, 0], 996712.9982895511, 1003292.4127973561],
  [[1, 0, 0], [1000, 2, -1], 996717.9982895511, 1003297.4127973561],
] as const;

test.each(BY_SCIPY)(
  'variances %j about %j: the quantiles that scipy gives',
  (variances, centre, low, high) => {
    expect(off(quadraticFormQuantile(spread(variances, centre), 0.05), low)).toBeLessThan(1e-10);
    expect(off(quadraticFormQuantile(spread(variances, centre), 0.95), high)).toBeLessThan(1e-10);
  },
);

test('a disc has the exponential law, a point its own distance, and a probability of 1 is refused', () => {
  for (const probability of [0.05, 0.5, 0.95]) {
    const found = quadraticFormQuantile(spread([9, 9, 0]), probability);
    expect(off(found, -18 * Math.log(1 - probability))).toBeLessThan(1e-9);
  }
  expect(quadraticFormQuantile(spread([0, 0, 0], [0.3, 0.4, 0]), 0.95)).toBeCloseTo(0.25, 15);
  expect(() => quadraticFormQuantile(spread([1, 1, 0]), 1)).toThrow(RangeError);
});

test('from clouds as thin as needles to points far off, a quantile is found and has its probability', () => {
  const random = randomStream(4);
  for (let k = 0; k < 2000; k += 1) {
    const variances: Triple = [10 ** (-8 * random()), 10 ** (-8 * random()), 10 ** (-8 * random())];
    const place = (): number => (random() < 0.3 ? 0 : 10 ** (4 * random() - 3) * (random() < 0.5 ? -1 : 1));
    const cloud = spread(variances, [place(), place(), place()]);
    for (const probability of [0.05, 0.5, 0.95]) {
      const found = quadraticFormQuantile(cloud, probability);
      expect(Math.abs(quadraticFormBelow(cloud, found) - probability)).toBeLessThan(1e-9);
    }
  }
});

test('a point has no spread; a probability lies between 0 and 1', () => {
  expect(quadraticFormQuantile(spread([0, 0, 0], [0.3, 0, 0.4]), 0.05)).toBeCloseTo(0.25, 15);
  expect(quadraticFormBelow(spread([0, 0, 0], [0.3, 0, 0.4]), 0.24)).toBe(0);
  expect(quadraticFormBelow(spread([0, 0, 0], [0.3, 0, 0.4]), 0.26)).toBe(1);
  expect(quadraticFormBelow(spread([1, 0, 0], [0, 2, 0]), 3.9)).toBe(0);
  for (const wrong of [0, 1, -1, NaN])
    expect(() => quadraticFormQuantile(spread([1, 1, 1]), wrong)).toThrow(RangeError);
});
