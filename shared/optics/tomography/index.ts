export { linearInversion, type LinearInversion } from './linear-inversion';
export type { MeasuredCounts, TomographyRefusal } from './measured-counts';
export type { MissingDirection } from './missing-direction';
export { mostLikelyState, type MostLikelyState, type StateEstimate } from './most-likely';
export { fidelityToPure, purity } from './state-quality';
