import { quoted } from '../logs/index.js';
import type { Watch } from '../rule/index.js';
import type { WatchMonth, WatchRun } from '../study/index.js';
import { count, plural, signed } from './format.js';
import { messageLines } from './summaryText.js';
import { capital } from './words.js';

/** What watching found, in a few lines for a terminal. */
export function watchText({ results, watches, unwatched, month, messages }: WatchRun): string {
  return [
    results.study.title,
    '',
    ...watches.flatMap(watchLines),
    ...unwatched.map(({ component, reason }) => `${capital(component)}: not watched, since ${reason}.`),
    ...monthLines(month),
    ...messageLines(messages),
  ].join('\n');
}

/** Marks to look after, and what the crews did. */
function monthLines({ after, from, visits, markShifts, nextMarks }: WatchMonth): string[] {
  if (from === null) {
    const since = after === null ? '' : ` after ${after}, the last day of the earlier run`;
    return [`No visit lies on a day${since}. Put the new logs into the study file.`];
  }
  const moved = markShifts.filter(({ verdict }) => verdict === 'moved');
  return [
    `New visits: ${count(visits.withFix)} with a fix, ${count(visits.withoutFix)} without.`,
    ...moved.map(
      ({ mark, component, shiftMm }) =>
        `Mark ${quoted(mark)} may have moved in ${component === 'horizontal' ? 'plan' : 'height'}: ${shiftMm.map((value) => `${signed(value, 1)} mm`).join(', ')}.`,
    ),
    ...(nextMarks.length === 0
      ? []
      : [
          `Visit next: ${nextMarks.map(({ mark, reason }) => `${quoted(mark)} (${reason === 'not visited' ? 'not visited on the new days' : reason})`).join(', ')}.`,
        ]),
  ];
}

/** So many of the latest days outside are named. */
const MOST_DAYS = 10;

function watchLines({ component, days, leftOut, fitAgain, reasons, sentence }: Watch): string[] {
  const left =
    leftOut === 0
      ? ''
      : ` ${plural(leftOut, 'occupation')} on marks that the model does not know took no part.`;
  if (days.length === 0) return [`${capital(component)}: no new day could be judged.${left}`];
  const outside = days.filter((day) => day.outside).map(({ day }) => day);
  const named = outside.slice(-MOST_DAYS).join(', ');
  return [
    `${capital(component)}: ${plural(days.length, 'new day')}, ${outside.length} of them outside${named === '' ? '' : ` (${named})`}.${left}`,
    ...(fitAgain ? reasons.map((reason) => `  ${capital(reason)}.`) : ['  The model may stay.']),
    `  ${sentence}`,
  ];
}
