import { groupIndices } from '../../errors/index.js';
import { inputError, type Message, message } from '../../logs/index.js';
import type { ErrorModel, EstimateWithLimits } from '../errorModel.js';
import type { FormEstimate } from '../estimate.js';
import { axesOf, type FitComponent } from '../forms.js';
import { meanShare } from './markCells.js';
import { type MarkMeanError, markVariance } from './markVariance.js';
import type { MarkDay } from './repeatability.js';
import { type ScaleTrend, scaleTrend } from './scaleTrend.js';
import { varianceAt } from './varianceModel.js';

/** A mark's own error: what is the same on every day. */
export interface MarkError extends MarkMeanError {
  readonly mark: string;
  readonly baselineKm: number;
  /** From the base, degrees; null where the errors do not tell. */
  readonly azimuthDeg: number | null;
  /** Counting days (of each base, where there are several). */
  readonly days: number;
  /** More than three standard errors from 0 on some axis, on three days or more. */
  readonly beyondThreeErrors: boolean;
}

/** The marks' own errors: coordinates of marks and base, scale, geoid, transformation. */
export interface MarkComponent {
  /** Every mark with a counting day, nearest first. */
  readonly marks: readonly MarkError[];
  /** Marks with three days or more, on which the rest stands. */
  readonly marksUsed: number;
  /** From 6 marks on `given`, with 3 to 5 `indicative`. */
  readonly standing: 'given' | 'indicative' | 'too few marks';
  /** Spread of the marks' own errors per axis, mm; null with fewer than 3 marks. */
  readonly sigmaMm: EstimateWithLimits;
  /** Growth of the marks' own errors with distance; null where the marks do not tell. */
  readonly trend: ScaleTrend | null;
  readonly notes: readonly Message[];
}

const FEWEST_DAYS = 3;
const FEWEST_MARKS = 3;
const COMFORTABLE_MARKS = 6;

/** Marks whose mean stands on enough days. */
export const marksInUse = (marks: readonly MarkError[]): readonly MarkError[] =>
  marks.filter(({ days }) => days >= FEWEST_DAYS);

/**
 * The marks' own errors from a fit of repeatability. The standard error τ of a mark's mean comes from the model, because
 * the scatter of a few days says too little of itself.
 * @param model a fit with `reference: 'repeatability'`
 * @throws InputError when the model has another reference
 */
export function markComponent(model: ErrorModel<FitComponent>): MarkComponent {
  const { confidence, component, repeatability } = model;
  if (repeatability === null) {
    throw inputError(
      'bad-model',
      'Expected a fit of reference "repeatability", came one of another reference. Fit with reference: "repeatability" first.',
    );
  }
  const marks = markErrors(repeatability.markDays, repeatability.rho, model.fitted, component);
  const used = marksInUse(marks);
  const standing =
    used.length < FEWEST_MARKS ? 'too few marks' : used.length < COMFORTABLE_MARKS ? 'indicative' : 'given';
  const variance = used.length < FEWEST_MARKS ? null : markVariance(used, confidence);
  const root = (value: number | undefined): number | null => (value === undefined ? null : Math.sqrt(value));
  const trend = variance === null ? null : trendOf(used, variance.estimate, component, confidence);
  return {
    marks,
    marksUsed: used.length,
    standing,
    sigmaMm: { estimate: root(variance?.estimate), low: root(variance?.low), high: root(variance?.high) },
    trend,
    notes: [...standingNote(standing, used.length), ...trendNote(trend, model)],
  };
}

/** The mean error of every mark with a counting day, nearest first. */
export function markErrors(
  markDays: readonly MarkDay[],
  rho: number,
  fitted: FormEstimate,
  component: FitComponent,
): MarkError[] {
  const perAxis = (l: number): number => varianceAt(fitted, l) / axesOf(component);
  const counting = markDays.filter(({ counts }) => counts);
  const marks = [...groupIndices(counting.map(({ mark }) => mark))].map(([mark, members]): MarkError => {
    const cells = members.map((k) => counting[k]!);
    const days = cells.length;
    const meanMm = cells[0]!.means.map((_, c) => cells.reduce((sum, { means }) => sum + means[c]!, 0) / days);
    const tau2 = cells.reduce((sum, cell) => sum + perAxis(cell.l) * meanShare(cell, rho), 0);
    const tauMm = Math.sqrt(tau2) / days;
    return {
      mark,
      baselineKm: cells.reduce((sum, { l }) => sum + Math.sqrt(l), 0) / days,
      azimuthDeg: new Set(cells.map(({ base }) => base)).size > 1 ? null : cells[0]!.azimuthDeg,
      days,
      meanMm,
      tauMm,
      beyondThreeErrors: days >= FEWEST_DAYS && meanMm.some((mean) => Math.abs(mean) > 3 * tauMm),
    };
  });
  return marks.sort((a, b) => a.baselineKm - b.baselineKm || (a.mark < b.mark ? -1 : 1));
}

function trendOf(
  used: readonly MarkError[],
  markVariancePerAxis: number,
  component: FitComponent,
  confidence: number,
): ScaleTrend | null {
  const horizontal = component === 'horizontal';
  // A single horizontal axis has no direction along the baseline.
  if (!horizontal && component !== 'vertical') return null;
  if (horizontal && used.some(({ azimuthDeg }) => azimuthDeg === null)) return null;
  const points = used.map(({ baselineKm, azimuthDeg, meanMm, tauMm }) => {
    const direction = ((azimuthDeg ?? 0) * Math.PI) / 180;
    const along = meanMm[0]! * Math.sin(direction) + (meanMm[1] ?? 0) * Math.cos(direction);
    return {
      baselineKm,
      meanMm: horizontal ? along : meanMm[0]!,
      variance: markVariancePerAxis + tauMm ** 2,
    };
  });
  return scaleTrend(points, !horizontal, confidence);
}

function standingNote(standing: MarkComponent['standing'], used: number): Message[] {
  if (standing === 'given') return [];
  const marks = `${used} ${used === 1 ? 'mark was' : 'marks were'} visited on 3 days or more`;
  return [
    standing === 'indicative'
      ? message(
          'warning',
          'mark-component-indicative',
          `Only ${marks}: the constant against the published coordinates is indicative, because few marks say little of the errors of marks. Visit at least ${COMFORTABLE_MARKS} marks on 3 days or more.`,
        )
      : message(
          'warning',
          'mark-component-unknown',
          `${used === 0 ? 'No mark was visited on 3 days or more' : `Only ${marks}`}: errors of the marks cannot be told from errors of the measurements. Visit at least ${FEWEST_MARKS} marks on 3 days or more, better ${COMFORTABLE_MARKS}.`,
        ),
  ];
}

function trendNote(trend: ScaleTrend | null, { component, ppm }: ErrorModel<FitComponent>): Message[] {
  if (trend === null || !trend.significant) return [];
  const what = component === 'horizontal' ? 'along the baseline' : 'in height';
  const signed = `${trend.ppm < 0 ? '−' : '+'}${Math.abs(trend.ppm).toFixed(2)}`;
  const random =
    ppm.estimate === null
      ? ''
      : `; beside the random ${ppm.estimate.toFixed(2)} ppm it makes ${Math.hypot(ppm.estimate, trend.ppm).toFixed(2)} ppm against the published coordinates`;
  return [
    message(
      'warning',
      'marks-off-with-distance',
      `The marks' own errors ${what} grow with distance, by ${signed} mm per km and the same on every day${random}. Check scale factor, transformation, geoid model and the coordinates of the base.`,
    ),
  ];
}
