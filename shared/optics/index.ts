export {
  type Budget,
  type BudgetProblem,
  type Contribution,
  errorBudget,
  expectedInfidelity,
  type ParameterKind,
  type ParameterUnit,
  type SharedDrift,
  type UncertainPlate,
  whatIf,
} from './budget';
export * from './calibration';
export * from './convention';
export { CONVENTION_SETS, type ConventionSet, type ConventionSource } from './convention-sets';
export { type DescribedState, describeState, type WrittenBloch } from './described-state';
export * from './dial';
export * from './dispersion';
export * from './ellipse';
export * from './expression';
export { type JonesVector, jonesNorm, normaliseJones } from './jones';
export { compose, conjugate, IDENTITY, type Quaternion, rotate } from './quaternion';
export {
  type JonesMatrix,
  path,
  type Path,
  quaternionMatrix,
  type Retarder,
  retarderMatrix,
  retarderQuaternion,
  retardJones,
  retardStokes,
  stackQuaternion,
  type Turn,
} from './retarder';
export {
  muellerMatrix,
  type MuellerMatrix,
  muellerOfJones,
  polariserMatrix,
  showMueller,
  type ShownMueller,
  type StokesRow,
} from './mueller';
export {
  flagOf,
  fullTurnSign,
  pancharatnamPhase,
  type PathPhases,
  pathPhases,
  phaseAlong,
  type PhasePoint,
  type Phases,
  type PlatePhases,
  showPhases,
} from './phase';
export * from './stokes';
export * from './units';
export { bestMember, type Cost, memberNear } from './solver/best-member';
export { MOST_PLATES, prepare, type PrepareProblem } from './solver/prepare';
export {
  type ReachCell,
  reachMap,
  type ReachMap,
  type ReachRow,
  reachRows,
  type ReachTotals,
} from './solver/reach-map';
export type { Family, Setting, Solved } from './solver/setting';
export {
  type Dialled,
  evaluateDials,
  type Objective,
  platesAtDials,
  settingBudget,
  type SettingSolution,
  SOLVER_VERSION,
  type SolvedTarget,
  solveTarget,
  statesBehind,
  type TargetPlate,
  type TargetProblem,
} from './solve-target';
export * from './tomography';
