import { chooseSolution, chooseSolutions } from '../../shared/protocol/choose-solutions';
import { benchProblem, type RowProblem, type RowResult, solveRow } from '../../shared/protocol/solve-row';
import type { JobRow, RowAnswer, SolverAnswer, SolverJob } from './solver-messages';

/** So that a long table shows its first rows at once, and that a newer job is heard between two batches. */
const rowsPerBatch = 5;

/** Every keystroke leaves a text behind; past this many the lot is forgotten. */
const mostKept = 4000;

let newestJob = 0;

/** What was solved for one bench, convention and task: after a keystroke only the row that was typed in is new. */
interface Solved {
  readonly question: string;
  readonly rows: Map<string, RowResult>;
}
let known: Solved = { question: '', rows: new Map() };

function answer(message: SolverAnswer): void {
  self.postMessage(message);
}

function pause(): Promise<void> {
  return new Promise((resolve) => setTimeout(resolve, 0));
}

function answered(row: JobRow, result: RowResult): RowAnswer {
  if (result.status === 'unreadable') return { result, choice: null };
  return {
    result,
    choice: chooseSolution({ solved: result.solved, heldFastAxesDeg: row.heldFastAxesDeg }),
  };
}

async function solve({ job, bench, convention, task, rows }: SolverJob): Promise<void> {
  const read = benchProblem(bench, convention, task);
  if (!read.ok) {
    answer({ kind: 'bench-unreadable', job, message: `Column ${read.error.column}: ${read.error.message}` });
    return;
  }
  const question = JSON.stringify([bench, convention, task]);
  if (known.question !== question || known.rows.size > mostKept) known = { question, rows: new Map() };
  const kept = known.rows;
  const resultOf = (row: JobRow): RowResult => {
    const key = JSON.stringify([row.expression, row.heldFastAxesDeg]);
    const before = kept.get(key);
    if (before !== undefined) return before;
    const result = solveRow(row.expression, read.problem, convention, row.heldFastAxesDeg);
    kept.set(key, result);
    return result;
  };
  const wanted = rows.flatMap((row, place) => (row.wanted ? [{ row, place }] : []));
  const isPlanned = task.objective === 'least-travel';
  for (let from = 0; from < wanted.length; from += rowsPerBatch) {
    const answers = wanted
      .slice(from, from + rowsPerBatch)
      .map(({ row, place }) => ({ place, answer: answered(row, resultOf(row)) }));
    const doneCount = from + answers.length;
    const done = doneCount === wanted.length && !isPlanned;
    answer({ kind: 'rows', job, answers, doneCount, done });
    await pause();
    if (job !== newestJob) return;
  }
  if (isPlanned) answer({ kind: 'choices', job, ...planned(rows, rows.map(resultOf), read.problem) });
}

/** The whole list's choices; a row that can't be read is stepped over. */
function planned(
  rows: readonly JobRow[],
  results: readonly RowResult[],
  problem: RowProblem,
): Pick<Extract<SolverAnswer, { kind: 'choices' }>, 'choices' | 'unplanned'> {
  const readable = results.flatMap((result, place) =>
    result.status === 'solved'
      ? [{ ...result, place, heldFastAxesDeg: rows[place]?.heldFastAxesDeg ?? null }]
      : [],
  );
  const { choices, unplanned } = chooseSolutions(readable, problem);
  const byPlace = new Map(readable.map(({ place }, index) => [place, choices[index] ?? null]));
  return {
    choices: rows.map((_, place) => byPlace.get(place) ?? null),
    unplanned: unplanned === null ? null : { ...unplanned, row: readable[unplanned.row]?.place ?? 0 },
  };
}

async function solveOrSay(job: SolverJob): Promise<void> {
  try {
    await solve(job);
  } catch (error) {
    const said = error instanceof Error ? ` It says: ${error.message}.` : '';
    const sentence = `The solver stopped at these rows.${said} Change the last thing you wrote, or load the page again; what you typed is kept.`;
    answer({ kind: 'failed', job: job.job, sentence });
  }
}

self.addEventListener('message', ({ data }: MessageEvent<SolverJob>) => {
  newestJob = data.job;
  void solveOrSay(data);
});
