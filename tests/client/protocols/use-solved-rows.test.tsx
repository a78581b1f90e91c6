import { act, cleanup, renderHook } from '@testing-library/react';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { DEFAULT_CONVENTION } from '../../../shared/optics/convention';
import { chooseSolution } from '../../../shared/protocol/choose-solutions';
import { benchProblem, solveRow, type SolvingTask } from '../../../shared/protocol/solve-row';
import type { DraftTarget } from '../../../shared/schemas/protocols';
import { useSolvedRows } from '../../../src/features/protocols/use-solved-rows';
import { drawAlone } from '../../../src/lib/draw-in-turn';
import type { RowAnswer, SolverAnswer, SolverJob } from '../../../src/workers/solver-messages';
import { solvingBench, solvingTask, target as anyTarget } from '../../support/plates';

const bench = solvingBench();
const ranked = solvingTask();
const planned = solvingTask({ objective: 'least-travel' });

/** What a page asks of its worker, and a way to answer it. */
const jobs: SolverJob[] = [];
let listener: ((event: MessageEvent<SolverAnswer>) => void)[] = [];

class WorkerByHand {
  addEventListener(kind: string, listen: (event: MessageEvent<SolverAnswer>) => void) {
    if (kind === 'message') listener.push(listen);
  }
  removeEventListener(_kind: string, listen: (event: MessageEvent<SolverAnswer>) => void) {
    listener = listener.filter((one) => one !== listen);
  }
  postMessage(job: SolverJob) {
    jobs.push(job);
  }
  terminate() {
    listener = [];
  }
}

beforeEach(() => {
  jobs.length = 0;
  vi.stubGlobal('Worker', WorkerByHand);
});
afterEach(() => {
  cleanup();
  vi.unstubAllGlobals();
});

/** Answers, and waits until the page has taken it in its turn. */
async function say(answer: SolverAnswer) {
  await act(async () => {
    for (const listen of [...listener]) listen(new MessageEvent('message', { data: answer }));
    await new Promise<void>((resolve) => drawAlone(resolve));
  });
}

const target = (id: string, expression: string) => anyTarget({ id, label: id, expression });

function page(targets: readonly DraftTarget[], task: SolvingTask = ranked) {
  const hook = renderHook(
    (rows: readonly DraftTarget[]) => useSolvedRows(rows, bench, DEFAULT_CONVENTION, task),
    { initialProps: targets },
  );
  return { write: (...rows: DraftTarget[]) => hook.rerender(rows), now: () => hook.result.current };
}

function newest(): SolverJob {
  const job = jobs.at(-1);
  if (job === undefined) throw new Error('nothing was asked for');
  return job;
}

function solvedAnswer(expression: string, task: SolvingTask): RowAnswer {
  const read = benchProblem(bench, DEFAULT_CONVENTION, task);
  if (!read.ok) throw new Error(read.error.message);
  const result = solveRow(expression, read.problem, DEFAULT_CONVENTION, null);
  if (result.status !== 'solved') throw new Error(`${expression} was not read`);
  return { result, choice: chooseSolution({ solved: result.solved, heldFastAxesDeg: null }) };
}

/** Answers the rows that are wanted, as the worker does. */
async function answerRows({ job, rows, task }: SolverJob) {
  const answers = rows.flatMap(({ expression, wanted }, place) =>
    wanted ? [{ place, answer: solvedAnswer(expression, task) }] : [],
  );
  const done = task.objective !== 'least-travel';
  await say({ kind: 'rows', job, answers, doneCount: answers.length, done });
}

const staleOf = (solved: ReturnType<typeof useSolvedRows>) =>
  [...solved.rows.values()].map(({ stale }) => stale);

describe('rows solved beside the page', () => {
  it('are new again when a text is typed away and back before its worker answered', async () => {
    const { write, now } = page([target('t1', 'D')]);
    await answerRows(newest());
    expect(staleOf(now())).toEqual([false]);
    write(target('t1', 'A'));
    expect(staleOf(now())).toEqual([true]);
    write(target('t1', 'D'));
    await answerRows(newest());
    expect(staleOf(now())).toEqual([false]);
    expect(now().progress).toBeNull();
  });

  it('are asked for once: a row that did not change is not wanted again', async () => {
    const { write } = page([target('t1', 'D'), target('t2', 'A')]);
    await answerRows(newest());
    write(target('t1', 'D'), target('t2', 'V'));
    expect(newest().rows.map(({ wanted }) => wanted)).toEqual([false, true]);
  });

  it('say so when the solver met what it was not made for, and stop waiting', async () => {
    const { write, now } = page([target('t1', 'D')]);
    await say({ kind: 'failed', job: newest().job, sentence: 'The solver stopped at these rows.' });
    expect(now()).toMatchObject({ benchFault: 'The solver stopped at these rows.', progress: null });
    write(target('t1', 'A'));
    expect(now().benchFault).toBeNull();
    await answerRows(newest());
    expect(staleOf(now())).toEqual([false]);
  });
});

describe('rows planned together', () => {
  it('are new only when the choices over the whole list are there', async () => {
    const { now } = page([target('t1', 'D'), target('t2', 'A')], planned);
    const job = newest();
    await answerRows(job);
    expect(staleOf(now())).toEqual([true, true]);
    expect(now().progress).toEqual({ done: 2, total: 2 });
    const choices = ['D', 'A'].map((text) => solvedAnswer(text, planned).choice);
    await say({ kind: 'choices', job: job.job, choices, unplanned: null });
    expect(staleOf(now())).toEqual([false, false]);
    expect(now()).toMatchObject({ progress: null, planFault: null });
  });

  it('wait for new choices when one of them is taken out, though nothing has to be solved', async () => {
    const { write, now } = page([target('t1', 'D'), target('t2', 'A')], planned);
    await answerRows(newest());
    const { job } = newest();
    const choice = solvedAnswer('D', planned).choice;
    await say({
      kind: 'choices',
      job,
      choices: [choice, solvedAnswer('A', planned).choice],
      unplanned: null,
    });
    write(target('t1', 'D'));
    expect(now().rows.get('t1')?.stale).toBe(true);
    await say({ kind: 'choices', job: newest().job, choices: [choice], unplanned: null });
    expect(now().rows.get('t1')?.stale).toBe(false);
  });

  it('name the row and the plate for which there is no plan, counting rows as the page does', async () => {
    const { now } = page([target('t1', ' '), target('t2', 'D'), target('t3', 'A')], planned);
    const job = newest();
    await answerRows(job);
    const choices = ['D', 'A'].map((text) => solvedAnswer(text, planned).choice);
    await say({ kind: 'choices', job: job.job, choices, unplanned: { row: 1, plate: 0 } });
    expect(now().planFault).toMatch(/^Row 3 \(t3\) .* the mount of plate 1 does not reach it/);
  });
});
