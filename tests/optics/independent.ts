/*
 * Plates by the book, sharing no line with the product: Rot(θ) · diag(e^{−iδ/2}, e^{+iδ/2}) · Rot(−θ) as 2 × 2 complex
 * matrices with the engine's own sine and cosine. What the product returns is put back through this.
 */

export interface C {
  readonly re: number;
  readonly im: number;
}
export type Vector = readonly [C, C];
export type Matrix = readonly [readonly [C, C], readonly [C, C]];

export const complex = (re: number, im = 0): C => ({ re, im });
export const times = (a: C, b: C): C => complex(a.re * b.re - a.im * b.im, a.re * b.im + a.im * b.re);
const plus = (a: C, b: C): C => complex(a.re + b.re, a.im + b.im);
const conj = (a: C): C => complex(a.re, -a.im);

export function product(a: Matrix, b: Matrix): Matrix {
  const entry = (row: 0 | 1, column: 0 | 1): C =>
    plus(times(a[row][0], b[0][column]), times(a[row][1], b[1][column]));
  return [
    [entry(0, 0), entry(0, 1)],
    [entry(1, 0), entry(1, 1)],
  ];
}

export function apply(a: Matrix, v: Vector): Vector {
  return [plus(times(a[0][0], v[0]), times(a[0][1], v[1])), plus(times(a[1][0], v[0]), times(a[1][1], v[1]))];
}

function rotation(angle: number): Matrix {
  const [c, s] = [complex(Math.cos(angle)), Math.sin(angle)];
  return [
    [c, complex(-s)],
    [complex(s), c],
  ];
}

export function plate(retardanceRad: number, fastAxisRad: number): Matrix {
  const half = retardanceRad / 2;
  const zero = complex(0);
  const delay: Matrix = [
    [complex(Math.cos(half), -Math.sin(half)), zero],
    [zero, complex(Math.cos(half), Math.sin(half))],
  ];
  return product(product(rotation(fastAxisRad), delay), rotation(-fastAxisRad));
}

export function stack(retardancesRad: readonly number[], fastAxesRad: readonly number[]): Matrix {
  let total: Matrix = plate(0, 0);
  retardancesRad.forEach((retardance, k) => {
    total = product(plate(retardance, fastAxesRad[k] ?? NaN), total);
  });
  return total;
}

/** ⟨t⊥|ψ⟩, whose squared size is the infidelity. */
export function missAmplitude(target: Vector, state: Vector): C {
  return plus(times(complex(-target[1].re, -target[1].im), state[0]), times(target[0], state[1]));
}

export function infidelity(target: Vector, state: Vector): number {
  const { re, im } = missAmplitude(target, state);
  return re * re + im * im;
}

export function stokesOf([a, b]: Vector): readonly [number, number, number] {
  const cross = times(conj(a), b);
  return [a.re * a.re + a.im * a.im - b.re * b.re - b.im * b.im, 2 * cross.re, 2 * cross.im];
}

/** A repeatable stream of numbers in [0, 1): a 32-bit multiply-and-xorshift mixer of a counter. */
export function randomStream(seed: number): () => number {
  let counter = seed >>> 0;
  return () => {
    counter = (counter + 0x9e3779b9) >>> 0;
    let x = counter;
    x = Math.imul(x ^ (x >>> 16), 0x21f0aaad);
    x = Math.imul(x ^ (x >>> 15), 0x735a2d97);
    return ((x ^ (x >>> 15)) >>> 0) / 2 ** 32;
  };
}

/** Uniform on the sphere, as a Jones vector. */
export function randomState(random: () => number): Vector {
  const cosTheta = 2 * random() - 1;
  const phi = 2 * Math.PI * random();
  const a = Math.sqrt((1 + cosTheta) / 2);
  const b = Math.sqrt((1 - cosTheta) / 2);
  return [complex(a), complex(b * Math.cos(phi), b * Math.sin(phi))];
}
