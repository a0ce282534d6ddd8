import { groupIndices } from '../errors/index.js';
import { type Message, message } from '../logs/index.js';
import { clusteredMean } from '../split/index.js';
import type { Reference } from './errorModel.js';
import { COMPONENT_COLUMNS, type FitComponent } from './forms.js';
import type { FitData } from './prepareErrors.js';
import { spreadOfMarks } from './reference/spreadOfMarks.js';

/**
 * What the data themselves say before any fit (the fit adds its own notes).
 * @param data errors against the published coordinates, of the occupations that take part
 */
export function dataNotes(data: FitData, component: FitComponent, reference: Reference): Message[] {
  const notes: Message[] = [];
  const add = (code: string, text: string): void => {
    notes.push(message('warning', code, text));
  };
  const n = data.y.length;
  const days = new Set(data.day).size;
  if (days < 4) {
    add(
      'too-few-days',
      `${days} ${days === 1 ? 'day is' : 'days are'} too few for an uncertainty; shown values describe only these days. Add days: from 4 on there is an interval, from 15 on a rule.`,
    );
  } else if (days < 8) {
    add(
      'indicative',
      `With ${days} days the intervals are indicative. Add days: from 8 on they hold what they say.`,
    );
  }
  const values = data.components.flatMap((column) => [...column]);
  const zeros = values.filter((value) => value === 0).length;
  if (zeros > 0.2 * values.length) {
    add(
      'rounded',
      `${((100 * zeros) / values.length).toFixed(0)} % of the errors are exactly 0: coordinates look rounded, and a constant below about 0.3 of the rounding step is not measurable. Export more digits.`,
    );
  }
  for (const [list, what, remedy] of [
    [data.day, 'day', 'Look at the fit without it.'],
    [data.mark, 'mark', 'Visit other marks too.'],
  ] as const) {
    const top = list === null ? null : mostFrequent(list);
    if (top !== null && top.count > 0.5 * n && new Set(list).size > 1) {
      add(
        `one-${what}`,
        `${what === 'day' ? 'Day' : 'Mark'} ${top.name} alone has ${((100 * top.count) / n).toFixed(0)} % of the shots. ${remedy}`,
      );
    }
  }
  if (reference === 'absolute' && data.setup !== null && new Set(data.setup).size === 1 && days > 1) {
    notes.push(
      message(
        'info',
        'one-setup',
        'There is one base setup: an error of the base coordinates cannot be separated from errors of the marks. It is part of these numbers.',
      ),
    );
  }
  if (data.withoutValue > 0) {
    notes.push(
      message(
        'info',
        'component-unknown',
        `${data.withoutValue} ${data.withoutValue === 1 ? 'occupation has' : 'occupations have'} no ${component} error because the mark is not known in that component. They take part in the other one.`,
      ),
    );
  }
  if (data.withoutBaseline > 0) {
    notes.push(
      message(
        'info',
        'on-the-base',
        `${data.withoutBaseline} ${data.withoutBaseline === 1 ? 'occupation is' : 'occupations are'} on the base itself and take no part in the fit. Take near shots some hundred metres away.`,
      ),
    );
  }
  // Other references take out what is common to all days.
  return reference === 'absolute' ? [...notes, ...systematicOffset(data, component)] : notes;
}

/**
 * A mean error more than three standard errors from 0. The error of a mark repeats on every day, so the spread between
 * marks counts beside that between days: SE² = SE_day² + s² Σ n_m²/n², s from the marks' own means where they were
 * visited on enough days, else the scatter between marks.
 */
function systematicOffset(data: FitData, component: FitComponent): Message[] {
  const names = COMPONENT_COLUMNS[component];
  const off = data.components.map((column) => {
    const byDay = clusteredMean(column, data.day, data.w);
    return { column, ...byDay, suspect: Math.abs(byDay.mean) > 3 * byDay.standardError };
  });
  if (!off.some(({ suspect }) => suspect)) return [];
  const ownMm = spreadOfMarks(data, component);
  return off.flatMap(({ column, mean, standardError, suspect }, k) => {
    if (!suspect) return [];
    const error = Math.hypot(standardError, markError(data, column, ownMm));
    if (!(Math.abs(mean) > 3 * error)) return [];
    return [
      message(
        'warning',
        'systematic-offset',
        `The mean ${names[k]} error is ${mean.toFixed(1)} mm with a standard error of ${error.toFixed(1)} mm: a systematic offset. Check transformation, antenna heights and base coordinates; it stays in the absolute errors.`,
      ),
    ];
  });
}

/** Standard error of the mean from the marks' own errors: s √(Σ n_m²)/n, or the scatter between marks without s. */
function markError({ mark, w }: FitData, column: Float64Array, ownMm: number | null): number {
  if (mark === null) return 0;
  // With a single mark the scatter between marks is unknown.
  if (ownMm === null) return clusteredMean(column, mark, w).standardError || 0;
  const weights = [...groupIndices(mark).values()].map((list) => list.reduce((sum, i) => sum + w[i]!, 0));
  const total = weights.reduce((sum, weight) => sum + weight, 0);
  return (ownMm * Math.sqrt(weights.reduce((sum, weight) => sum + weight ** 2, 0))) / total;
}

function mostFrequent(list: readonly string[]): { name: string; count: number } {
  const counts = new Map<string, number>();
  for (const name of list) counts.set(name, (counts.get(name) ?? 0) + 1);
  return [...counts].reduce((best, [name, count]) => (count > best.count ? { name, count } : best), {
    name: '',
    count: 0,
  });
}

/** Ratio of east to north RMS outside 0.6 … 1.67: the quantile of equal axes is then too small. */
export function axisNote(data: FitData): Message[] {
  const [east, north] = data.components;
  if (east === undefined || north === undefined) return [];
  const total = data.w.reduce((sum, value) => sum + value, 0);
  const rms = (column: Float64Array): number =>
    Math.sqrt(column.reduce((sum, value, i) => sum + data.w[i]! * value * value, 0) / total);
  const ratio = rms(east) / rms(north);
  if (ratio >= 0.6 && ratio <= 1.67) return [];
  return [
    message(
      'warning',
      'unequal-axes',
      `East and north errors differ (RMS ${rms(east).toFixed(1)} and ${rms(north).toFixed(1)} mm): radial limits from equal axes would be too small, and the quantile of the two fitted axes is used. Look for a cause that acts in one direction.`,
    ),
  ];
}
