import type { View } from './chartSpec.js';

const DAY_MS = 86_400_000;
const MOST_LABELS = 12;
/** From three weeks on it is weeks that are read off the axis. */
const FEWEST_DAYS_BY_WEEKS = 21;
/** Beyond this many calendar days those without work are left out. */
const MOST_CALENDAR_DAYS = 400;

const isDate = (day: string): boolean => /^\d{4}-\d{2}-\d{2}$/.test(day);

/** All calendar days from the first to the last, so that gaps show; names that are no dates stay as they are. */
export function calendarDays(days: readonly string[]): string[] {
  const sorted = [...new Set(days)].sort();
  const [first, last] = [sorted[0], sorted.at(-1)];
  if (first === undefined || last === undefined || !sorted.every(isDate)) return sorted;
  const count = (Date.parse(last) - Date.parse(first)) / DAY_MS + 1;
  if (count > MOST_CALENDAR_DAYS) return sorted;
  return Array.from({ length: count }, (_, k) =>
    new Date(Date.parse(first) + k * DAY_MS).toISOString().slice(0, 10),
  );
}

const MONTHS = ['Jan', 'Feb', 'Mar', 'Apr', 'May', 'Jun', 'Jul', 'Aug', 'Sep', 'Oct', 'Nov', 'Dec'];

/** `3 Mar`; a name that is no date stays as it is. */
export function dayWords(day: string): string {
  return isDate(day) ? `${Number(day.slice(8))} ${MONTHS[Number(day.slice(5, 7)) - 1]}` : day;
}

/** `2025`, `2024 and 2025`: the years that day labels leave out; empty for names that are no dates. */
export const yearWords = (days: readonly string[]): string =>
  [...new Set(days.filter(isDate).map((day) => day.slice(0, 4)))].sort().join(' and ');

/** Some of the days: Mondays where every day of some weeks is there. */
function labelledDays(days: readonly string[]): readonly string[] {
  const weekly = days.length >= FEWEST_DAYS_BY_WEEKS && isCalendar(days);
  const choice = weekly ? days.filter((day) => new Date(`${day}T00:00:00Z`).getUTCDay() === 1) : days;
  const step = Math.max(1, Math.ceil(choice.length / MOST_LABELS));
  return choice.filter((_, k) => k % step === 0);
}

/** Whether the days are dates that follow each other without a gap. */
const isCalendar = (days: readonly string[]): boolean =>
  days.every(isDate) && (Date.parse(days.at(-1)!) - Date.parse(days[0]!)) / DAY_MS === days.length - 1;

/**
 * The channel of days, evenly spaced bands with some of them labelled.
 * @param labels false leaves ticks and labels to a panel below
 */
export function dayChannel(days: readonly string[], labels: boolean): View {
  const values = labelledDays(days);
  const names = Object.fromEntries(values.map((day) => [day, dayWords(day)]));
  const years = yearWords(days);
  return {
    type: 'ordinal',
    scale: { domain: days, paddingInner: 0.15, paddingOuter: 0.2 },
    axis: labels
      ? {
          title: years === '' ? 'day' : `day, ${years}`,
          values,
          labelAngle: 0,
          labelExpr: `${JSON.stringify(names)}[datum.value]`,
        }
      : { title: null, values, labels: false, ticks: false },
  };
}
