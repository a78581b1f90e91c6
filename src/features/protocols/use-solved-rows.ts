import { startTransition, useEffect, useRef, useState } from 'react';
import type { Convention } from '../../../shared/optics/convention';
import type { RowChoice } from '../../../shared/protocol/choose-solutions';
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

/** What the rows on the page were solved for, and which text of each was answered last. */
interface Answered {
  readonly context: string;
  readonly keys: Map<string, string>;
}

function keyOf({ expression, heldFastAxesDeg }: DraftTarget): string {
  return JSON.stringify([expression, heldFastAxesDeg]);
}

/**
 * Solves every written row in a worker, anew whenever it, the bench, the task or the convention changes. Old numbers stay,
 * marked stale, until the new ones are there; rows that did not change keep the very same objects.
 */
export function useSolvedRows(
  targets: readonly DraftTarget[],
  bench: SolvingBench | null,
  convention: Convention,
  task: SolvingTask,
): SolvedRows {
  const [solved, setSolved] = useState(nothing);
  const worker = useRef<Worker | null>(null);
  const jobNumber = useRef(0);
  const answered = useRef<Answered>({ context: '', keys: new Map() });

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
  const context = JSON.stringify([bench, convention, kind, objective, presentDialsDeg]);
  const question = `${context} ${written.map((target) => `${target.id} ${keyOf(target)}`).join(' ')}`;

  useEffect(() => {
    const current = worker.current;
    if (current === null || bench === null) return;
    jobNumber.current += 1;
    const job = jobNumber.current;
    if (answered.current.context !== context) answered.current = { context, keys: new Map() };
    const { keys } = answered.current;
    const wanted = new Set(written.filter((row) => keys.get(row.id) !== keyOf(row)).map(({ id }) => id));
    const ids = written.map(({ id }) => id);
    const markStale = () =>
      setSolved((before) => ({
        rows: staleWhere(before.rows, wanted),
        progress: wanted.size === 0 ? null : { done: 0, total: wanted.size },
        benchFault: null,
      }));
    // One row is marked at once, as it is typed; a whole table in slices, so that typing is never kept waiting.
    if (wanted.size > 1) startTransition(markStale);
    else markStale();
    const take = ({ data }: MessageEvent<SolverAnswer>) => {
      if (data.job !== job) return;
      if (data.kind === 'rows') {
        for (const { place } of data.answers) {
          const row = written[place];
          if (row !== undefined) keys.set(row.id, keyOf(row));
        }
      }
      startTransition(() => setSolved((before) => merge(before, data, ids, wanted.size)));
    };
    current.addEventListener('message', take);
    const request: SolverJob = {
      job,
      bench,
      convention,
      task: { kind, objective, presentDialsDeg },
      rows: written.map(({ id, expression, heldFastAxesDeg }) => ({
        expression,
        heldFastAxesDeg,
        wanted: wanted.has(id),
      })),
    };
    current.postMessage(request);
    return () => current.removeEventListener('message', take);
    // eslint-disable-next-line react-hooks/exhaustive-deps -- `question` is the text of all that the job depends on; the arrays are new at every render
  }, [question]);

  return solved;
}

function staleWhere(
  rows: ReadonlyMap<string, SolvedRow>,
  wanted: ReadonlySet<string>,
): ReadonlyMap<string, SolvedRow> {
  return new Map(
    [...rows].map(([id, row]) => [id, wanted.has(id) && !row.stale ? { ...row, stale: true } : row]),
  );
}

function merge(before: SolvedRows, data: SolverAnswer, ids: readonly string[], total: number): SolvedRows {
  if (data.kind === 'bench-unreadable') return { rows: new Map(), progress: null, benchFault: data.message };
  const rows = new Map(before.rows);
  if (data.kind === 'choices') {
    data.choices.forEach((choice, place) => {
      const id = ids[place];
      const row = id === undefined ? undefined : rows.get(id);
      if (id !== undefined && row !== undefined && !sameChoice(choice, row.choice)) {
        rows.set(id, { ...row, choice });
      }
    });
    return { ...before, rows };
  }
  for (const { place, answer } of data.answers) {
    const id = ids[place];
    if (id !== undefined) rows.set(id, { ...answer, stale: false });
  }
  return { rows, progress: data.done ? null : { done: data.doneCount, total }, benchFault: null };
}

function sameChoice(one: RowChoice | null, other: RowChoice | null): boolean {
  return JSON.stringify(one) === JSON.stringify(other);
}
