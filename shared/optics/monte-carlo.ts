import type { BudgetProblem } from './budget-problem';
import { InfidelityDraws } from './monte-carlo-draws';
import { selectRank } from './order-statistic';

/** Ten bins for each decade of 1 − F, from 1e-12 to 1: the same for every problem, so that two runs can be laid over each other. */
export interface InfidelityHistogram {
  /** 121 edges, rising; bin k holds edges[k] ≤ 1 − F < edges[k + 1], the last one its upper edge too. */
  readonly edges: readonly number[];
  readonly counts: readonly number[];
  /** Draws below the first edge. */
  readonly below: number;
}

export interface MonteCarloSummary {
  readonly draws: number;
  readonly seed: number;
  readonly mean: number;
  /** Standard error of the mean; 0 for a single draw. */
  readonly standardError: number;
  /** Percentiles are draws: the smallest one that at least that part of all draws doesn't exceed. */
  readonly median: number;
  readonly low: number;
  readonly high: number;
  readonly largest: number;
  readonly histogram: InfidelityHistogram;
}

/** A run that goes on as long as its caller wants: in pieces, with progress between them. */
export interface MonteCarloRun {
  /** Drawn so far. */
  readonly draws: number;
  /** @throws RangeError unless it is a whole number from 0 on. */
  advance(draws: number): void;
  /** Of everything drawn so far; `null` before the first draw. The run can go on afterwards. */
  summary(): MonteCarloSummary | null;
}

/**
 * Starts a Monte Carlo error budget of one setting. What is drawn depends on the problem and the seed only: pieces of any size
 * add up to the same numbers, on every machine.
 * @param seed a whole number from 0 to 2^53 − 1.
 * @throws RangeError for such a seed and for what `errorBudget` refuses.
 */
export function startMonteCarlo(problem: BudgetProblem, seed: number): MonteCarloRun {
  const source = new InfidelityDraws(problem, seed);
  let values = new Float64Array(1024);
  let drawn = 0;
  return {
    get draws() {
      return drawn;
    },
    advance(draws) {
      if (!Number.isSafeInteger(draws) || draws < 0)
        throw new RangeError(`the number of draws is a whole number, got ${draws}`);
      if (drawn + draws > values.length) {
        const larger = new Float64Array(Math.max(drawn + draws, 2 * values.length));
        larger.set(values.subarray(0, drawn));
        values = larger;
      }
      source.fill(values, drawn, draws);
      drawn += draws;
    },
    summary() {
      return drawn === 0 ? null : summarise(values.slice(0, drawn), seed);
    },
  };
}

/** All draws at once. @throws RangeError unless there is at least one, and as `startMonteCarlo`. */
export function monteCarlo(
  problem: BudgetProblem,
  { draws, seed }: { readonly draws: number; readonly seed: number },
): MonteCarloSummary {
  const run = startMonteCarlo(problem, seed);
  run.advance(draws);
  const summary = run.summary();
  if (summary === null) throw new RangeError('a Monte Carlo budget takes at least one draw');
  return summary;
}

// Rearranges `values`.
function summarise(values: Float64Array, seed: number): MonteCarloSummary {
  const draws = values.length;
  let [sum, largest] = [0, 0];
  for (const value of values) {
    sum += value;
    largest = Math.max(largest, value);
  }
  const mean = sum / draws;
  let squares = 0;
  for (const value of values) squares += (value - mean) * (value - mean);
  const histogram = histogramOf(values);
  const middle = rankOf(50, draws);
  const median = selectRank(values, middle);
  return {
    draws,
    seed,
    mean,
    standardError: draws > 1 ? Math.sqrt(squares / (draws - 1) / draws) : 0,
    median,
    low: selectRank(values, rankOf(5, draws), 0, middle),
    high: selectRank(values, rankOf(95, draws), middle, draws - 1),
    largest,
    histogram,
  };
}

function rankOf(percent: number, draws: number): number {
  return Math.ceil((percent * draws) / 100) - 1;
}

/** 10^(k/10), and the decades as the nearest numbers to them: products have the same bits everywhere. */
const TENTHS_OF_A_DECADE = [
  1, 1.2589254117941673, 1.5848931924611136, 1.9952623149688795, 2.51188643150958, 3.1622776601683795,
  3.9810717055349722, 5.011872336272722, 6.309573444801933, 7.943282347242816,
] as const;
const DECADES = [1e-12, 1e-11, 1e-10, 1e-9, 1e-8, 1e-7, 1e-6, 1e-5, 1e-4, 1e-3, 1e-2, 1e-1] as const;

function histogramOf(values: Float64Array): InfidelityHistogram {
  const edges = Float64Array.from([
    ...DECADES.flatMap((decade) => TENTHS_OF_A_DECADE.map((tenth) => tenth * decade)),
    1,
  ]);
  const bins = edges.length - 1;
  // One place more in front for what lies below the first edge.
  const counts = new Uint32Array(bins + 1);
  for (const value of values) {
    let low = -1;
    let high = bins;
    // edges[low] ≤ value < edges[high], with −∞ in front and the last edge taken in
    while (high - low > 1) {
      const middle = (low + high) >> 1;
      if (value < (edges[middle] ?? 1)) high = middle;
      else low = middle;
    }
    counts[low + 1] = (counts[low + 1] ?? 0) + 1;
  }
  return { edges: Array.from(edges), counts: Array.from(counts.subarray(1)), below: counts[0] ?? 0 };
}
