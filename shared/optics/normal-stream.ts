import { exp, log } from './elementary';

/*
 * Random numbers with the same bits on every machine.
 * Uniform: xoshiro128** of Blackman and Vigna (ACM Trans. Math. Softw. 47, 36 (2021)), its state filled by splitmix64, as they
 * advise. Normal: the ziggurat of Marsaglia and Tsang (J. Stat. Softw. 5, 8 (2000)) with 128 layers, its layer and its
 * height from different bits as Doornik asks (2005), 57 of them for the height.
 */

const TWO_25 = 33_554_432;
const TWO_32 = 4_294_967_296;
const TWO_56 = 72_057_594_037_927_936;
const LAYERS = 128;
/** Where the tail begins, and the area of each layer: R e^{−R²/2} + ∫_R^∞ e^{−x²/2} dx. Printed in both papers. */
const TAIL_START = 3.442619855899;
const LAYER_AREA = 9.91256303526217e-3;

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

const BLOCK = 512;

/** Standard normal numbers. */
export class NormalStream {
  /** Right edge of each layer; one more at the top, which is 0. */
  private readonly edges = new Float64Array(LAYERS + 1);
  /** Part of a layer that lies wholly under the curve. */
  private readonly inside = new Float64Array(LAYERS);
  private readonly heights = new Float64Array(BLOCK);
  private readonly layers = new Uint8Array(BLOCK);
  private readonly ready: UniformStream;
  private readonly rare: UniformStream;
  private taken = BLOCK;

  /** @param words eight: four for what nearly every number takes, four for what one in 80 takes besides. */
  constructor(words: Uint32Array) {
    this.ready = new UniformStream(words.subarray(0, 4));
    this.rare = new UniformStream(words.subarray(4, 8));
    let height = exp((-TAIL_START * TAIL_START) / 2);
    let edge = TAIL_START;
    this.edges[0] = LAYER_AREA / height;
    this.edges[1] = TAIL_START;
    for (let layer = 2; layer < LAYERS; layer += 1) {
      height += LAYER_AREA / edge;
      edge = Math.sqrt(-2 * log(height));
      this.edges[layer] = edge;
    }
    for (let layer = 0; layer < LAYERS; layer += 1)
      this.inside[layer] = (this.edges[layer + 1] ?? 0) / (this.edges[layer] ?? 1);
  }

  /** Fills the first `count` places, the same numbers however they are split among calls. */
  fill(out: Float64Array, count: number): void {
    const { edges, inside, heights, layers } = this;
    let taken = this.taken;
    for (let k = 0; k < count; k += 1) {
      if (taken === BLOCK) {
        this.ready.fillPairs(heights, layers, BLOCK);
        taken = 0;
      }
      const u = heights[taken] ?? 0;
      const layer = layers[taken] ?? 0;
      taken += 1;
      out[k] = Math.abs(u) < (inside[layer] ?? 0) ? u * (edges[layer] ?? 0) : this.outside(u, layer);
    }
    this.taken = taken;
  }

  // Once in some 80 numbers: in the tail, in the corner of a layer, or anew.
  private outside(firstU: number, firstLayer: number): number {
    const { rare, edges, inside } = this;
    let [u, layer] = [firstU, firstLayer];
    for (;;) {
      const edge = edges[layer] ?? 0;
      if (Math.abs(u) < (inside[layer] ?? 0)) return u * edge;
      if (layer === 0) return this.tail(u < 0);
      const x = u * edge;
      const [lower, upper] = [edge, edges[layer + 1] ?? 0];
      const atLower = exp((x * x - lower * lower) / 2);
      const atUpper = exp((x * x - upper * upper) / 2);
      if (atLower + rare.next() * (atUpper - atLower) < 1) return x;
      const high = rare.nextWord() | 0;
      const low = rare.nextWord();
      layer = low & 127;
      u = (high * TWO_25 + (low >>> 7)) / TWO_56;
    }
  }

  // Marsaglia's: beyond R the curve falls almost like an exponential of rate R.
  private tail(isNegative: boolean): number {
    for (;;) {
      const x = -log(this.rare.next()) / TAIL_START;
      const y = -log(this.rare.next());
      if (2 * y >= x * x) return isNegative ? -(TAIL_START + x) : TAIL_START + x;
    }
  }
}

/** @throws RangeError for a seed that isn't a whole number from 0 to 2^53 − 1. */
export function checkSeed(seed: number): void {
  if (!Number.isSafeInteger(seed) || seed < 0)
    throw new RangeError(`a seed is a whole number from 0 to ${Number.MAX_SAFE_INTEGER}, got ${seed}`);
}
