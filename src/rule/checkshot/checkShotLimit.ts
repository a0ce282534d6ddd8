import type { DayModel } from '../../days/index.js';
import { axesOf, type Component, type ErrorModel } from '../../fit/index.js';
import { inputError } from '../../logs/index.js';
import { limitOf, otherDays, type PredictedDays, predictedDays, varianceAt } from './tails.js';

export interface CheckShotOptions {
  /** False alarms that a crew accepts in a year; default 1. */
  readonly falseAlarmsPerYear?: number | undefined;
  /** Check shots of a crew in a year; default 1000. */
  readonly checksPerYear?: number | undefined;
  /** Horizontal and vertical are both checked, and share the false alarms; default true. */
  readonly bothComponents?: boolean | undefined;
  /** Lengths of the table; default 0.5, 1, 2, 5, 10, 15 and 20 km. */
  readonly lengthsKm?: readonly number[] | undefined;
  /** Standard deviation of the mark's coordinates, or of its mean error if that is taken off, mm per axis; default 0. */
  readonly markSigmaMm?: number | undefined;
  /** Standard deviation of the base's coordinates, mm per axis, for visits from two bases; default 0. */
  readonly baseSigmaMm?: number | undefined;
}

/** How far errors may lie out at a length before something is wrong. */
export interface CheckShotLimit {
  readonly baselineKm: number;
  /** From a known mark. */
  readonly knownMarkMm: number;
  /** Two visits of one mark on different days, from one base. */
  readonly otherDayMm: number;
  /** Two visits on one day from two bases, both at this length. */
  readonly twoBasesMm: number;
}

/** How far two shots of one point on one day, from two bases, may lie apart. */
export interface TwoBasesLimit {
  readonly firstKm: number;
  readonly secondKm: number;
  readonly limitMm: number;
}

export interface CheckShotLimits {
  readonly component: Component;
  /** Share of good shots that lie beyond the limit. */
  readonly alarmShare: number;
  readonly falseAlarmsPerYear: number;
  readonly checksPerYear: number;
  readonly limits: readonly CheckShotLimit[];
  /** From two bases at different distances: every two lengths of the table. */
  readonly twoBases: readonly TwoBasesLimit[];
  /** Why there are no limits; null otherwise. */
  readonly reason: string | null;
  readonly sentence: string;
}

const LENGTHS_KM = [0.5, 1, 2, 5, 10, 15, 20];
const FEWEST_DAYS = 15;
const LEAST_INFORMATION = 15;

/**
 * Limits of check shots at a stated number of false alarms, from what days to come are like by the day model: a mixture,
 * whose tails are longer than its RMS tells.
 * @throws InputError for an impossible option
 */
export function checkShotLimits(
  model: ErrorModel,
  dayModel: DayModel | null,
  options: CheckShotOptions = {},
): CheckShotLimits {
  const {
    falseAlarmsPerYear = 1,
    checksPerYear = 1000,
    bothComponents = true,
    lengthsKm = LENGTHS_KM,
  } = options;
  const { markSigmaMm = 0, baseSigmaMm = 0 } = options;
  const alarmShare = falseAlarmsPerYear / (checksPerYear * (bothComponents ? 2 : 1));
  if (!(alarmShare > 0 && alarmShare < 0.5)) {
    throw inputError(
      'bad-option',
      `Expected fewer false alarms than check shots, and more than none, came ${falseAlarmsPerYear} among ${checksPerYear}. Correct falseAlarmsPerYear or checksPerYear.`,
    );
  }
  const { component } = model;
  const common = { component, alarmShare, falseAlarmsPerYear, checksPerYear };
  const reason = whyNoLimit(model, dayModel);
  if (reason !== null) {
    return {
      ...common,
      limits: [],
      twoBases: [],
      reason,
      sentence: `There is no check-shot limit: ${reason}.`,
    };
  }
  const days = predictedDays(component, dayModel!.posterior!);
  const axes = axesOf(component);
  const limits = lengthsKm.map((baselineKm): CheckShotLimit => {
    const own = varianceAt(days, baselineKm);
    const plus = (added: number, times = 1) => ({
      variances: own.map((variance) => times * variance + axes * added),
      weights: days.weights,
    });
    return {
      baselineKm,
      knownMarkMm: limitOf(component, plus(markSigmaMm ** 2), alarmShare),
      otherDayMm: limitOf(component, otherDays(days, own, own), alarmShare),
      twoBasesMm: limitOf(component, plus(2 * baseSigmaMm ** 2, 2), alarmShare),
    };
  });
  const twoBases = lengthsKm.flatMap((firstKm, k) =>
    lengthsKm.slice(k + 1).map((secondKm): TwoBasesLimit => {
      const [first, second] = [varianceAt(days, firstKm), varianceAt(days, secondKm)];
      const variances = first.map((variance, j) => variance + second[j]! + 2 * axes * baseSigmaMm ** 2);
      return {
        firstKm,
        secondKm,
        limitMm: limitOf(component, { variances, weights: days.weights }, alarmShare),
      };
    }),
  );
  return {
    ...common,
    limits,
    twoBases,
    reason: null,
    sentence: `With ${checksPerYear} check shots a year a good crew is alarmed about ${perYear(falseAlarmsPerYear)} in the ${component} component${bothComponents ? ' or the other one' : ''}, at most four times as often where disturbed days occur.`,
  };
}

export interface TwoVisitOptions extends Pick<CheckShotOptions, 'baseSigmaMm'> {
  readonly firstKm: number;
  readonly secondKm: number;
  /** `other-day`, or `same-day` with the correlation of two such visits ({@link visitCorrelation}). */
  readonly when: 'other-day' | 'same-day';
  /** Correlation of two visits on one day from one base; default 0, as from two bases. */
  readonly correlation?: number | undefined;
  readonly bases: 'same' | 'different';
  /** Share of good pairs beyond the limit. */
  readonly alarmShare: number;
}

/**
 * How far two visits of one mark may lie apart. The mark's own error is in both and cancels; that of the base only where
 * it is one base.
 * @returns null where the data allow no limit
 */
export function twoVisitLimitMm(
  model: ErrorModel,
  dayModel: DayModel | null,
  { firstKm, secondKm, when, correlation = 0, bases, baseSigmaMm = 0, alarmShare }: TwoVisitOptions,
): number | null {
  if (whyNoLimit(model, dayModel) !== null) return null;
  const { component } = model;
  const days: PredictedDays = predictedDays(component, dayModel!.posterior!);
  const [first, second] = [varianceAt(days, firstKm), varianceAt(days, secondKm)];
  const added = bases === 'different' ? 2 * axesOf(component) * baseSigmaMm ** 2 : 0;
  if (when === 'other-day') {
    const { variances, weights } = otherDays(days, first, second);
    return limitOf(
      component,
      { variances: variances.map((variance) => variance + added), weights },
      alarmShare,
    );
  }
  const shared = bases === 'same' ? correlation : 0;
  const variances = first.map(
    (variance, k) => variance + second[k]! - 2 * shared * Math.sqrt(variance * second[k]!) + added,
  );
  return limitOf(component, { variances, weights: days.weights }, alarmShare);
}

function whyNoLimit({ days, informationNumber }: ErrorModel, dayModel: DayModel | null): string | null {
  if (days < FEWEST_DAYS) {
    return `${days} ${days === 1 ? 'day is' : 'days are'} too few, it needs ${FEWEST_DAYS}`;
  }
  if (informationNumber < LEAST_INFORMATION) {
    return `the shots say too little of distance (information number ${informationNumber.toFixed(0)}, it needs ${LEAST_INFORMATION}); add days with far shots`;
  }
  return dayModel?.posterior ? null : 'how days differ could not be judged; add days with far shots';
}

const perYear = (count: number): string =>
  count === 1
    ? 'once a year'
    : count < 1
      ? `once in ${Number((1 / count).toPrecision(2))} years`
      : `${count} times a year`;
