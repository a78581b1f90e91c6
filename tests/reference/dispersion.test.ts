import { evaluate } from 'mathjs';
import { afterAll, expect, test } from 'vitest';
import {
  birefringence,
  birefringenceDispersion,
  fittedBirefringence,
  indexDispersion,
  MATERIAL_IDS,
  type MaterialId,
  materialOf,
  MATERIALS,
  type Ray,
  refractiveIndex,
  WavelengthRangeError,
} from '../../shared/optics/dispersion';
import { Deviations } from './deviations';

const deviations = new Deviations();
afterAll(() => deviations.print('Dispersion against published values, worst deviation'));

// Columns of the regression table of references.md 4.2, computed there from the published coefficients; λ in µm.
const TABLE: readonly (readonly number[])[] = [
  [
    0.4046563, 1.5571555, 1.5666986, 0.00954311, 0.00953938, 1.3836046, 1.3956715, 1.7857349, 1.7772961,
    1.6809599, 1.4967055,
  ],
  [
    0.532, 1.5468676, 1.5560588, 0.0091912, 0.0091944, 1.3789247, 1.3907904, 1.7716976, 1.7635516, 1.6628362,
    1.4882283,
  ],
  [
    0.5893, 1.5442057, 1.5533058, 0.00910004, 0.00910513, 1.3777118, 1.3895235, 1.7680764, 1.760002,
    1.6583434, 1.4861301,
  ],
  [
    0.6328, 1.5426059, 1.5516508, 0.0090449, 0.00905107, 1.3769842, 1.3887627, 1.765904, 1.757871, 1.6556901,
    1.484909,
  ],
  [
    0.78, 1.5387435, 1.5476527, 0.00890926, 0.00891762, 1.3752388, 1.3869343, 1.7606814, 1.7527398, 1.6494671,
    1.4821783,
  ],
  [
    0.81, 1.5381386, 1.5470261, 0.00888749, 0.00889608, 1.3749681, 1.38665, 1.759868, 1.751939, 1.6485214,
    1.4817919,
  ],
  [
    1.064, 1.5340989, 1.5428349, 0.00873602, 0.00874498, 1.373193, 1.3847793, 1.7544855, 1.7466254, 1.6424571,
    1.4796429,
  ],
  [
    1.55, 1.5276959, 1.5361703, 0.00847435, 0.00847849, 1.3705187, 1.3819382, 1.7461816, 1.7383815, 1.6336293,
    1.4777023,
  ],
];

test('eight wavelengths of quartz, magnesium fluoride, sapphire and calcite come out as tabulated', () => {
  for (const row of TABLE) {
    const nm = (row[0] ?? NaN) * 1000;
    const found = [
      refractiveIndex('quartz', 'o', nm),
      refractiveIndex('quartz', 'e', nm),
      birefringence('quartz', nm),
      fittedBirefringence('quartz', nm) ?? NaN,
      refractiveIndex('magnesium-fluoride', 'o', nm),
      refractiveIndex('magnesium-fluoride', 'e', nm),
      refractiveIndex('sapphire', 'o', nm),
      refractiveIndex('sapphire', 'e', nm),
      refractiveIndex('calcite', 'o', nm),
      refractiveIndex('calcite', 'e', nm),
    ];
    found.forEach((value, k) => {
      const deviation = Math.abs(value - (row[k + 1] ?? NaN));
      const difference = k === 2 || k === 3;
      const source = difference
        ? 'Ghosh 1999 quartz, Δn at 8 wavelengths (8 decimals, computed in references.md 4.2)'
        : 'Ghosh 1999, Dodge 1984, Malitson & Dodge 1972: n at 8 wavelengths (7 decimals, 4.2)';
      // Half a unit of the last printed decimal, and rounding.
      expect(deviations.note(source, deviation)).toBeLessThan(difference ? 5.1e-9 : 5.1e-8);
    });
  }
});

// A public sapphire index table, read; Malitson & Dodge 1972 coefficients behind ours.
test.each([
  [532, 1.7717, 1.76355, 1.1e-5],
  [633, 1.7659, 1.75787, 1.1e-5],
  [780, 1.76068, 1.75274, 1.1e-5],
  [1064, 1.75449, 1.74663, 1.1e-5],
  [1550, 1.74618, 1.73838, 1.1e-5],
  [442, 1.78038, 1.77206, 5.5e-5],
  [488, 1.7753, 1.76711, 5.5e-5],
  [515, 1.77304, 1.76486, 5.5e-5],
] as const)('sapphire at %d nm is that of a published table', (nm, ordinary, extraordinary, tolerance) => {
  for (const [ray, published] of [
    ['o', ordinary],
    ['e', extraordinary],
  ] as const) {
    const deviation = Math.abs(refractiveIndex('sapphire', ray, nm) - published);
    expect(deviations.note('Sapphire index table, public page, 8 wavelengths', deviation)).toBeLessThan(
      tolerance,
    );
  }
});

// Fraunhofer lines of the two Abbe numbers, nm: d, F, C and e, F', C' (ISO 7944; from memory).
const abbe = (material: MaterialId, centre: number, blue: number, red: number) =>
  (refractiveIndex(material, 'o', centre) - 1) /
  (refractiveIndex(material, 'o', blue) - refractiveIndex(material, 'o', red));

// refractiveindex.info, calcite pages of Ghosh and of the Handbook of Optics, read.
test.each([
  ['calcite', 1.65846, -0.068, 49.91, 49.71],
  ['calcite-handbook', 1.65864, -0.0699, 48.54, 48.34],
] as const)('%s: n, dn/dλ and both Abbe numbers are those its page prints', (id, n, slope, vd, ve) => {
  const { value, slopePerNm } = indexDispersion(id, 'o', 587.6);
  const note = (what: string, deviation: number) =>
    deviations.note(
      `refractiveindex.info calcite pages (Ghosh; Handbook of Optics): ${what}`,
      Math.abs(deviation),
    );
  expect(note('n_o at 587.6 nm', value - n)).toBeLessThan(5.1e-6);
  expect(note('dn/dλ per µm', slopePerNm * 1000 - slope)).toBeLessThan(5.1e-5);
  expect(note('Abbe numbers', abbe(id, 587.5618, 486.1327, 656.2725) - vd)).toBeLessThan(0.0051);
  expect(note('Abbe numbers', abbe(id, 546.074, 479.9914, 643.8469) - ve)).toBeLessThan(0.0051);
});

// Coefficients again, through a general library: a slip of the pen in the table of materials shows here.
const FORMULAS: readonly (readonly [MaterialId, Ray, string])[] = [
  [
    'quartz-radhakrishnan',
    'o',
    'sqrt(1+0.663044l^2/(l^2-0.060^2)+0.517852l^2/(l^2-0.106^2)+0.175912l^2/(l^2-0.119^2)+0.565380l^2/(l^2-8.844^2)+1.675299l^2/(l^2-20.742^2))',
  ],
  [
    'quartz-radhakrishnan',
    'e',
    'sqrt(1+0.665721l^2/(l^2-0.060^2)+0.503511l^2/(l^2-0.106^2)+0.214792l^2/(l^2-0.119^2)+0.539173l^2/(l^2-8.792^2)+1.807613l^2/(l^2-19.70^2))',
  ],
  [
    'magnesium-fluoride',
    'o',
    'sqrt(1+0.48755108l^2/(l^2-0.04338408^2)+0.39875031l^2/(l^2-0.09461442^2)+2.3120353l^2/(l^2-23.793604^2))',
  ],
  [
    'calcite-handbook',
    'o',
    'sqrt(1+0.8559l^2/(l^2-0.0588^2)+0.8391l^2/(l^2-0.141^2)+0.0009l^2/(l^2-0.197^2)+0.6845l^2/(l^2-7.005^2))',
  ],
  [
    'calcite-handbook',
    'e',
    'sqrt(1+1.0856l^2/(l^2-0.07897^2)+0.0988l^2/(l^2-0.142^2)+0.317l^2/(l^2-11.468^2))',
  ],
  ['quartz', 'e', 'sqrt(1+0.28851804+1.09509924l^2/(l^2-1.02101864e-2)+1.15662475l^2/(l^2-100))'],
];
test.each(FORMULAS)('%s, ray %s: the formula in mathjs gives the same index', (id, ray, formula) => {
  for (const nm of [300, 404.6563, 589.3, 810, 1550, 2000]) {
    const deviation = Math.abs(refractiveIndex(id, ray, nm) - Number(evaluate(formula, { l: nm / 1000 })));
    expect(deviations.note('Published formulas evaluated in mathjs', deviation)).toBeLessThan(2e-15);
  }
});

// 589.3 nm by three formulas (references.md 4.2) and the handbook values 1.54424, 1.55335 at 18 °C (from memory).
test('quartz at 589.3 nm: the published formulas agree within 6e-5, and with the handbook', () => {
  const laurent = (c: readonly number[]) =>
    Math.sqrt(c.reduce((sum, a, k) => sum + a * 0.5893 ** (k === 1 ? 2 : k === 0 ? 0 : -2 * (k - 1)), 0));
  const ordinary = laurent([2.35728, -1.17e-2, 1.054e-2, 1.34143e-4, -4.45368e-7, 5.92362e-8]);
  const extraordinary = laurent([2.3849, -1.259e-2, 1.079e-2, 1.6518e-4, -1.94741e-6, 9.36476e-8]);
  for (const id of ['quartz', 'quartz-radhakrishnan'] as const) {
    for (const [ray, handbook, power] of [
      ['o', 1.54424, ordinary],
      ['e', 1.55335, extraordinary],
    ] as const) {
      const n = refractiveIndex(id, ray, 589.3);
      expect(
        deviations.note('Quartz handbook 589.3 nm (from memory), both formulas', Math.abs(n - handbook)),
      ).toBeLessThan(6e-5);
      expect(
        deviations.note('Quartz power series 589.3 nm (from memory), both formulas', Math.abs(n - power)),
      ).toBeLessThan(6e-5);
    }
    const deviation = Math.abs(birefringence(id, 589.3) - 0.00911);
    expect(deviations.note('Quartz Δn 0.00911 at 589.3 nm, both formulas', deviation)).toBeLessThan(2.5e-5);
  }
  for (const [id, ray, value] of [
    ['quartz-radhakrishnan', 'o', 1.5442383],
    ['quartz-radhakrishnan', 'e', 1.5533551],
    ['calcite-handbook', 'o', 1.6585222],
    ['calcite-handbook', 'e', 1.4864395],
  ] as const) {
    const deviation = Math.abs(refractiveIndex(id, ray, 589.3) - value);
    expect(
      deviations.note('Radhakrishnan 1951, Handbook of Optics at 589.3 nm (4.2)', deviation),
    ).toBeLessThan(5.1e-8);
  }
});

test('589.3 nm: calcite and magnesium fluoride lie by their handbook values, Δn by references.md', () => {
  for (const [id, ray, handbook, tolerance] of [
    ['calcite', 'o', 1.6584, 1.3e-4],
    ['calcite', 'e', 1.4864, 3e-4],
    ['calcite-handbook', 'o', 1.6584, 1.3e-4],
    ['calcite-handbook', 'e', 1.4864, 1.3e-4],
    // 1.378 and 1.390 are printed to three decimals.
    ['magnesium-fluoride', 'o', 1.378, 5e-4],
    ['magnesium-fluoride', 'e', 1.39, 5e-4],
  ] as const) {
    const deviation = Math.abs(refractiveIndex(id, ray, 589.3) - handbook);
    expect(
      deviations.note(`${materialOf(id).crystal} at 589.3 nm, handbook (from memory)`, deviation),
    ).toBeLessThan(tolerance);
  }
  expect(birefringence('calcite', 589.3)).toBeCloseTo(-0.17221, 5);
  expect(birefringence('calcite-handbook', 589.3)).toBeCloseTo(-0.17208, 5);
  expect(fittedBirefringence('calcite', 589.3)).toBeCloseTo(-0.17197, 5);
  expect(birefringence('magnesium-fluoride', 589.3)).toBeCloseTo(0.01181169, 8);
  expect(fittedBirefringence('sapphire', 589.3)).toBeNull();
});

test('Ghosh’s separate fit of Δn and the difference of his indices agree within 2.5e-5 for quartz', () => {
  for (let nm = 400; nm <= 1600; nm += 25) {
    const deviation = Math.abs((fittedBirefringence('quartz', nm) ?? NaN) - birefringence('quartz', nm));
    expect(deviations.note('Ghosh 1999: Δn fit against n_e − n_o, 400 to 1600 nm', deviation)).toBeLessThan(
      2.5e-5,
    );
  }
});

test('slopes are the derivatives: a symmetric difference agrees, for every material across its range', () => {
  for (const { id, shortestNm, longestNm } of MATERIALS) {
    for (let k = 1; k < 40; k += 1) {
      const nm = shortestNm + ((longestNm - shortestNm) * k) / 40;
      const step = 1e-3 * nm;
      const difference = (h: number) => (birefringence(id, nm + h) - birefringence(id, nm - h)) / (2 * h);
      // One step of Richardson takes away the h² term.
      const slope = (4 * difference(step / 2) - difference(step)) / 3;
      const exact = birefringenceDispersion(id, nm).slopePerNm;
      const deviation = Math.abs(exact - slope) * nm;
      expect(
        deviations.note('λ · dΔn/dλ against a symmetric difference', deviation),
        `${id} ${nm}`,
      ).toBeLessThan(1e-9);
    }
  }
});

test('Δn keeps its sign over every range, so a ratio of two of them is always there', () => {
  for (const { id, shortestNm, longestNm } of MATERIALS) {
    const sign = Math.sign(birefringence(id, shortestNm));
    expect(sign, id).toBe(['calcite', 'calcite-handbook', 'sapphire'].includes(id) ? -1 : 1);
    for (let k = 0; k <= 400; k += 1) {
      expect(Math.sign(birefringence(id, shortestNm + ((longestNm - shortestNm) * k) / 400))).toBe(sign);
    }
  }
});

test('outside the range of a formula there is no index, and the error says the range', () => {
  for (const nm of [100, 197.9, 2053.2, NaN, Infinity, -500]) {
    expect(() => refractiveIndex('quartz', 'o', nm)).toThrow(WavelengthRangeError);
    expect(() => birefringence('quartz', nm)).toThrow('198 to 2053.1 nm');
    expect(() => fittedBirefringence('quartz', nm)).toThrow(WavelengthRangeError);
  }
  expect(refractiveIndex('quartz', 'o', 198)).toBeGreaterThan(1.6);
  expect(() => refractiveIndex('magnesium-fluoride', 'e', 7001)).toThrow('200 to 7000 nm');
});

test('every material names its source, and the usual quartz stands first', () => {
  expect(MATERIALS.map(({ id }) => id)).toEqual([...MATERIAL_IDS]);
  expect(MATERIALS[0]?.id).toBe('quartz');
  for (const { source } of MATERIALS) expect(source).toMatch(/19\d\d/u);
});
