import type { AdjustmentWeight, ConstantAndPpm, Results } from '../study/index.js';
import { type Html, html } from './html.js';
import { htmlPage } from './htmlPage.js';
import { Page } from './page.js';
import { type Column, table } from './table.js';

/** What to enter in an adjustment: every meaning of "a + b ppm" beside the others, so that nobody takes the wrong one. */
export function weightsHtml(results: Results): string {
  const page = new Page(results);
  const { adjustmentWeights: weights, study } = results;
  const body = html`<header><h1>Weights for an adjustment</h1>
<p class="lead">${page.name(study.title)}. ${page.units.words}</p></header>
${weights.length === 0 ? html`<p>No weights can be given: no fit was possible.</p>` : tables(page)}`;
  return htmlPage({ title: `${study.title} — weights for an adjustment`, kind: 'card', body });
}

function tables(page: Page): Html {
  const { heights, settings } = page.results;
  return html`<section id="which"><h2>Which one to enter</h2>
<ul>
<li>Most adjustments ask for <strong>one standard deviation per axis</strong>. Never enter a radial RMS or a 95 % figure there: it is
larger by 1.41 or 2.45.</li>
<li>The marks’ own errors belong in the weight only when marks are held fixed as free of error. Where the adjustment carries
their standard deviations, take the rows <strong>without</strong> mark error.</li>
<li>${
    settings.centringSigmaMm === 0
      ? 'The setting of the rod is in every constant. Where the adjustment adds centring by itself, enter none there, or state centringSigmaMm in the study file and run again.'
      : html`Where the adjustment adds centring by itself, take the rows without it: they are freed of the stated ${page.number(settings, 'centringSigmaMm', 'error to a hundredth')} ${page.units.error.name} per axis.`
  }</li>
<li>Where the adjustment adds constant and ppm as squares, take root-sum-square; where it adds them as they are, linear-sum.</li>
<li>The error of the base’s own coordinates is in none of these numbers.</li>
</ul></section>
${section(page, 'horizontal', 'East and north')}
${section(page, 'vertical', `Up, ${heights} heights`)}`;
}

function section(page: Page, component: AdjustmentWeight['component'], title: string): Html {
  const rows = page.results.adjustmentWeights.filter((weight) => weight.component === component);
  if (rows.length === 0)
    return html`<section id="${component}"><h2>${title}</h2><p>No fit of this component was possible.</p></section>`;
  const { error } = page.units;
  const part = (value: ConstantAndPpm | null): Html =>
    value === null
      ? html`—`
      : html`${page.number(value, 'constantMm', 'error to a hundredth')} ${error.name} + ${page.number(value, 'ppm', 'ppm')} ppm`;
  const columns: Column<AdjustmentWeight>[] = [
    {
      head: 'Constant and ppm are added',
      cell: ({ form }) =>
        form === 'root-sum-square' ? 'as squares (root-sum-square)' : 'as they are (linear-sum)',
      text: true,
    },
    { head: 'Mark error', cell: ({ markError }) => (markError ? 'with' : 'without'), text: true },
    ...(rows.some(({ centring }) => !centring)
      ? [
          {
            head: 'Centring',
            cell: ({ centring }: AdjustmentWeight) => (centring ? 'with' : 'without'),
            text: true,
          },
        ]
      : []),
    {
      head: component === 'horizontal' ? 'One standard deviation per axis' : 'One standard deviation',
      cell: ({ perAxis }) => part(perAxis),
    },
    ...(component === 'horizontal'
      ? [{ head: 'Radial RMS', cell: ({ radialRms }: AdjustmentWeight) => part(radialRms) }]
      : []),
    { head: component === 'horizontal' ? '95 %, radial' : '95 %', cell: ({ share95 }) => part(share95) },
  ];
  const tooMuch = rows.some(({ centring, perAxis }) => !centring && perAxis.constantMm === null);
  return html`<section id="${component}"><h2>${title}</h2>
${table(`One and the same spread in ${component === 'horizontal' ? 'three' : 'two'} meanings`, rows, columns)}
${tooMuch ? html`<p class="small">The stated centring is larger than the whole constant, so no constant without it can be given. Look at centringSigmaMm.</p>` : null}</section>`;
}
