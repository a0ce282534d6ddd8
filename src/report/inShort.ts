import type { Rule } from '../rule/index.js';
import type { Results } from '../study/index.js';
import { daysJudged, proviso } from './daysSection.js';
import { date, type Html, html } from './html.js';
import type { Page } from './page.js';
import { byDays, whyNoRule } from './words.js';

/** The five answers that a manager asks for, each with the section that holds the rest. */
export function inShort(page: Page): Html {
  const { fits } = page.results;
  if (fits.length === 0) return html``;
  const { rules, backTest } = page.results;
  const lines: [string, string | null, Html][] = [
    ['How far', 'rule', howFar(page)],
    ['How sure', rules.length + backTest.length === 0 ? null : 'proof', howSure(page)],
    ['When not', 'days', whenNot(page)],
    ['Against the spec sheet', 'fit', againstSheet(page)],
    ['Set aside', 'account', setAside(page)],
  ];
  return html`<section id="short"><h2>In short</h2>
<dl>${lines.map(([head, id, words]) => html`<dt>${id === null ? head : html`<a href="#${id}">${head}</a>`}</dt><dd>${words}</dd>\n`)}</dl>
</section>
`;
}

/** More rules than these are no summary. */
const MOST_RULES = 4;

const place = (component: Rule['component']): string =>
  component === 'horizontal' ? 'in plan' : 'in height';

function howFar(page: Page): Html {
  const { rules } = page.results;
  if (rules.length === 0) return html`No rule: ${whyNoRule(page.results)}.`;
  const { error, distance } = page.units;
  const told = rules.slice(0, MOST_RULES).map((rule, k) => {
    const { maximumBaselineKm: km, component } = rule;
    const limit = html`${page.number(rule, 'limitMm', 'limit')}\u00a0${error.name} ${place(component)}`;
    const far =
      km === null
        ? html`no rule for ${limit}`
        : km === 0
          ? html`${limit} at no distance`
          : html`<strong>${page.number(rule, 'maximumBaselineKm', 'distance, rounded down')}\u00a0${distance.name}</strong> for ${limit}`;
    return html`${k === 0 ? '' : '; '}${far}`;
  });
  return html`${told}${rules.length > MOST_RULES ? '; further limits below' : ''}.`;
}

function howSure(page: Page): Html {
  const { rules, backTest } = page.results;
  const first = rules.find(({ maximumBaselineKm }) => maximumBaselineKm);
  const holds =
    first === undefined
      ? html``
      : html`${page.number(first, 'share', 'share')} of positions hold the limit on ${byDays(first) ? html`at least ${page.number(first, 'dayShare', 'share')} of days` : 'all days together'}, with ${page.number(first, 'confidence', 'share')} confidence. `;
  const tried = backTest.map(
    (test, k) =>
      html`${k === 0 ? '' : ' and '}${page.number(test, 'observedShare', 'share')} ${place(test.component)}`,
  );
  return backTest.length === 0
    ? html`${holds}Not tried on days that were not seen.`
    : html`${holds}Tried on days not seen: ${tried} lay inside limits made for ${page.number(backTest[0]!, 'share', 'share')}.`;
}

function whenNot(page: Page): Html {
  const { degradedDays, hoursOfCaution } = page.results;
  const days = [...new Set(degradedDays.map(({ day }) => day))].sort();
  const dayWords = !daysJudged(page.results)
    ? html`Single days could not be judged.`
    : days.length === 0
      ? html`No day stands out.${proviso(page)}`
      : html`Errors were clearly larger than usual on ${days.map((day, k) => html`${k === 0 ? '' : k === days.length - 1 ? ' and ' : ', '}${date(day)}`)}.`;
  const hours = hoursOfCaution.map(
    (one) =>
      html` Take care ${place(one.component)} from ${page.number(one, 'fromHour', 'hour')} to ${page.number(one, 'toHour', 'hour')} solar time${one.clock === null ? '' : html`, ${page.number(one.clock, 'fromHour', 'hour')} to ${page.number(one.clock, 'toHour', 'hour')} on the clock of ${date(one.clock.day)}`}.`,
  );
  return html`${dayWords}${hours}`;
}

const VERDICTS: Readonly<Record<Results['specSheetTest'][number]['verdict'], string>> = {
  better: 'better than it states',
  worse: 'worse than it states',
  'not worse by more than 10 %': 'not worse than it states by more than 10 %',
  'not shown to differ': 'not shown to differ from it',
  'cannot be judged': 'cannot be judged',
};

function againstSheet(page: Page): Html {
  const { specSheet, specSheetTest } = page.results;
  if (specSheet === null) return html`The study file gives none.`;
  if (specSheetTest.length === 0) return html`Could not be compared.`;
  return html`${specSheetTest.map(({ component, verdict }, k) => html`${k === 0 ? place(component).replace('in', 'In') : `; ${place(component)}`} your errors ${verdict === 'cannot be judged' ? '' : 'are '}${VERDICTS[verdict]}`)}.`;
}

function setAside(page: Page): Html {
  const { rows, occupations, visits } = page.results;
  return html`${page.sum(rows.setAside)} of ${page.counted(rows, 'read', 'row')}, and ${page.sum(occupations.setAside)} of ${page.counted(occupations, 'formed', 'occupation')}; each with its reason. ${page.counted(visits, 'withoutFix', 'visit')} never got a fix.`;
}
