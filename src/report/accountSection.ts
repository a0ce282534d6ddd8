import { type Message, REASON_WORDS } from '../logs/index.js';
import type { FileResult, Results } from '../study/index.js';
import { count, mm, NOT_GIVEN, plural } from './format.js';
import { type Html, html } from './html.js';
import { table } from './table.js';
import { groupedMessages, otherFilesWords, setAsideWords } from './words.js';

type Reason = keyof typeof REASON_WORDS;

const reasons = (setAside: object): [Reason, number][] => Object.entries(setAside) as [Reason, number][];

/** What was read, what was used and what became of the rest. */
export function accountSection(results: Results): Html {
  const { rows, visits, occupations, files } = results;
  const lines: [string, number][] = [
    ['Rows read', rows.read],
    ...reasons(rows.setAside).map(([reason, n]): [string, number] => [
      `set aside: ${reason} (${REASON_WORDS[reason]})`,
      n,
    ]),
    ['Rows used', rows.used],
    ['Visits with a fix', visits.withFix],
    ['Visits that never got a fix', visits.withoutFix],
    ['Occupations formed', occupations.formed],
    ...reasons(occupations.setAside).map(([reason, n]): [string, number] => [
      `set aside: ${reason} (${REASON_WORDS[reason]})`,
      n,
    ]),
    ['Occupations used', occupations.used],
  ];
  return html`<section id="account"><h2>What the result rests on</h2>
<p>Every row of the logs is accounted for: ${plural(rows.read, 'row')} read = ${count(rows.used)} used +
${count(rows.read - rows.used)} set aside.</p>
${table('Account', lines, [
  { head: 'What', cell: ([what]) => what, text: true },
  { head: 'Number', cell: ([, n]) => count(n) },
])}
${table('Account of each file', files, [
  { head: 'File', cell: ({ file }) => file, text: true },
  { head: 'Read', cell: ({ read }) => count(read) },
  { head: 'Used', cell: ({ used }) => count(used) },
  { head: 'Set aside', cell: ({ setAside }) => setAsideWords(setAside) || 'none', text: true },
  { head: 'Steps, mm', cell: ({ resolution }) => steps(resolution) },
])}
${roundingWords(results)}</section>
`;
}

/** Steps of plan and height in which a log is written. */
const steps = (resolution: FileResult['resolution']): string =>
  resolution === null
    ? NOT_GIVEN
    : `${step(resolution.horizontalStepMm)} / ${step(resolution.verticalStepMm)}`;

const step = (mm: number): string =>
  mm < 0.1 ? 'below 0.1' : Number(mm.toPrecision(2)).toLocaleString('en-US');

function roundingWords({ roundingMm }: Results): Html | null {
  if (roundingMm === null) return null;
  return html`<p class="small">Steps are those of plan and height in which positions are written. Their rounding adds
${mm(roundingMm.horizontal)} mm to the horizontal and ${mm(roundingMm.vertical)} mm to the vertical constant, as squares.</p>
`;
}

/** Messages, the most severe first. */
export function messagesSection({ messages }: Results): Html {
  if (messages.length === 0) return html``;
  const place = (m: Message): string =>
    [m.file, m.row === null ? null : `line ${m.row}`, m.column].filter((part) => part !== null).join(', ');
  return html`<section id="messages"><h2>What to know before using it</h2>
<ul class="messages">
${groupedMessages(messages).map((m) => html`<li>${m.text}${otherFilesWords(m)}${place(m) === '' ? null : html` <span class="small">(${place(m)})</span>`}</li>\n`)}</ul>
</section>
`;
}
