import type { ErrorModel, EstimateWithLimits } from '../fit/index.js';
import type { Rule, SpecSheet, Tolerance } from '../rule/index.js';
import { ruleWords } from './errorTolerance.js';
import { counted, countWords, percentWords, shortNumber } from './words.js';

/** `8.1 mm + 1.02 ppm`, or what can be said where an estimate is missing. */
function modelWords(model: ErrorModel): string {
  const { constantMm, ppm } = model;
  const constant = term(constantMm, 1, 'mm');
  if (ppm.estimate === null && ppm.high === null) {
    const [from, to] = [model.shortestKm, model.longestKm].map((km) => km.toFixed(1));
    return `${constant} from ${from} to ${to} km, ppm not known`;
  }
  return `${constant} + ${term(ppm, 2, 'ppm')}`;
}

function term({ estimate, high }: EstimateWithLimits, digits: number, unit: string): string {
  if (estimate !== null) return `${estimate.toFixed(digits)} ${unit}`;
  return high === null ? `unknown ${unit}` : `less than ${high.toFixed(digits)} ${unit}`;
}

/** The form in brackets; a constant alone has none. */
const formWords = ({ ppm, form }: ErrorModel): string =>
  ppm.estimate === null && ppm.high === null ? '' : ` (${form})`;

/** The finding: `Horizontal error: 8.1 mm + 1.02 ppm (root-sum-square)`. */
export function errorTitle(model: ErrorModel): string {
  const name = model.component === 'horizontal' ? 'Horizontal' : 'Vertical';
  return `${name} error: ${modelWords(model)}${formWords(model)}`;
}

/** What the numbers are, on what they rest, and what the chart does not show. */
export function errorSubtitle(
  model: ErrorModel,
  rule: Rule | undefined,
  hidden: HiddenCounts,
  heights: HeightKind | undefined,
): string[] {
  const marks = model.marks === null ? '' : ` at ${counted(model.marks, 'mark')}`;
  const basis = `${model.basis}${heightWords(model, heights)}, ${model.reference} reference${intervalWords(model)}`;
  const data = `${counted(model.occupations, 'occupation')} on ${counted(model.days, 'day')}${marks}${hiddenWords(hidden)}`;
  const why =
    rule !== undefined && ruleWords(rule) === null
      ? [`no maximum baseline for ${shortNumber(rule.limitMm)} mm: ${rule.reason ?? 'none given'}`]
      : [];
  return [basis, data, ...why].map((line) => `${line[0]!.toUpperCase()}${line.slice(1)}`);
}

/** Kind of the heights of which vertical errors are those. */
export type HeightKind = 'ellipsoidal' | 'orthometric';

/** ` of ellipsoidal heights`; nothing for the plan, or where the kind is not stated. */
export const heightWords = ({ component }: ErrorModel, heights: HeightKind | undefined): string =>
  component === 'horizontal' || heights === undefined ? '' : ` of ${heights} heights`;

function intervalWords({ constantMm, ppm, confidence }: ErrorModel): string {
  const ranges = [limits(constantMm, 1, 'mm'), limits(ppm, 2, 'ppm')].filter((text) => text !== null);
  return ranges.length === 0
    ? '; too few days for an interval'
    : `; ${percentWords(confidence)} interval${ranges.length === 1 ? '' : 's'} ${ranges.join(' and ')}`;
}

const limits = ({ low, high }: EstimateWithLimits, digits: number, unit: string): string | null =>
  low === null || high === null ? null : `${low.toFixed(digits)} to ${high.toFixed(digits)} ${unit}`;

/** What lies above the upper end of the axis. */
export interface HiddenCounts {
  readonly points: number;
  readonly classes: number;
  readonly aboveMm: number;
}

function hiddenWords({ points, classes, aboveMm }: HiddenCounts): string {
  const parts = [
    ...(points > 0 ? [counted(points, 'error')] : []),
    ...(classes > 0 ? [`${countWords(classes)} length class${classes === 1 ? '' : 'es'}`] : []),
  ];
  return parts.length === 0 ? '' : `; not shown: ${parts.join(' and ')} above ${shortNumber(aboveMm)} mm`;
}

/** The chart in sentences. */
export function errorDescription(
  model: ErrorModel,
  parts: {
    readonly classes: number;
    readonly specSheet: SpecSheet | undefined;
    readonly tolerance: Tolerance | undefined;
    readonly rule: Rule | undefined;
    readonly hidden: HiddenCounts;
    readonly heights: HeightKind | undefined;
  },
): string {
  const { classes, specSheet, tolerance, rule, hidden, heights } = parts;
  const kind =
    model.component === 'horizontal'
      ? 'radial horizontal errors'
      : `sizes of height errors${heights === undefined ? '' : ` (${heights} heights)`}`;
  const words = rule === undefined ? null : ruleWords(rule);
  return [
    `Chart of ${kind} in millimetres against baseline length from ${model.shortestKm.toFixed(1)} to ${model.longestKm.toFixed(1)} km, ${counted(model.occupations, 'occupation')} on ${counted(model.days, 'day')}.`,
    `The own error model, ${modelWords(model)}${formWords(model)}, ${model.basis}, is drawn as a curve.`,
    classes > 0
      ? `The ${model.basis} measured in ${classes === 1 ? '1 length class' : `${classes} length classes`} is drawn beside it.`
      : '',
    specSheet === undefined
      ? ''
      : `A dashed curve shows the spec sheet, ${specSheet[model.component].constantMm} mm + ${specSheet[model.component].ppm} ppm as stated there.`,
    tolerance === undefined
      ? ''
      : `The tolerance is ${shortNumber(tolerance.limitMm)} mm for ${percentWords(tolerance.share)} of positions.`,
    words !== null ? `${words}.` : '',
    rule !== undefined && words === null
      ? `There is no maximum baseline: ${rule.reason ?? 'no reason given'}.`
      : '',
    hidden.points > 0
      ? `Not shown: ${counted(hidden.points, 'error')} above ${shortNumber(hidden.aboveMm)} mm.`
      : '',
  ]
    .filter((sentence) => sentence !== '')
    .join(' ');
}
