import { reviewBy } from '../rule/index.js';
import type { HoursOfCaution } from '../study/index.js';
import { date, type Html, html } from './html.js';
import type { Page } from './page.js';
import { list } from './ruleConditions.js';

/** Hours at which errors are larger. */
export function cautionHours(page: Page): Html {
  const { timeOfDay, hoursOfCaution } = page.results;
  const words =
    hoursOfCaution.length > 0
      ? hoursOfCaution.map((one) => html`<p>${hourWords(page, one)}</p>`)
      : timeOfDay.some(({ pValue }) => pValue !== null)
        ? html`<p>No hours are shown to be worse than others.</p>`
        : html`<p>Whether some hours are worse could not be judged.</p>`;
  return html`<section id="hours"><h2>Hours of caution</h2>${words}</section>`;
}

function hourWords(page: Page, one: HoursOfCaution): Html {
  const { component, clock } = one;
  const place = component === 'horizontal' ? 'Plan' : 'Height';
  const sun = html`${page.number(one, 'fromHour', 'hour')} to ${page.number(one, 'toHour', 'hour')} sun time (sun highest at about 12:00)`;
  return clock === null
    ? html`${place}: take care from ${sun}.`
    : html`${place}: take care from <strong>${page.number(clock, 'fromHour', 'hour')} to ${page.number(clock, 'toHour', 'hour')}</strong> on the clock of ${date(clock.day)}, ${sun}.`;
}

/** The equipment and bases of the data: with others the distances are not known. */
export function rig(page: Page): Html {
  const { bases, rovers, period, rules } = page.results;
  const told = (names: readonly string[]): Html =>
    names.length === 0 ? html`not told by the logs` : list(page, names);
  const supports = rules[0]?.conditions.supports ?? [];
  const tilt = rules[0]?.conditions.tiltDeg ?? null;
  return html`<section id="rig"><h2>Only with</h2>
<dl><dt>Bases</dt><dd>${told(bases)}</dd>
<dt>Receivers</dt><dd>${told(rovers)}</dd>
<dt>Rod</dt><dd>${told(supports)}${tilt === null ? null : html`, tilted at most ${page.number(tilt, 'to', 'plain')} degrees`}</dd>
<dt>Found</dt><dd>${period === null ? 'no day' : html`${date(period.from)} to ${date(period.to)}`}</dd></dl></section>`;
}

/** A year after the last day: seasons and the sun's activity have then changed. */
export function validUntil({ results: { period } }: Page): Html {
  const day = period === null ? null : reviewBy(period.to);
  return day === null ? html`Not valid: no occupation could be used.` : html`Valid until ${date(day)}.`;
}
