import { acos } from '../elementary';

/** A plate of a published composite, in beam order. */
export interface CompositePlate {
  readonly retardanceDeg: number;
  readonly fastAxisDeg: number;
}

/** What a composite makes when nothing is wrong. Only `apply` says something about every input. */
export type CompositeMakes =
  | { readonly kind: 'apply'; readonly retardanceDeg: number; readonly fastAxisDeg: number }
  /** Canonical Stokes vectors (S1, S2, S3). */
  | { readonly kind: 'prepare'; readonly input: Triple; readonly target: Triple }
  /** The retardance is flat and the light nearly that of a plate; the axis drifts with the error. */
  | { readonly kind: 'flat-retardance'; readonly retardanceDeg: number };

type Triple = readonly [s1: number, s2: number, s3: number];

export interface PublishedComposite {
  readonly id: string;
  /** In plain words, with the author of the idea. */
  readonly name: string;
  readonly source: string;
  /** recalled: the numbers are from memory of the source, checked only by what they do. computed: worked out from its idea. */
  readonly standing: 'recalled' | 'computed' | 'seen';
  readonly plates: readonly CompositePlate[];
  readonly makes: CompositeMakes;
  /** Power of the common relative retardance error with which 1 − F grows; null where the source promises a band, not a power. */
  readonly infidelityPower: number | null;
}

const H: Triple = [1, 0, 0];
const V: Triple = [-1, 0, 0];
const CLOCKWISE: Triple = [0, 0, -1];
const COUNTER_CLOCKWISE: Triple = [0, 0, 1];

/** φ = arccos(−δ/4π), the phase of SK1 and BB1 for a turn by δ; plate angles are half of it. */
function correctionPhaseDeg(retardanceDeg: number): number {
  return (acos(-retardanceDeg / 720) * 180) / Math.PI;
}

function plates(...pairs: readonly (readonly [retardanceDeg: number, fastAxisDeg: number])[]) {
  return pairs.map(([retardanceDeg, fastAxisDeg]): CompositePlate => ({ retardanceDeg, fastAxisDeg }));
}

function sk1(retardanceDeg: number): PublishedComposite {
  const half = correctionPhaseDeg(retardanceDeg) / 2;
  return {
    id: `sk1-${retardanceDeg}`,
    name: `Brown, Harrow and Chuang: two full-wave plates after a plate of ${retardanceDeg}°`,
    source: 'K. R. Brown, A. W. Harrow, I. L. Chuang, Phys. Rev. A 70, 052318 (2004)',
    standing: 'recalled',
    plates: plates([retardanceDeg, 0], [360, 180 - half], [360, half]),
    makes: { kind: 'apply', retardanceDeg, fastAxisDeg: 0 },
    infidelityPower: 4,
  };
}

function bb1(retardanceDeg: number): PublishedComposite {
  const half = correctionPhaseDeg(retardanceDeg) / 2;
  return {
    id: `bb1-${retardanceDeg}`,
    name: `Wimperis: half-, full- and half-wave plate before a plate of ${retardanceDeg}°`,
    source:
      'S. Wimperis, J. Magn. Reson. A 109, 221 (1994); phase as in Cummins et al., Phys. Rev. A 67, 042308 (2003); carried over ' +
      'to retarders by A. Ardavan, New J. Phys. 9, 24 (2007)',
    standing: 'seen',
    plates: plates([180, half], [360, 3 * half], [180, half], [retardanceDeg, 0]),
    makes: { kind: 'apply', retardanceDeg, fastAxisDeg: 0 },
    infidelityPower: 6,
  };
}

// φ_k = (N + 1 − 2⌊(k + 1)/2⌋) ⌊k/2⌋ · 180°/N, plate angles half of it.
function inversion(count: number): PublishedComposite {
  const angle = (k: number): number =>
    ((count + 1 - 2 * Math.floor((k + 1) / 2)) * Math.floor(k / 2) * 90) / count;
  return {
    id: `inversion-${count}`,
    name: `Torosov and Vitanov: ${count} half-wave plates turn one circular state into the other`,
    source: 'B. T. Torosov, N. V. Vitanov, Phys. Rev. A 83, 053420 (2011)',
    standing: 'recalled',
    plates: plates(...Array.from({ length: count }, (_, k) => [180, angle(k + 1) % 180] as const)),
    makes: { kind: 'prepare', input: CLOCKWISE, target: COUNTER_CLOCKWISE },
    infidelityPower: 2 * count,
  };
}

/**
 * Composite settings from the literature, plates in beam order, fast axes counter-clockwise from H as the receiver sees
 * them. What each one does under a common relative retardance error is checked in tests/reference/composites.test.ts.
 */
export const PUBLISHED_COMPOSITES: readonly PublishedComposite[] = [
  {
    id: 'half-wave-0-60-0',
    name: 'Pancharatnam: three half-wave plates make one at 30°',
    source:
      'after S. Pancharatnam, Proc. Indian Acad. Sci. A 41, 137 (1955); first-order condition cos 2c = −½',
    standing: 'computed',
    plates: plates([180, 0], [180, 60], [180, 0]),
    makes: { kind: 'apply', retardanceDeg: 180, fastAxisDeg: 30 },
    infidelityPower: 4,
  },
  {
    id: 'quarter-wave-three',
    name: 'Pancharatnam: three plates make an achromatic quarter-wave plate',
    source: 'S. Pancharatnam, Proc. Indian Acad. Sci. A 41, 137 (1955)',
    standing: 'recalled',
    plates: plates([115.5, 0], [180, 70.5], [115.5, 0]),
    makes: { kind: 'flat-retardance', retardanceDeg: 90 },
    infidelityPower: null,
  },
  sk1(90),
  sk1(180),
  bb1(90),
  bb1(180),
  {
    id: 'circular-two',
    name: 'Destriau and Prouteau: a half- and a quarter-wave plate make circular light from H',
    source:
      'idea: G. Destriau, J. Prouteau (1949); S. Pancharatnam, Proc. Indian Acad. Sci. A 41, 130 (1955)',
    standing: 'recalled',
    plates: plates([180, 15], [90, 75]),
    makes: { kind: 'prepare', input: H, target: CLOCKWISE },
    infidelityPower: 4,
  },
  {
    id: 'circular-three',
    name: 'Pancharatnam: two half- and a quarter-wave plate make circular light from H over a band',
    source:
      'idea: S. Pancharatnam, Proc. Indian Acad. Sci. A 41, 130 (1955); these angles fitted, not the paper’s',
    standing: 'computed',
    plates: plates([180, 6.1381], [180, 34.6613], [90, 102.0464]),
    makes: { kind: 'prepare', input: H, target: CLOCKWISE },
    infidelityPower: null,
  },
  {
    id: 'rotator-two',
    name: 'Koester: two half-wave plates turn H to V',
    source: 'C. J. Koester, J. Opt. Soc. Am. 49, 405 (1959)',
    standing: 'seen',
    plates: plates([180, 22.5], [180, 67.5]),
    makes: { kind: 'prepare', input: H, target: V },
    infidelityPower: 4,
  },
  {
    id: 'rotator-three',
    name: 'Koester: three half-wave plates turn H to V',
    source: 'C. J. Koester, J. Opt. Soc. Am. 49, 405 (1959)',
    standing: 'seen',
    plates: plates([180, 11.25], [180, 45], [180, 78.75]),
    makes: { kind: 'prepare', input: H, target: V },
    infidelityPower: null,
  },
  inversion(3),
  inversion(5),
  inversion(7),
];
