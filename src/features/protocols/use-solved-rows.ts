import { startTransition, useEffect, useRef, useState } from 'react';
import type { Convention } from '../../../shared/optics/convention';
import { type RowChoice, whyUnplanned } from '../../../shared/protocol/choose-solutions';
import { rowName } from '../../../shared/protocol/row-name';
import type { SolvingBench, SolvingTask } from '../../../shared/protocol/solve-row';
import type { DraftTarget } from '../../../shared/schemas/protocols';
import { drawAlone } from '../../lib/draw-in-turn';
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
  /** Why the rows could not be planned together; each then stands as it would alone, and no version can be saved. */
  readonly planFault: string | null;
}

const nothing: SolvedRows = { rows: new Map(), progress: null, benchFault: null, planFault: null };

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
    // From here on these rows hold no answer of the text they had: typed back to it, they are asked for again.
    for (const id of wanted) keys.delete(id);
    const names = targets.map(({ label }, place) => rowName(place, label));
    const isPlanned = objective === 'least-travel';
    const asked: Asked = {
      rows: written.map((row) => ({ id: row.id, name: names[targets.indexOf(row)] ?? '' })),
      total: wanted.size,
      isPlanned,
    };
    const markStale = () =>
      setSolved((before) => ({
        rows: staleWhere(before.rows, (id) => wanted.has(id) || (isPlanned && wanted.size === 0)),
        progress: wanted.size === 0 && !isPlanned ? null : { done: 0, total: wanted.size },
        benchFault: null,
        planFault: null,
      }));
    // One row is marked at once, as it is typed; a whole table in slices, so that typing is never kept waiting.
    if (wanted.size > 1) startTransition(markStale);
    else markStale();
    const take = (data: SolverAnswer) => {
      // Asked for again meanwhile: the newer job answers those rows too.
      if (jobNumber.current !== job) return;
      if (data.kind === 'rows') {
        for (const { place } of data.answers) {
          const row = written[place];
          if (row !== undefined) keys.set(row.id, keyOf(row));
        }
      }
      startTransition(() => setSolved((before) => merge(before, data, asked)));
    };
    // A frame for each few rows: many that are answered at once would be laid out at once.
    const hear = ({ data }: MessageEvent<SolverAnswer>) => {
      if (data.job === job) drawAlone(() => take(data));
    };
    current.addEventListener('message', hear);
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
    return () => current.removeEventListener('message', hear);
    // eslint-disable-next-line react-hooks/exhaustive-deps -- `question` is the text of all that the job depends on; the arrays are new at every render
  }, [question]);

  return solved;
}

function staleWhere(
  rows: ReadonlyMap<string, SolvedRow>,
  isStale: (id: string) => boolean,
): ReadonlyMap<string, SolvedRow> {
  return new Map(
    [...rows].map(([id, row]) => [id, isStale(id) && !row.stale ? { ...row, stale: true } : row]),
  );
}

/** What was asked for, as `merge` has to know it. */
interface Asked {
  readonly rows: readonly { readonly id: string; readonly name: string }[];
  /** Rows whose answer is wanted. */
  readonly total: number;
  /** Whether an answer waits for the choices over the whole list. */
  readonly isPlanned: boolean;
}

function merge(before: SolvedRows, data: SolverAnswer, asked: Asked): SolvedRows {
  switch (data.kind) {
    case 'bench-unreadable':
      return { ...nothing, benchFault: data.message };
    case 'failed':
      return { ...before, progress: null, benchFault: data.sentence };
    case 'rows': {
      const rows = new Map(before.rows);
      for (const { place, answer } of data.answers) {
        const id = asked.rows[place]?.id;
        if (id !== undefined) rows.set(id, { ...answer, stale: asked.isPlanned });
      }
      const progress = data.done ? null : { done: data.doneCount, total: asked.total };
      return { rows, progress, benchFault: null, planFault: null };
    }
    case 'choices':
      return {
        ...before,
        rows: chosen(before.rows, data, asked),
        progress: null,
        planFault: faultOf(data, asked),
      };
  }
}

type ChoicesAnswer = Extract<SolverAnswer, { kind: 'choices' }>;

function chosen(
  before: ReadonlyMap<string, SolvedRow>,
  { choices }: ChoicesAnswer,
  asked: Asked,
): ReadonlyMap<string, SolvedRow> {
  const rows = new Map(before);
  choices.forEach((choice, place) => {
    const id = asked.rows[place]?.id;
    const row = id === undefined ? undefined : rows.get(id);
    if (id === undefined || row === undefined) return;
    if (row.stale || !sameChoice(choice, row.choice)) rows.set(id, { ...row, choice, stale: false });
  });
  return rows;
}

function faultOf({ unplanned }: ChoicesAnswer, asked: Asked): string | null {
  if (unplanned === null) return null;
  const name = asked.rows[unplanned.row]?.name ?? `Row ${unplanned.row + 1}`;
  return whyUnplanned(name, unplanned.plate === null ? null : `plate ${unplanned.plate + 1}`);
}

function sameChoice(one: RowChoice | null, other: RowChoice | null): boolean {
  return JSON.stringify(one) === JSON.stringify(other);
}
