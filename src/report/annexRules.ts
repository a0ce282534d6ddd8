import type { BackTestResult, HourRule, SeasonRule } from '../study/index.js';
import { forwardWords } from './annexForward.js';
import { failureTable } from './failureTable.js';
import { type Html, html } from './html.js';
import { movesTables } from './movesSection.js';
import type { Page } from './page.js';
import { ruleTableReasons } from './ruleTableSection.js';
import { table } from './table.js';

/** How the limits move, by hour and month, how they held on unseen days, and which occupations missed them. */
export function annexRules(page: Page): Html {
  const { rules, backTest, rulesByHour, rulesBySeason } = page.results;
  if (rules.length === 0 && backTest.length === 0) return html``;
  return html`<section id="rules"><h2>Rules and back-test</h2>
${movesTables(page)}
${rulesByHour.length === 0 ? null : partTable(page, 'Rules of single hours, solar time', 'Hours', rulesByHour, ({ hours }) => hours)}
${rulesBySeason.length === 0 ? null : partTable(page, 'Rules of single months', 'Month', rulesBySeason, ({ month }) => month)}
${ruleTableReasons(page)}
${backTest.map((test) => html`${backTestTables(page, test)}${forwardWords(page, test)}`)}
</section>
`;
}

function partTable<Part extends HourRule | SeasonRule>(
  page: Page,
  caption: string,
  head: string,
  rows: readonly Part[],
  group: (row: Part) => string,
): Html {
  return table<Part>(caption, rows, [
    { head, cell: (row) => page.text(group(row)), text: true },
    { head: 'Positions', cell: ({ component }) => component, text: true },
    { head: `Within, ${page.units.error.name}`, cell: (row) => page.number(row, 'limitMm', 'limit') },
    { head: 'Share', cell: (row) => page.number(row, 'share', 'share') },
    {
      head: `Up to, ${page.units.distance.name}`,
      cell: (row) => page.number(row, 'maximumBaselineKm', 'distance, rounded down'),
    },
    {
      head: 'Why it ends there',
      cell: ({ reason }) => (reason === null ? 'the limit is met' : page.text(reason)),
      text: true,
    },
  ]);
}

function backTestTables(page: Page, test: BackTestResult): Html {
  const { component, lengthClasses, specSheet, groups, rules } = test;
  const { distance } = page.units;
  const classRows = [
    ...lengthClasses.map((one) => ['own model', one] as const),
    ...(specSheet?.lengthClasses ?? []).map((one) => ['spec sheet', one] as const),
  ];
  return html`${table(`Share inside the limit on unseen days by distance, ${component}`, classRows, [
    { head: 'Limit of', cell: ([whose]) => whose, text: true },
    {
      head: `Distance, ${distance.name}`,
      cell: ([, one]) =>
        one.toKm === null
          ? html`over ${page.number(one, 'fromKm', 'edge of a class')}`
          : html`${page.number(one, 'fromKm', 'edge of a class')} to ${page.number(one, 'toKm', 'edge of a class')}`,
      text: true,
    },
    { head: 'Occupations', cell: ([, one]) => page.number(one, 'occupations', 'count') },
    { head: 'Share inside', cell: ([, one]) => page.number(one, 'observedShare', 'share') },
    { head: 'From', cell: ([, one]) => page.number(one, 'low', 'share') },
    { head: 'To', cell: ([, one]) => page.number(one, 'high', 'share') },
  ])}
${
  groups.length === 0
    ? null
    : table(`Each crew, receiver and base judged by the others, ${component}`, groups, [
        {
          head: 'Left out',
          cell: (one) => (one.by === 'crew' ? page.crew(one.group) : html`${one.by} ${page.name(one.group)}`),
          text: true,
        },
        {
          head: 'Share inside',
          cell: (one) => (one.score === null ? '—' : page.number(one.score, 'observedShare', 'share')),
        },
        {
          head: 'Occupations',
          cell: (one) => (one.score === null ? '—' : page.number(one.score, 'occupations', 'count')),
        },
      ])
}
${failureTable(page, `Occupations within a ${component} rule that missed its limit`, rules) ?? html`<p>No occupation within a ${component} rule missed its limit.</p>`}
`;
}
