/*
 * Random numbers with the same bits on every machine: xoshiro128** of Blackman and Vigna (ACM Trans. Math. Softw. 47, 36
 * (2021)), its state filled by splitmix64, as they advise. For drawing states and errors, not for secrets.
 */

const TWO_25 = 33_554_432;
const TWO_26 = 67_108_864;
const TWO_32 = 4_294_967_296;
const TWO_53 = 9_007_199_254_740_992;
const TWO_56 = 72_057_594_037_927_936;

/** @throws RangeError for a seed that isn't a whole number from 0 to 2^53 − 1. */
export function checkSeed(seed: number): void {
  if (!Number.isSafeInteger(seed) || seed < 0)
    throw new RangeError(`a seed is a whole number from 0 to ${Number.MAX_SAFE_INTEGER}, got ${seed}`);
}

/** Words from splitmix64 (Steele, Lea, Flood, OOPSLA 2014), the lower half of each number first. */
export function splitmixWords(seed: number, count: number): Uint32Array {
  let state = BigInt(seed);
  const words = new Uint32Array(count);
  for (let k = 0; k < count; k += 2) {
    state = BigInt.asUintN(64, state + 0x9e3779b97f4a7c15n);
    let z = state;
    z = BigInt.asUintN(64, (z ^ (z >> 30n)) * 0xbf58476d1ce4e5b9n);
    z = BigInt.asUintN(64, (z ^ (z >> 27n)) * 0x94d049bb133111ebn);
    z ^= z >> 31n;
    words[k] = Number(z & 0xffffffffn);
    if (k + 1 < count) words[k + 1] = Number(z >> 32n);
  }
  return words;
}

/** The bare generator: whole numbers in [0, 2^32). */
export class UniformStream {
  private readonly state: Int32Array;

  /** @throws RangeError unless there are four words, not all of them 0. */
  constructor(words: Uint32Array) {
    if (words.length !== 4 || words.every((word) => word === 0))
      throw new RangeError('the generator starts from four words, not all of them 0');
    this.state = Int32Array.from(words);
  }

  nextWord(): number {
    const { state } = this;
    const a = state[0] ?? 0;
    const b = state[1] ?? 0;
    const c = (state[2] ?? 0) ^ a;
    const d = (state[3] ?? 0) ^ b;
    state[0] = a ^ d;
    state[1] = b ^ c;
    state[2] = c ^ (b << 9);
    state[3] = (d << 11) | (d >>> 21);
    return scrambled(b) >>> 0;
  }

  /** In (0, 1), never an end of it. */
  next(): number {
    return (this.nextWord() + 0.5) / TWO_32;
  }

  /** Fills the first `count` places with numbers in (−½, ½). */
  fillCentred(out: Float64Array, count: number): void {
    const { state } = this;
    let a = state[0] ?? 0;
    let b = state[1] ?? 0;
    let c = state[2] ?? 0;
    let d = state[3] ?? 0;
    for (let k = 0; k < count; k += 1) {
      // The upper half of the words comes out negative: in all the range from −½ to ½, as even.
      out[k] = (scrambled(b) + 0.5) / TWO_32;
      const shifted = b << 9;
      c ^= a;
      d ^= b;
      b ^= c;
      a ^= d;
      c ^= shifted;
      d = (d << 11) | (d >>> 21);
    }
    state[0] = a;
    state[1] = b;
    state[2] = c;
    state[3] = d;
  }

  /**
   * Two words for each place: the first whole, as a signed number; of the second the upper 25 bits below it and the lower
   * seven beside it. The same words as `nextWord` gives, with the generator's state in local variables.
   */
  fillPairs(heights: Float64Array, layers: Uint8Array, count: number): void {
    const { state } = this;
    let a = state[0] ?? 0;
    let b = state[1] ?? 0;
    let c = state[2] ?? 0;
    let d = state[3] ?? 0;
    for (let k = 0; k < count; k += 1) {
      const high = scrambled(b);
      let shifted = b << 9;
      c ^= a;
      d ^= b;
      b ^= c;
      a ^= d;
      c ^= shifted;
      d = (d << 11) | (d >>> 21);
      const low = scrambled(b);
      shifted = b << 9;
      c ^= a;
      d ^= b;
      b ^= c;
      a ^= d;
      c ^= shifted;
      d = (d << 11) | (d >>> 21);
      heights[k] = (high * TWO_25 + (low >>> 7)) / TWO_56;
      layers[k] = low & 127;
    }
    state[0] = a;
    state[1] = b;
    state[2] = c;
    state[3] = d;
  }
}

function scrambled(word: number): number {
  const times5 = Math.imul(word, 5);
  return Math.imul((times5 << 7) | (times5 >>> 25), 9);
}

/**
 * Numbers in [0, 1) with all 53 bits of a double, two words each.
 * @throws RangeError for a seed that isn't a whole number from 0 to 2^53 − 1.
 */
export function seededStream(seed: number): () => number {
  checkSeed(seed);
  const words = new UniformStream(splitmixWords(seed, 4));
  return () => {
    const high = words.nextWord() >>> 5;
    return (high * TWO_26 + (words.nextWord() >>> 6)) / TWO_53;
  };
}
