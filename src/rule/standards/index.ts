export { type AsprsResult, asprs, withControlError } from './asprs.js';
export { type CheckPoints, checkPoints } from './checkPoints.js';
export { circularUncertainty95 } from './circularUncertainty.js';
export type { StandardCondition, StandardHead } from './condition.js';
export {
  type FieldSeries,
  type FieldTestShot,
  type FoundFieldTest,
  type FoundFieldTests,
  findFieldTests,
  type PlaceOfMark,
} from './findFieldTests.js';
export {
  type FieldPoint,
  type FieldTestOptions,
  type FieldTestResult,
  type FieldTestSet,
  isoFieldTest,
  type SampleDeviation,
  type SetCheck,
  sameDeviation,
  upperFactor,
} from './iso17123.js';
export { type CheckPointOptions, type NssdaResult, nssda } from './nssda.js';
export {
  LAND_TITLE_LIMIT,
  type RelativeClass,
  type RelativeLimit,
  type RelativePrecision,
  type RelativePrecisionOptions,
  relativeAllowance,
  relativePrecision,
} from './relativePrecision.js';
export { figure, lackingOf, type StandardFigure, type StandardResult } from './standardResult.js';
export {
  type BudgetEntry,
  type BudgetOptions,
  type CombinedUncertainty,
  combineUncertainties,
  type UncertaintyBudget,
  uncertaintyBudget,
} from './uncertaintyBudget.js';
