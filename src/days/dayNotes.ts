import type { Component } from '../fit/index.js';
import { type Message, message } from '../logs/index.js';
import { median } from '../stats/index.js';
import type { DayEstimate } from './dayEstimates.js';
import type { DegradedEvent } from './degradedDays.js';

/** Days are named from so many days on, and from so many occupations on a usual day (rules of thumb). */
const FEWEST_DAYS = 8;
const FEWEST_OCCUPATIONS = 10;
/** Below this number of days a study may well hold no disturbed day at all. */
const LONG_RUN_DAYS = 30;

export const namesDays = (occupations: Int32Array): boolean =>
  occupations.length >= FEWEST_DAYS && median(occupations) >= FEWEST_OCCUPATIONS;

export const daysNotJudged = (): Message =>
  message(
    'info',
    'days-not-judged',
    'Day differences cannot be judged: the ppm is not clear of zero. Add days with shots farther from the base.',
  );

interface DaysFound {
  readonly component: Component;
  readonly occupations: Int32Array;
  /** Days without a shot where the distance part exceeds the constant. */
  readonly daysWithoutFar: number;
  /** That length, a/b, km. */
  readonly farFromKm: number;
  readonly tau: number;
  readonly estimates: readonly DayEstimate[];
  readonly events: readonly DegradedEvent[];
}

/** What must be said of the days beside the numbers. */
export function dayNotes(found: DaysFound): Message[] {
  const days = found.occupations.length;
  const named = namesDays(found.occupations);
  return [
    ...(named ? [] : [notNamed(found)]),
    ...(named && found.daysWithoutFar > 0 ? [withoutFarNote(found)] : []),
    ...found.events.map((event) => degradedNote(event, found)),
    ...(days < LONG_RUN_DAYS ? [longRunNote(days, found.events)] : []),
  ];
}

function notNamed({ occupations, tau }: DaysFound): Message {
  const days = occupations.length;
  const [few, remedy] =
    days < FEWEST_DAYS
      ? [`With ${days} days`, `Add days: from ${FEWEST_DAYS} on they are compared.`]
      : [
          `With ${median(occupations)} occupations on the usual day`,
          `Take ${FEWEST_OCCUPATIONS} or more occupations a day.`,
        ];
  return message(
    'info',
    'days-not-named',
    `${few} degraded days cannot be named; only the spread of the log of the ppm between days is told, ${tau.toFixed(2)}. ${remedy}`,
  );
}

function withoutFarNote({ daysWithoutFar, farFromKm, occupations }: DaysFound): Message {
  return message(
    'info',
    'days-without-far-shots',
    `${daysWithoutFar} of ${occupations.length} days ${daysWithoutFar === 1 ? 'has' : 'have'} no shot beyond ${farFromKm.toFixed(1)} km and could hardly be found degraded. Take some far shots every day.`,
  );
}

function degradedNote({ from, to, days }: DegradedEvent, { component, estimates }: DaysFound): Message {
  const factors = estimates.filter(({ day }) => days.includes(day)).map(({ factor }) => factor.estimate);
  const [least, most] = [Math.min(...factors).toFixed(1), Math.max(...factors).toFixed(1)];
  const times = least === most ? least : `${least} to ${most}`;
  const when =
    days.length === 1 ? `On ${from} the` : `On ${days.length} days in a row, ${from} to ${to}, the`;
  return message(
    'warning',
    'degraded-days',
    `${when} ${component} ppm was ${times} times that of the median day. Look for a cause in setup, crew and receiver before the sky is blamed.`,
  );
}

function longRunNote(days: number, events: readonly DegradedEvent[]): Message {
  const seen =
    events.length > 0
      ? ''
      : ` No degraded day among ${days} leaves room for a share of up to ${Math.min(100, 300 / days).toFixed(0)} % (95 % confidence).`;
  return message(
    'info',
    'days-observed',
    `The ppm is that of the ${days} days observed: rare bad days, which may carry half of the long-run square, can be missing below ${LONG_RUN_DAYS} days.${seen} Add days.`,
  );
}
