import { sincosInto } from '../elementary';
import type { Samples } from './scan-rows';

/** Which functions of the plate's angle a scan is taken apart into: 1, then cos kθ and sin kθ for each k of `signal`. */
export interface Basis {
  readonly signal: readonly number[];
  /** The same functions once more, times the time: what a source that drifts slowly adds. */
  readonly drifts: boolean;
  /** Further harmonics, without drift, to look for faults. */
  readonly faults: readonly number[];
}

export function basisSize({ signal, drifts, faults }: Basis): number {
  return (1 + 2 * signal.length) * (drifts ? 2 : 1) + 2 * faults.length;
}

/** The basis functions' values, a row for each sample. */
export function designOf(basis: Basis, samples: Samples): Float64Array {
  const size = basisSize(basis);
  const design = new Float64Array(samples.count * size);
  const trig = { sin: 0, cos: 0 };
  for (let k = 0; k < samples.count; k += 1) {
    const angleRad = samples.angleRad[k] ?? 0;
    const time = samples.time[k] ?? 0;
    const first = k * size;
    let column = first;
    design[column++] = 1;
    for (const harmonic of basis.signal) {
      sincosInto(harmonic * angleRad, trig);
      design[column++] = trig.cos;
      design[column++] = trig.sin;
    }
    if (basis.drifts) {
      const end = column;
      for (let i = first; i < end; i += 1) design[column++] = time * (design[i] ?? 0);
    }
    for (const harmonic of basis.faults) {
      sincosInto(harmonic * angleRad, trig);
      design[column++] = trig.cos;
      design[column++] = trig.sin;
    }
  }
  return design;
}
