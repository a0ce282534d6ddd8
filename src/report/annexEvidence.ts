import type { RmsRatio } from '../fit/index.js';
import type { EvidenceResult } from '../study/index.js';
import { date, type Html, html } from './html.js';
import type { Page } from './page.js';
import { table } from './table.js';
import { capital } from './words.js';

/** On which marks, days, directions and crews the ppm rests, and what else could pass for it. */
export function annexEvidence(page: Page): Html {
  const { evidence } = page.results;
  if (evidence.length === 0) return html``;
  return html`<section id="evidence"><h2>What the ppm rests on</h2>
<p>A shot speaks of the ppm by its distance: a share of information is how much of all that is known of the ppm comes from one
mark, day, direction or crew. A rule that rests on one of them stands or falls with it.</p>
${evidence.map((one) => html`${shareTable(page, one)}<ul>${remarks(page, one).map((words) => html`<li>${words}</li>\n`)}</ul>\n`)}
</section>
`;
}

type Share = EvidenceResult['shares'][number];

function shareTable(page: Page, { component, shares }: EvidenceResult): Html {
  const rows = shares.flatMap((kind) => kind.largest.map((one) => ({ kind, one })));
  return table(`Largest shares of the information on the ${component} ppm`, rows, [
    { head: 'Of', cell: ({ kind }) => capital(kind.by), text: true },
    { head: 'Which', cell: ({ kind, one }) => groupName(page, kind, one.group), text: true },
    { head: 'Share', cell: ({ one }) => page.number(one, 'share', 'share') },
    { head: 'Occupations', cell: ({ one }) => page.number(one, 'occupations', 'count') },
    { head: 'Of so many', cell: ({ kind }) => page.number(kind, 'groups', 'count') },
  ]);
}

function groupName(page: Page, { by }: Share, group: string): string | Html {
  if (by === 'day') return date(group);
  if (by === 'mark') return page.name(group);
  return by === 'crew' ? page.crew(group) : group;
}

function remarks(
  page: Page,
  { companions, daysWithFarShots: far, firstAndLast: pairs }: EvidenceResult,
): Html[] {
  const { distance } = page.units;
  const known = companions.filter(({ correlation }) => correlation !== null);
  return [
    ...(known.length === 0
      ? []
      : [
          html`Correlation with distance: ${known.map((one, k) => html`${k === 0 ? '' : ', '}${one.quantity} ${page.number(one, 'correlation', 'signed ppm')}`)}. From 0.7 on either way the two can hardly be told apart.`,
        ]),
    ...(far === null
      ? []
      : [
          html`Far shots, beyond ${page.number(far, 'farKm', 'distance')} ${distance.name}, lie on ${page.counted(far, 'daysWithFar', 'day')}; ${page.counted(far, 'daysWithoutFar', 'day')} ${far.daysWithoutFar === 1 ? 'has' : 'have'} none. ${
            far.near === null
              ? 'Whether near shots are better on one kind of day cannot be told.'
              : html`Near shots on days with far ones are ${ratioWords(page, far.near)} times as large as on the others.`
          }`,
        ]),
    pairs.first === null
      ? html`Visits with several occupations are too few to compare the first with the last.`
      : html`At ${page.counted(pairs, 'visits', 'visit')} with several occupations the first is ${ratioWords(page, pairs.first)} times as large in error as the last.`,
  ];
}

/** `0.99 (0.91 to 1.07; chance 0.71)` */
const ratioWords = (page: Page, ratio: RmsRatio): Html =>
  html`${page.number(ratio, 'ratio', 'ratio')} (${page.number(ratio, 'low', 'ratio')} to ${page.number(ratio, 'high', 'ratio')}; chance of as much without a difference ${page.number(ratio, 'pValue', 'chance')})`;
