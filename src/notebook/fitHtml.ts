import { coefficientTexts, type ErrorModel, type FitComponent, fitSummary } from '../fit/index.js';
import { escapeHtml } from '../report/index.js';
import { tableHtml } from './tableHtml.js';

/** Whether a value is a fit. */
export const isFit = (what: unknown): what is ErrorModel<FitComponent> =>
  typeof what === 'object' && what !== null && 'constantMm' in what && 'fitted' in what && 'interval' in what;

/** A fit as HTML that needs no style sheet, every text escaped. */
export function fitHtml(model: ErrorModel<FitComponent>): string {
  const { title, facts, confidence, coefficients, remarks, notes } = fitSummary(model);
  const level = Number((100 * confidence).toFixed(1));
  const table = tableHtml({
    columns: [
      { name: '', numeric: false },
      { name: 'estimate', numeric: true },
      { name: `${level} % interval`, numeric: true },
    ],
    rows: coefficients.map((coefficient) => {
      const { estimate, limits } = coefficientTexts(coefficient);
      return [`${coefficient.name}, ${coefficient.unit}`, estimate, limits];
    }),
    moreRows: 0,
  });
  const fact = ([word, text]: readonly [string, string]): string =>
    `<tr><th style="text-align: left; padding: 2px 10px; vertical-align: top">${escapeHtml(word)}</th><td style="text-align: left; padding: 2px 10px">${escapeHtml(text)}</td></tr>`;
  const note = ({ severity, text }: (typeof notes)[number]): string =>
    `<li>${severity === 'info' ? '' : `<b>${severity}</b>: `}${escapeHtml(text)}</li>`;
  return [
    `<p><b>${escapeHtml(title)}</b></p>`,
    `<table style="border-collapse: collapse">${facts.map(fact).join('')}</table>`,
    table,
    `<p>${remarks.map(escapeHtml).join('<br>')}</p>`,
    ...(notes.length === 0 ? [] : [`<ul>${notes.map(note).join('')}</ul>`]),
  ].join('\n');
}
