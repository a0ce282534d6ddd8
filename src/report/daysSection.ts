import type { DegradedDayResult, Results, TimeOfDayResult } from '../study/index.js';
import { unseenShare } from './cautions.js';
import { percent } from './format.js';
import { date, type Html, html } from './html.js';
import type { Page } from './page.js';
import { table } from './table.js';

type Component = TimeOfDayResult['component'];

/** On which days and at which hours the rule is not to be trusted. */
export function daysSection(page: Page): Html {
  const { timeOfDay, fits } = page.results;
  if (fits.length === 0) return html``;
  return html`<section id="days"><h2>On which days and at which hours not</h2>
${!daysJudged(page.results) ? html`<p>Single days could not be judged: that takes more days with near and far marks.</p>` : degraded(page)}
${timeOfDay.map((one) => html`<p>${hourWords(page, one)}</p>\n`)}
</section>
`;
}

/** Whether days could be told apart. */
export const daysJudged = ({ dailyFactors }: Results): boolean =>
  dailyFactors.some(({ degraded: named }) => named !== null);

function degraded(page: Page): Html {
  const { degradedDays, dayModels } = page.results;
  const spread = dayModels.map(
    (model) =>
      html`<p>${title(model.component)}: on half of the days the ppm is above
${page.limits(model.medianDayPpm, 'ppm')}; over days to come it is ${page.limits(model.longRunPpm, 'ppm')} in the root-mean-square.</p>\n`,
  );
  if (degradedDays.length === 0) return html`${spread}<p>No day stands out as degraded.${proviso(page)}</p>`;
  return html`${spread}<p>Some days stand out as degraded; they stay in the fit. The words for each stand in the annex.</p>
${table<DegradedDayResult>('Degraded days', degradedDays, [
  { head: 'Day', cell: ({ day }) => date(day), text: true },
  { head: 'Component', cell: ({ component }) => component, text: true },
  { head: 'ppm over that of the median day', cell: (day) => page.number(day, 'factor', 'ratio') },
  { head: 'Probability', cell: (day) => page.number(day, 'probabilityDegraded', 'ratio') },
  { head: 'Put down to', cell: (day) => putDownTo(page, day), text: true },
])}`;
}

/** What may have been missed though no day stands out. */
export function proviso(page: Page): Html {
  const { rules, evidence } = page.results;
  const days = rules[0]?.conditions.days ?? 0;
  const unseen =
    days === 0 ? null : html` So many days leave room for ${percent(unseenShare(days))} of worse ones.`;
  const blind = evidence
    .map(({ daysWithFarShots }) => daysWithFarShots)
    .find((far) => far !== null && far.daysWithoutFar > 0);
  const short = blind
    ? html` ${page.counted(blind, 'daysWithoutFar', 'day')} had no shot beyond ${page.number(blind, 'farKm', 'distance')} ${page.units.distance.name}, and can hardly stand out.`
    : null;
  return html`${unseen}${short}`;
}

function putDownTo(page: Page, { verdict, subject }: DegradedDayResult): string {
  if (subject === null) return verdict;
  return verdict === 'one crew' ? page.crew(subject) : `${verdict}, ${subject}`;
}

const title = (component: Component): string => (component === 'horizontal' ? 'In plan' : 'In height');

/** Below this chance hours are told apart. */
const HOURS_LEVEL = 0.05;

function hourWords(page: Page, one: TimeOfDayResult): Html {
  const { component, pValue, hours } = one;
  if (pValue === null) {
    return html`${title(component)}: whether some hours are worse could not be judged: that takes 15 days or more with a time of day.`;
  }
  const chance = html`chance of such differences among equal hours: ${page.number(one, 'pValue', 'chance')}`;
  if (pValue >= HOURS_LEVEL) {
    return html`${title(component)}: no hours are shown to be worse than others (${chance}).`;
  }
  const worst = worstHours(hours);
  return html`${title(component)}: hours differ (${chance}). The worst are those from ${page.number(worst, 'from', 'hour')} to
${page.number(worst, 'to', 'hour')} solar time, with ${page.limits(worst.ppm, 'ppm')} ppm.`;
}

/** The hours with the largest ppm. */
const worstHours = (hours: Results['timeOfDay'][number]['hours']): (typeof hours)[number] =>
  hours.reduce((a, b) => ((b.ppm.estimate ?? 0) > (a.ppm.estimate ?? 0) ? b : a));
