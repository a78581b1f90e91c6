import { erf } from 'mathjs';
import { expect, test } from 'vitest';
import { NormalStream } from '../../shared/optics/normal-stream';
import { splitmixWords, UniformStream } from '../../shared/optics/uniform-stream';

// Outputs of the authors' C code as many ports print them.
test('the generator and its seeding give the published outputs', () => {
  const stream = new UniformStream(Uint32Array.of(1, 2, 3, 4));
  const words = Array.from({ length: 10 }, () => stream.nextWord());
  expect(words).toEqual([
    11520, 0, 5927040, 70819200, 2031721883, 1637235492, 1287239034, 3734860849, 3729100597, 4258142804,
  ]);
  const seeded = splitmixWords(1234567, 6);
  const whole = [0, 2, 4].map((k) => BigInt(seeded[k + 1] ?? 0) * 2n ** 32n + BigInt(seeded[k] ?? 0));
  expect(whole).toEqual([6457827717110365317n, 3203168211198807973n, 9817491932198370423n]);
  expect(() => new UniformStream(new Uint32Array(4))).toThrow(RangeError);
  expect(() => new UniformStream(Uint32Array.of(1, 2, 3))).toThrow(RangeError);
});

test('pairs of words are the same words', () => {
  const [one, other] = [new UniformStream(splitmixWords(8, 4)), new UniformStream(splitmixWords(8, 4))];
  const heights = new Float64Array(200);
  const layers = new Uint8Array(200);
  one.fillPairs(heights, layers, 200);
  heights.forEach((height, k) => {
    const high = other.nextWord() | 0;
    const low = other.nextWord();
    expect([height, layers[k]]).toEqual([(high * 2 ** 25 + Math.floor(low / 128)) / 2 ** 56, low % 128]);
  });
  expect(one.nextWord()).toBe(other.nextWord());
});

test('normal numbers fill the bell: a hundred equal shares, the far tails, moments, and no memory', () => {
  const count = 2_000_000;
  const values = new Float64Array(count);
  new NormalStream(splitmixWords(17, 8)).fill(values, count);
  const shares = new Array<number>(100).fill(0);
  const tails = [3, 3.442619855899, 4, 4.5].map((limit) => ({ limit, below: 0, above: 0 }));
  let [first, second, third, fourth, neighbours] = [0, 0, 0, 0, 0];
  values.forEach((value, k) => {
    const share = Math.min(99, Math.floor(50 * (1 + erf(value / Math.SQRT2))));
    shares[share] = (shares[share] ?? 0) + 1;
    for (const tail of tails) {
      if (value > tail.limit) tail.above += 1;
      if (value < -tail.limit) tail.below += 1;
    }
    first += value;
    second += value * value;
    third += value ** 3;
    fourth += value ** 4;
    neighbours += value * (values[k - 1] ?? 0);
  });
  const wanted = count / 100;
  const chiSquare = shares.reduce((sum, share) => sum + (share - wanted) ** 2 / wanted, 0);
  // 99 degrees of freedom: beyond 162 once in 30 000.
  expect(chiSquare).toBeLessThan(162);
  for (const { limit, below, above } of tails) {
    const expected = (count * (1 - erf(limit / Math.SQRT2))) / 2;
    for (const side of [below, above])
      expect(Math.abs(side - expected)).toBeLessThan(4 * Math.sqrt(expected));
  }
  const error = 4 / Math.sqrt(count);
  expect(Math.abs(first / count)).toBeLessThan(error);
  expect(Math.abs(second / count - 1)).toBeLessThan(error * Math.sqrt(2));
  expect(Math.abs(third / count)).toBeLessThan(error * Math.sqrt(15));
  expect(Math.abs(fourth / count - 3)).toBeLessThan(error * Math.sqrt(96));
  expect(Math.abs(neighbours / count)).toBeLessThan(error);
});

test('numbers between −½ and ½ are even', () => {
  const values = new Float64Array(200_000);
  new UniformStream(splitmixWords(3, 4)).fillCentred(values, values.length);
  const shares = new Array<number>(50).fill(0);
  let largest = 0;
  for (const value of values) {
    largest = Math.max(largest, Math.abs(value));
    const share = Math.floor(50 * (value + 0.5));
    shares[share] = (shares[share] ?? 0) + 1;
  }
  expect(largest).toBeLessThan(0.5);
  // 49 degrees of freedom: beyond 95 once in 10 000.
  expect(shares.reduce((sum, share) => sum + (share - 4000) ** 2 / 4000, 0)).toBeLessThan(95);
});
