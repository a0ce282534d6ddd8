import { REASON_WORDS } from '../logs/index.js';
import type { NewlySetAside, RowsSetAside, WatchMonth } from '../study/index.js';
import { date, type Html, html } from './html.js';
import type { Page } from './page.js';
import { table } from './table.js';

/** Rows and occupations of the new days that were set aside. */
export function newlySetAside(page: Page, { rowsSetAside, occupationsSetAside }: WatchMonth): Html {
  return html`<section id="set-aside"><h2>Newly set aside</h2>
${
  rowsSetAside.length === 0
    ? html`<p>No row of a new log was set aside.</p>`
    : table<RowsSetAside>('Rows of logs that are new or have grown', rowsSetAside, [
        { head: 'File', cell: ({ file }) => page.name(file), text: true },
        { head: 'Reason', cell: ({ reason }) => `${reason} (${REASON_WORDS[reason]})`, text: true },
        { head: 'Rows', cell: (row) => page.number(row, 'count', 'count') },
        { head: 'First lines', cell: (row) => lines(page, row), text: true },
      ])
}
${
  occupationsSetAside.length === 0
    ? html`<p>No occupation of a new day was set aside.</p>`
    : table<NewlySetAside>('Occupations of new days', occupationsSetAside, [
        { head: 'Day', cell: ({ day }) => date(day), text: true },
        { head: 'Mark', cell: ({ mark }) => page.name(mark), text: true },
        { head: 'Crew', cell: ({ crew }) => page.crew(crew), text: true },
        { head: 'Why', cell: ({ reason, detail }) => page.text(`${reason}: ${detail}`), text: true },
        {
          head: 'Place',
          cell: (one) => html`${page.name(one.file)}, line ${page.number(one, 'row', 'plain')}`,
          text: true,
        },
      ])
}
</section>`;
}

const lines = (page: Page, { firstRows, count }: RowsSetAside): Html =>
  firstRows.length === 0
    ? html`see tables/set-aside.csv of a run`
    : html`${firstRows.map((_, k) => html`${k === 0 ? '' : ', '}${page.number(firstRows as unknown as number[], k, 'plain')}`)}${count > firstRows.length ? ', …' : ''}`;
