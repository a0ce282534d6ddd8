import type { DailyFactor } from '../days/index.js';
import type { Component } from '../fit/index.js';
import { dayWords, yearWords } from './dayAxis.js';
import { type Activity, activityWords } from './daysActivity.js';
import { counted } from './words.js';

/** What title and description of the days are made from. */
export interface DaysWords {
  readonly factors: readonly DailyFactor[];
  readonly components: readonly Component[];
  readonly hasBars: boolean;
  readonly measure: Activity;
}

interface Count {
  readonly component: Component;
  readonly days: number;
  /** Null where days cannot be named. */
  readonly degraded: readonly string[] | null;
}

const countsOf = ({ factors, components }: DaysWords): Count[] =>
  components.map((component) => {
    const own = factors.filter((one) => one.component === component);
    const canName = own.every(({ degraded }) => degraded !== null);
    const degraded = canName ? own.filter((one) => one.degraded === true).map(({ day }) => day) : null;
    return { component, days: own.length, degraded };
  });

/** The finding: how many days are degraded. */
export function daysTitle(words: DaysWords): string {
  const counts = countsOf(words);
  const days = Math.max(...counts.map((one) => one.days));
  const named = counts.filter(({ degraded }) => degraded !== null);
  if (named.length === 0) return `Daily ppm of ${counted(days, 'day')}: degraded days cannot be named`;
  if (named.every(({ degraded }) => degraded!.length === 0)) return `No day of ${days} is named degraded`;
  const parts = named.map(({ component, degraded }) => `${degraded!.length} in ${component} ppm`);
  return `Degraded days of ${days}: ${parts.join(', ')}`;
}

export function daysSubtitle(words: DaysWords): string[] {
  const { hasBars, measure } = words;
  const columns = countsOf(words).some(({ degraded }) => degraded !== null && degraded.length > 0)
    ? ['grey columns: degraded days']
    : [];
  const bars = hasBars ? [`bars: ${activityWords(measure)} of the day`] : [];
  const second = [...columns, ...bars].join('; ');
  return [
    'A day’s ppm over that of the median day, with 95 % bands; dashed: 1.5 times',
    ...(second === '' ? [] : [`${second[0]!.toUpperCase()}${second.slice(1)}`]),
  ];
}

/** The chart in sentences. */
export function daysDescription(words: DaysWords): string {
  const all = words.factors.map(({ day }) => day).sort();
  const years = yearWords(all);
  const lists = countsOf(words).map(({ component, degraded }) => {
    if (degraded === null) return `In the ${component} ppm degraded days cannot be named.`;
    if (degraded.length === 0) return `In the ${component} ppm no day is named degraded.`;
    return `Degraded in the ${component} ppm: ${degraded.map(dayWords).join(', ')}.`;
  });
  return [
    `Daily factors from ${dayWords(all[0]!)} to ${dayWords(all.at(-1)!)}${years === '' ? '' : ` ${years}`}, each day’s ppm over that of the median day.`,
    ...lists,
    words.hasBars
      ? 'Bars beneath show geomagnetic activity; that both are high on a day names no cause.'
      : '',
  ]
    .filter((sentence) => sentence !== '')
    .join(' ');
}
