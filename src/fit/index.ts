export {
  type ClusterTerms,
  type CovarianceKind,
  clusterTerms,
  covariance,
  naiveCovariance,
} from './clusterCovariance.js';
export { type CompareOptions, type Comparison, compareForms, type DayScore } from './compareForms.js';
export { type CurvePoint, errorCurve, sigmaAtMm, sigmaLimitsMm, sigmaUpperLimitMm } from './errorCurve.js';
export type {
  AxisFits,
  ErrorModel,
  EstimateWithLimits,
  ModelUncertainty,
  Reference,
  RepeatabilityTerms,
  SetupSummary,
} from './errorModel.js';
export {
  estimateForm,
  estimateVariance,
  type FormEstimate,
  fittedSigmaMm,
  type VarianceEstimate,
} from './estimate.js';
export { daysWithFarShots, type FarDays, type FarDaysOptions } from './evidence/daysWithFarShots.js';
export { type FirstAndLast, type FirstAndLastOptions, firstAndLast } from './evidence/firstAndLast.js';
export {
  type DistanceCompanion,
  type DistanceCompanions,
  goesWithDistance,
} from './evidence/goesWithDistance.js';
export {
  type InformationBy,
  type InformationShare,
  type InformationShares,
  informationShares,
} from './evidence/informationShares.js';
export type { RmsRatio } from './evidence/ratioOfMeanSquares.js';
export { type ReshotOptions, type Reshots, reshots } from './evidence/reshots.js';
export { fitErrorModel } from './fitErrorModel.js';
export {
  type Axis,
  axesOf,
  COMPONENT_COLUMNS,
  type Component,
  type FitComponent,
  type Form,
  type FormCurve,
  spreadMm,
} from './forms.js';
export { type CompareStudiesOptions, compareStudies, type StudyComparison } from './groups/compareStudies.js';
export {
  type FitByGroupOptions,
  fitByGroup,
  type GroupBy,
  type GroupComparison,
  type GroupFit,
  type GroupVerdict,
} from './groups/fitByGroup.js';
export { informationNumber } from './information.js';
export { type ContrastEstimate, contrastEstimate, varianceLimits } from './intervals.js';
export { type DayInfluence, type Jackknife, jackknifeByDay } from './jackknife.js';
export type { FitOptions } from './options.js';
export { type FitData, prepareErrors } from './prepareErrors.js';
export { chooseReference, type ReferenceChoice } from './reference/chooseReference.js';
export { type ComposedAbsolute, composeAbsolute } from './reference/composeAbsolute.js';
export type { MarkCell } from './reference/markCells.js';
export { type MarkComponent, type MarkError, markComponent } from './reference/markComponent.js';
export type { MarkSupport } from './reference/markSupport.js';
export { type MarkMeanError, markVariance, type VarianceWithLimits } from './reference/markVariance.js';
export { type ReferencedData, type ReferenceOptions, referenceData } from './reference/referenceData.js';
export type { SetupOffset, SetupSeparation } from './reference/relative.js';
export type { MarkDay, Repeatability } from './reference/repeatability.js';
export type { ScaleTrend } from './reference/scaleTrend.js';
export { type SetupOffsets, setupOffsets } from './reference/setupOffsets.js';
export { type MarkTest, type TestMarksOptions, testMarks } from './reference/testMarks.js';
export { azimuthSpread } from './reference/visits.js';

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
export { type SignFlipTest, signFlipTest } from './signFlips.js';
export { type Coefficient, coefficientTable } from './summary/coefficientTable.js';
export { type FitExtras, type FitSummary, fitSummary } from './summary/fitSummary.js';
export { coefficientTexts, formatFit } from './summary/formatFit.js';
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
