export { lengthWithin, maximumBaseline, noRule, type Rule, type RuleConditions } from './maximumBaseline.js';
export { type SpecSheet, specSheetSigmaMm } from './specSheet.js';
export { longestSupportedKm } from './supportedLength.js';
export { type Tolerance, toleranceFactor, toleranceFactorAt } from './tolerance.js';
