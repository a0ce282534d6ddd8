import type { TimeGuess, TimeLayout } from '../../time/index.js';
import type { ColumnRole } from '../roles.js';
import type { Draft } from './draft.js';
import { dateInName } from './fileDate.js';
import { clockOfName } from './headerName.js';
import type { RecognizeOptions } from './recognition.js';
import { askAboutFormat, askForDate, askForZone } from './timeDoubts.js';
import { textFormats } from './timeTexts.js';

/** Settles how the times are written and by which clock, or asks for it. */
export function settleTimes(draft: Draft, fileName: string, options: RecognizeOptions): void {
  if (draft.has('gpsWeek', 'gpsSeconds')) return;
  const date = settleDate(draft, fileName);
  const texts = timeTexts(draft, date);
  if (texts.length === 0) return;
  const dated = textFormats(texts);
  const guesses = dated.guesses.filter(({ kind }) => kind !== 'time-of-day');
  const best = guesses[0];
  const format = askAboutFormat(draft, texts, dated.share < 0.5 ? [] : guesses);
  const time: { -readonly [Key in keyof TimeLayout]: TimeLayout[Key] } = {};
  if (format !== null && format !== 'iso') time.format = format;
  if (best !== undefined) Object.assign(time, clock(draft, best, options));
  if (Object.keys(time).length > 0) draft.parts = { ...draft.parts, time };
}

/** Takes the date from the name of the file where the rows have none; gives its text, or asks for it. */
function settleDate(draft: Draft, fileName: string): string | null {
  if (['time', 'date', 'start'].some((role) => draft.has(role as ColumnRole))) return null;
  if (draft.doubts.some(({ code, key }) => code === 'repeated-role' && /time|date|start/.test(key)))
    return null;
  const found = dateInName(fileName);
  if (found === null) {
    askForDate(draft);
    return null;
  }
  draft.parts = { ...draft.parts, fromFileName: found.pattern };
  draft.doubt({
    code: 'date-from-file-name',
    question: `Is "${found.text}" in the name of the file the date of its rows?`,
    because: 'The rows have no date.',
    key: 'layout.fromFileName',
    choices: [found.pattern],
    decisive: false,
  });
  return found.text;
}

/** The texts as the reader of times is given them: date and time of day joined by one blank. */
function timeTexts({ sheet, roles }: Draft, fileDate: string | null): readonly string[] {
  const texts = (role: ColumnRole): readonly string[] => {
    const column = roles.get(role);
    return column === undefined ? [] : sheet.rows.map(({ cells }) => cells[column.index] ?? '');
  };
  const filled = (all: readonly string[]): readonly string[] => all.filter((text) => text !== '');
  const timeOfDay = texts('timeOfDay');
  const dates = roles.has('date') ? texts('date') : fileDate === null ? [] : sheet.rows.map(() => fileDate);
  if (timeOfDay.length > 0 && dates.length > 0) {
    const joined = dates.map((date, k) =>
      date === '' || timeOfDay[k] === '' ? '' : `${date} ${timeOfDay[k]}`,
    );
    return filled(joined);
  }
  for (const role of ['time', 'start'] as const) if (roles.has(role)) return filled(texts(role));
  return filled(dates);
}

/** Zone and scale that texts or names of columns tell; else the zone is asked for, unless the study has one. */
function clock(draft: Draft, guess: TimeGuess, { timeZone }: RecognizeOptions): TimeLayout {
  if (guess.zone !== undefined) return { zone: guess.zone };
  if (guess.scale !== undefined) return { scale: guess.scale };
  const isWall = guess.kind === 'date-time' && guess.ambiguous.some((note) => note.includes('zone'));
  if (!isWall) return {};
  const columns = (['time', 'timeOfDay', 'start', 'date'] as const).flatMap(
    (role) => draft.roles.get(role) ?? [],
  );
  const named = columns
    .map(({ name }) => ({ name, clock: clockOfName(name) }))
    .find(({ clock }) => clock !== null);
  if (named?.clock === 'utc') return { zone: 'UTC' };
  if (named?.clock === 'gps') {
    draft.doubt({
      code: 'gps-time',
      question: 'Are the times rightly read as GPS time, which is ahead of UTC by the leap seconds?',
      because: `The name "${named.name}" says so.`,
      key: 'layout.time.scale',
      choices: ['gps', 'utc'],
      decisive: false,
    });
    return { scale: 'gps' };
  }
  if (timeZone === undefined || timeZone === null) askForZone(draft, guess);
  return {};
}
