import type { Convention } from './convention';

type Flag = keyof Convention;

/** One published text or standard, and which of the three flags it settles. */
export interface ConventionSource {
  readonly text: string;
  /** What it says of the hands, the Jones vectors and S3. */
  readonly states: string;
  /** Flags settled by what was read, in the text itself or quoted in a public page that is named. */
  readonly read: readonly Flag[];
  /** Flags settled by what is recalled of it: look it up before citing it. */
  readonly recalled: readonly Flag[];
}

/** A ready-made convention with the texts or standards that it comes from. */
export interface ConventionSet {
  readonly id: string;
  readonly name: string;
  readonly sources: readonly ConventionSource[];
  /** The sources in one line. */
  readonly source: string;
  readonly convention: Convention;
  /** Flags that no source of the set settles, filled with the usual companion. */
  readonly notFixedBySource: readonly Flag[];
  /** `read` when something that was read settles every flag that the sources settle at all. */
  readonly checked: 'read' | 'from memory';
}

const FLAGS: readonly Flag[] = ['phase', 'handedness', 's3Sign'];

function conventionSet(
  id: string,
  name: string,
  convention: Convention,
  sources: readonly ConventionSource[],
): ConventionSet {
  const read = sources.flatMap((source) => source.read);
  const settled = [...read, ...sources.flatMap((source) => source.recalled)];
  return {
    id,
    name,
    sources,
    source: sources.map(({ text, states }) => `${text}: ${states}`).join('; '),
    convention,
    notFixedBySource: FLAGS.filter((flag) => !settled.includes(flag)),
    checked: settled.every((flag) => read.includes(flag)) ? 'read' : 'from memory',
  };
}

/** Sets with equal flags stand side by side where their sources are looked for by name or leave different flags open. */
export const CONVENTION_SETS: readonly ConventionSet[] = [
  conventionSet(
    'positive-helicity',
    'Physics texts, positive helicity',
    { phase: 'kz-wt', handedness: 'receiver', s3Sign: 'L' },
    [
      {
        text: 'J. D. Jackson, Classical Electrodynamics',
        states:
          'k·x − ωt; ε1 + iε2, counter-clockwise to the receiver, is "left", positive helicity, s3 = +1',
        read: [],
        recalled: ['phase', 'handedness', 's3Sign'],
      },
    ],
  ),
  conventionSet(
    'receiver-optics-kz',
    'Receiver-view optics texts, kz − ωt',
    { phase: 'kz-wt', handedness: 'receiver', s3Sign: 'R' },
    [
      {
        text: 'J. C. Wyant, Optics 513 "Jones calculus" notes',
        states:
          'R = (1, −i)/√2, and a retarder with its fast axis along x is diag(1, e^{iφ}), which is kz − ωt and so R clockwise to the receiver',
        read: ['phase', 'handedness'],
        recalled: [],
      },
      {
        text: 'E. Landi Degl’Innocenti, M. Landolfi, Polarization in Spectral Lines (2004), as an encyclopedia’s references quote it',
        states: 'right is clockwise for an observer facing the source, with S3 > 0; no phase',
        read: ['handedness', 's3Sign'],
        recalled: [],
      },
      {
        text: 'R. A. Chipman, W.-S. T. Lam, G. Young, Polarized Light and Optical Systems (2018)',
        states: 'decreasing phase (as a public file quotes it); R clockwise to the receiver, S3 = +1 for it',
        read: ['phase'],
        recalled: ['handedness', 's3Sign'],
      },
      {
        text: 'E. Hecht, Optics',
        states:
          'kz − ωt, R = (1, −i)/√2 clockwise to the receiver, S3 = +1 for it in the Stokes table; his formula for S3 gives the other sign, so check the edition',
        read: [],
        recalled: ['phase', 'handedness', 's3Sign'],
      },
    ],
  ),
  conventionSet(
    'receiver-optics-wt',
    'Receiver-view optics texts, ωt − kz',
    { phase: 'wt-kz', handedness: 'receiver', s3Sign: 'R' },
    [
      {
        text: 'M. Born, E. Wolf, Principles of Optics',
        states: 'ωt − k·r; right is clockwise for an observer who looks at the source, s3 = 2a1a2 sin δ > 0',
        read: [],
        recalled: ['phase', 'handedness', 's3Sign'],
      },
      {
        text: 'D. Goldstein, Polarized Light',
        states: 'ωt − kz; R = (1, +i)/√2 clockwise to the receiver, S3 = 2E0xE0y sin(δy − δx) > 0',
        read: [],
        recalled: ['phase', 'handedness', 's3Sign'],
      },
      {
        text: 'E. Collett, Field Guide to Polarization; B. Schaefer et al., Am. J. Phys. 75, 163 (2007)',
        states: 'as Goldstein',
        read: [],
        recalled: ['phase', 'handedness', 's3Sign'],
      },
    ],
  ),
  conventionSet(
    'receiver-vocabularies',
    'CIE, IEC and IUPAC vocabularies',
    { phase: 'kz-wt', handedness: 'receiver', s3Sign: 'R' },
    [
      {
        text: 'CIE e-ILV term 177, which is IEC 60050-845, entry 845-21-019 (2020)',
        states: 'right is clockwise as seen by an observer receiving the light',
        read: ['handedness'],
        recalled: [],
      },
      {
        text: 'IUPAC Gold Book L03524',
        states: 'right is clockwise viewed against the propagation',
        read: ['handedness'],
        recalled: [],
      },
    ],
  ),
  conventionSet('ieee-source', 'IEEE, source view', { phase: 'wt-kz', handedness: 'source', s3Sign: 'R' }, [
    {
      text: 'IEEE Std 149-1979, section 11.1, as an encyclopedia’s references quote it',
      states: 'right is clockwise for an observer looking along the propagation',
      read: ['handedness'],
      recalled: [],
    },
    {
      text: 'US Federal Standard 1037C; International Electrotechnical Vocabulary, part on antennas and propagation',
      states: 'right is clockwise viewed in the direction of propagation, left counter-clockwise',
      read: ['handedness'],
      recalled: [],
    },
    {
      text: 'IEEE Std 145',
      states: 'the same sense; wording not seen',
      read: [],
      recalled: ['handedness'],
    },
  ]),
  conventionSet(
    'iau-1974',
    'International Astronomical Union, 1974',
    { phase: 'wt-kz', handedness: 'source', s3Sign: 'R' },
    [
      {
        text: 'IAU Commission 40 (1974), as told by J. P. Hamaker, J. D. Bregman, Astron. Astrophys. Suppl. 117, 161 (1996)',
        states:
          'the IEEE sense: right is counter-clockwise on the sky for the receiver, and V > 0 for it (the sign of V recalled)',
        read: ['handedness'],
        recalled: ['s3Sign'],
      },
    ],
  ),
  conventionSet(
    'particle-helicity',
    'Particle physics, helicity',
    { phase: 'kz-wt', handedness: 'source', s3Sign: 'R' },
    [
      {
        text: 'Common use in particle physics, no single text',
        states:
          'k·x − ωt; right is helicity +1, (1, +i)/√2, counter-clockwise to the receiver; no Stokes parameters',
        read: [],
        recalled: ['phase', 'handedness'],
      },
    ],
  ),
  conventionSet(
    'qubit-measurement-2001',
    'Measurement of qubits, 2001',
    { phase: 'kz-wt', handedness: 'receiver', s3Sign: 'R' },
    [
      {
        text: 'D. F. V. James, P. G. Kwiat, W. J. Munro, A. G. White, Phys. Rev. A 64, 052312 (2001)',
        states:
          'R = (H − iV)/√2, L = (H + iV)/√2 (only these give the published matrix from its counts); S3 = +1 for R; no phase and no sense of turning',
        read: [],
        recalled: ['s3Sign'],
      },
    ],
  ),
];
