import type { DispersionFormula, Material, MaterialId, TemperatureCoefficient } from './material';

/** n² = 1 + A0 + A1 λ²/(λ² − A2) + A3 λ²/(λ² − A4), as Ghosh writes it. */
function ghosh(a0: number, a1: number, a2: number, a3: number, a4: number): DispersionFormula {
  return {
    constant: 1 + a0,
    resonances: [
      { strength: a1, poleSquaredUm2: a2 },
      { strength: a3, poleSquaredUm2: a4 },
    ],
  };
}

/** n² = 1 + Σ B λ²/(λ² − C²), each pair (B, C). */
function sellmeier(...pairs: readonly (readonly [b: number, c: number])[]): DispersionFormula {
  return {
    constant: 1,
    resonances: pairs.map(([strength, c]) => ({ strength, poleSquaredUm2: c * c })),
  };
}

/** Δn = a + b λ²/(λ² − g) + j λ²/(λ² − l): Ghosh's separate fit of the birefringence. */
function ghoshDifference(a: number, b: number, g: number, j: number, l: number): DispersionFormula {
  return {
    constant: a,
    resonances: [
      { strength: b, poleSquaredUm2: g },
      { strength: j, poleSquaredUm2: l },
    ],
  };
}

const ETZEL =
  'S. M. Etzel, A. H. Rose, C. M. Wang, Appl. Opt. 39, 5796 (2000): 24 to 80 °C, 633 to 1539 nm (read on the publication page of NIST; volume and page from memory)';

const QUARTZ_TEMPERATURE: TemperatureCoefficient = {
  perKelvin: -1.23e-4,
  sigmaPerKelvin: 0.02e-4,
  source: ETZEL,
};

const MAGNESIUM_FLUORIDE_TEMPERATURE: TemperatureCoefficient = {
  perKelvin: -5.37e-5,
  sigmaPerKelvin: 0.17e-5,
  source: ETZEL,
};

/** Every crystal that a plate can be of, quartz of Ghosh first: the usual one. */
export const MATERIALS: readonly Material[] = [
  {
    id: 'quartz',
    name: 'Quartz (Ghosh 1999)',
    crystal: 'quartz',
    ordinary: ghosh(0.28604141, 1.07044083, 1.00585997e-2, 1.10202242, 100),
    extraordinary: ghosh(0.28851804, 1.09509924, 1.02101864e-2, 1.15662475, 100),
    fittedBirefringence: ghoshDifference(0.78890253e-3, 8.04095323e-3, 1.37254429e-2, 10.1933186e-3, 64),
    shortestNm: 198,
    longestNm: 2053.1,
    source: 'G. Ghosh, Opt. Commun. 163, 95–102 (1999), room temperature',
    checked: 'read',
    temperature: QUARTZ_TEMPERATURE,
  },
  {
    id: 'quartz-radhakrishnan',
    name: 'Quartz (Radhakrishnan 1951)',
    crystal: 'quartz',
    ordinary: sellmeier(
      [0.663044, 0.06],
      [0.517852, 0.106],
      [0.175912, 0.119],
      [0.56538, 8.844],
      [1.675299, 20.742],
    ),
    extraordinary: sellmeier(
      [0.665721, 0.06],
      [0.503511, 0.106],
      [0.214792, 0.119],
      [0.539173, 8.792],
      [1.807613, 19.7],
    ),
    fittedBirefringence: null,
    shortestNm: 180,
    longestNm: 3000,
    source: 'T. Radhakrishnan, Proc. Indian Acad. Sci. A31, 22 (1951) and A25, 260 (1947), 18 °C',
    checked: 'read',
    temperature: QUARTZ_TEMPERATURE,
  },
  {
    id: 'magnesium-fluoride',
    name: 'Magnesium fluoride (Dodge 1984)',
    crystal: 'magnesium fluoride',
    ordinary: sellmeier([0.48755108, 0.04338408], [0.39875031, 0.09461442], [2.3120353, 23.793604]),
    extraordinary: sellmeier([0.41344023, 0.03684262], [0.50497499, 0.09076162], [2.4904862, 23.771995]),
    fittedBirefringence: null,
    shortestNm: 200,
    longestNm: 7000,
    source: 'M. J. Dodge, Appl. Opt. 23, 1980 (1984), 19 °C',
    checked: 'read',
    temperature: MAGNESIUM_FLUORIDE_TEMPERATURE,
  },
  {
    id: 'calcite',
    name: 'Calcite (Ghosh 1999)',
    crystal: 'calcite',
    ordinary: ghosh(0.73358749, 0.96464345, 1.94325203e-2, 1.82831454, 120),
    extraordinary: ghosh(0.35859695, 0.8242783, 1.06689543e-2, 0.14429128, 120),
    fittedBirefringence: ghoshDifference(-29.435688e-3, -134.804456e-3, 2.17641576e-2, -294.9611e-3, 80),
    shortestNm: 204,
    longestNm: 2172,
    source: 'G. Ghosh, Opt. Commun. 163, 95–102 (1999), room temperature',
    checked: 'read',
    temperature: null,
  },
  {
    id: 'calcite-handbook',
    name: 'Calcite (Handbook of Optics 1994)',
    crystal: 'calcite',
    ordinary: sellmeier([0.8559, 0.0588], [0.8391, 0.141], [0.0009, 0.197], [0.6845, 7.005]),
    extraordinary: sellmeier([1.0856, 0.07897], [0.0988, 0.142], [0.317, 11.468]),
    fittedBirefringence: null,
    shortestNm: 200,
    longestNm: 2200,
    source:
      'Handbook of Optics, vol. 2, 2nd ed. (1994); coefficients of the extraordinary ray as a public file gives them, its range taken as the ordinary ray’s',
    checked: 'read',
    temperature: null,
  },
  {
    id: 'sapphire',
    name: 'Sapphire (Malitson and Dodge 1972)',
    crystal: 'sapphire',
    ordinary: sellmeier([1.4313493, 0.0726631], [0.65054713, 0.1193242], [5.3414021, 18.028251]),
    extraordinary: sellmeier([1.5039759, 0.0740288], [0.55069141, 0.1216529], [6.5927379, 20.072248]),
    fittedBirefringence: null,
    shortestNm: 200,
    longestNm: 5000,
    source:
      'I. H. Malitson, M. J. Dodge, J. Opt. Soc. Am. 62, 1405 (1972); M. J. Dodge, CRC Handbook of Laser Science and Technology IV (1986), 20 °C',
    checked: 'read',
    temperature: null,
  },
];

/** @throws RangeError for an id that no material has: `MaterialId` already rules that out for typed code. */
export function materialOf(id: MaterialId): Material {
  const found = MATERIALS.find((material) => material.id === id);
  if (found === undefined) throw new RangeError(`no material is called ${id}`);
  return found;
}
