import type { Message } from '../logs/index.js';
import { groupedMessages, otherFilesWords } from './groupedMessages.js';
import { type Html, html } from './html.js';
import type { Page } from './page.js';

/** Errors and warnings for the letter; all messages where asked. The most severe first. */
export function messagesSection(page: Page, all = false): Html {
  const grouped = groupedMessages(page.results.messages).filter(({ severity }) => all || severity !== 'info');
  if (grouped.length === 0) return html``;
  const items = grouped.map((told) => {
    const where = place(told);
    return html`<li>${page.text(told.text)}${otherFilesWords(told)}${where === '' ? null : html` <span class="small">(${where})</span>`}</li>\n`;
  });
  return html`<section id="messages"><h2>${all ? 'Messages' : 'What to know before using it'}</h2>
<ul class="messages">
${items}</ul>
</section>
`;
}

const place = ({ file, row, column }: Message): string =>
  [file, row === null ? null : `line ${row}`, column].filter((part) => part !== null).join(', ');
