import { date, type Html, html } from './html.js';
import type { Page } from './page.js';
import { table } from './table.js';
import { capital } from './words.js';

/** Occupations that a person likely got wrong, each with its cause. */
export function blundersSection(page: Page): Html {
  const { blunders } = page.results;
  if (blunders.length === 0) return html``;
  return html`<section id="blunders"><h2>Suspected blunders</h2>
<p>${page.lengthOf(blunders, 'occupation')} ${blunders.length === 1 ? 'looks' : 'look'} like a mistake of a person, not of
a receiver, and ${blunders.length === 1 ? 'is' : 'are'} set aside. Look each of them up in the field book.</p>
${table('Suspected blunders', blunders, [
  { head: 'Day', cell: ({ day }) => date(day), text: true },
  { head: 'Mark', cell: ({ mark }) => page.name(mark), text: true },
  { head: 'Crew, rover', cell: ({ crew, rover }) => who(page.crew(crew), rover), text: true },
  { head: 'Cause', cell: ({ cause }) => capital(page.text(cause)), text: true },
  { head: 'Place', cell: ({ file, row }) => `${file}, line ${row}`, text: true },
])}
</section>
`;
}

export const who = (crew: string, rover: string): string =>
  [crew, rover].filter((name) => name !== '').join(', ');
