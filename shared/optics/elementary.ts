/*
 * Sine, cosine, exponential, logarithm, arctangent and arccosine with the same bits on every JavaScript engine.
 *
 * Why not Math.sin: ECMAScript leaves its last bits to the engine, and a version's hash must come out the same in the
 * browser and on the server. Everything here is made of + − × ÷ and Math.sqrt, Math.fround, Math.abs, Math.round, which
 * IEEE 754 and the language fix exactly. The algorithms and coefficients are those of fdlibm 5.3, whose notice follows.
 *
 * ====================================================
 * Copyright (C) 1993-2004 by Sun Microsystems, Inc. All rights reserved.
 *
 * Developed at SunSoft, a Sun Microsystems, Inc. business.
 * Permission to use, copy, modify, and distribute this
 * software is freely granted, provided that this notice
 * is preserved.
 * ====================================================
 */

/** The largest angle that `sin`, `cos` and `sincos` take, in radians: the reach of the three-part reduction below. */
export const LARGEST_ANGLE_RAD = 500_000;

const PI = 3.141592653589793;
const PI_LOW = 1.2246467991473532e-16;
const HALF_PI = 1.5707963267948966;
const HALF_PI_LOW = 6.123233995736766e-17;

// sin on [−π/4, π/4]; tail is the part of the angle below its last bit.
function kernelSin(x: number, tail: number): number {
  const z = x * x;
  const v = z * x;
  const r =
    8.33333333332248946124e-3 +
    z *
      (-1.98412698298579493134e-4 +
        z * (2.75573137070700676789e-6 + z * (-2.50507602534068634195e-8 + z * 1.58969099521155010221e-10)));
  return x - (z * (0.5 * tail - v * r) - tail - v * -1.66666666666666324348e-1);
}

// cos on [−π/4, π/4]
function kernelCos(x: number, tail: number): number {
  const z = x * x;
  const r =
    z *
    (4.16666666666666019037e-2 +
      z *
        (-1.38888888888741095749e-3 +
          z *
            (2.48015872894767294178e-5 +
              z *
                (-2.75573143513906633035e-7 +
                  z * (2.0875723212981748279e-9 + z * -1.13596475577881948265e-11)))));
  const ax = Math.abs(x);
  if (ax < 0.3) return 1 - (0.5 * z - (z * r - x * tail));
  const qx = ax > 0.78125 ? 0.28125 : Math.fround(ax * 0.25);
  const hz = 0.5 * z - qx;
  return 1 - qx - (hz - (z * r - x * tail));
}

/** A sine and a cosine of one angle. Filled in place so that a kernel can call it without allocating. */
export interface SinCos {
  sin: number;
  cos: number;
}

/**
 * Writes sin and cos of `angleRad` into `out`.
 * Cody–Waite reduction by π/2 in three parts of 33 bits; error below one unit in the last place.
 * @throws RangeError beyond ±LARGEST_ANGLE_RAD and for NaN.
 */
export function sincosInto(angleRad: number, out: SinCos): void {
  const size = Math.abs(angleRad);
  if (!(size <= LARGEST_ANGLE_RAD)) {
    throw new RangeError(`angle must be within ±${LARGEST_ANGLE_RAD} rad, got ${angleRad}`);
  }
  if (size <= PI / 4) {
    out.sin = kernelSin(angleRad, 0);
    out.cos = kernelCos(angleRad, 0);
    return;
  }
  const n = Math.round(angleRad * 6.36619772367581382433e-1);
  let r = angleRad - n * 1.57079632673412561417;
  let w = n * 6.07710050650619224932e-11;
  let head = r - w;
  // Close to a multiple of π/2 the first part cancels; bring in the next bits of π/2.
  if (Math.abs(head) < size * 1.52587890625e-5) {
    let t = r;
    w = n * 6.0771005063039659766e-11;
    r = t - w;
    w = n * 2.02226624879595063154e-21 - (t - r - w);
    head = r - w;
    if (Math.abs(head) < size * 1.7763568394002505e-15) {
      t = r;
      w = n * 2.0222662487111664558e-21;
      r = t - w;
      w = n * 8.47842766036889956997e-32 - (t - r - w);
      head = r - w;
    }
  }
  const tail = r - head - w;
  const s = kernelSin(head, tail);
  const c = kernelCos(head, tail);
  switch (((n % 4) + 4) % 4) {
    case 0:
      out.sin = s;
      out.cos = c;
      return;
    case 1:
      out.sin = c;
      out.cos = -s;
      return;
    case 2:
      out.sin = -s;
      out.cos = -c;
      return;
    default:
      out.sin = -c;
      out.cos = s;
  }
}

export function sincos(angleRad: number): SinCos {
  const out = { sin: 0, cos: 0 };
  sincosInto(angleRad, out);
  return out;
}

export function sin(angleRad: number): number {
  return sincos(angleRad).sin;
}

export function cos(angleRad: number): number {
  return sincos(angleRad).cos;
}

function atanSeries(x: number): number {
  const z = x * x;
  const w = z * z;
  const s1 =
    z *
    (3.33333333333329318027e-1 +
      w *
        (1.42857142725034663711e-1 +
          w *
            (9.09088713343650656196e-2 +
              w *
                (6.66107313738753120669e-2 +
                  w * (4.97687799461593236017e-2 + w * 1.62858201153657823623e-2)))));
  const s2 =
    w *
    (-1.99999999998764832476e-1 +
      w *
        (-1.1111110405462355788e-1 +
          w *
            (-7.69187620504482999495e-2 + w * (-5.83357013379057348645e-2 + w * -3.6531572744216915527e-2))));
  return x * (s1 + s2);
}

/** Arctangent of a finite number, in [−π/2, π/2]. */
export function atan(value: number): number {
  const x = Math.abs(value);
  let result: number;
  if (x >= 1.8446744073709552e19) result = HALF_PI;
  else if (x < 0.4375) result = x - atanSeries(x);
  else if (x < 0.6875) {
    const y = (2 * x - 1) / (2 + x);
    result = 4.63647609000806093515e-1 - (atanSeries(y) - 2.26987774529616870924e-17 - y);
  } else if (x < 1.1875) {
    const y = (x - 1) / (x + 1);
    result = 7.85398163397448278999e-1 - (atanSeries(y) - 3.06161699786838301793e-17 - y);
  } else if (x < 2.4375) {
    const y = (x - 1.5) / (1 + 1.5 * x);
    result = 9.82793723247329054082e-1 - (atanSeries(y) - 1.39033110312309984516e-17 - y);
  } else {
    const y = -1 / x;
    result = HALF_PI - (atanSeries(y) - HALF_PI_LOW - y);
  }
  return value < 0 ? -result : result;
}

/** The angle of the point (x, y) from the positive x axis, in (−π, π]; 0 at the origin. */
export function atan2(y: number, x: number): number {
  if (y === 0) return x < 0 ? PI : 0;
  if (x === 0) return y > 0 ? HALF_PI : -HALF_PI;
  const z = atan(Math.abs(y / x));
  if (x > 0) return y > 0 ? z : -z;
  return y > 0 ? PI - (z - PI_LOW) : z - PI_LOW - PI;
}

function asinRatio(z: number): number {
  const p =
    z *
    (1.66666666666666657415e-1 +
      z *
        (-3.25565818622400915405e-1 +
          z *
            (2.01212532134862925881e-1 +
              z *
                (-4.00555345006794114027e-2 +
                  z * (7.91534994289814532176e-4 + z * 3.4793310759602116757e-5)))));
  const q =
    1 +
    z *
      (-2.40339491173441421878 +
        z * (2.02094576023350569471 + z * (-6.8828397160545329303e-1 + z * 7.70381505559019352791e-2)));
  return p / q;
}

/** Arccosine in [0, π]. Values outside [−1, 1] are clamped: rounding takes a unit vector's product past 1. */
export function acos(value: number): number {
  if (value >= 1) return 0;
  if (value <= -1) return PI;
  if (Math.abs(value) < 0.5) {
    return HALF_PI - (value - (HALF_PI_LOW - value * asinRatio(value * value)));
  }
  if (value < 0) {
    const z = (1 + value) * 0.5;
    const s = Math.sqrt(z);
    return PI - 2 * (s + (asinRatio(z) * s - HALF_PI_LOW));
  }
  const z = (1 - value) * 0.5;
  const s = Math.sqrt(z);
  const head = Math.fround(s);
  const c = (z - head * head) / (s + head);
  return 2 * (head + (asinRatio(z) * s + c));
}

/** Arcsine in [−π/2, π/2], clamped like `acos`. */
export function asin(value: number): number {
  const clamped = value > 1 ? 1 : value < -1 ? -1 : value;
  return atan2(clamped, Math.sqrt((1 - clamped) * (1 + clamped)));
}

/** e to a finite power; 0 below −745 and Infinity above 709.78, as in IEEE arithmetic. */
export function exp(value: number): number {
  if (value > 709.782712893384) return Infinity;
  if (value < -745.1332191019411) return 0;
  const k = Math.round(value * 1.442695040888963387);
  const high = value - k * 6.9314718036912381649e-1;
  const low = k * 1.90821492927058770002e-10;
  const x = high - low;
  const t = x * x;
  const c =
    x -
    t *
      (1.66666666666666019037e-1 +
        t *
          (-2.77777777770155933842e-3 +
            t *
              (6.61375632143793436117e-5 + t * (-1.6533902205465251539e-6 + t * 4.13813679705723846039e-8))));
  return scaleByPowerOfTwo(1 - (low - (x * c) / (2 - c) - high), k);
}

/** Natural logarithm; −Infinity at 0, NaN below. */
export function log(value: number): number {
  if (!(value > 0) || value === Infinity) return value === 0 ? -Infinity : value > 0 ? Infinity : NaN;
  // value = m · 2^power with m in [√½, √2)
  let m = value;
  let power = 0;
  for (const step of [512, 256, 128, 64, 32, 16, 8, 4, 2, 1]) {
    const size = powerOfTwo(step);
    if (m >= size) {
      m /= size;
      power += step;
    } else if (m * size < 2) {
      m *= size;
      power -= step;
    }
  }
  // Subnormal numbers reach below the sum of those steps.
  while (m < 1) {
    m *= 2;
    power -= 1;
  }
  if (m > Math.SQRT2) {
    m /= 2;
    power += 1;
  }
  const f = m - 1;
  const s = f / (2 + f);
  const z = s * s;
  const w = z * z;
  const t1 = w * (3.999999999940941908e-1 + w * (2.222219843214978396e-1 + w * 1.531383769920937332e-1));
  const t2 =
    z *
    (6.66666666666673513e-1 +
      w * (2.857142874366239149e-1 + w * (1.818357216161805012e-1 + w * 1.479819860511658591e-1)));
  const half = 0.5 * f * f;
  const high = power * 6.9314718036912381649e-1;
  const low = power * 1.90821492927058770002e-10;
  return high - (half - (s * (half + (t1 + t2)) + low) - f);
}

// Two exact factors, so that neither overflows nor loses bits before the product does.
function scaleByPowerOfTwo(value: number, power: number): number {
  const half = Math.trunc(power / 2);
  return value * powerOfTwo(half) * powerOfTwo(power - half);
}

function powerOfTwo(power: number): number {
  let factor = power < 0 ? 0.5 : 2;
  let result = 1;
  for (let left = Math.abs(power); left > 0; left = Math.floor(left / 2)) {
    if (left % 2 === 1) result *= factor;
    factor *= factor;
  }
  return result;
}
