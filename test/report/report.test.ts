import { beforeAll, describe, expect, it } from 'vitest';
import type { Message } from '../../src/logs/index.js';
import { csvText } from '../../src/report/csv.js';
import { kmDown, mm, percent, withLimits } from '../../src/report/format.js';
import { html } from '../../src/report/html.js';
import {
  type ReportPictures,
  reportHtml,
  reportTables,
  ruleSentence,
  summaryText,
} from '../../src/report/index.js';
import { shownFits } from '../../src/report/words.js';
import { noRule, type Rule } from '../../src/rule/index.js';
import { type Results, readStudy, runStudy, type StudyRun } from '../../src/study/index.js';
import { REPOSITORY } from '../cli/ppmwise.js';

const NO_PICTURES: ReportPictures = {
  proof: null,
  moves: null,
  horizontal: null,
  vertical: null,
  maps: [],
  markMeans: null,
};
let run: StudyRun;
let page: string;

beforeAll(async () => {
  run = await runStudy(await readStudy(`${REPOSITORY}/datasets-demo/study.yaml`));
  page = reportHtml(run.results, {
    ...NO_PICTURES,
    horizontal: { svg: '<svg xmlns="http://www.w3.org/2000/svg"></svg>', description: 'errors & "distance"' },
  });
});

describe('the report', () => {
  it('puts the rule first, then why to believe it, then the data, then the cautions', () => {
    const order = [
      'id="rule"',
      'id="fit"',
      'id="marks"',
      'id="account"',
      'id="messages"',
      'id="method"',
      'id="glossary"',
      'id="cautions"',
    ];
    const places = order.map((id) => page.indexOf(id));
    expect(places).toEqual([...places].sort((a, b) => a - b));
    expect(places[0]).toBeGreaterThan(0);
  });
  it('is one self-contained page that loads nothing', () => {
    expect(page).not.toMatch(/<script|<link|src="http|url\(|@import/);
    expect(page).toContain('src="data:image/svg+xml;base64,');
    expect(page).toContain('alt="errors &amp; &quot;distance&quot;"');
  });
  it('shows every fit, rule and mark as the results have them', () => {
    for (const fit of shownFits(run.results)) {
      expect(page).toContain(withLimits(fit.constantMm, mm));
      expect(page).toContain(
        `${fit.ppm.estimate!.toFixed(2)} (${fit.ppm.low!.toFixed(2)} to ${fit.ppm.high!.toFixed(2)})`,
      );
    }
    for (const rule of run.results.rules)
      expect(page).toContain(`Up to ${kmDown(rule.maximumBaselineKm!)}\u00a0km from the base`);
    for (const { mark } of run.results.marks) expect(page).toContain(`<td>${mark}</td>`);
    expect(page).toContain('licensed surveyor');
  });
  it('escapes whatever stands in logs and study file', () => {
    const evil = '<script>alert(1)</script>';
    const results: Results = {
      ...run.results,
      study: { ...run.results.study, title: evil },
      messages: [{ code: 'x', severity: 'warning', text: evil, file: evil, row: 1, column: evil }],
      marks: [{ ...run.results.marks[0]!, mark: evil, base: evil }],
      files: [{ ...run.results.files[0]!, file: evil }],
      bases: [evil],
    };
    expect(reportHtml(results, NO_PICTURES)).not.toContain('<script>');
  });
  it('reads well when nothing could be fitted', () => {
    const nothing: Results = {
      ...run.results,
      fits: [],
      rules: [],
      lengthClasses: [],
      marks: [],
      period: null,
      bases: [],
    };
    const text = reportHtml(nothing, NO_PICTURES);
    expect(text).toContain('There is no rule: no fit was possible');
    expect(text).not.toMatch(/undefined|NaN|null/);
    expect(summaryText(nothing)).toContain('No fit.');
  });
  it('says nothing undefined', () => {
    expect(page).not.toMatch(/undefined|NaN|\[object/);
    expect(summaryText(run.results)).not.toMatch(/undefined|NaN|\[object/);
  });
});

describe('messages', () => {
  const told = (file: string | null, code: string, text: string): Message => ({
    code,
    severity: 'warning',
    text,
    file,
    row: 2,
    column: null,
  });
  it('tell the same of many files once, and first what spoils every number', () => {
    const messages = [
      told('a.csv', 'unreadable', '8 rows are set aside.'),
      told('b.csv', 'unreadable', '9 rows are set aside.'),
      told(null, 'mark-far-off', 'Mark "A" is measured 1 m off.'),
    ];
    const text = summaryText({ ...run.results, messages });
    expect(text.indexOf('First: Mark "A"')).toBeLessThan(text.indexOf('Up to'));
    expect(text).toContain('8 rows are set aside. (the same in 1 other file)');
    expect(text).not.toContain('9 rows');
    const page = reportHtml({ ...run.results, messages }, NO_PICTURES);
    expect(page.indexOf('<p class="first">Mark')).toBeLessThan(page.indexOf('<ul class="rules">'));
  });
});

describe('a rule in words', () => {
  const tolerance = {
    component: 'horizontal',
    limitMm: 25,
    share: 0.95,
    dayShare: 0.9,
    confidence: 0.95,
  } as const;
  const rule = (more: Partial<Rule>): Rule => ({
    ...tolerance,
    method: 'pooled',
    maximumBaselineKm: 7.96,
    bestEstimateKm: 9,
    allDaysKm: 7.96,
    longestSupportedKm: 30,
    wrongFixShare: null,
    dayBound: null,
    reason: null,
    remarks: [],
    conditions: noRule([], tolerance, 'no errors').conditions,
    ...more,
  });
  it('rounds the distance down', () => {
    expect(ruleSentence(rule({}))).toBe(
      'Up to 7.9\u00a0km from the base: 95\u00a0% of horizontal positions within 25\u00a0mm, with 95\u00a0% confidence over all days together.',
    );
    expect(kmDown(0.3 * 3)).toBe('0.9');
    expect(kmDown(12)).toBe('12.0');
  });
  it('says on how many days it holds where that was judged', () => {
    expect(ruleSentence(rule({ method: 'day-model' }))).toBe(
      'Up to 7.9\u00a0km from the base: 95\u00a0% of horizontal positions within 25\u00a0mm, with 95\u00a0% confidence on at least 90\u00a0% of days.',
    );
  });
  it('gives the reason when there is none', () => {
    expect(ruleSentence(rule({ maximumBaselineKm: null, reason: '9 days are too few' }))).toBe(
      'No rule for 95\u00a0% of horizontal positions within 25\u00a0mm: 9 days are too few.',
    );
    expect(ruleSentence(rule({ maximumBaselineKm: 0, reason: 'the constant alone exceeds it' }))).toBe(
      'At no distance from the base: 95\u00a0% of horizontal positions within 25\u00a0mm cannot be promised: the constant alone exceeds it.',
    );
  });
});

describe('numbers and tables', () => {
  it('writes numbers for readers', () => {
    expect([mm(-0.04), mm(-1.26), mm(null), percent(0.95), percent(0.995)]).toEqual([
      '0.0',
      '−1.3',
      '—',
      '95\u00a0%',
      '99.5\u00a0%',
    ]);
    expect(withLimits({ estimate: null, low: 0, high: 3 }, mm)).toBe('below 3.0');
    expect(withLimits({ estimate: 1, low: null, high: null }, mm)).toBe('1.0');
    expect(withLimits({ estimate: null, low: null, high: null }, mm)).toBe('—');
  });
  it('writes CSV that can be read back', () => {
    expect(
      csvText(
        ['a', 'b'],
        [
          ['x,"y"', 1],
          ['line\nbreak', Number.NaN],
          [null, true],
        ],
      ),
    ).toBe('a,b\n"x,""y""",1\n"line\nbreak",\n,true\n');
  });
  it('has one line an occupation, traceable to file and row', () => {
    const tables = reportTables(run);
    const errors = tables.find(({ name }) => name === 'errors')!;
    expect(errors.rows).toHaveLength(run.results.occupations.used);
    for (const { header, rows } of tables) for (const row of rows) expect(row).toHaveLength(header.length);
    const at = (name: string): unknown => errors.rows[0]![errors.header.indexOf(name)];
    expect([at('file'), at('row')]).toEqual([run.errors[0]!.file, run.errors[0]!.row]);
  });
  it('escapes in the template', () => {
    expect(html`<b>${'<i>'}</b>${['&', html`<br>`]}${null}${0}`.text).toBe('<b>&lt;i&gt;</b>&amp;<br>0');
  });
});
