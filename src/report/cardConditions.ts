import { reviewBy } from '../rule/index.js';
import { HOURS_LEVEL, worstHours } from './daysSection.js';
import { date, type Html, html } from './html.js';
import type { Page } from './page.js';
import { list } from './ruleConditions.js';

/** Hours at which errors are larger. */
export function cautionHours(page: Page): Html {
  const judged = page.results.timeOfDay.filter(({ pValue }) => pValue !== null);
  const differing = judged.filter(({ pValue }) => pValue! < HOURS_LEVEL);
  const words =
    judged.length === 0
      ? html`Whether some hours are worse could not be judged.`
      : differing.length === 0
        ? html`No hours are shown to be worse than others.`
        : html`${differing.map((one) => {
            const worst = worstHours(one.hours);
            return html`${one.component === 'horizontal' ? 'Plan' : 'Height'}: take care from ${page.number(worst, 'from', 'hour')} to ${page.number(worst, 'to', 'hour')} solar time (sun highest at 12:00). `;
          })}`;
  return html`<section id="hours"><h2>Hours of caution</h2><p>${words}</p></section>`;
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
