import type { BudgetProblem } from './budget-problem';
import { InfidelityBins, type InfidelityHistogram } from './infidelity-bins';
import { InfidelityDraws } from './monte-carlo-draws';

export type { InfidelityHistogram } from './infidelity-bins';

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
  /** How many of the draws so far don't exceed a limit. */
  countWithin(limit: number): number;
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
    countWithin(limit) {
      let count = 0;
      for (let k = 0; k < drawn; k += 1) if ((values[k] ?? Infinity) <= limit) count += 1;
      return count;
    },
    summary() {
      return drawn === 0 ? null : summarise(values.subarray(0, drawn), seed);
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

function summarise(values: Float64Array, seed: number): MonteCarloSummary {
  const draws = values.length;
  let [sum, largest] = [0, 0];
  for (let k = 0; k < draws; k += 1) {
    const value = values[k] ?? 0;
    sum += value;
    largest = Math.max(largest, value);
  }
  const mean = sum / draws;
  let squares = 0;
  for (let k = 0; k < draws; k += 1) {
    const off = (values[k] ?? 0) - mean;
    squares += off * off;
  }
  const bins = new InfidelityBins(values);
  return {
    draws,
    seed,
    mean,
    standardError: draws > 1 ? Math.sqrt(squares / (draws - 1) / draws) : 0,
    median: bins.percentile(50),
    low: bins.percentile(5),
    high: bins.percentile(95),
    largest,
    histogram: bins.histogram(),
  };
}
