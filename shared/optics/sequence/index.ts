export { type MountMove, mountMove, readingsFor } from './mount-move';
export { type SequencePlan, type SequenceStep } from './plan';
export {
  type OrderOptions,
  type OrderPlan,
  type OrderProgress,
  planOrder,
  planOrderSteps,
} from './plan-order';
export { planSequence, planSequenceSteps, type SequenceProgress } from './plan-sequence';
export {
  type MountMotion,
  type SequenceProblem,
  type SequenceRow,
  TooManyStationsError,
  UnreachableRowError,
} from './problem';
export { finish } from './cheapest-way';
