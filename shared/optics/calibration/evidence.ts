import { exp, log } from '../elementary';

/** A question counts as settled, a fault as seen and a value as apart from another from this many σ on. */
export const SETTLED_SIGMA = 5;

/** Intervals hold what lies within this many σ: 95.45 % for normal errors. */
export const INTERVAL_SIGMA = 2;

/**
 * Where σ was estimated from the scatter, with this many degrees of freedom; null where it was stated. Then a distance in
 * units of the estimate follows Student's law, and few rows would make a fluke look settled.
 */
export type ScatterFreedom = number | null;

/**
 * The σ of a normal law that is as unlikely as `ratio` estimated σ are under Student's. Wallace's approximation (Ann. Math.
 * Stat. 30, 1124 (1959), from memory), low by up to 0.06 at 3 σ with three degrees of freedom, by less with more: it errs to the careful side.
 */
export function asNormalSigmas(ratio: number, freedom: ScatterFreedom): number {
  if (freedom === null) return ratio;
  return shrink(freedom) * Math.sqrt(freedom * log(1 + (ratio * ratio) / freedom));
}

/** The inverse: how many estimated σ reach as far as `sigmas` of a normal law. */
export function asStudentSigmas(sigmas: number, freedom: ScatterFreedom): number {
  if (freedom === null) return sigmas;
  const root = sigmas / shrink(freedom);
  return Math.sqrt(freedom * (exp((root * root) / freedom) - 1));
}

function shrink(freedom: number): number {
  return (8 * freedom + 1) / (8 * freedom + 3);
}

/**
 * The length in σ of a two-component amplitude whose χ² is `squares`. For an estimated σ exact: χ²/2 then follows Fisher's
 * law with (2, ν) degrees, whose tail is (1 + χ²/ν)^(−ν/2) where that of a normal pair is e^(−z²/2).
 */
export function pairSigmas(squares: number, freedom: ScatterFreedom): number {
  const size = Math.max(0, squares);
  return Math.sqrt(freedom === null ? size : freedom * log(1 + size / freedom));
}

/**
 * How many σ a χ² lies above what its degrees of freedom give; 0 for none. The cube root of χ²/ν is nearly normal (Wilson
 * and Hilferty, PNAS 17, 684 (1931), from memory).
 */
export function misfitSigmas(chiSquared: number, freedom: number): number {
  if (freedom <= 0 || chiSquared <= 0) return 0;
  const spread = 2 / (9 * freedom);
  return (exp(log(chiSquared / freedom) / 3) - 1 + spread) / Math.sqrt(spread);
}

/**
 * The length in σ of a two-component amplitude as unlikely as a sum of squares of `count` normal numbers that reaches
 * `squares`: for an estimated σ Fisher's law with (count, ν) degrees, otherwise χ²'s, whose tails are finite sums for even
 * counts. An odd count is taken as one more, which errs to the careful side.
 */
export function excessSigmas(squares: number, count: number, freedom: ScatterFreedom): number {
  if (count <= 0 || !(squares > 0)) return 0;
  const terms = Math.ceil(count / 2);
  const spread = freedom === null ? 0 : squares / freedom;
  const step = squares / (1 + spread) / 2;
  let sum = 0;
  for (let i = 0, term = 1; i < terms; i += 1) {
    sum += term;
    // Of χ² (h)ⁱ/i! with h = χ²/2; of Fisher's (ν/2)(ν/2 + 1)…/i! times the i-th power of what is left of one.
    term *= (step + (freedom === null ? 0 : (2 * i * step) / freedom)) / (i + 1);
  }
  const lost = freedom === null ? squares / 2 : (freedom / 2) * log(1 + spread);
  return Math.sqrt(Math.max(0, 2 * (lost - log(sum))));
}
