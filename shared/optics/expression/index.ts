export { formatState } from './format-state';
export { formatUnitary } from './format-unitary';
export { MAX_DEPTH, MAX_LENGTH, MAX_NODES } from './limits';
export { parseState, type StateReading } from './read-state';
export { parseStokes, type StokesReading } from './read-stokes';
export { parseUnitary, type UnitaryReading } from './read-unitary';
export type { ExpressionProblem } from './span';
