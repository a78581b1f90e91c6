import { expect, test } from 'vitest';
import { DEFAULT_CONVENTION, parseState, parseStokes, parseUnitary } from '../../shared/optics';
import { tokenise } from '../../shared/optics/expression/tokens';
import { ExpressionError } from '../../shared/optics/expression/span';
import { randomStream } from './independent';

const CASES = 100_000;

const PIECES = [
  ...Array.from('HVDALRiehjxπ√+-−*/^()[],.|>⟩°·0123456789 \t\n"\\{}$;:_#%&\u0000é😀'),
  'sqrt(',
  'exp(',
  'cos(',
  'sin(',
  'bloch(',
  'stokes(',
  'ellipse(',
  'linear(',
  'rotate(',
  'zyz(',
  'qwp(',
  'hwp(',
  'plate(',
  'dagger',
  'dagger(',
  '†',
  'from ',
  ' to ',
  'matrix [[',
  ']]',
  'X',
  'Y',
  'Z',
  'S',
  'T',
  'hadamard',
  'identity',
  'x',
  'z',
  'deg',
  'rad',
  'pi',
  '|+i>',
  '|->',
  '1e400',
  '1e-400',
  '1e308',
  '0',
  '-0',
  'NaN',
  'Infinity',
  '__proto__',
  'constructor',
  '9'.repeat(30),
  '((((',
  '))))',
];

const UNITARY_SEEDS = [
  'hadamard S† T^-2',
  'rotate([1, 0, -1], 22.5deg)',
  'rotate(|+i>, pi/3)',
  'matrix [[1, i], [i, 1]]/sqrt(2)',
  'exp(-i 45deg/2 (X + 0.5 Z))',
  'zyz(10deg, 20deg, 30deg)',
  'from H to (H + i V)/sqrt(2)',
  'qwp(45deg) hwp(10deg) plate(100deg, 3deg)',
  'dagger(qwp(45deg)*X)',
  '(X + i identity)/√2',
  'hadamard H',
];

const SEEDS = [
  '(H + i V)/sqrt(2)',
  'cos(22.5deg) H + e^(i 45°) sin(22.5deg) V',
  '[1, i]',
  'bloch(109.47deg, 240deg)',
  'stokes(0.6, 0, 0.8)',
  'ellipse(20deg, -10deg)',
  'linear(22.5deg)',
  '1/√2·(|0⟩ − |1⟩)',
  '|+i>',
  '2^(1/2) D - pi A/3',
];

function pick<T>(from: readonly T[], random: () => number): T {
  const chosen = from[Math.floor(random() * from.length)];
  if (chosen === undefined) throw new Error('nothing to pick from');
  return chosen;
}

function fromPieces(random: () => number): string {
  const length = Math.floor(random() * 24);
  return Array.from({ length }, () => pick(PIECES, random)).join('');
}

function mutated(random: () => number, seeds: readonly string[]): string {
  let text = pick(seeds, random);
  for (let edits = 1 + Math.floor(random() * 4); edits > 0; edits -= 1) {
    const at = Math.floor(random() * (text.length + 1));
    const until = Math.min(text.length, at + Math.floor(random() * 4));
    const [head, cut, tail] = [text.slice(0, at), text.slice(at, until), text.slice(until)];
    text = pick(
      [head + tail, head + pick(PIECES, random) + cut + tail, head + cut + cut + tail, tail + head + cut],
      random,
    );
  }
  return text;
}

function anyUnits(random: () => number): string {
  const length = Math.floor(random() * 16);
  return Array.from({ length }, () => String.fromCharCode(Math.floor(random() * 0x10000))).join('');
}

test(`${CASES} random strings and mutated expressions: a value or an error with a column, never a throw`, () => {
  const random = randomStream(20_260_101);
  let [values, errors] = [0, 0];
  for (let k = 0; k < CASES; k += 1) {
    const source = k % 5 === 0 ? fromPieces(random) : k % 5 === 1 ? anyUnits(random) : mutated(random, SEEDS);
    const reading = parseState(source, DEFAULT_CONVENTION);
    if (reading.ok) {
      values += 1;
      const { aRe, aIm, bRe, bIm } = reading.jones;
      const length = aRe * aRe + aIm * aIm + bRe * bRe + bIm * bIm;
      if (!(Math.abs(length - 1) < 1e-12) || !(reading.norm > 0 && reading.norm < Infinity)) {
        expect.fail(`${JSON.stringify(source)} gave a state of length ${length}`);
      }
    } else {
      errors += 1;
      const { column, length, message } = reading.error;
      const within = Number.isInteger(column) && column >= 1 && column <= source.length + 1 && length >= 1;
      if (!within || message.length < 10 || /undefined|^Column/.test(message)) {
        expect.fail(`${JSON.stringify(source)} gave column ${column}: ${message}`);
      }
    }
  }
  // Both sides of the answer are really exercised.
  expect(values).toBeGreaterThan(CASES / 20);
  expect(errors).toBeGreaterThan(CASES / 4);
}, 60_000);

test(`${CASES} random strings and mutated unitaries: a value or an error with a column, never a throw`, () => {
  const random = randomStream(20_260_102);
  let [values, errors] = [0, 0];
  for (let k = 0; k < CASES; k += 1) {
    const source = k % 5 === 0 ? fromPieces(random) : mutated(random, k % 5 === 1 ? SEEDS : UNITARY_SEEDS);
    const reading = parseUnitary(source, DEFAULT_CONVENTION);
    parseStokes(source, DEFAULT_CONVENTION);
    if (reading.ok) {
      values += 1;
      const { w, x, y, z } = reading.quaternion;
      const length = w * w + x * x + y * y + z * z;
      if (!(Math.abs(length - 1) < 1e-12) || !(reading.scale > 0 && reading.scale < Infinity)) {
        expect.fail(`${JSON.stringify(source)} gave a unitary of length ${length}`);
      }
    } else {
      errors += 1;
      const { column, length, message, suggestion, nearestUnitary, distanceFromUnitary = 1 } = reading.error;
      const within = Number.isInteger(column) && column >= 1 && column <= source.length + 1 && length >= 1;
      if (!within || message.length < 10 || /undefined|^Column/.test(message) || suggestion === '') {
        expect.fail(`${JSON.stringify(source)} gave column ${column}: ${message}`);
      }
      if (!(distanceFromUnitary > 0)) expect.fail(`${JSON.stringify(source)}: ${distanceFromUnitary} away`);
      if (nearestUnitary !== undefined && !parseUnitary(nearestUnitary, DEFAULT_CONVENTION).ok) {
        expect.fail(`${JSON.stringify(source)} is offered ${nearestUnitary}, which does not read`);
      }
    }
  }
  expect(values).toBeGreaterThan(CASES / 20);
  expect(errors).toBeGreaterThan(CASES / 4);
}, 60_000);

/** Shapes that drive a careless reader to quadratic or exponential time, at a wanted length. */
const SHAPES: readonly (readonly [string, (length: number) => string])[] = [
  ['digits', (n) => '1'.repeat(n)],
  ['digits and points', (n) => '1.'.repeat(n / 2)],
  ['exponents', (n) => '1e'.repeat(n / 2)],
  ['letters', (n) => 'i'.repeat(n)],
  ['unknown letters', (n) => 'sqr'.repeat(n / 3)],
  ['open kets', (n) => '|'.repeat(n)],
  ['kets', (n) => '|H>+'.repeat(n / 4)],
  ['brackets', (n) => '('.repeat(n)],
  ['sums', (n) => 'H+'.repeat(n / 2)],
  ['products', (n) => '2*'.repeat(n / 2)],
  ['signs', (n) => '-'.repeat(n)],
  ['powers', (n) => '2^'.repeat(n / 2)],
  ['spaces', (n) => ' '.repeat(n)],
  ['daggers', (n) => `X${'†'.repeat(n - 1)}`],
  ['gates', (n) => 'X'.repeat(n)],
  ['plates', (n) => 'qwp(1deg)'.repeat(n / 9)],
  ['turns from', (n) => 'from H to '.repeat(n / 10)],
  ['matrices', (n) => 'matrix[['.repeat(n / 8)],
  ['axes', (n) => 'rotate('.repeat(n / 7)],
  ['matrices in sums', (n) => 'matrix[[1,0],[0,1]]+'.repeat(n / 20)],
  ['almost words', (n) => 'hadamar'.repeat(n / 7)],
];

/** The least processor time of several: what else runs on the machine only ever adds, and less to this than to the clock. */
function leastMs(work: () => void, repeats: number): number {
  let least = Infinity;
  for (let k = 0; k < repeats; k += 1) {
    const start = process.cpuUsage();
    work();
    const { user, system } = process.cpuUsage(start);
    least = Math.min(least, (user + system) / 1000);
  }
  return least;
}

function tokeniseQuietly(source: string): void {
  try {
    tokenise(source);
  } catch (error) {
    if (!(error instanceof ExpressionError)) throw error;
  }
}

test.each(SHAPES)('%s: twice the text takes at most two and a half times as long', (_, shape) => {
  // On short times the clock, the collector and other work on the machine decide, not the reader; the allowance covers
  // them. A reader that is quadratic needs hundreds of milliseconds at the last length, far beyond it.
  const allowanceMs = 3;
  for (const [work, sizes] of [
    [(text: string) => void parseState(text, DEFAULT_CONVENTION), [1024, 2048, 4096]],
    [(text: string) => void parseUnitary(text, DEFAULT_CONVENTION), [1024, 2048, 4096]],
    [tokeniseQuietly, [8_000, 16_000, 32_000]],
  ] as const) {
    const texts = sizes.map(shape);
    const times = texts.map((text) => leastMs(() => work(text), 10));
    const grows = (k: number): boolean => (times[k] ?? 0) > 2.5 * (times[k - 1] ?? Infinity) + allowanceMs;
    // What else runs on the machine only adds: measure again, keeping the least, before calling it growth.
    for (let again = 0; again < 8 && (grows(1) || grows(2)); again += 1) {
      texts.forEach(
        (text, k) =>
          (times[k] = Math.min(
            times[k] ?? Infinity,
            leastMs(() => work(text), 10),
          )),
      );
    }
    expect([grows(1), grows(2)], times.join(' ms, ')).toEqual([false, false]);
  }
});

test.each(SHAPES)('%s: ten thousand characters are answered within 50 ms of the processor', (_, shape) => {
  const text = shape(10_000);
  expect(leastMs(() => void parseState(text, DEFAULT_CONVENTION), 5)).toBeLessThan(50);
  expect(leastMs(() => void parseUnitary(text, DEFAULT_CONVENTION), 5)).toBeLessThan(50);
  expect(leastMs(() => void parseUnitary(text.slice(0, 4096), DEFAULT_CONVENTION), 5)).toBeLessThan(50);
  expect(leastMs(() => tokeniseQuietly(text), 5)).toBeLessThan(50);
});
