/**
 * Where a scan that left `blind` open feels nothing to first order: at 0°, 180° or 360° between polarisers, where the power
 * goes with cos δ, and at 90° or 270° behind circular light, where it goes with sin δ.
 */
export function blindNearDeg(retardanceDeg: number): number {
  return 90 * Math.round(retardanceDeg / 90);
}

/** Which scan feels a retardance where the other one is blind. */
export function feelingScan(retardanceDeg: number): 'between-polarisers' | 'circular-light' {
  return blindNearDeg(retardanceDeg) % 180 === 0 ? 'circular-light' : 'between-polarisers';
}
