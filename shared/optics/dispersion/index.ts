export { birefringence, birefringenceDispersion, fittedBirefringence } from './birefringence';
export {
  compareWithModel,
  type DesignedRetardance,
  designRetardance,
  type ModelComparison,
  type ModelledRetardance,
  modelRetardance,
  NOMINAL_DEG,
  type PlateDesign,
} from './design';
export {
  type Material,
  MATERIAL_IDS,
  type MaterialId,
  type Ray,
  type TemperatureCoefficient,
} from './material';
export { materialOf, MATERIALS } from './materials';
export { type Dispersion, indexDispersion, refractiveIndex, WavelengthRangeError } from './refractive-index';
export {
  type MeasuredRetardance,
  type ModelledPlate,
  type PlateConstruction,
  retardanceAt,
  type Surroundings,
  type UsedRetardance,
} from './retardance-model';
