/** A Jones vector aH + bV in the canonical frame (phase e^{i(kz − ωt)}), each part as real and imaginary numbers. */
export interface JonesVector {
  readonly aRe: number;
  readonly aIm: number;
  readonly bRe: number;
  readonly bIm: number;
}

// Below this share of the norm a component's phase is rounding noise and can't fix the global phase.
const PHASELESS = 1e-15;

/** The length √(|a|² + |b|²), scaled so that neither 1e-200 nor 1e200 is lost in the squares. */
export function jonesNorm({ aRe, aIm, bRe, bIm }: JonesVector): number {
  const largest = Math.max(Math.abs(aRe), Math.abs(aIm), Math.abs(bRe), Math.abs(bIm));
  if (largest === 0) return 0;
  const [w, x, y, z] = [aRe / largest, aIm / largest, bRe / largest, bIm / largest];
  return largest * Math.sqrt(w * w + x * x + y * y + z * z);
}

/**
 * The same state with length 1 and its global phase fixed: a real and not negative, or b where a vanishes.
 * @throws RangeError for the zero vector and for parts that aren't finite.
 */
export function normaliseJones(jones: JonesVector): JonesVector {
  const largest = Math.max(
    Math.abs(jones.aRe),
    Math.abs(jones.aIm),
    Math.abs(jones.bRe),
    Math.abs(jones.bIm),
  );
  if (!(largest > 0) || largest === Infinity)
    throw new RangeError('a zero or endless Jones vector is no state');
  const aRe = jones.aRe / largest;
  const aIm = jones.aIm / largest;
  const bRe = jones.bRe / largest;
  const bIm = jones.bIm / largest;
  const a = Math.sqrt(aRe * aRe + aIm * aIm);
  const b = Math.sqrt(bRe * bRe + bIm * bIm);
  const norm = Math.sqrt(aRe * aRe + aIm * aIm + bRe * bRe + bIm * bIm);
  if (a <= PHASELESS * norm) return { aRe: 0, aIm: 0, bRe: 1, bIm: 0 };
  if (b <= PHASELESS * norm) return { aRe: 1, aIm: 0, bRe: 0, bIm: 0 };
  const scale = a * norm;
  return {
    aRe: a / norm,
    aIm: 0,
    bRe: (bRe * aRe + bIm * aIm) / scale,
    bIm: (bIm * aRe - bRe * aIm) / scale,
  };
}
