import { REASON_WORDS } from '../logs/index.js';
import { type Html, html } from './html.js';
import type { Page } from './page.js';
import { table } from './table.js';

type Reason = keyof typeof REASON_WORDS;

/** What was read, what was used and what became of the rest. */
export function accountSection(page: Page): Html {
  const { rows, visits, occupations, files } = page.results;
  const asideOf = (setAside: object): [string, Html][] =>
    (Object.keys(setAside) as Reason[]).map((reason): [string, Html] => [
      `set aside: ${reason} (${REASON_WORDS[reason]})`,
      page.number(setAside as Record<string, number>, reason, 'count'),
    ]);
  const lines: [string, Html][] = [
    ['Rows read', page.number(rows, 'read', 'count')],
    ...asideOf(rows.setAside),
    ['Rows used', page.number(rows, 'used', 'count')],
    ['Visits with a fix', page.number(visits, 'withFix', 'count')],
    ['Visits that never got a fix', page.number(visits, 'withoutFix', 'count')],
    ['Occupations formed', page.number(occupations, 'formed', 'count')],
    ...asideOf(occupations.setAside),
    ['Occupations used', page.number(occupations, 'used', 'count')],
  ];
  return html`<section id="account"><h2>What it rests on, and what was thrown away</h2>
<p>Every row of ${page.lengthOf(files, 'log file')} is accounted for: ${page.counted(rows, 'read', 'row')} read =
${page.number(rows, 'used', 'count')} used + ${page.sum(rows.setAside)} set aside. The account of each file, and every row and
occupation set aside, stand in the annex.</p>
${table('Account', lines, [
  { head: 'What', cell: ([what]) => what, text: true },
  { head: 'Number', cell: ([, n]) => n },
])}
</section>
`;
}
