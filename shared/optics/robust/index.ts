export {
  findRobust,
  findRobustSteps,
  type PlainSetting,
  type RobustProblem,
  type RobustProgress,
  type RobustResult,
  type RobustSetting,
} from './find-robust';
export { type CurvePoint, infidelityCurve, type Robustness, robustnessOf } from './robustness';
export {
  type CompositeMakes,
  type CompositePlate,
  PUBLISHED_COMPOSITES,
  type PublishedComposite,
} from './published-composites';
