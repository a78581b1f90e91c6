import type { BudgetProblem } from '../../shared/optics/budget';
import type { MonteCarloSummary } from '../../shared/optics/monte-carlo';
import type { ReachMap } from '../../shared/optics/solver/reach-map';
import type { Stokes } from '../../shared/optics/stokes';
import type { OrderPlan, SequencePlan, SequenceProblem } from '../../shared/optics/sequence';
import type { RobustQuestion, RobustStudy } from './robust-study';

/** Work that may take seconds: done aside, with its progress told, and stopped by ending the worker. */
export type StudyRequest =
  | {
      readonly kind: 'sequence';
      readonly problem: SequenceProblem;
      /** Whether other orders of the list are tried as well. */
      readonly reorder: boolean;
    }
  | {
      readonly kind: 'monte-carlo';
      readonly problem: BudgetProblem;
      readonly draws: number;
      readonly seed: number;
      readonly toleranceInfidelity: number;
    }
  | {
      readonly kind: 'reach';
      readonly input: Stokes;
      readonly retardancesDeg: readonly [number, number];
      readonly stepDeg: number;
    }
  | { readonly kind: 'robust'; readonly question: RobustQuestion };

export type StudyResult =
  | { readonly kind: 'sequence'; readonly plan: SequencePlan; readonly order: OrderPlan | null }
  | { readonly kind: 'monte-carlo'; readonly summary: MonteCarloSummary; readonly shareWithin: number }
  | { readonly kind: 'reach'; readonly map: ReachMap; readonly stepDeg: number }
  | { readonly kind: 'robust'; readonly study: RobustStudy };

/** What a request of some kind is answered with. */
export type ResultOf<Kind extends StudyRequest['kind']> = Extract<StudyResult, { readonly kind: Kind }>;

export type StudyAnswer =
  /** From 0 to 1. */
  | { readonly state: 'working'; readonly share: number }
  | { readonly state: 'done'; readonly result: StudyResult }
  | { readonly state: 'failed'; readonly sentence: string };
