import { exp, sincos } from '../elementary';

/** A complex number, computed only with operations that give the same bits everywhere. */
export interface Complex {
  readonly re: number;
  readonly im: number;
}

export const ONE: Complex = { re: 1, im: 0 };

export function add(a: Complex, b: Complex): Complex {
  return { re: a.re + b.re, im: a.im + b.im };
}

export function negative({ re, im }: Complex): Complex {
  return { re: 0 - re, im: 0 - im };
}

export function multiply(a: Complex, b: Complex): Complex {
  return { re: a.re * b.re - a.im * b.im, im: a.re * b.im + a.im * b.re };
}

/** Smith's division: no square of a part, so neither overflow nor loss for parts of very different size. */
export function divide(a: Complex, b: Complex): Complex {
  if (b.im === 0) return { re: a.re / b.re, im: a.im / b.re };
  if (Math.abs(b.re) >= Math.abs(b.im)) {
    const ratio = b.im / b.re;
    const denominator = b.re + b.im * ratio;
    return { re: (a.re + a.im * ratio) / denominator, im: (a.im - a.re * ratio) / denominator };
  }
  const ratio = b.re / b.im;
  const denominator = b.re * ratio + b.im;
  return { re: (a.re * ratio + a.im) / denominator, im: (a.im * ratio - a.re) / denominator };
}

/** The root with a real part that isn't negative; √−1 = i. */
export function squareRoot({ re, im }: Complex): Complex {
  if (im === 0) return re >= 0 ? { re: Math.sqrt(re), im: 0 } : { re: 0, im: Math.sqrt(-re) };
  const scale = Math.max(Math.abs(re), Math.abs(im));
  const size = scale * Math.sqrt((re / scale) * (re / scale) + (im / scale) * (im / scale));
  const half = Math.sqrt((size + Math.abs(re)) / 2);
  const other = im / (2 * half);
  return re >= 0 ? { re: half, im: other } : { re: Math.abs(other), im: im < 0 ? -half : half };
}

/** e^(re + i·im). @throws RangeError for an imaginary part beyond the reach of `sincos`. */
export function exponential({ re, im }: Complex): Complex {
  const size = exp(re);
  if (im === 0) return { re: size, im: 0 };
  const { sin, cos } = sincos(im);
  return { re: size * cos, im: size * sin };
}

/** By repeated squaring; negative exponents through the reciprocal. `exponent` is a whole number. */
export function wholePower(base: Complex, exponent: number): Complex {
  let result = ONE;
  let square = base;
  for (let left = Math.abs(exponent); left > 0; left = Math.floor(left / 2)) {
    if (left % 2 === 1) result = multiply(result, square);
    if (left > 1) square = multiply(square, square);
  }
  return exponent < 0 ? divide(ONE, result) : result;
}

export function isFinite({ re, im }: Complex): boolean {
  return Number.isFinite(re) && Number.isFinite(im);
}
