import { inputError, type Message, message } from '../../logs/index.js';
import type { Random } from '../../stats/index.js';
import type { ErrorModel } from '../errorModel.js';
import { axesOf, type FitComponent } from '../forms.js';
import { signFlipTest } from '../signFlips.js';
import { type MarkError, markErrors, marksInUse } from './markComponent.js';
import { markSpread } from './markVariance.js';
import type { MarkDay } from './repeatability.js';

export interface TestMarksOptions {
  /** Numbers in [0, 1). */
  readonly random: Random;
  /** Sign patterns; default 1999. */
  readonly flips?: number | undefined;
}

/** Whether the marks' mean errors are more than their scatter from day to day explains. */
export interface MarkTest {
  /** Σ (mean/τ)² over marks and axes, and how often chance gives as much; null with fewer than 3 marks. */
  readonly any: { readonly statistic: number; readonly pValue: number } | null;
  /** The same with what all marks have in common taken out. */
  readonly differ: { readonly statistic: number; readonly pValue: number } | null;
  /** Sign patterns of days tried. */
  readonly flips: number;
  /** By how much marks differ beyond the scatter of their days, standard deviation per axis, mm. */
  readonly spreadMm: number | null;
  /** Marks more than three standard errors off, farthest off first. */
  readonly beyondThreeErrors: readonly MarkError[];
  readonly notes: readonly Message[];
}

const DEFAULT_FLIPS = 1999;
const FEWEST_MARKS = 3;
const LEVEL = 0.05;
const MOST_NAMED = 5;

/**
 * Tests the marks' mean errors by sign flips of whole days: against the published coordinates (`any`) and against each
 * other (`differ`). Only marks on three days or more take part.
 * @param model a fit with `reference: 'repeatability'`
 * @throws InputError when the model has another reference
 */
export function testMarks(
  model: ErrorModel<FitComponent>,
  { random, flips = DEFAULT_FLIPS }: TestMarksOptions,
): MarkTest {
  const { repeatability, fitted, component } = model;
  if (repeatability === null) {
    throw inputError(
      'bad-model',
      'Expected a fit of reference "repeatability", came one of another reference. Fit with reference: "repeatability" first.',
    );
  }
  const used = marksInUse(markErrors(repeatability.markDays, repeatability.rho, fitted, component));
  if (used.length < FEWEST_MARKS) {
    const note = message(
      'info',
      'marks-not-tested',
      `${used.length} ${used.length === 1 ? 'mark was' : 'marks were'} visited on 3 days or more: too few to tell whether marks are in error. Visit at least ${FEWEST_MARKS} marks on 3 days or more.`,
    );
    return { any: null, differ: null, flips: 0, spreadMm: null, beyondThreeErrors: [], notes: [note] };
  }
  const table = dayTable(repeatability.markDays, used, axesOf(component));
  const any = signFlipTest(table.days, (signs) => quadratic(table, signs, false), flips, random);
  const centered = { ...table, values: withoutCommon(table) };
  const differ = signFlipTest(table.days, (signs) => quadratic(centered, signs, true), flips, random);
  const spreadMm = Math.sqrt(markSpread(used));
  const far = (mark: MarkError): number => Math.hypot(...mark.meanMm) / mark.tauMm;
  const beyondThreeErrors = used.filter((mark) => mark.beyondThreeErrors).sort((a, b) => far(b) - far(a));
  return {
    any: { statistic: any.statistic, pValue: any.pValue },
    differ: { statistic: differ.statistic, pValue: differ.pValue },
    flips: any.flips,
    spreadMm,
    beyondThreeErrors,
    notes: verdict(any.pValue, differ.pValue, spreadMm, beyondThreeErrors, used),
  };
}

/** Contributions of each day to the means of the marks in use, by axis. */
interface DayTable {
  readonly days: number;
  readonly axes: number;
  /** 1/τ² of each mark. */
  readonly weights: Float64Array;
  /** Day and mark of each cell, its share 1/D of the mark's mean, and share × mean error by axis. */
  readonly dayOf: Int32Array;
  readonly markOf: Int32Array;
  readonly share: Float64Array;
  readonly values: readonly Float64Array[];
}

function dayTable(markDays: readonly MarkDay[], used: readonly MarkError[], axes: number): DayTable {
  const markIndex = new Map(used.map(({ mark }, m) => [mark, m]));
  const cells = markDays.filter(({ mark, counts }) => counts && markIndex.has(mark));
  const names = [...new Set(cells.map(({ day }) => day))].sort();
  const dayIndex = new Map(names.map((name, d) => [name, d]));
  const share = Float64Array.from(cells, ({ mark }) => 1 / used[markIndex.get(mark)!]!.days);
  return {
    days: names.length,
    axes,
    weights: Float64Array.from(used, ({ tauMm }) => 1 / tauMm ** 2),
    dayOf: Int32Array.from(cells, ({ day }) => dayIndex.get(day)!),
    markOf: Int32Array.from(cells, ({ mark }) => markIndex.get(mark)!),
    share,
    values: Array.from({ length: axes }, (_, c) =>
      Float64Array.from(cells, ({ means }, k) => share[k]! * means[c]!),
    ),
  };
}

/** Σ w mean² over marks and axes with the days' signs, the weighted mean of each axis taken out where wanted. */
function quadratic(table: DayTable, signs: Float64Array, centered: boolean): number {
  const { weights, dayOf, markOf, values } = table;
  let total = 0;
  for (const column of values) {
    const means = new Float64Array(weights.length);
    for (let k = 0; k < column.length; k++) means[markOf[k]!]! += signs[dayOf[k]!]! * column[k]!;
    const center = centered ? weightedMean(means, weights) : 0;
    for (let m = 0; m < means.length; m++) total += weights[m]! * (means[m]! - center) ** 2;
  }
  return total;
}

function withoutCommon({ weights, markOf, share, values }: DayTable): Float64Array[] {
  return values.map((column) => {
    const means = new Float64Array(weights.length);
    column.forEach((value, k) => {
      means[markOf[k]!]! += value;
    });
    const common = weightedMean(means, weights);
    return column.map((value, k) => value - common * share[k]!);
  });
}

function weightedMean(values: Float64Array, weights: Float64Array): number {
  let [sum, total] = [0, 0];
  for (let k = 0; k < values.length; k++) {
    sum += weights[k]! * values[k]!;
    total += weights[k]!;
  }
  return sum / total;
}

function verdict(
  pAny: number,
  pDiffer: number,
  spreadMm: number,
  beyond: readonly MarkError[],
  used: readonly MarkError[],
): Message[] {
  if (pDiffer < LEVEL) {
    const names = beyond
      .slice(0, MOST_NAMED)
      .map(({ mark, meanMm }) => `${mark} (${meanMm.map(signed).join(', ')} mm)`);
    const more = beyond.length - names.length;
    const list =
      names.length === 0
        ? 'no single mark is more than three standard errors off'
        : `more than three standard errors off: ${names.join(', ')}${more > 0 ? ` and ${more} more` : ''}`;
    return [
      message(
        'warning',
        'marks-differ',
        `Marks differ by ${spreadMm.toFixed(1)} mm per axis more than their day-to-day scatter explains; ${list}. Check the coordinates of these marks, and rest the ppm on repeatability.`,
      ),
    ];
  }
  if (pAny >= LEVEL) return [];
  const common = used[0]!.meanMm.map((_, c) => {
    const weights = Float64Array.from(used, ({ tauMm }) => 1 / tauMm ** 2);
    return signed(
      weightedMean(
        Float64Array.from(used, ({ meanMm }) => meanMm[c]!),
        weights,
      ),
    );
  });
  return [
    message(
      'warning',
      'common-offset',
      `All marks are off together, by ${common.join(', ')} mm, and do not differ among themselves: a common offset. Check base coordinates, antenna heights and transformation.`,
    ),
  ];
}

const signed = (valueMm: number): string => `${valueMm < 0 ? '−' : '+'}${Math.abs(valueMm).toFixed(1)}`;
