export * from './backtest/index.js';
export * from './checkshot/index.js';
export { reviewBy, type Surroundings } from './conditions.js';
export { type DayBound, daysNeeded, goodDayShareLimit } from './dayBound.js';
export { type FormDoubt, findFormDoubt, formDoubt } from './formDoubt.js';
export { type FrozenMark, frozenMarks } from './frozenMarks.js';
export { crowdedDaysKept, type HeightAllowance, type RuleGround, type RuleOptions } from './ground.js';
export { type GroupRule, type GroupRuleOptions, ruleByHour, ruleBySeason } from './groupedRules.js';
export { heightAllowance } from './heightAllowance.js';
export * from './jobs/index.js';
export { lengthWithin, maximumBaseline, noRule, ruleFinder } from './maximumBaseline.js';
export { type PositionPromise, type PromiseDemand, promiseAtKm, promiser } from './promise.js';
export type { Rule, RuleConditions, SeenRange } from './rule.js';
export { type RuleTableOptions, type RuleTableRow, ruleTable } from './ruleTable.js';
export { type SpecSheet, specSheetSigmaMm } from './specSheet.js';
export * from './standards/index.js';
export { longestSupportedKm } from './supportedLength.js';
export { tabledLengths } from './tabledLengths.js';
export {
  type SpecSheetRatio,
  type SpecSheetTest,
  type SpecSheetTestOptions,
  type SpecSheetVerdict,
  testSpecSheet,
} from './testSpecSheet.js';
export { checkTolerance, type Tolerance, toleranceFactor, toleranceFactorAt } from './tolerance.js';
export * from './watch/index.js';
