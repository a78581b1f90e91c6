import type { Convention } from '../../shared/optics/convention';
import type { RowResult, SolvingBench } from '../../shared/protocol/solve-row';

/** Rows to solve for one bench. A newer job makes an older one pointless. */
export interface SolverJob {
  readonly job: number;
  readonly bench: SolvingBench;
  readonly convention: Convention;
  readonly expressions: readonly string[];
}

export type SolverAnswer =
  | { readonly kind: 'bench-unreadable'; readonly job: number; readonly message: string }
  | {
      readonly kind: 'rows';
      readonly job: number;
      /** Place of the first of `results` among the job's expressions. */
      readonly from: number;
      readonly results: readonly RowResult[];
      readonly done: boolean;
    };
