import { type ErrorsInput, errorColumns } from '../errors/index.js';
import type { Component, ErrorModel, EstimateWithLimits, FitData } from '../fit/index.js';
import { type Message, message } from '../logs/index.js';
import { chanceText, type Random } from '../stats/index.js';
import { dayIndex } from './dayIndex.js';
import { type FittedSpread, fittedData, fittedSpread } from './fittedSpread.js';
import { flippedScores } from './flippedScores.js';
import { type HourClasses, hourClasses } from './hourClasses.js';
import { type HourHarmonics, hourHarmonics } from './hourHarmonics.js';
import { ppmOfRows } from './hourPpm.js';
import { hourDayFactors, hourScores } from './hourScores.js';

/** The ppm in one third of the working hours. */
export interface HourClass {
  /** Solar hours. */
  readonly from: number;
  readonly to: number;
  /** Adjusted for what kind of days its shots come from. */
  readonly ppm: EstimateWithLimits;
  readonly occupations: number;
  readonly days: number;
}

/** Whether the ppm depends on the hour of the day, by solar time. */
export interface TimeOfDay {
  readonly component: Component;
  /** Test that it does not, by flipped signs of days; null when the days are too few to tell. */
  readonly pValue: number | null;
  /** Thirds of the working hours; empty when there is nothing to compare. */
  readonly hours: readonly HourClass[];
  /** A smooth course, when the shots span at least half of the day and the days are enough. */
  readonly harmonics: HourHarmonics | null;
  readonly notes: readonly Message[];
}

export interface TimeOfDayOptions {
  /** Numbers in [0, 1) for the flips. */
  readonly random: Random;
  /** Weights with which the model was fitted. */
  readonly weights?: Float64Array | undefined;
}

const FEWEST_DAYS = 15;
/** Days on which a third of the hours must have shots that speak of the ppm. */
const FEWEST_CLASS_DAYS = 5;
const SHORTEST_SPAN_HOURS = 1.5;
const LEVEL = 0.05;

/**
 * Compares the ppm between equal thirds of the working hours (solar time). Days differ, so the test takes each day as
 * one, with a factor of its own: level about 5 % where a test that counts shots has 20-58 %.
 * @param errors with `solarHour` beside the columns of the fit
 * @throws InputError when a column is missing
 */
export function timeOfDay(errors: ErrorsInput, model: ErrorModel, options: TimeOfDayOptions): TimeOfDay {
  const hours = errorColumns(errors).numbers('solarHour', 'the time of day');
  const data = fittedData(errors, model, options.weights);
  const own = Float64Array.from(data.rows, (row) => hours[row]!);
  return timeOfDayOf(data, own, fittedSpread(model), model.confidence, options.random);
}

/**
 * @param hours solar time of every row of data
 * @param spread null when the fit has no distance term
 */
export function timeOfDayOf(
  data: FitData,
  hours: Float64Array,
  spread: FittedSpread | null,
  confidence: number,
  random: Random,
): TimeOfDay {
  const component: Component = data.components.length === 2 ? 'horizontal' : 'vertical';
  const none = (note: Message): TimeOfDay => ({
    component,
    pValue: null,
    hours: [],
    harmonics: null,
    notes: [note],
  });
  if (spread === null || !(spread.B > 0)) return none(noPpm());
  const classes = hourClasses(hours);
  if (classes === null) return none(noTimes());
  if (classes.spanHours < SHORTEST_SPAN_HOURS) return none(shortSpan(classes.spanHours));
  const timed = withoutUntimed(data, classes);
  const { A, B } = spread;
  const factors = hourDayFactors(timed, A, B);
  const list = classList(timed, classes, factors, A, B, confidence);
  const notes = untimedNote(classes);
  const reason = tooFew(timed, classes, A / B);
  if (reason !== null) {
    return { component, pValue: null, hours: list, harmonics: null, notes: [...notes, reason] };
  }
  const pValue = hourTest(timed, classes.classOf, A, B, factors, random).pValue;
  const clock = hours.map((hour) => (Number.isNaN(hour) ? 0 : hour));
  const harmonics = hourHarmonics(timed, clock, classes.spanHours, A, B, factors, random);
  return {
    component,
    pValue,
    hours: list,
    harmonics,
    notes: pValue < LEVEL ? [...notes, differsNote(component, list, pValue)] : notes,
  };
}

/** Test of the second and third class against the first. */
export function hourTest(
  data: FitData,
  classOf: Int32Array,
  A: number,
  B: number,
  factors: Float64Array,
  random: Random,
) {
  const indicator = (k: number): Float64Array => Float64Array.from(classOf, (own) => (own === k ? 1 : 0));
  return flippedScores(hourScores(data, A, B, factors, [indicator(1), indicator(2)]), random);
}

/** Rows without a time keep their place with weight 0. */
const withoutUntimed = (data: FitData, { classOf }: HourClasses): FitData => ({
  ...data,
  w: data.w.map((weight, i) => (classOf[i]! < 0 ? 0 : weight)),
});

function classList(
  data: FitData,
  { edges, classOf }: HourClasses,
  factors: Float64Array,
  A: number,
  B: number,
  confidence: number,
): HourClass[] {
  const { dayOf } = dayIndex(data.day);
  const x = data.l.map((value, i) => factors[dayOf[i]!]! * value);
  return [0, 1, 2].flatMap((k) => {
    const rows = [...classOf.keys()].filter((i) => classOf[i] === k);
    if (!rows.some((i) => data.w[i]! > 0)) return [];
    return [
      {
        from: edges[k]! % 24,
        to: edges[k + 1]! % 24,
        ppm: ppmOfRows(data, x, rows, A, B, confidence),
        occupations: rows.length,
        days: new Set(rows.map((i) => data.day[i]!)).size,
      },
    ];
  });
}

/** Why there is no verdict. A shot speaks of the ppm where the distance part exceeds the constant, beyond a/b. */
function tooFew(data: FitData, { classOf }: HourClasses, farFrom: number): Message | null {
  const days = new Set(data.day).size;
  if (days < FEWEST_DAYS) {
    return message(
      'info',
      'hours-too-few-days',
      `${days} ${days === 1 ? 'day is' : 'days are'} too few days to tell whether the ppm depends on the hour. Add days: from ${FEWEST_DAYS} on it is tested.`,
    );
  }
  const classDays = [0, 1, 2].map(
    (k) => new Set(data.day.filter((_, i) => classOf[i] === k && data.l[i]! > farFrom)).size,
  );
  const least = Math.min(...classDays);
  if (least >= FEWEST_CLASS_DAYS) return null;
  return message(
    'info',
    'hours-too-few-days',
    `There are too few days to tell whether the ppm depends on the hour: one third of the hours has shots beyond ${Math.sqrt(farFrom).toFixed(1)} km on ${least} ${least === 1 ? 'day' : 'days'} only. Take far shots in all hours, on ${FEWEST_CLASS_DAYS} days or more.`,
  );
}

const noPpm = (): Message =>
  message(
    'info',
    'hours-not-compared',
    'Hours cannot be compared: there is no ppm to compare. Add shots farther from the base.',
  );

const noTimes = (): Message =>
  message(
    'info',
    'hours-not-compared',
    'Hours cannot be compared: no shot has a time. Add times to the log.',
  );

const shortSpan = (span: number): Message =>
  message(
    'info',
    'hours-not-compared',
    `Hours cannot be compared: the shots span ${span.toFixed(1)} hours of the day. Take shots in the morning, at noon and in the afternoon.`,
  );

function untimedNote({ classOf }: HourClasses): Message[] {
  const count = classOf.filter((own) => own < 0).length;
  if (count === 0) return [];
  return [
    message(
      'info',
      'hours-unknown',
      `${count} ${count === 1 ? 'occupation has' : 'occupations have'} no time and take no part in the comparison of hours. Add times to the log.`,
    ),
  ];
}

function differsNote(component: Component, list: readonly HourClass[], pValue: number): Message {
  const parts = list.map(
    ({ from, to, ppm }) => `${ppm.estimate!.toFixed(2)} ppm from ${from.toFixed(1)} to ${to.toFixed(1)} h`,
  );
  return message(
    'warning',
    'hours-differ',
    `The ${component} ppm depends on the hour (${chanceText(pValue)}), by solar time: ${parts.join(', ')}. Take far shots in the better hours, and check shots in the worse ones.`,
  );
}
