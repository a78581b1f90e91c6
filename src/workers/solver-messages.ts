import type { Convention } from '../../shared/optics/convention';
import type { RowChoice, Unplanned } from '../../shared/protocol/choose-solutions';
import type { RowResult, SolvingBench, SolvingTask } from '../../shared/protocol/solve-row';

export interface JobRow {
  readonly expression: string;
  readonly heldFastAxesDeg: readonly number[] | null;
  /** Whether its answer is wanted; the page has the others already. */
  readonly wanted: boolean;
}

/** Rows to solve for one bench. A newer job makes an older one pointless. */
export interface SolverJob {
  readonly job: number;
  readonly bench: SolvingBench;
  readonly convention: Convention;
  readonly task: SolvingTask;
  readonly rows: readonly JobRow[];
}

export interface RowAnswer {
  readonly result: RowResult;
  /** The solution that stands; null for a row that can't be read. */
  readonly choice: RowChoice | null;
}

export type SolverAnswer =
  | { readonly kind: 'bench-unreadable'; readonly job: number; readonly message: string }
  | {
      readonly kind: 'rows';
      readonly job: number;
      readonly answers: readonly { readonly place: number; readonly answer: RowAnswer }[];
      /** Of the rows that were wanted. */
      readonly doneCount: number;
      /** Whether nothing more comes: by the least travel the choices do. */
      readonly done: boolean;
    }
  /** By the least travel the rows depend on one another: their choices come when the last is solved, and are the last answer. */
  | {
      readonly kind: 'choices';
      readonly job: number;
      readonly choices: readonly (RowChoice | null)[];
      /** Why there is no plan; its row is a place among the job's. */
      readonly unplanned: Unplanned | null;
    }
  /** Nothing more comes: the solver met what it was not made for. */
  | { readonly kind: 'failed'; readonly job: number; readonly sentence: string };
