export {
  type AssociationOptions,
  type DayShare,
  type DegradedDay,
  type KpThreshold,
  type RankAssociation,
  rankAssociation,
  type ThresholdRule,
  thresholdRule,
} from './association.js';
export { type DailyFactor, dailyFactors } from './dailyFactors.js';
export type { DayCondition } from './dayConditions.js';
export { type DayEstimate, type DayValue, DEGRADED_FACTOR } from './dayEstimates.js';
export type { DayExplanation, DayVerdict, TestedCondition, TestedSetup } from './dayExplanation.js';
export {
  comboQuantiles,
  DAY_COMBOS,
  type DayCombo,
  dayPrior,
  MEDIAN_COUNT,
  priorSupport,
  THETAS,
} from './dayGrid.js';
export type { DayIndex } from './dayIndex.js';
export type { DayCells } from './dayLikelihood.js';
export { type DayModel, type DayPosterior, dayModel, dayModelOf } from './dayModel.js';
export type { GuiltyPart } from './dayParts.js';
export { type DayModelNode, dayModelNodes, dayQuantilePpm, predictiveWeights } from './dayQuantiles.js';
export type { DegradedEvent } from './degradedDays.js';
export { type EffectiveShare, effectiveShare } from './effectiveShare.js';
export {
  type DayCovariates,
  type ExplainOptions,
  explainDay,
  judgeDegradedDays,
} from './explainDay.js';
export { familyAdjusted } from './falseDiscovery.js';
export { type FittedSpread, fittedData, fittedSpread } from './fittedSpread.js';
export { type HourClasses, hourClasses } from './hourClasses.js';
export { type HourDayCell, type HourDayOptions, hourDayRatios } from './hourDayRatios.js';
export type { HourHarmonics } from './hourHarmonics.js';
export { type ModeratedDay, moderatedDays } from './moderatedVariance.js';
export { nodesWithoutDay } from './nodesWithoutDay.js';
export type { OffsetTest } from './setupOffsets.js';
export {
  type HourClass,
  type TimeOfDay,
  type TimeOfDayOptions,
  timeOfDay,
} from './timeOfDay.js';
export { type DayDependence, dayDependence } from './weekClusters.js';
export { weightedQuantiles } from './weightedQuantile.js';
