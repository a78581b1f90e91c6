import { startTransition, useEffect, useRef, useState } from 'react';
import type { Convention } from '../../../shared/optics/convention';
import type { SolvingBench, SolvingTask } from '../../../shared/protocol/solve-row';
import type { DraftTarget } from '../../../shared/schemas/protocols';
import type { RowAnswer, SolverAnswer, SolverJob } from '../../workers/solver-messages';

/** What is known of one row: its newest result, and whether it is still that of an older text or bench. */
export interface SolvedRow extends RowAnswer {
  readonly stale: boolean;
}

export interface SolvedRows {
  readonly rows: ReadonlyMap<string, SolvedRow>;
  /** Rows solved of the job that runs; null when none runs. */
  readonly progress: { readonly done: number; readonly total: number } | null;
  readonly benchFault: string | null;
}

const nothing: SolvedRows = { rows: new Map(), progress: null, benchFault: null };

function startWorker(): Worker {
  return new Worker(new URL('../../workers/solver.worker.ts', import.meta.url), { type: 'module' });
}

/** Solves every written row in a worker, anew whenever a row, the bench or the convention changes. Old numbers stay, marked stale, until the new ones are there. */
export function useSolvedRows(
  targets: readonly DraftTarget[],
  bench: SolvingBench | null,
  convention: Convention,
  task: SolvingTask,
): SolvedRows {
  const [solved, setSolved] = useState(nothing);
  const worker = useRef<Worker | null>(null);
  const jobNumber = useRef(0);

  useEffect(() => {
    const started = startWorker();
    worker.current = started;
    started.addEventListener('error', () =>
      setSolved((before) => ({
        ...before,
        progress: null,
        benchFault: 'The solver stopped. Load the page again; what you typed is kept.',
      })),
    );
    return () => {
      started.terminate();
      worker.current = null;
    };
  }, []);

  const written = targets.filter(({ expression }) => expression.trim() !== '');
  const { kind, objective, presentDialsDeg } = task;
  const question = JSON.stringify([
    written.map(({ id, expression, heldFastAxesDeg }) => [id, expression, heldFastAxesDeg]),
    bench,
    convention,
    [kind, objective, presentDialsDeg],
  ]);

  useEffect(() => {
    const current = worker.current;
    if (current === null || bench === null) return;
    jobNumber.current += 1;
    const job = jobNumber.current;
    const ids = written.map(({ id }) => id);
    setSolved((before) => ({
      rows: new Map(
        [...before.rows].filter(([id]) => ids.includes(id)).map(([id, row]) => [id, { ...row, stale: true }]),
      ),
      progress: ids.length === 0 ? null : { done: 0, total: ids.length },
      benchFault: null,
    }));
    const take = ({ data }: MessageEvent<SolverAnswer>) => {
      if (data.job !== job) return;
      // A long table is drawn in slices, so that typing is never kept waiting.
      startTransition(() => setSolved((before) => merge(before, data, ids)));
    };
    current.addEventListener('message', take);
    const question: SolverJob = {
      job,
      bench,
      convention,
      task: { kind, objective, presentDialsDeg },
      rows: written.map(({ expression, heldFastAxesDeg }) => ({ expression, heldFastAxesDeg })),
    };
    current.postMessage(question);
    return () => current.removeEventListener('message', take);
    // eslint-disable-next-line react-hooks/exhaustive-deps -- `question` is the text of all that the job depends on; the arrays are new at every render
  }, [question]);

  return solved;
}

function merge(before: SolvedRows, data: SolverAnswer, ids: readonly string[]): SolvedRows {
  if (data.kind === 'bench-unreadable') return { rows: new Map(), progress: null, benchFault: data.message };
  const rows = new Map(before.rows);
  if (data.kind === 'choices') {
    data.choices.forEach((choice, place) => {
      const id = ids[place];
      const row = id === undefined ? undefined : rows.get(id);
      if (id !== undefined && row !== undefined) rows.set(id, { ...row, choice });
    });
    return { ...before, rows };
  }
  data.answers.forEach((answer, offset) => {
    const id = ids[data.from + offset];
    if (id !== undefined) rows.set(id, { ...answer, stale: false });
  });
  return {
    rows,
    progress: data.done ? null : { done: data.from + data.answers.length, total: ids.length },
    benchFault: null,
  };
}
