import type { Watch } from '../rule/index.js';
import type { WatchRun } from '../study/index.js';
import { plural } from './format.js';
import { messageLines } from './summaryText.js';
import { capital } from './words.js';

/** What watching found, in a few lines for a terminal. */
export function watchText({ results, watches, unwatched, messages }: WatchRun): string {
  return [
    results.study.title,
    '',
    ...watches.flatMap(watchLines),
    ...unwatched.map(({ component, reason }) => `${capital(component)}: not watched, since ${reason}.`),
    ...messageLines(messages),
  ].join('\n');
}

/** So many of the latest days outside are named. */
const MOST_DAYS = 10;

function watchLines({ component, days, leftOut, fitAgain, reasons, sentence }: Watch): string[] {
  const outside = days.filter((day) => day.outside).map(({ day }) => day);
  const named = outside.slice(-MOST_DAYS).join(', ');
  const left =
    leftOut === 0
      ? ''
      : ` ${plural(leftOut, 'occupation')} on marks that the model does not know took no part.`;
  return [
    `${capital(component)}: ${plural(days.length, 'new day')}, ${outside.length} of them outside${named === '' ? '' : ` (${named})`}.${left}`,
    ...(fitAgain ? reasons.map((reason) => `  ${capital(reason)}.`) : ['  The model may stay.']),
    `  ${sentence}`,
  ];
}
