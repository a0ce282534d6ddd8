export {
  type ClusterTerms,
  type CovarianceKind,
  clusterTerms,
  contrastVariance,
  covariance,
  degreesOfFreedom,
  dominantDay,
  naiveCovariance,
} from './clusterCovariance.js';
export { type CurvePoint, errorCurve, sigmaAtMm, sigmaUpperLimitMm } from './errorCurve.js';
export type { ErrorModel, EstimateWithLimits, ModelUncertainty, Reference } from './errorModel.js';
export { estimateVariance, type SquaredErrors, type VarianceEstimate } from './estimate.js';
export { fitErrorModel } from './fitErrorModel.js';
export { type Component, type Form, spreadMm } from './forms.js';
export { informationNumber } from './information.js';
export { type ContrastEstimate, contrastEstimate, varianceLimits, varianceUpperLimit } from './intervals.js';
export type { FitOptions } from './options.js';
export { scoreLimits } from './scoreInterval.js';
export { type FitWithoutDay, fitWithoutEachDay } from './withoutEachDay.js';
