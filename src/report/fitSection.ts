import type { FitResult, LengthClass } from '../study/index.js';
import { FORMULAS, fitTable } from './fitTable.js';
import { percent } from './format.js';
import { type Html, html } from './html.js';
import type { Page } from './page.js';
import { type Column, table } from './table.js';
import { shownFits } from './words.js';

/** How the errors grow with distance: the fitted model, the spec sheet, and what was measured by length. */
export function fitSection(page: Page, charts: readonly (Html | null)[] = []): Html {
  const { fits } = page.results;
  if (fits.length === 0)
    return html`<section id="fit"><h2>How errors grow with distance</h2><p>No fit was possible.</p></section>\n`;
  const shown = shownFits(page.results);
  const forms = [...new Set(shown.map(({ form }) => FORMULAS[form]))].join(' or ');
  return html`<section id="fit"><h2>How errors grow with distance</h2>
${charts}${specSheetWords(page)}
${fitTable(page, `Own error model, ${forms}, with ${percent(shown[0]!.confidence)} intervals`, shown)}
${lengthTable(page)}
</section>
`;
}

/** The spec sheet beside the own model, in one sentence for each component. */
function specSheetWords(page: Page): Html {
  const { specSheet, specSheetTest, fits } = page.results;
  if (specSheet === null) {
    return html`<p>The study file gives no spec sheet, so there is none to compare with.</p>\n`;
  }
  const { error } = page.units;
  const words = (fit: FitResult): Html => {
    const stated = specSheet[fit.component];
    return html`<li>${fit.component === 'horizontal' ? 'In plan' : 'In height'} the spec sheet states ${page.number(stated, 'constantMm', 'error')} ${error.name}
+ ${page.number(stated, 'ppm', 'ppm')} ppm (${SHEET_LEVELS[specSheet.level]}${fit.component === 'vertical' ? '' : `, ${specSheet.axis}`}, ${specSheet.form});
your own shots show ${page.number(fit.constantMm, 'estimate', 'error')} ${error.name} + ${page.number(fit.ppm, 'estimate', 'ppm')} ppm (${fit.basis}, ${fit.form}).</li>\n`;
  };
  const own = fits.filter(({ basisOfRule }) => basisOfRule);
  return html`<ul>${own.map(words)}</ul>
${specSheetTest.map(({ component, sentence }) => html`<p><strong>${component === 'horizontal' ? 'In plan' : 'In height'}.</strong> ${page.text(sentence)}</p>\n`)}
<p class="small">Numbers of different form, axis or level cannot be compared as they stand; the table below has both as the same kind of
spread.</p>
`;
}

const SHEET_LEVELS = { rms: 'root-mean-square', '68': 'for 68 %', '95': 'for 95 %' } as const;

/** Measured spread by class of length, with the spec sheet's. */
export function lengthTable(page: Page): Html {
  const { lengthClasses, heights, specSheet } = page.results;
  const { distance, error } = page.units;
  const rms = (row: LengthClass, key: 'horizontalRmsMm' | 'verticalRmsMm'): Html => {
    const value = row[key];
    return value === null ? html`—` : html`${page.limits(value, 'error')}${row.tooFew ? ' *' : ''}`;
  };
  const edge = (row: LengthClass, key: 'fromKm' | 'toKm'): Html => page.number(row, key, 'edge of a class');
  const stated = (key: 'horizontal' | 'vertical') => ({
    head: `Spec sheet, ${key === 'horizontal' ? 'radial' : 'vertical'}`,
    cell: ({ specSheetMm }: LengthClass) =>
      specSheetMm === null ? '—' : page.number(specSheetMm, key, 'error'),
  });
  const columns: Column<LengthClass>[] = [
    {
      head: `Distance, ${distance.name}`,
      cell: (row) => html`${edge(row, 'fromKm')} to ${edge(row, 'toKm')}`,
      text: true,
    },
    { head: 'Occupations', cell: (row) => page.number(row, 'occupations', 'count') },
    { head: 'Days', cell: (row) => page.number(row, 'days', 'count') },
    { head: 'Visits without a fix', cell: (row) => page.number(row, 'visitsWithoutFix', 'count') },
    { head: `Radial RMS, ${error.name}`, cell: (row) => rms(row, 'horizontalRmsMm') },
    { head: `Vertical RMS, ${error.name}`, cell: (row) => rms(row, 'verticalRmsMm') },
    ...(specSheet === null ? [] : [stated('horizontal'), stated('vertical')]),
  ];
  const starred = lengthClasses.some(({ tooFew, occupations }) => tooFew && occupations > 0);
  return html`${table(`Measured by distance (shown, not fitted); vertical: ${heights} heights`, lengthClasses, columns)}
<p class="small">${starred ? '* too few: fewer than 10 occupations or 3 days; the figure describes these occupations and nothing more. ' : ''}${specSheet === null ? '' : 'The spec sheet is for ideal conditions; it stands here as the same kind of spread.'}</p>
`;
}
