import type { FailedShot, RuleCount } from '../rule/index.js';
import { who } from './blundersSection.js';
import { date, type Html } from './html.js';
import type { Page } from './page.js';
import { table } from './table.js';

/** The occupations within a rule that missed its limit, each with what is known of it. */
export function failureTable(page: Page, caption: string, counts: readonly RuleCount[]): Html | null {
  const failures = counts.flatMap((count) =>
    count.failures.map((shot): [RuleCount, FailedShot] => [count, shot]),
  );
  if (failures.length === 0) return null;
  const { distance, error } = page.units;
  return table(caption, failures, [
    { head: 'Day', cell: ([, shot]) => date(shot.day), text: true },
    {
      head: `Limit, ${error.name}`,
      cell: ([count]) => page.number(count, 'limitMm', 'limit'),
    },
    {
      head: `Error, ${error.name}`,
      cell: ([, shot]) => page.number(shot, 'errorMm', 'error'),
    },
    {
      head: `Distance, ${distance.name}`,
      cell: ([, shot]) => page.number(shot, 'baselineKm', 'distance'),
    },
    { head: 'Mark', cell: ([, shot]) => page.name(shot.mark), text: true },
    { head: 'Crew, rover', cell: ([, { crew, rover }]) => who(page.crew(crew), rover), text: true },
    { head: 'Suspected wrong fix', cell: ([, { suspected }]) => (suspected ? 'yes' : 'no'), text: true },
  ]);
}
