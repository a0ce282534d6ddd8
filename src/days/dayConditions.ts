import type { Visit } from '../errors/index.js';
import { median, studentTCdf } from '../stats/index.js';

/** Median absolute deviation to standard deviation, for normal values. */
const MAD_TO_SD = 1.4826;
const FEWEST_OTHER_DAYS = 5;

/** A circumstance of a day against the same on other days. */
export interface DayCondition {
  readonly name: 'satellites' | 'PDOP' | 'age of corrections, s' | 'share of visits without a fix';
  /** Mean or share of the day, and the median of other days. */
  readonly value: number;
  readonly usual: number;
  readonly pValue: number;
}

/** Values of every row by condition; null where the log has none. */
export interface ConditionColumns {
  readonly satellites: Float64Array | null;
  readonly pdop: Float64Array | null;
  readonly ageSeconds: Float64Array | null;
}

const NAMES = { satellites: 'satellites', pdop: 'PDOP', ageSeconds: 'age of corrections, s' } as const;

/** Every condition that the data tell of, tested for one day by the median and the spread of the others. */
export function dayConditions(
  day: string,
  days: readonly string[],
  columns: ConditionColumns,
  visits: readonly Visit[],
): DayCondition[] {
  const measured = (['satellites', 'pdop', 'ageSeconds'] as const).flatMap((key) => {
    const values = columns[key];
    return values === null ? [] : compare(NAMES[key], day, meansByDay(days, values));
  });
  return [...measured, ...compare('share of visits without a fix', day, missingByDay(visits))];
}

interface DayMean {
  readonly mean: number;
  /** What chance makes of the mean within the day. */
  readonly standardError: number;
}

function meansByDay(days: readonly string[], values: Float64Array): Map<string, DayMean> {
  const lists = new Map<string, number[]>();
  days.forEach((day, i) => {
    if (Number.isNaN(values[i]!)) return;
    const list = lists.get(day);
    if (list === undefined) lists.set(day, [values[i]!]);
    else list.push(values[i]!);
  });
  return new Map(
    [...lists].map(([day, list]) => {
      const mean = list.reduce((a, b) => a + b) / list.length;
      const squares = list.reduce((sum, value) => sum + (value - mean) ** 2, 0);
      const standardError = list.length < 2 ? 0 : Math.sqrt(squares / (list.length - 1) / list.length);
      return [day, { mean, standardError }];
    }),
  );
}

/** Shares without a fix; the error is that of the usual share, or of half a visit where that is larger. */
function missingByDay(visits: readonly Visit[]): Map<string, DayMean> {
  const counts = new Map<string, { all: number; missing: number }>();
  for (const { day, fixedRows } of visits) {
    const count = counts.get(day) ?? { all: 0, missing: 0 };
    counts.set(day, { all: count.all + 1, missing: count.missing + (fixedRows === 0 ? 1 : 0) });
  }
  const shares = [...counts.values()].map(({ all, missing }) => missing / all);
  const typical = shares.length === 0 ? 0 : shares.reduce((a, b) => a + b) / shares.length;
  return new Map(
    [...counts].map(([day, { all, missing }]) => [
      day,
      { mean: missing / all, standardError: Math.max(Math.sqrt((typical * (1 - typical)) / all), 0.5 / all) },
    ]),
  );
}

function compare(name: DayCondition['name'], day: string, means: Map<string, DayMean>): DayCondition[] {
  const own = means.get(day);
  const others = [...means].filter(([other]) => other !== day).map(([, { mean }]) => mean);
  if (own === undefined || others.length < FEWEST_OTHER_DAYS) return [];
  const usual = median(others);
  const spread = MAD_TO_SD * median(others.map((value) => Math.abs(value - usual)));
  const scale = Math.hypot(spread, own.standardError);
  const distance = Math.abs(own.mean - usual);
  // Where nothing ever varies, any difference is out of the ordinary.
  const z = scale > 0 ? distance / scale : distance > 0 ? Number.POSITIVE_INFINITY : 0;
  return [{ name, value: own.mean, usual, pValue: 2 * studentTCdf(-z, others.length - 1) }];
}
