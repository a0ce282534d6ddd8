import type { TimeGuess } from '../../time/index.js';
import type { ColumnRole } from '../roles.js';
import { type Column, isInteger } from './columns.js';
import { isAngle } from './contentCoordinates.js';
import type { Draft } from './draft.js';
import { MOST_OF_THEM, textFormats } from './timeTexts.js';

/** Kind of times in a column, or null when it holds none. */
function timeKind(column: Column): TimeGuess['kind'] | null {
  const { guesses, share } = textFormats(column.texts);
  return share >= MOST_OF_THEM ? (guesses[0]?.kind ?? null) : null;
}

const TIME_ROLES: readonly ColumnRole[] = ['time', 'date', 'start', 'gpsWeek'];

/** Whether a column (or the file) gives dates already. */
const isDated = (draft: Draft): boolean =>
  draft.has('gpsWeek', 'gpsSeconds') || TIME_ROLES.some((role) => role !== 'gpsWeek' && draft.has(role));

/** A column named like a time may hold a time of day alone. */
export function settleTimeOfDay(draft: Draft): void {
  const time = draft.roles.get('time');
  if (time === undefined || draft.has('timeOfDay')) return;
  const { guesses } = textFormats(time.texts);
  const kinds = new Set(guesses.map(({ kind }) => kind));
  // With dates beside it digits such as 101500 are meant as a time of day.
  const isTimeOfDay = kinds.has('time-of-day') && (kinds.size === 1 || draft.has('date'));
  if (!isTimeOfDay) return;
  draft.roles.delete('time');
  draft.assign('timeOfDay', time);
}

/** Times that are written with marks, by their cells: before coordinates are looked for. */
export function findWrittenTimes(draft: Draft): void {
  const isWhole = ({ roles }: Draft): boolean =>
    !roles.has('date') ||
    roles.has('time') ||
    roles.has('timeOfDay') ||
    timeKind(roles.get('date')!) !== 'date';
  if (isDated(draft) && isWhole(draft)) return;
  const free = draft.free().filter((column) => column.numbers === null && !isAngle(column));
  const kinds = free.map((column) => ({ column, kind: timeKind(column) }));
  const whole = kinds.find(({ kind }) => kind === 'date-time');
  const date = kinds.find(({ kind }) => kind === 'date');
  const timeOfDay = kinds.find(({ kind }) => kind === 'time-of-day');
  if (whole !== undefined && !isDated(draft)) draft.assign('time', whole.column);
  else {
    if (date !== undefined && !isDated(draft)) draft.assign('date', date.column);
    if (timeOfDay !== undefined && !draft.has('timeOfDay')) draft.assign('timeOfDay', timeOfDay.column);
  }
}

/** Times that are plain numbers: dates and times of eight, fourteen or six digits, week and seconds of GPS, serials. */
export function findNumericTimes(draft: Draft): void {
  const free = draft.free().filter(({ numbers }) => numbers !== null);
  if (!isDated(draft)) {
    const packed =
      free.find((column) => hasDigits(column, 14)) ?? free.find((column) => hasDigits(column, 8));
    if (packed !== undefined && timeKind(packed) !== null) {
      draft.assign(timeKind(packed) === 'date' ? 'date' : 'time', packed);
    } else if (!findGpsTimes(draft, free)) findSerials(draft, free);
  }
  if (draft.has('time') || draft.has('timeOfDay') || !draft.has('date')) return;
  const beside = draft.roles.get('date')!.index + 1;
  const next = free.find(({ index }) => index === beside);
  if (next?.texts.every((text) => /^\d{5,6}([.,]\d+)?$/.test(text)) && timeKind(next) !== null) {
    draft.assign('timeOfDay', next);
  }
}

const hasDigits = ({ texts }: Column, count: number): boolean =>
  texts.every((text) => new RegExp(`^(19|20)\\d{${count - 2}}$`).test(text));

const FIRST_FULL_WEEK = 1024;
const LAST_WEEK = 4000;
const WEEK_SECONDS = 604_800;

function findGpsTimes(draft: Draft, free: readonly Column[]): boolean {
  for (const week of free) {
    const isWeek =
      isInteger(week) &&
      week.least >= FIRST_FULL_WEEK &&
      week.greatest <= LAST_WEEK &&
      week.greatest - week.least <= 60;
    const seconds = free.find(({ index }) => index === week.index + 1);
    if (!isWeek || seconds === undefined || draft.has('gpsWeek')) continue;
    const isSeconds =
      seconds.least >= 0 &&
      seconds.greatest < WEEK_SECONDS &&
      seconds.greatest > 10_000 &&
      isGrowing(seconds);
    if (!isSeconds) continue;
    draft.assign('gpsWeek', week);
    draft.assign('gpsSeconds', seconds);
    return true;
  }
  return false;
}

const isGrowing = ({ numbers }: Column): boolean => {
  const steps = numbers!.slice(1).filter((value, k) => value >= numbers![k]!).length;
  return steps >= 0.8 * (numbers!.length - 1);
};

/** Serial numbers of days of the years 2009 to 2064, with a time of day, that only grow. */
function findSerials(draft: Draft, free: readonly Column[]): void {
  const serial = free.find(
    (column) =>
      column.least >= 40_000 && column.greatest < 60_000 && column.decimals >= 4 && isGrowing(column),
  );
  if (serial !== undefined) draft.assign('time', serial);
}
