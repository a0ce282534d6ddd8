import type { ColumnTable } from 'arquero';
import { type ChartSpec, renderPng } from '../charts/index.js';
import { type ErrorModel, type FitComponent, formatFit } from '../fit/index.js';
import { escapeHtml } from '../report/index.js';
import { fitHtml, isFit } from './fitHtml.js';
import { type DisplayBundle, runningCell } from './kernel.js';
import { recordTable } from './recordTable.js';
import { isRule, ruleHtml, ruleText } from './ruleView.js';
import { isColumnTable, type TextTable, textTable } from './tableCells.js';
import { tableHtml } from './tableHtml.js';
import { tableText } from './tableText.js';

/** What {@link show} can show: a chart, a fit, a rule, a table, records, any other single result, or a text. */
export type Showable =
  | ChartSpec
  | ErrorModel<FitComponent>
  | ColumnTable
  | readonly object[]
  | object
  | string;

/** Longer tables are cut, so that a notebook stays readable. */
const MOST_ROWS = 20;
/** Pixels of a picture for each pixel on the page. */
const SCALE = 2;

/**
 * Shows a chart, a fit, a rule, a table, a single result or a text below the running cell of a notebook; anywhere else writes
 * the same, of a chart its words, to the standard output. Tables are cut after 20 rows and say how many more there are.
 * @throws TypeError when it is something else
 */
export async function show(what: Showable): Promise<void> {
  // asked before drawing: while a picture is made another cell could begin
  const send = runningCell();
  if (send === null) process.stdout.write(`${plainText(what)}\n`);
  else send(await bundleOf(what));
}

/** A thing in all the forms that a notebook is given. */
async function bundleOf(what: Showable): Promise<DisplayBundle> {
  const plain = { 'text/plain': plainText(what) };
  if (typeof what === 'string') return { data: { 'text/html': textHtml(what), ...plain }, metadata: {} };
  if (isFit(what)) return { data: { 'text/html': fitHtml(what), ...plain }, metadata: {} };
  if (isRule(what)) return { data: { 'text/html': ruleHtml(what), ...plain }, metadata: {} };
  if (isChart(what)) {
    const png = await renderPng(what, SCALE);
    return {
      data: { 'image/png': png.toString('base64'), ...plain },
      metadata: { 'image/png': sizeOnPage(png) },
    };
  }
  return { data: { 'text/html': tableHtml(tableOf(what)), ...plain }, metadata: {} };
}

/** A text in paragraphs: plain text of a notebook is broken within words. */
const textHtml = (text: string): string =>
  text
    .split('\n')
    .map((line) => `<p style="margin: 2px 0">${escapeHtml(line)}</p>`)
    .join('\n');

function plainText(what: Showable): string {
  if (typeof what === 'string') return what;
  if (isFit(what)) return formatFit(what);
  if (isChart(what)) return [what.title, ...what.subtitle, what.description].join('\n');
  if (isRule(what)) return ruleText(what);
  if (typeof what === 'object' && what !== null) return tableText(tableOf(what));
  throw new TypeError(
    `Expected a chart, a fit, a rule, a table, records or a text to show, came ${JSON.stringify(what) ?? typeof what}. Hand in one of these.`,
  );
}

const tableOf = (what: ColumnTable | readonly object[] | object): TextTable =>
  isColumnTable(what) || Array.isArray(what) ? textTable(what, MOST_ROWS) : recordTable(what);

const isChart = (what: Showable): what is ChartSpec =>
  typeof what === 'object' && what !== null && 'vegaLite' in what;

/** Width and height from the header of a PNG (ISO/IEC 15948, chunk IHDR), in pixels of the page. */
function sizeOnPage(png: Buffer): { readonly width: number; readonly height: number } {
  return { width: png.readUInt32BE(16) / SCALE, height: png.readUInt32BE(20) / SCALE };
}
