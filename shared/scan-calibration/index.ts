/*
 * A scan's file and a plate in its mount in, a calibration's numbers out: the reader of shared/scan-file and the fits of
 * shared/optics/calibration put together, the same for the page and for the server.
 */
export {
  fitScan,
  recordProblem,
  type ScanAnswer,
  type ScanFit,
  type ScanLight,
  type ScanToFit,
  type ScanValues,
} from './fit-scan';
export { type DescribedPlate, type MeasuredBefore, nominalRetardance, predictedRetardance } from './nominal';
export { asMeasuredBefore, recordedScan } from './recorded';
