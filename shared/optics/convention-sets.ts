import type { Convention } from './convention';

/** A ready-made convention with the text or standard that it comes from. */
export interface ConventionSet {
  readonly id: string;
  readonly name: string;
  readonly source: string;
  readonly convention: Convention;
  /** Flags that the source doesn't settle, filled with the usual companion. */
  readonly notFixedBySource: readonly (keyof Convention)[];
  /** How the source was checked: read in a public page, or recalled. */
  readonly checked: 'read' | 'from memory';
}

export const CONVENTION_SETS: readonly ConventionSet[] = [
  {
    id: 'positive-helicity',
    name: 'Physics texts, positive helicity',
    source: 'J. D. Jackson, Classical Electrodynamics: k·x − ωt, positive helicity is "left", s3 = +1 for it',
    convention: { phase: 'kz-wt', handedness: 'receiver', s3Sign: 'L' },
    notFixedBySource: [],
    checked: 'from memory',
  },
  {
    id: 'receiver-optics-kz',
    name: 'Receiver-view optics texts, kz − ωt',
    source:
      'J. C. Wyant, Optics 513 "Jones calculus" notes: R = (1, −i)/√2; Chipman, Lam, Young, Polarized Light and Optical Systems (2018): decreasing phase, R clockwise to the receiver with S3 = +1 (hand and S3 from memory)',
    convention: { phase: 'kz-wt', handedness: 'receiver', s3Sign: 'R' },
    notFixedBySource: [],
    checked: 'read',
  },
  {
    id: 'receiver-optics-wt',
    name: 'Receiver-view optics texts, ωt − kz',
    source:
      'M. Born, E. Wolf, Principles of Optics; D. Goldstein, Polarized Light: R = (1, +i)/√2, S3 = +1 for R',
    convention: { phase: 'wt-kz', handedness: 'receiver', s3Sign: 'R' },
    notFixedBySource: [],
    checked: 'from memory',
  },
  {
    id: 'ieee-source',
    name: 'IEEE, source view',
    source:
      'IEEE Std 149-1979, section 11.1: right is clockwise for an observer looking along the propagation',
    convention: { phase: 'wt-kz', handedness: 'source', s3Sign: 'R' },
    notFixedBySource: ['phase', 's3Sign'],
    checked: 'read',
  },
  {
    id: 'iau-1974',
    name: 'International Astronomical Union, 1974',
    source:
      'IAU Commission 40 (1974), as told by Hamaker and Bregman, A&AS 117, 161 (1996): the IEEE sense; V > 0 for its right (sign of V from memory)',
    convention: { phase: 'wt-kz', handedness: 'source', s3Sign: 'R' },
    notFixedBySource: ['phase'],
    checked: 'read',
  },
  {
    id: 'qubit-measurement-2001',
    name: 'Measurement of qubits, 2001',
    source:
      'D. F. V. James, P. G. Kwiat, W. J. Munro, A. G. White, Phys. Rev. A 64, 052312 (2001): R = (H − iV)/√2, L = (H + iV)/√2, S3 = +1 for R (from memory)',
    convention: { phase: 'kz-wt', handedness: 'receiver', s3Sign: 'R' },
    notFixedBySource: ['phase', 'handedness'],
    checked: 'from memory',
  },
];
