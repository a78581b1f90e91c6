import { selectRank } from './order-statistic';

/** Ten bins for each decade of 1 − F, from 1e-12 to 1: the same for every problem, so that two runs can be laid over each other. */
export interface InfidelityHistogram {
  /** 121 edges, rising; bin k holds edges[k] ≤ 1 − F < edges[k + 1], the last one its upper edge too. */
  readonly edges: readonly number[];
  readonly counts: readonly number[];
  /** Draws below the first edge. */
  readonly below: number;
}

/** 10^(k/10), and the decades as the nearest numbers to them: products have the same bits everywhere. */
const TENTHS_OF_A_DECADE = [
  1, 1.2589254117941673, 1.5848931924611136, 1.9952623149688795, 2.51188643150958, 3.1622776601683795,
  3.9810717055349722, 5.011872336272722, 6.309573444801933, 7.943282347242816,
] as const;
const DECADES = [1e-12, 1e-11, 1e-10, 1e-9, 1e-8, 1e-7, 1e-6, 1e-5, 1e-4, 1e-3, 1e-2, 1e-1] as const;
const BINS = DECADES.length * TENTHS_OF_A_DECADE.length;

/** Sign, exponent and this many bits of the fraction name a slot; in a sixteenth of an octave there is one edge at most. */
const DROPPED_BITS = 16;

/** Values of 1 − F, none negative, counted into bins; a percentile is then sought in one bin only. */
export class InfidelityBins {
  private readonly edges = Float64Array.from([
    ...DECADES.flatMap((decade) => TENTHS_OF_A_DECADE.map((tenth) => tenth * decade)),
    1,
  ]);
  /** One place more in front, for what lies below the first edge. */
  private readonly counts = new Uint32Array(BINS + 1);
  private readonly placeOf: Uint8Array;

  constructor(private readonly values: Float64Array) {
    this.placeOf = new Uint8Array(values.length);
    const { counts, placeOf, edges } = this;
    const high = highWords(values);
    const first = slotOf(DECADES[0]);
    const placeAt = firstPlaces(edges, first);
    for (let k = 0; k < values.length; k += 1) {
      const slot = ((high.words[2 * k + high.offset] ?? 0) >>> DROPPED_BITS) - first;
      let place = slot < 0 ? 0 : (placeAt[slot] ?? BINS);
      if (place < BINS && (values[k] ?? 0) >= (edges[place] ?? 1)) place += 1;
      placeOf[k] = place;
      counts[place] = (counts[place] ?? 0) + 1;
    }
  }

  histogram(): InfidelityHistogram {
    const { edges, counts } = this;
    return { edges: Array.from(edges), counts: Array.from(counts.subarray(1)), below: counts[0] ?? 0 };
  }

  /** The smallest value that at least so many percent (a whole number, 1 to 100) of all don't exceed. */
  percentile(percent: number): number {
    const { values, counts, placeOf } = this;
    let rank = Math.ceil((percent * values.length) / 100) - 1;
    let place = 0;
    while (rank >= (counts[place] ?? Infinity)) {
      rank -= counts[place] ?? 0;
      place += 1;
    }
    const inside = new Float64Array(counts[place] ?? 0);
    let taken = 0;
    for (let k = 0; k < values.length; k += 1) {
      if (placeOf[k] !== place) continue;
      inside[taken] = values[k] ?? 0;
      taken += 1;
    }
    return selectRank(inside, rank);
  }
}

// The words with sign, exponent and the upper part of the fraction, wherever this machine keeps them.
function highWords(values: Float64Array): { readonly words: Uint32Array; readonly offset: 0 | 1 } {
  const words = new Uint32Array(values.buffer, values.byteOffset, 2 * values.length);
  const [lower] = new Uint32Array(Float64Array.of(1).buffer);
  return { words, offset: lower === 0 ? 1 : 0 };
}

function slotOf(value: number): number {
  const { words, offset } = highWords(Float64Array.of(value));
  return (words[offset] ?? 0) >>> DROPPED_BITS;
}

// For each slot from the first edge's to that of 1: the place (bin + 1) of its smallest value.
function firstPlaces(edges: Float64Array, first: number): Uint8Array {
  const places = new Uint8Array(slotOf(1) - first + 1);
  let place = 0;
  const smallest = new Float64Array(1);
  const { words, offset } = highWords(smallest);
  for (let slot = 0; slot < places.length; slot += 1) {
    words[offset] = ((slot + first) << DROPPED_BITS) >>> 0;
    while (place < BINS && (smallest[0] ?? 0) >= (edges[place] ?? 1)) place += 1;
    places[slot] = place;
  }
  return places;
}
