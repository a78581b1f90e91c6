import { benchProblem, type RowResult, solveRow } from '../../shared/protocol/solve-row';
import type { SolverAnswer, SolverJob } from './solver-messages';

/** So that a long table shows its first rows at once, and that a newer job is heard between two batches. */
const rowsPerBatch = 10;

let newestJob = 0;

function answer(message: SolverAnswer): void {
  self.postMessage(message);
}

function pause(): Promise<void> {
  return new Promise((resolve) => setTimeout(resolve, 0));
}

async function solve({ job, bench, convention, expressions }: SolverJob): Promise<void> {
  const read = benchProblem(bench, convention);
  if (!read.ok) {
    answer({ kind: 'bench-unreadable', job, message: `Column ${read.error.column}: ${read.error.message}` });
    return;
  }
  for (let from = 0; from < expressions.length && job === newestJob; from += rowsPerBatch) {
    const batch = expressions.slice(from, from + rowsPerBatch);
    const results: RowResult[] = batch.map((expression) => solveRow(expression, read.problem, convention));
    answer({ kind: 'rows', job, from, results, done: from + rowsPerBatch >= expressions.length });
    await pause();
  }
}

self.addEventListener('message', ({ data }: MessageEvent<SolverJob>) => {
  newestJob = data.job;
  void solve(data);
});
