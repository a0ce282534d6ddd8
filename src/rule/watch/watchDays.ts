import { type ErrorsInput, errorColumns, groupIndices } from '../../errors/index.js';
import { COMPONENT_COLUMNS, type Component } from '../../fit/index.js';
import { newErrors } from '../frozenMarks.js';
import { type DayStatistic, dayStatistic } from './dayStatistic.js';
import type { WatchBasis } from './watchBasis.js';

/** A new day against the model, with the sums that have gathered up to it. */
export interface WatchedDay {
  readonly day: string;
  readonly occupations: number;
  readonly ppm: DayStatistic | null;
  readonly constant: DayStatistic | null;
  /** Cumulative sums after the day; 0 again after an alarm. */
  readonly ppmSum: number;
  readonly constantSum: number;
  /** The day alone is worse than one in a thousand by the model. */
  readonly outside: boolean;
  /** Mean error by axis (east and north, or up), mm. */
  readonly meanMm: readonly number[];
}

/** Errors have grown, and since when. */
export interface WatchAlarm {
  readonly part: 'ppm' | 'constant';
  /** Day on which it was noticed, and first day of the run that led to it. */
  readonly day: string;
  readonly since: string;
}

/** New days held against a fitted model. */
export interface Watch {
  readonly component: Component;
  readonly days: readonly WatchedDay[];
  readonly alarms: readonly WatchAlarm[];
  /** Occupations on marks that the model does not know, or without the component, which take no part. */
  readonly leftOut: number;
  readonly fitAgain: boolean;
  /** Why; empty when the model may stay. */
  readonly reasons: readonly string[];
  /** What an alarm is worth. */
  readonly sentence: string;
}

export interface WatchOptions {
  /** Weights in [0, 1], one for each new error, such as those of a screening; default 1. */
  readonly weights?: Float64Array | undefined;
  /** The sum that gives an alarm; default 8. */
  readonly alarmAt?: number | undefined;
}

/** What is taken off every day's score: half of the shift that is to be found soonest. */
const ALLOWANCE = 0.5;
const OUTSIDE = 0.001;

/**
 * Cumulative sums (Page 1954; from memory) of the days' scores, for the ppm and for the constant: S = max(0, S + z - 0.5),
 * an alarm beyond 8, then 0 again. Only growth of errors is looked for.
 * @param errors new ones; days that the model was fitted to are left out
 * @throws InputError when a column is missing
 */
export function watchDays(
  basis: WatchBasis,
  errors: ErrorsInput,
  { weights, alarmAt = 8 }: WatchOptions = {},
): Watch {
  const { component, lastDay } = basis;
  const columns = errorColumns(errors);
  const dayOf = columns.texts('day', 'watching');
  const rows = Array.from(dayOf.keys()).filter((row) => dayOf[row]! > lastDay);
  const found = newErrors(columns, component, basis.marks, rows);
  const byDay = [...groupIndices(found.rows.map((row) => dayOf[row]!))].sort(([a], [b]) => (a < b ? -1 : 1));
  const sums = { ppm: new RunningSum('ppm', alarmAt), constant: new RunningSum('constant', alarmAt) };
  const days = byDay.map(([day, members]): WatchedDay => {
    const shots = {
      y: members.map((k) => found.y[k]!),
      l: members.map((k) => found.l[k]!),
      w: members.map((k) => weights?.[found.rows[k]!] ?? 1),
    };
    const [ppm, constant] = [dayStatistic(basis, shots, 'ppm'), dayStatistic(basis, shots, 'constant')];
    sums.ppm.add(day, ppm);
    sums.constant.add(day, constant);
    const total = shots.w.reduce((sum, w) => sum + w, 0);
    return {
      day,
      occupations: members.length,
      ppm,
      constant,
      ppmSum: sums.ppm.value,
      constantSum: sums.constant.value,
      outside: [ppm, constant].some((each) => each !== null && each.pValue < OUTSIDE),
      meanMm: COMPONENT_COLUMNS[component].map((_, c) =>
        total > 0
          ? members.reduce((sum, k, i) => sum + shots.w[i]! * found.components[c]![k]!, 0) / total
          : Number.NaN,
      ),
    };
  });
  const alarms = [...sums.ppm.alarms, ...sums.constant.alarms].sort((a, b) => (a.day < b.day ? -1 : 1));
  const leftOut = rows.length - found.rows.length;
  const reasons = [
    ...alarms.map(alarmReason),
    ...dueReasons(basis, days.at(-1)?.day ?? null),
    ...newMarkReasons(found.onNewMarks.length, rows.length),
  ];
  return {
    component,
    days,
    alarms,
    leftOut,
    fitAgain: reasons.length > 0,
    reasons,
    sentence: sentenceOf(days.length, alarmAt),
  };
}

/** One cumulative sum with what led to its alarms. */
class RunningSum {
  value = 0;
  readonly alarms: WatchAlarm[] = [];
  private since: string | null = null;

  constructor(
    private readonly part: WatchAlarm['part'],
    private readonly alarmAt: number,
  ) {}

  add(day: string, statistic: DayStatistic | null): void {
    if (statistic === null) return;
    this.since ??= day;
    this.value = Math.max(0, this.value + statistic.score - ALLOWANCE);
    if (this.value > this.alarmAt) {
      this.alarms.push({ part: this.part, day, since: this.since });
      this.value = 0;
    }
    if (this.value === 0) this.since = null;
  }
}

const alarmReason = ({ part, day, since }: WatchAlarm): string =>
  part === 'ppm'
    ? `since ${since} errors grow faster with distance than the model says (noticed on ${day}): look for a cause in sky, base and receiver, and fit again`
    : `since ${since} errors near the base are larger than the model says (noticed on ${day}): look for a cause in rods, centring, crew and receiver, and fit again`;

function dueReasons({ reviewBy }: WatchBasis, last: string | null): string[] {
  if (reviewBy === null || last === null || last <= reviewBy) return [];
  return [`the model was to be looked at again by ${reviewBy}: fit again with the new days`];
}

function newMarkReasons(onNewMarks: number, all: number): string[] {
  if (onNewMarks <= all / 2) return [];
  return [
    `${onNewMarks} of ${all} new occupations lie on marks that the model does not know and cannot be watched: fit again with them`,
  ];
}

const sentenceOf = (days: number, alarmAt: number): string =>
  `${days} new ${days === 1 ? 'day was' : 'days were'} watched. ${
    alarmAt === 8
      ? 'In simulations a false alarm comes once in 4 to 50 crew-years, the more often the fewer days were fitted; a doubled ppm shows within one to seven weeks by the number of shots a day, half as much again later or not at all.'
      : `The rate of false alarms is known for sums of 8 alone; here alarms come at ${alarmAt}.`
  }`;
