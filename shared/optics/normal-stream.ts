import { exp, log } from './elementary';
import { UniformStream } from './uniform-stream';

/*
 * The ziggurat of Marsaglia and Tsang (J. Stat. Softw. 5, 8 (2000)) with 128 layers, its layer and its height from different
 * bits as Doornik asks (2005), 57 of them for the height.
 */

const TWO_25 = 33_554_432;
const TWO_56 = 72_057_594_037_927_936;
const LAYERS = 128;
/** Where the tail begins, and the area of each layer: R e^{−R²/2} + ∫_R^∞ e^{−x²/2} dx. Printed in both papers. */
const TAIL_START = 3.442619855899;
const LAYER_AREA = 9.91256303526217e-3;
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
