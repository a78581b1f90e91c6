/*
 * Calibration of a plate in its mount by a scan: powers against dial angles in, offset and retardance out, with their
 * errors and with what the scan leaves open (open-questions.ts has the reasoning). Between linear polarisers
 * (`fitLinearScan`), behind known light (`fitRotatingScan`), and the other way round, light from a known plate
 * (`fitInputStokes`). Angles at this interface are in degrees; offset is the dial's reading with the fast axis at H.
 */
export {
  type RetardanceDistance,
  distanceFromModel,
  predictRetardance,
  type Prediction,
  type PredictionProblem,
} from './prediction';
export { INTERVAL_SIGMA, SETTLED_SIGMA } from './evidence';
export type { FaultHarmonic } from './fault-harmonics';
export {
  type EvenHarmonics,
  evenHarmonics,
  fitInputStokes,
  type InputScan,
  type InputStokes,
  stokesOfHarmonics,
} from './input-stokes';
export type { OffsetEstimate, PlateFinding } from './linear-reading';
export {
  fitLinearScan,
  type FitQuality,
  type FittedParameter,
  type LinearParameter,
  type LinearScan,
  linearScanCurve,
  type LinearScanFit,
} from './linear-scan';
export { blindNearDeg } from './open-questions';
export type {
  BranchReason,
  CandidatePlate,
  NominalRetardance,
  OpenQuestion,
  PlateReading,
  SettledQuestion,
} from './open-questions';
export { SUSPECT_SIGMA } from './outliers';
export type { ScanRefusal, RefusalReason } from './refusal';
export type { RetardanceEstimate } from './retardance-estimate';
export { rotatingPlateRow } from './rotating-model';
export {
  fitRotatingScan,
  type RotatingParameter,
  type RotatingScan,
  rotatingScanCurve,
  type RotatingScanFit,
} from './rotating-scan';
export type { RowResidual } from './row-residuals';
export {
  MOST_ROWS,
  type Ports,
  type PowerReading,
  type RotatingRow,
  type ScanRow,
  type Stated,
} from './scan-rows';
export type { ScanWarning } from './warnings';
