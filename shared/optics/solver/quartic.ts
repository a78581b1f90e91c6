/**
 * A polynomial of degree 4, k4 t⁴ + k3 t³ + k2 t² + k1 t + k0, with a leading coefficient that isn't small
 * (trig-quadratic.ts sees to that by choosing where t is infinite).
 */
export interface Quartic {
  readonly k4: number;
  readonly k3: number;
  readonly k2: number;
  readonly k1: number;
  readonly k0: number;
}

function valueAt(p: Quartic, t: number): number {
  return (((p.k4 * t + p.k3) * t + p.k2) * t + p.k1) * t + p.k0;
}

/** The derivative as a quartic whose leading coefficient is 0. */
function derivative(p: Quartic): Quartic {
  return { k4: 0, k3: 4 * p.k4, k2: 3 * p.k3, k1: 2 * p.k2, k0: p.k1 };
}

/** Real zeros of a polynomial, and the real zeros of its derivative that bracket them. */
export interface RealZeros {
  readonly zeros: readonly number[];
  readonly turningPoints: readonly number[];
}

/**
 * All real zeros, by the chain of derivatives: between two neighbouring zeros of the derivative the polynomial is
 * monotonic, so one sign test says whether a zero lies there and a bracketed Newton finds it. No starting guesses.
 * A zero where the polynomial only touches 0 may be missed by rounding; it is then among the turning points.
 */
export function realZeros(p: Quartic): RealZeros {
  const largest = Math.max(Math.abs(p.k3), Math.abs(p.k2), Math.abs(p.k1), Math.abs(p.k0));
  // Cauchy's bound holds all zeros of the polynomial, and so (Gauss–Lucas) those of its derivatives.
  const bound = 1 + largest / Math.abs(p.k4);
  const first = derivative(p);
  const second = derivative(first);
  const turningPoints = zerosBetween(first, second, quadraticZeros(second), bound);
  return { zeros: zerosBetween(p, first, turningPoints, bound), turningPoints };
}

function quadraticZeros({ k2, k1, k0 }: Quartic): readonly number[] {
  const discriminant = k1 * k1 - 4 * k2 * k0;
  if (!(discriminant >= 0) || k2 === 0) return [];
  const q = -0.5 * (k1 + (k1 < 0 ? -1 : 1) * Math.sqrt(discriminant));
  if (q === 0) return [0];
  const [one, other] = [q / k2, k0 / q];
  return one <= other ? [one, other] : [other, one];
}

// `breaks` rise and hold every turning point of p within ±bound.
function zerosBetween(
  p: Quartic,
  slope: Quartic,
  breaks: readonly number[],
  bound: number,
): readonly number[] {
  const zeros: number[] = [];
  let low = -bound;
  let lowValue = valueAt(p, low);
  for (let k = 0; k <= breaks.length; k += 1) {
    const high = breaks[k] ?? bound;
    const highValue = valueAt(p, high);
    if (lowValue === 0) zeros.push(low);
    else if (lowValue < 0 !== highValue < 0 && highValue !== 0) {
      zeros.push(bracketedZero(p, slope, low, high, lowValue < 0));
    }
    low = high;
    lowValue = highValue;
  }
  return zeros;
}

// Newton, with a bisection whenever it would leave the bracket. `rising` means p < 0 at the lower end.
function bracketedZero(p: Quartic, slope: Quartic, from: number, to: number, rising: boolean): number {
  let low = from;
  let high = to;
  let t = 0.5 * (low + high);
  for (let step = 0; step < 100; step += 1) {
    const value = valueAt(p, t);
    if (value === 0) return t;
    if (value < 0 === rising) low = t;
    else high = t;
    const newton = t - value / valueAt(slope, t);
    const next = newton > low && newton < high ? newton : 0.5 * (low + high);
    if (Math.abs(next - t) <= 2e-16 * Math.abs(t) + 1e-300) return next;
    t = next;
  }
  return t;
}
