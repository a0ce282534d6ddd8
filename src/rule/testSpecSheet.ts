import type { DayModel } from '../days/index.js';
import type { ErrorsInput } from '../errors/index.js';
import {
  type Component,
  type ErrorModel,
  type Form,
  type Reference,
  sigmaAtMm,
  sigmaLimitsMm,
} from '../fit/index.js';
import { type SpecSheet, specSheetSigmaMm } from './specSheet.js';
import { longestSupportedKm } from './supportedLength.js';

/** `not shown to differ` is no proof of agreement; the data may be too few to tell. */
export type SpecSheetVerdict =
  | 'worse'
  | 'better'
  | 'not worse by more than 10 %'
  | 'not shown to differ'
  | 'cannot be judged';

/** The firm's spread over that of the spec sheet at one length. */
export interface SpecSheetRatio {
  readonly baselineKm: number;
  readonly ratio: number;
  readonly low: number;
  readonly high: number;
  readonly verdict: Exclude<SpecSheetVerdict, 'cannot be judged'>;
}

/** Whether the firm's data agree with "a mm + b ppm" as a spec sheet states it. */
export interface SpecSheetTest {
  readonly component: Component;
  readonly reference: Reference;
  readonly constantMm: number;
  readonly ppm: number;
  readonly form: Form;
  readonly ratios: readonly SpecSheetRatio[];
  readonly verdict: SpecSheetVerdict;
  /** The verdict and what it rests on, in words. */
  readonly sentence: string;
}

export interface SpecSheetTestOptions {
  /** How days differ; without it nothing is called better. */
  readonly dayModel?: DayModel | null | undefined;
  /** Default 1, 5 and 10 km; those beyond the supported length are passed over. */
  readonly lengthsKm?: readonly number[] | undefined;
}

const LENGTHS_KM = [1, 5, 10];
/** Margin of non-inferiority, fixed beforehand. */
const MARGIN = 1.1;
/** With fewer days rare bad ones may be missing from the data, and a sheet be beaten by luck. */
const FEWEST_DAYS_BETTER = 30;

/**
 * Compares the fitted spread with that of a spec sheet at some lengths. Worse: the lower limit lies above it. Better: the
 * upper limit lies below it, and so does the upper limit of the spread over days to come.
 * @param errors those that count, for the supported length
 * @throws InputError when a column is missing
 */
export function testSpecSheet(
  errors: ErrorsInput,
  model: ErrorModel,
  spec: SpecSheet,
  { dayModel, lengthsKm = LENGTHS_KM }: SpecSheetTestOptions = {},
): SpecSheetTest {
  const { component, reference, confidence, days } = model;
  const { constantMm, ppm } = spec[component];
  const common = { component, reference, constantMm, ppm, form: spec.form };
  const none = (sentence: string): SpecSheetTest => ({
    ...common,
    ratios: [],
    verdict: 'cannot be judged',
    sentence,
  });
  if (model.uncertainty === null) {
    return none(
      'The spec sheet cannot be judged: the fit has no intervals. Add days and marks at several distances.',
    );
  }
  const supportedKm = longestSupportedKm(errors, component);
  const lengths = lengthsKm.filter((km) => supportedKm !== null && km <= supportedKm);
  if (lengths.length === 0) {
    return none(
      `The spec sheet cannot be judged at ${lengthsKm.join(', ')} km: no such length has 20 occupations on 5 days and 2 marks at or beyond it. Visit farther marks.`,
    );
  }
  const ratios = lengths.map((km): SpecSheetRatio => {
    const sheet = specSheetSigmaMm(spec, component, km);
    const [low, high] = sigmaLimitsMm(model, km, confidence)!.map((limit) => limit / sheet) as [
      number,
      number,
    ];
    const toCome = daysToComeUpper(model, dayModel, km);
    return {
      baselineKm: km,
      ratio: sigmaAtMm(model, km) / sheet,
      low,
      high,
      verdict: verdictOf(low, high, toCome === null ? null : toCome / sheet, days),
    };
  });
  const verdict = overall(ratios.map((each) => each.verdict));
  return { ...common, ratios, verdict, sentence: sentenceOf(verdict, ratios, model) };
}

/** Upper limit of σ over days to come, mm; null without a day model. */
function daysToComeUpper(
  { variance }: ErrorModel,
  dayModel: DayModel | null | undefined,
  km: number,
): number | null {
  const high = dayModel?.longRunPpm.high ?? null;
  return high === null || variance === null ? null : Math.sqrt(variance.displayA + (high * km) ** 2);
}

function verdictOf(
  low: number,
  high: number,
  toCome: number | null,
  days: number,
): SpecSheetRatio['verdict'] {
  if (low > 1) return 'worse';
  if (toCome === null) return 'not shown to differ';
  if (high < 1 && toCome < 1 && days >= FEWEST_DAYS_BETTER) return 'better';
  if (high < MARGIN && toCome < MARGIN) return 'not worse by more than 10 %';
  return 'not shown to differ';
}

/** Worse anywhere is worse; what is said of all lengths must hold at each. */
function overall(verdicts: readonly SpecSheetRatio['verdict'][]): SpecSheetRatio['verdict'] {
  if (verdicts.includes('worse')) return 'worse';
  if (verdicts.every((each) => each === 'better')) return 'better';
  if (verdicts.every((each) => each !== 'not shown to differ')) return 'not worse by more than 10 %';
  return 'not shown to differ';
}

function sentenceOf(
  verdict: SpecSheetRatio['verdict'],
  ratios: readonly SpecSheetRatio[],
  { component, days, confidence }: ErrorModel,
): string {
  const list = ratios.filter((each) => verdict !== 'worse' || each.verdict === 'worse');
  const at = list
    .map(
      ({ baselineKm, ratio, low, high }) =>
        `${changeWords(ratio)} (${changeRange(low, high)}) at ${baselineKm} km`,
    )
    .join(', ');
  const better = verdict === 'better' ? [] : ratios.filter((each) => each.verdict === 'better');
  const alsoBetter =
    better.length === 0
      ? ''
      : ` At ${better.map(({ baselineKm }) => `${baselineKm} km`).join(' and ')} they are shown to be better.`;
  const told = {
    worse: 'are worse than the spec sheet',
    better: 'are better than the spec sheet',
    'not worse by more than 10 %': 'are not worse than the spec sheet by more than 10 %',
    'not shown to differ': 'are not shown to differ from the spec sheet',
  }[verdict];
  return `On the ${days} days observed the ${component} errors ${told}: against the sheet's their spread is ${at} (${Number((100 * confidence).toFixed(1))} % intervals).${alsoBetter}`;
}

/** A ratio as a reader says it: `13 % smaller`. */
function changeWords(ratio: number): string {
  const perCent = Math.round(100 * Math.abs(ratio - 1));
  return perCent === 0 ? 'the same' : `${perCent} % ${ratio < 1 ? 'smaller' : 'larger'}`;
}

/** `6 to 19 %` where both lie on the side of the ratio, else with words. */
function changeRange(low: number, high: number): string {
  const [ofLow, ofHigh] = [low, high].map((ratio) => Math.round(100 * (ratio - 1))) as [number, number];
  if (ofHigh < 0) return `${-ofHigh} to ${-ofLow} %`;
  if (ofLow > 0) return `${ofLow} to ${ofHigh} %`;
  return `${changeWords(low)} to ${changeWords(high)}`;
}
