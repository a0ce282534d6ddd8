import type { ErrorsInput } from '../errors/index.js';
import type { ErrorModel, EstimateWithLimits } from '../fit/index.js';
import { inputError } from '../logs/index.js';
import type { Rule, SpecSheet, Tolerance } from '../rule/index.js';
import type { SummaryRow } from '../split/index.js';
import { type ChartSpec, chartSpec, type View } from './chartSpec.js';
import { errorFrame, frameChannels } from './errorFrame.js';
import { type KeyEntry, keyLayers } from './errorKey.js';
import { type EndLabel, endLabel, endLabelLayers } from './errorLabels.js';
import {
  bandLayer,
  barPoints,
  classLayers,
  heatLayer,
  lineLayers,
  type MeasuredClass,
  measuredClasses,
  pointLayer,
} from './errorLayers.js';
import { drawnShare, errorBand, errorLines } from './errorLines.js';
import { errorPoints } from './errorPoints.js';
import { ruleLayers, toleranceLayer } from './errorTolerance.js';
import { errorDescription, errorSubtitle, errorTitle, type HeightKind } from './errorWords.js';
import { COLORS } from './theme.js';
import { countWords, percentWords, shortNumber } from './words.js';

/** What {@link errorByBaselineChart} draws; only errors and model are needed. */
export interface ErrorByBaselineInput {
  /** The errors to which the model was fitted; mm, km. */
  readonly errors: ErrorsInput;
  readonly model: ErrorModel;
  /** The ppm to be stated with its limits, such as those widened for days to come; default that of the model. */
  readonly ppm?: EstimateWithLimits | undefined;
  /** Measured RMS by length class, from `summarizeBy`; shown beside the curve, never fitted. */
  readonly bins?: readonly SummaryRow[] | undefined;
  readonly specSheet?: SpecSheet | undefined;
  readonly tolerance?: Tolerance | undefined;
  readonly rule?: Rule | undefined;
  /** Kind of the heights, for charts of vertical errors; named where it is given. */
  readonly heights?: HeightKind | undefined;
}

/** Beyond this many, points would cover each other and counts are shown instead. */
const MOST_POINTS = 800;

/**
 * The chart that proves the job: errors over baseline length, the fitted curve through them, what was measured class
 * by class, the spec sheet, the tolerance and how far it holds. It computes nothing of that.
 * @throws InputError when tolerance or rule are of the other component, or a column is missing
 */
export function errorByBaselineChart(input: ErrorByBaselineInput): ChartSpec {
  const { errors, model, specSheet, tolerance, rule, ppm = model.ppm } = input;
  const stated = { ...model, ppm };
  refuseOtherComponent(model, 'tolerance', tolerance);
  refuseOtherComponent(model, 'rule', rule);
  const points = errorPoints(errors, model.component);
  const classes = measuredClasses(input.bins ?? [], model.component);
  const lines = errorLines(model, drawnShare(tolerance?.share), specSheet, model.longestKm);
  const frame = errorFrame(
    [...points.map(({ baselineKm }) => baselineKm), model.longestKm],
    points.map(({ errorMm }) => errorMm),
    [
      ...lines.map(({ points: curve }) => curve.at(-1)!.errorMm),
      ...classes.filter(({ tooFew }) => !tooFew).map(({ rmsMm }) => rmsMm),
    ],
    tolerance?.limitMm ?? null,
  );
  const channels = frameChannels(frame, axisTitle(model, input.heights));
  const shown = points.filter(({ errorMm }) => errorMm <= frame.maxMm);
  const shownClasses = classes.filter(({ rmsMm }) => rmsMm <= frame.maxMm);
  const hidden = {
    points: points.length - shown.length,
    classes: classes.length - shownClasses.length,
    aboveMm: frame.maxMm,
  };
  const drawn = [
    ...shown,
    ...lines.flatMap(({ points: curve }) => curve),
    ...shownClasses.flatMap(barPoints),
  ];
  const ruleDrawn = rule === undefined ? null : ruleLayers(rule, drawn, frame, channels);
  const heat = shown.length > MOST_POINTS ? heatLayer(shown, frame, channels) : null;
  const layer: View[] = [
    heat?.layer ?? pointLayer(shown, channels),
    bandLayer(errorBand(model, model.longestKm, ppm), channels),
    ...(tolerance === undefined ? [] : [toleranceLayer(tolerance, frame, channels)]),
    ...(ruleDrawn === null ? [] : [ruleDrawn.line]),
    ...[...lines].reverse().flatMap((line) => lineLayers(line, channels)),
    ...classLayers(shownClasses, channels),
    ...(ruleDrawn?.words ?? []),
    ...endLabelLayers([...lines.map(endLabel), ...toleranceLabel(tolerance)], frame, channels),
    ...keyLayers(keyEntries(heat?.fullest ?? null, shownClasses, model), frame, channels),
  ];
  return chartSpec(
    errorTitle(stated),
    errorSubtitle(stated, rule, hidden, input.heights),
    errorDescription(stated, {
      classes: shownClasses.length,
      specSheet,
      tolerance,
      rule,
      hidden,
      heights: input.heights,
    }),
    { width: frame.widthPx, height: frame.heightPx, layer },
  );
}

const axisTitle = ({ component }: ErrorModel, heights: HeightKind | undefined): string =>
  component === 'horizontal'
    ? 'radial error √(E² + N²), mm'
    : `size of the ${heights === undefined ? '' : `${heights} `}height error, mm`;

function toleranceLabel(tolerance: Tolerance | undefined): EndLabel[] {
  if (tolerance === undefined) return [];
  const { limitMm, share } = tolerance;
  const text = [`tolerance ${shortNumber(limitMm)} mm`, `for ${percentWords(share)}`];
  return [{ errorMm: limitMm, text, color: COLORS.brick, bold: false }];
}

function keyEntries(
  fullest: number | null,
  classes: readonly MeasuredClass[],
  { basis }: ErrorModel,
): KeyEntry[] {
  const entries: KeyEntry[] = [
    fullest === null
      ? { kind: 'point', text: 'one occupation' }
      : { kind: 'amount', text: `1 to ${countWords(fullest)} occupations in a cell`, fullest },
  ];
  if (classes.some(({ tooFew }) => !tooFew)) {
    entries.push({ kind: 'filled-class', text: `${basis} measured in a length class` });
  }
  if (classes.some(({ tooFew }) => tooFew)) {
    entries.push({ kind: 'hollow-class', text: 'the same from few shots or days' });
  }
  return entries;
}

function refuseOtherComponent(
  { component }: ErrorModel,
  name: 'tolerance' | 'rule',
  given: { readonly component: string } | undefined,
): void {
  if (given === undefined || given.component === component) return;
  throw inputError(
    'bad-option',
    `Expected a ${component} ${name} for a model of the ${component} error, came a ${given.component} one. Hand in the ${name} of the same component.`,
  );
}
