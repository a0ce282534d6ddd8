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
export { type CompareOptions, type Comparison, compareForms, type DayScore } from './compareForms.js';
export { type CurvePoint, errorCurve, sigmaAtMm, sigmaUpperLimitMm } from './errorCurve.js';
export type {
  AxisFits,
  ErrorModel,
  EstimateWithLimits,
  ModelUncertainty,
  Reference,
} from './errorModel.js';
export {
  estimateForm,
  estimateVariance,
  type FormEstimate,
  fittedSigmaMm,
  type VarianceEstimate,
} from './estimate.js';
export { fitErrorModel } from './fitErrorModel.js';
export {
  type Axis,
  BASIS,
  COMPONENT_COLUMNS,
  type Component,
  type FitComponent,
  FORM_CURVES,
  type Form,
  type FormCurve,
  spreadMm,
} from './forms.js';
export { informationNumber } from './information.js';
export { type ContrastEstimate, contrastEstimate, varianceLimits, varianceUpperLimit } from './intervals.js';
export { type DayInfluence, type Jackknife, jackknifeByDay } from './jackknife.js';
export type { FitOptions } from './options.js';
export { scoreLimits } from './scoreInterval.js';
export type { FormSolution, SquaredErrors } from './scoring.js';
export {
  type Screening,
  type ScreeningOptions,
  type ScreeningResiduals,
  screenWrongFixes,
} from './screening/screenWrongFixes.js';
export {
  type WrongFixGrowth,
  type WrongFixShareAtKm,
  wrongFixGrowth,
  wrongFixShareAtKm,
} from './screening/wrongFixGrowth.js';
export type { WrongFixShare } from './screening/wrongFixShare.js';
export { fitTerms, type TermEstimate, type TermOptions, type TermsModel } from './terms/fitTerms.js';
export type { KnownSigmas } from './terms/knownParts.js';
export type { Term } from './terms/termData.js';
export type { TermGain } from './terms/termGain.js';
export {
  type FitWithoutDay,
  type FitWithoutMark,
  fitWithoutEachDay,
  fitWithoutEachMark,
} from './withoutEachDay.js';
