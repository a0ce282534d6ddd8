import type { BlunderResult, Results } from '../study/index.js';
import { plural } from './format.js';
import { date, type Html, html } from './html.js';
import { table } from './table.js';
import { capital } from './words.js';

/** Occupations that a person likely got wrong, each with its cause. */
export function blundersSection({ blunders }: Results): Html {
  if (blunders.length === 0) return html``;
  return html`<section id="blunders"><h2>Suspected blunders</h2>
<p>${plural(blunders.length, 'occupation')} ${blunders.length === 1 ? 'looks' : 'look'} like a mistake of a person, not of
a receiver, and ${blunders.length === 1 ? 'is' : 'are'} set aside. Look each of them up in the field book.</p>
${table('Suspected blunders', blunders, [
  { head: 'Day', cell: ({ day }) => date(day), text: true },
  { head: 'Mark', cell: ({ mark }) => mark, text: true },
  { head: 'Crew, rover', cell: who, text: true },
  { head: 'Cause', cell: ({ cause }) => capital(cause), text: true },
  { head: 'Place', cell: ({ file, row }) => `${file}, line ${row}`, text: true },
])}
</section>
`;
}

const who = ({ crew, rover }: BlunderResult): string =>
  [crew, rover].filter((name) => name !== '').join(', ');
