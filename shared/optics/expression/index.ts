export { formatState } from './format-state';
export { MAX_DEPTH, MAX_LENGTH, MAX_NODES } from './limits';
export { parseState, type StateReading } from './read-state';
export type { ExpressionProblem } from './span';
