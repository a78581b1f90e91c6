import { pairSigmas } from './evidence';
import { type Basis, basisSize } from './harmonic-basis';
import { pairSquares } from './linear-squares';
import type { Samples } from './scan-rows';
import { spectrumOf } from './spectrum';

/**
 * A harmonic that an ideal plate doesn't make. Once per turn points to a wedge or an axis off the beam; twice per turn,
 * between linear polarisers, to a plate that absorbs along one axis more (diattenuation) or to light that comes in
 * elliptical. Common practice, from memory: a hint where to look, no finding.
 */
export interface FaultHarmonic {
  readonly perTurn: 1 | 2;
  readonly hint: 'wedge-or-decentre' | 'diattenuation-or-elliptical-input';
  /** Amplitude, in the unit of the scan's values (a share for both ports). */
  readonly amplitude: number;
  /** Its length in σ, both phases together. */
  readonly sigmas: number;
}

/** The fault harmonics of a scan, fitted together with its signal; null where the rows are too few to tell. */
export function faultHarmonics(
  samples: Samples,
  signal: Basis,
  perTurn: readonly (1 | 2)[],
): readonly FaultHarmonic[] | null {
  const found = spectrumOf(samples, { ...signal, faults: perTurn });
  if (found === null) return null;
  const first = basisSize(signal);
  return perTurn.map((harmonic, i) => {
    const [a, b] = [
      found.fit.coefficients[first + 2 * i] ?? 0,
      found.fit.coefficients[first + 2 * i + 1] ?? 0,
    ];
    return {
      perTurn: harmonic,
      hint: harmonic === 1 ? 'wedge-or-decentre' : 'diattenuation-or-elliptical-input',
      amplitude: samples.scale * Math.sqrt(a * a + b * b),
      sigmas: pairSigmas(pairSquares(found.fit, first + 2 * i), found.freedom),
    };
  });
}
