import type { Rule, SeenRange } from '../rule/index.js';
import type { NumberKind } from './format.js';
import { date, type Html, html } from './html.js';
import type { Page } from './page.js';

/** What the rules rest on; said once where both components rest on the same. */
export function conditionsOfRules(page: Page): Html[] {
  const { rules } = page.results;
  const first = rules.filter(
    (rule, k) => rules.findIndex(({ component }) => component === rule.component) === k,
  );
  const alike = first.every(
    ({ conditions: c }) => JSON.stringify(c) === JSON.stringify(first[0]!.conditions),
  );
  return alike
    ? [conditions(page, first[0]!, 'These rules', false)]
    : first.map((rule) => conditions(page, rule, `The ${rule.component} rules`, true));
}

function conditions(page: Page, { component, conditions: c }: Rule, what: string, alone: boolean): Html {
  if (c.occupations === 0) return html`<p>${what} rest on no occupation.</p>`;
  const remarks = remarksOf(page, (rule) => !alone || rule.component === component);
  return html`<p>${what} rest on ${page.counted(c, 'occupations', 'occupation')} of ${page.lengthOf(c.marks, 'mark')} on
${page.counted(c, 'days', 'day')} from ${date(c.from)} to ${date(c.to)}, measured from ${c.bases.length === 1 ? 'base' : 'bases'} ${list(page, c.bases)}.
They hold under the conditions of these days:</p>
<ul>${[...statements(page, c), ...remarks].map((statement) => html`<li>${statement}</li>\n`)}</ul>`;
}

/** What the days say by their order alone stands in the table of rules. */
const ownRemarks = ({ remarks, dayBound }: Rule): string[] =>
  remarks.filter((remark) => remark !== dayBound?.sentence);

/** What must be known beside the numbers, each sentence once, and of which rules it is said where it is not of all. */
function remarksOf(page: Page, of: (rule: Rule) => boolean): Html[] {
  const rules = page.results.rules.filter(of);
  const components = new Set(rules.map(({ component }) => component));
  return [...new Set(rules.flatMap(ownRemarks))].map((remark) => {
    const said = new Set(
      rules.filter((rule) => ownRemarks(rule).includes(remark)).map(({ component }) => component),
    );
    const whole = page.text(remark);
    if (said.size === components.size) return html`${whole}`;
    return html`${said.has('horizontal') ? 'In plan' : 'In height'}: ${whole}`;
  });
}

/** Conditions that are known, one a line. */
export function statements(page: Page, c: Rule['conditions']): Html[] {
  const { height } = page.units;
  return [
    ...(c.solarHours === null
      ? []
      : [html`shots from ${range(page, c.solarHours, 'hour')} solar time${onClock(page, c.solarHours)}`]),
    ...(c.epochs === null
      ? []
      : [html`${range(page, c.epochs, 'plain')} positions averaged to an occupation`]),
    ...(c.supports.length === 0 ? [] : [html`support of the rod: ${list(page, c.supports)}`]),
    ...(c.tiltDeg === null ? [] : [html`tilt of the rod ${range(page, c.tiltDeg, 'plain')} degrees`]),
    ...(c.skies.length === 0 ? [] : [html`sky at the marks: ${list(page, c.skies)}`]),
    ...(c.f107 === null
      ? []
      : [html`solar radio flux F10.7 ${range(page, c.f107, 'plain')} solar flux units`]),
    ...(c.heightDifferenceM === null
      ? []
      : [
          html`sites ${page.number(c, 'heightDifferenceM', 'height')} ${height.name} above or below the base`,
        ]),
    ...(c.reviewBy === null ? [] : [html`to be looked at again by ${date(c.reviewBy)}`]),
  ];
}

/** The same hours by the clock of the zone, where it is known. */
function onClock(page: Page, { from, to }: SeenRange): Html | null {
  const { shotHours } = page.results;
  if (shotHours === null || shotHours.clock === null) return null;
  if (shotHours.fromHour !== from || shotHours.toHour !== to) return null;
  const { clock } = shotHours;
  return html`, ${page.number(clock, 'fromHour', 'hour')} to ${page.number(clock, 'toHour', 'hour')} on the clock of ${date(clock.day)}`;
}

const range = (page: Page, seen: SeenRange, kind: NumberKind): Html =>
  seen.from === seen.to
    ? page.number(seen, 'from', kind)
    : html`${page.number(seen, 'from', kind)} to ${page.number(seen, 'to', kind)}`;

export const list = (page: Page, names: readonly string[]): Html =>
  html`${names.map((name, k) => html`${k === 0 ? '' : ', '}${page.name(name)}`)}`;
