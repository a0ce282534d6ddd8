import { existsSync, readFileSync, statSync } from 'node:fs';
import { join } from 'node:path';
import { fromArrow } from 'arquero';
import { beforeAll, describe, expect, it } from 'vitest';
import { dayCharts, type NamedChart } from '../../src/cli/annexPictures.js';
import { writeOutputs } from '../../src/cli/outputs.js';
import { drawPictures } from '../../src/cli/pictures.js';
import type { Message } from '../../src/logs/index.js';
import { csvText } from '../../src/report/csv.js';
import { formatNumber, kmDown, mm, percent } from '../../src/report/format.js';
import { html } from '../../src/report/html.js';
import {
  annexHtml,
  arrowBytes,
  cardHtml,
  markdownOf,
  monthHtml,
  Page,
  type ReportPicture,
  type ReportPictures,
  reportHtml,
  reportTables,
  ruleSentence,
  summaryText,
  watchText,
  weightsHtml,
} from '../../src/report/index.js';
import { noRule, type Rule } from '../../src/rule/index.js';
import {
  REPORT_UNITS,
  type Results,
  readerUnits,
  readStudy,
  runStudy,
  type StudyRun,
  type WatchRun,
} from '../../src/study/index.js';
import { REPOSITORY } from '../cli/ppmwise.js';
import { testFolder } from '../files.js';
import { printed, shownBlock } from './exports.js';
import { atPointer, otherWords, pageNumbers, readNumber } from './numbers.js';
import { NO_PICTURES } from './pictures.js';

let run: StudyRun;
let page: string;

const withResults = (more: Partial<Results>): StudyRun => ({ ...run, results: { ...run.results, ...more } });

const namesCrew = (words: string, crew: string): boolean => new RegExp(`\\b${crew}\\b`).test(words);

/** All pages of a run, by name. */
const pagesOf = (of: StudyRun, pictures = NO_PICTURES): Record<string, string> => ({
  report: reportHtml(of.results, pictures),
  annex: annexHtml(of, pictures),
  card: cardHtml(of.results),
  weights: weightsHtml(of.results),
});

beforeAll(async () => {
  run = await runStudy(await readStudy(`${REPOSITORY}/datasets-demo/study.yaml`));
  page = reportHtml(run.results, {
    ...NO_PICTURES,
    proof: { svg: '<svg xmlns="http://www.w3.org/2000/svg"></svg>', description: 'errors & "distance"' },
  });
}, 300_000);

describe('the report', () => {
  it('puts the rule first, then why to believe it, then the data, then the cautions', () => {
    const order = [
      'rule',
      'proof',
      'moves',
      'fit',
      'days',
      'account',
      'messages',
      'method',
      'glossary',
      'cautions',
      'signature',
    ];
    const places = order.map((id) => page.indexOf(`id="${id}"`));
    expect(places).toEqual([...places].sort((a, b) => a - b));
    expect(places[0]).toBeGreaterThan(0);
  });
  it('is one self-contained page that loads nothing', () => {
    for (const each of [page, ...Object.values(pagesOf(run))]) {
      expect(each).not.toMatch(/<script|<link|src="http|url\(|@import/);
    }
    expect(page).toContain('src="data:image/svg+xml;base64,');
    expect(page).toContain('alt="errors &amp; &quot;distance&quot;"');
  });
  it('names who answers for it, or leaves a line to be filled in', () => {
    expect(page).toContain('<dt>Responsible surveyor</dt><dd><span class="blank">');
    const study = { ...run.results.study, surveyor: 'Ada <Bly>', reportDate: '2025-06-12' };
    const signed = reportHtml({ ...run.results, study }, NO_PICTURES);
    expect(signed).toContain('<dt>Responsible surveyor</dt><dd><bdi>Ada &lt;Bly&gt;</bdi></dd>');
    expect(signed).toContain('Date of this report: <span class="date">2025-06-12</span>');
    expect(signed).not.toContain('<dd><span class="blank"></span></dd>\n<dt>Date');
  });
  it('names no crew unless the study shows them', () => {
    const { crews, study } = run.results;
    expect(crews.length).toBeGreaterThan(1);
    const named = withResults({ study: { ...study, showCrews: true } });
    for (const [name, each] of Object.entries(pagesOf(run))) {
      for (const crew of crews) expect(namesCrew(otherWords(each), crew), `${name} ${crew}`).toBe(false);
    }
    expect(pagesOf(named).annex).toContain(`without crew ${crews[0]}`);
    expect(pagesOf(run).annex).toContain('without crew 1');
  });
  it('keeps settings as they were stated, though a crew has the same name', () => {
    const stated = [{ key: 'logs[0].layout.columns.latitude', value: run.results.crews[1]! }];
    const { annex } = pagesOf(withResults({ settings: { ...run.results.settings, stated } }));
    expect(annex).toContain(`<bdi>${run.results.crews[1]}</bdi>`);
  });
  it('says of which rules a remark is where it is not of all', () => {
    const remark = 'Days left out do not tell root-sum-square and linear sum apart.';
    const [conditions] = run.results.rules.map((rule) => rule.conditions);
    const rules = run.results.rules.map((rule) => ({
      ...rule,
      conditions: conditions!,
      remarks: [] as string[],
    }));
    const some = rules.map((rule) => (rule.component === 'vertical' ? { ...rule, remarks: [remark] } : rule));
    expect(reportHtml({ ...run.results, rules: some }, NO_PICTURES)).toContain(
      `<li>In height: ${remark}</li>`,
    );
    const all = rules.map((rule) => ({ ...rule, remarks: [remark] }));
    expect(reportHtml({ ...run.results, rules: all }, NO_PICTURES)).toContain(`<li>${remark}</li>`);
  });
});

describe('the words of the report', () => {
  const paragraphs = (more: Partial<Results>): string =>
    otherWords(reportHtml({ ...run.results, ...more }, NO_PICTURES)).replace(/\s+/g, ' ');
  it('say "or more" of a length that is the last of which the data tell, and only then', () => {
    const rules = (bestEstimateKm: number): Rule[] =>
      run.results.rules.map((rule) => ({
        ...rule,
        bestEstimateKm,
        allDaysKm: 1,
        dayBound: null,
        longestSupportedKm: 8.34,
      }));
    expect(paragraphs({ rules: rules(8.34) })).toContain('“Or more”: so far the data reach');
    expect(reportHtml({ ...run.results, rules: rules(8.34) }, NO_PICTURES)).toMatch(/>8\.3<\/data> or more</);
    expect(reportHtml({ ...run.results, rules: rules(8) }, NO_PICTURES)).not.toMatch(/> or more<|“Or more”/);
    const ruleTable = run.results.ruleTable.map((row) => ({ ...row, maximumBaselineKm: 8.34 }));
    expect(paragraphs({ rules: rules(8), ruleTable })).toContain('is as far as the data reach');
  });
  it('say what may have been missed where no day stands out', () => {
    const none = paragraphs({ degradedDays: [] });
    expect(none.match(/So many days leave room for/g)).toHaveLength(2);
    const days = run.results.rules[0]!.conditions.days;
    expect(none).toContain(`leave room for ${percent(3 / days).replace('\u00a0', ' ')} of worse ones`);
    const evidence = run.results.evidence.map((one) => ({
      ...one,
      daysWithFarShots: { farKm: 8, daysWithFar: 20, daysWithoutFar: 6, near: null },
    }));
    expect(paragraphs({ degradedDays: [], evidence })).toContain('and can hardly stand out.');
  });
  it('give the hours of the shots by the clock too', () => {
    expect(run.results.study.timeZone).toBe('Etc/GMT+1');
    expect(paragraphs({})).toMatch(/shots from to solar time, to on the clock of 2025-05-02/);
    expect(paragraphs({ shotHours: { ...run.results.shotHours!, clock: null } })).not.toMatch(
      /shots from to solar time,/,
    );
  });
  it('are explained where they are used, and only these', () => {
    const told = /<section id="glossary">([\s\S]*?)<\/section>/;
    const words = [...told.exec(page)![1]!.matchAll(/<dt>([^<]*)<\/dt>/g)].map(([, word]) => word!);
    const rest = otherWords(page.replace(told, ''));
    expect(words).toContain('ppm');
    for (const word of words) expect(rest.toLowerCase()).toContain(word.toLowerCase());
    expect(words).not.toContain('combined factor');
  });
  it('stand beside the errors by distance, in plan and in height', () => {
    const of = (description: string): ReportPicture => ({ svg: '<svg/>', description });
    const pictures = {
      ...NO_PICTURES,
      horizontal: of('plan by distance'),
      vertical: of('height by distance'),
    };
    const fit = reportHtml(run.results, pictures).split('<section id="fit">')[1]!.split('</section>')[0]!;
    expect(fit).toContain('alt="plan by distance"');
    expect(fit).toContain('alt="height by distance"');
  });
});

describe('tables of lengths', () => {
  const farthest = (): number => Math.max(...run.results.rules.map((rule) => rule.maximumBaselineKm ?? 0));
  const lengthsOf = (each: string, part: string): number[] =>
    pageNumbers(each).flatMap(({ attributes }) => {
      const at = attributes.get('data-at') ?? '';
      return at.startsWith(`/${part}/`) && at.endsWith('/baselineKm')
        ? [Number(attributes.get('value'))]
        : [];
    });
  it('of the card end where its farthest rule does', () => {
    for (const part of ['checkShotLimits', 'secondVisits']) {
      const lengths = lengthsOf(cardHtml(run.results), part);
      expect(Math.max(...lengths), part).toBeCloseTo(farthest(), 9);
    }
    const nearer = run.results.rules.map((rule) => ({ ...rule, maximumBaselineKm: 2 }));
    const near = lengthsOf(cardHtml({ ...run.results, rules: nearer }), 'checkShotLimits');
    expect(Math.max(...near)).toBe(2);
  });
  it('of promises end where the data do', () => {
    for (const { component, longestSupportedKm } of run.results.rules) {
      const own = run.results.promises.filter((one) => one.component === component);
      expect(Math.max(...own.map(({ baselineKm }) => baselineKm))).toBe(longestSupportedKm);
    }
  });
});

describe('numbers on pages', () => {
  const units = REPORT_UNITS.map((kind) => [kind] as const);
  /** How many of the shown units one of ours is, by kind of number. */
  const perOurs = (kind: string, of: ReturnType<typeof readerUnits>): number => {
    if (/error|limit/.test(kind)) return of.error.perOurs;
    if (/distance|class/.test(kind)) return of.distance.perOurs;
    if (kind === 'height') return of.height.perOurs;
    return kind.endsWith('share') ? 100 : 1;
  };

  it.each(units)('are those of results.json, in %s', (reportUnits) => {
    const study = { ...run.results.study, reportUnits };
    const other = withResults({ study });
    const json = JSON.parse(JSON.stringify(other.results)) as Results;
    const tables = new Map(reportTables(other).map((table) => [table.name, table]));
    const reader = readerUnits(reportUnits);
    for (const [name, each] of Object.entries(pagesOf(other))) {
      const numbers = pageNumbers(each);
      expect(numbers.length, name).toBeGreaterThan(10);
      for (const { attributes, text } of numbers) {
        const value = Number(attributes.get('value'));
        const where = `${name}: ${[...attributes].join(' ')} ${text}`;
        const source = attributes.get('data-at');
        if (source !== undefined) expect(value, where).toBe(atPointer(json, source));
        else if (attributes.has('data-sum')) {
          const parts = Object.values(atPointer(json, attributes.get('data-sum')!) as Record<string, number>);
          expect(value, where).toBe(parts.reduce((a, b) => a + b, 0));
        } else if (attributes.has('data-length')) {
          expect(value, where).toBe((atPointer(json, attributes.get('data-length')!) as unknown[]).length);
        } else if (attributes.has('data-table')) {
          const [table, row, column] = attributes.get('data-table')!.split('/') as [string, string, string];
          const { header, rows } = tables.get(table)!;
          expect(value, where).toBe(rows[Number(row)]![header.indexOf(column)]);
        } else if (attributes.has('data-rows')) {
          expect(value, where).toBe(tables.get(attributes.get('data-rows')!)!.rows.length);
        } else expect(attributes.has('data-cut'), where).toBe(true);
        // What a reader reads is the value in his units, to half a unit of the last digit, or rounded down.
        const kind = attributes.get('data-kind');
        if (kind === undefined || text.startsWith('below')) continue;
        const shown = readNumber(text);
        const expected = value * perOurs(kind, reader);
        const decimals = /\.(\d+)/.exec(text)?.[1]?.length ?? 0;
        const step = kind === 'hour' ? 1 / 60 : 10 ** -decimals;
        if (kind.includes('down')) {
          expect(shown, where).toBeLessThanOrEqual(expected + 1e-9);
          expect(shown, where).toBeGreaterThan(expected - step - 1e-9);
        } else if (kind.endsWith('rounded up')) {
          expect(shown, where).toBeGreaterThanOrEqual(expected - 1e-9);
          expect(shown, where).toBeLessThan(expected + step + 1e-9);
        } else expect(Math.abs(shown - expected), where).toBeLessThanOrEqual(step / 2 + 1e-9);
      }
    }
  });

  it('are all marked, but for those inside sentences of the results and fixed words', () => {
    const words = (text: string): string[] =>
      text
        .split(/[\s(),;:"\u201c\u201d\u2019?]+/)
        .map((word) => word.replace(/[.\u00a0%]+$/, ''))
        .filter((word) => /\d/.test(word));
    // Words of the pages themselves stand on the pages of any study.
    const fixed = Object.values(pagesOf(withResults(emptied()))).map(otherWords);
    const tables = reportTables(run).flatMap(({ rows }) => rows.flat());
    const known = new Set([...texts(run.results), ...tables.map(String), ...fixed].flatMap(words));
    for (const [name, each] of Object.entries(pagesOf(run))) {
      for (const word of words(otherWords(each))) {
        expect(known.has(word) || STATED.has(word), `${name}: ${word}`).toBe(true);
      }
    }
  });

  /** Levels that captions repeat from the results in per cent, and heads of columns. */
  const STATED = new Set(['95', '99', 'SHA-256']);

  it('stand in the Markdown of each page too, in the same order', () => {
    for (const [name, each] of Object.entries(pagesOf(run))) {
      let from = 0;
      const text = markdownOf(each);
      for (const number of pageNumbers(each)) {
        const at = text.indexOf(number.text, from);
        expect(at, `${name}: ${number.text}`).toBeGreaterThanOrEqual(from);
        from = at + number.text.length;
      }
      expect(text).not.toMatch(/<[a-z/]|undefined|NaN|\[object/);
    }
  });

  it('leave no part of the results without a place in the annex or the report', () => {
    const { annex, report, card, weights } = pagesOf(run);
    const cited = new Set(
      [annex, report, card, weights].flatMap((each) =>
        pageNumbers(each!).flatMap(({ attributes }) =>
          ['data-at', 'data-sum', 'data-length'].map((name) => attributes.get(name)?.split('/')[1]),
        ),
      ),
    );
    const withNumbers = Object.entries(run.results).filter(
      ([, part]) => typeof part === 'object' && /\d/.test(JSON.stringify(part ?? '')),
    );
    const words = ['messages', 'period', 'bases', 'rovers', 'inputs'];
    for (const [key] of withNumbers) expect(cited.has(key) || words.includes(key), key).toBe(true);
    for (const { sha256 } of [...run.results.inputs, ...run.results.files]) expect(annex).toContain(sha256);
    for (const { key } of run.results.settings.stated) expect(annex).toContain(`<code>${key}</code>`);
    expect(run.results.settings.stated).toContainEqual({ key: 'occupations.gapSeconds', value: '60' });
    expect(run.results.inputs.map(({ role }) => role)).toEqual([
      'study file',
      'marks',
      'bases',
      'job points',
      'geomagnetic indices',
    ]);
  });

  it('are the same on charts as in the tables, and no chart names a crew', async () => {
    const { files } = await drawPictures(run);
    const charts = new Map(files);
    for (const fit of run.results.fits.filter(({ basisOfRule }) => basisOfRule)) {
      const { low, high } = fit.ppm;
      // Was once the interval of the model, where the results state one that is widened for days to come.
      expect(charts.get(`${fit.component}-error`)).toContain(`${low!.toFixed(2)} to ${high!.toFixed(2)} ppm`);
    }
    for (const [name, svg] of files)
      for (const crew of run.results.crews) expect(namesCrew(svg, crew), name).toBe(false);
    const blamed = run.results.degradedDays.map((one) => ({
      ...one,
      verdict: 'one crew' as const,
      subject: run.results.crews[0]!,
    }));
    const [[, chart]] = dayCharts(withResults({ degradedDays: blamed })) as [NamedChart];
    expect(JSON.stringify(chart)).toContain('one crew 1');
    expect(JSON.stringify(chart)).not.toContain(run.results.crews[0]);
  }, 60_000);

  it('have no place on a page when they come from elsewhere', () => {
    expect(() => new Page(run.results).number({ made: 1 }, 'made', 'count')).toThrow(
      'must come from the results',
    );
  });
});

/** Every text of a value, however deep. */
function texts(value: unknown): string[] {
  if (typeof value === 'string') return [value];
  return value !== null && typeof value === 'object' ? Object.values(value).flatMap(texts) : [];
}

/** Results of a study in which nothing could be used. */
function emptied(): Partial<Results> {
  return {
    messages: [],
    files: [],
    fits: [],
    rules: [],
    ruleTable: [],
    ruleMoves: [],
    rulesByHour: [],
    rulesBySeason: [],
    backTest: [],
    specSheetTest: [],
    checkShotLimits: [],
    adjustmentWeights: [],
    comparison: [],
    lengthClasses: [],
    marks: [],
    controlMarks: [],
    markComponents: [],
    setups: [],
    wrongFixes: [],
    blunders: [],
    dayModels: [],
    dailyFactors: [],
    degradedDays: [],
    timeOfDay: [],
    period: null,
    bases: [],
    crews: [],
    rovers: [],
    jobs: [],
    standards: [],
    secondVisits: [],
    errorByOccupationLength: [],
    promises: [],
    leftOut: null,
    hoursOfCaution: [],
    shotHours: null,
    specSheet: null,
    commonCauses: { bases: [], causes: [] },
  };
}

describe('pages of poor studies', () => {
  it('read well when nothing could be fitted', () => {
    const poor = {
      ...withResults(emptied()),
      errors: [],
      setAside: [],
      visits: [],
      weights: new Float64Array(0),
    };
    const pages = pagesOf(poor);
    for (const each of Object.values(pages)) {
      expect(otherWords(each)).not.toMatch(/undefined|NaN|null|\[object/);
      expect(each).toMatch(/<h1>[^\n]*<\/h1>/);
    }
    expect(pages.report).toContain('There is no rule: no fit was possible');
    expect(pages.card).toContain('No distance can be given: no fit was possible');
    expect(pages.card).toContain('Not valid');
    expect(pages.weights).toContain('No weights can be given');
    expect(summaryText(poor.results)).toContain('No fit.');
  });

  it('say in words what null rules, no spec sheet and no tolerance leave out', () => {
    const none = run.results.rules.map(
      (rule): Rule => ({
        ...rule,
        maximumBaselineKm: null,
        bestEstimateKm: null,
        allDaysKm: null,
        reason: '9 days are too few: a rule needs 15 days',
      }),
    );
    const nulls = pagesOf(withResults({ rules: none, backTest: [] }));
    expect(nulls.report).toContain('<strong>No rule</strong>');
    expect(nulls.report).toContain('9 days are too few');
    expect(nulls.report).toContain('were not tried on days that they had not seen');
    expect(nulls.card).toContain('no rule');
    expect(nulls.card).toContain('9 days are too few');
    const bare = pagesOf(
      withResults({
        rules: [],
        ruleMoves: [],
        specSheet: null,
        specSheetTest: [],
        lengthClasses: run.results.lengthClasses.map((one) => ({ ...one, specSheetMm: null })),
      }),
    );
    expect(bare.report).toContain('the study file states no tolerance');
    expect(bare.report).toContain('gives no spec sheet');
    expect(bare.card).toContain('the study file states no tolerance');
  });

  it('say of one day that days could not be judged, and a reason of several limits once', () => {
    const rules = run.results.rules.map(
      (rule): Rule => ({
        ...rule,
        maximumBaselineKm: null,
        reason: '1 day is too few: a rule needs 15 days',
      }),
    );
    const oneDay = pagesOf(
      withResults({
        rules,
        backTest: [],
        degradedDays: [],
        hoursOfCaution: [],
        dailyFactors: run.results.dailyFactors.map((one) => ({ ...one, degraded: null })),
        timeOfDay: run.results.timeOfDay.map((one) => ({ ...one, pValue: null })),
      }),
    );
    expect(oneDay.report).toContain('Single days could not be judged.');
    expect(oneDay.report).not.toContain('No day stands out');
    expect(oneDay.card!.match(/1 day is too few/g)).toHaveLength(2);
    expect(oneDay.card).toContain('Whether some hours are worse could not be judged');
  });

  it('of a month without a new day, a model or a crew read well', () => {
    const evil = '<script>alert(1)</script>';
    const month: WatchRun['month'] = {
      after: null,
      from: null,
      to: null,
      days: 0,
      crews: [],
      visits: { withFix: 0, withoutFix: 0, shareWithoutFix: null },
      earlierShareWithoutFix: null,
      late: { occupations: 0, days: [] },
      rowsSetAside: [],
      occupationsSetAside: [],
      markShifts: [],
      nextMarks: [],
      messagesToldBefore: 0,
    };
    const empty = monthHtml({ results: run.results, watches: [], unwatched: [], month, messages: [] });
    expect(otherWords(empty)).not.toMatch(/undefined|NaN|null|\[object/);
    expect(empty).toContain('Put the new logs into the study file.');
    expect(empty).toContain('There is nothing to watch by');
    const idle = { component: 'horizontal', days: [], alarms: [], leftOut: 2, fitAgain: false } as const;
    const told = watchText({
      results: run.results,
      watches: [{ ...idle, reasons: [], sentence: '0 new days were watched.' }],
      unwatched: [],
      month: { ...month, after: '2025-05-02' },
      messages: [],
    });
    expect(told).toContain(
      'Horizontal: no new day could be judged. 2 occupations on marks that the model does not know took no part.',
    );
    expect(told).not.toContain('may stay');
    expect(told).toContain('No visit lies on a day after 2025-05-02, the last day of the earlier run.');
    const place = { day: '2025-06-01', mark: evil, crew: evil, file: evil, row: 3 };
    const spoiled = monthHtml({
      results: { ...run.results, study: { ...run.results.study, title: evil }, crews: [] },
      watches: [],
      unwatched: [{ component: 'horizontal', reason: evil }],
      month: {
        ...month,
        crews: [
          { crew: evil, days: 1, visits: 2, visitsWithoutFix: 0, occupations: 2 },
          { crew: '', days: 1, visits: 1, visitsWithoutFix: 0, occupations: 1 },
        ],
        occupationsSetAside: [{ ...place, reason: 'suspected-blunder', detail: evil }],
        nextMarks: [{ mark: evil, baselineKm: 3, days: 2, reason: 'few days', informationGain: null }],
      },
      messages: [],
    });
    expect(spoiled).not.toContain('<script>');
    expect(spoiled).toContain('not named');
    expect(markdownOf(spoiled)).not.toContain('<script>');
  });

  it('escape whatever stands in logs and study file, and keep its direction', () => {
    const evil = '<script>alert(1)</script>';
    const hebrew = '\u05e0\u05e7\u05d5\u05d3\u05d4 7';
    const results: Partial<Results> = {
      study: { ...run.results.study, title: evil, surveyor: evil, showCrews: true },
      messages: [{ code: 'x', severity: 'warning', text: evil, file: evil, row: 1, column: evil }],
      marks: [{ ...run.results.marks[0]!, mark: hebrew, base: evil }],
      files: [{ ...run.results.files[0]!, file: evil }],
      bases: [evil],
      rovers: ['a\u0000b'],
      crews: [evil],
    };
    const pages = pagesOf(withResults(results));
    for (const each of Object.values(pages)) expect(each).not.toContain('<script>');
    expect(pages.annex).toContain(`<bdi>${hebrew}</bdi>`);
    expect(pages.card).not.toContain('\u0000');
    expect(markdownOf(pages.report!)).not.toContain('<script>');
    expect(markdownOf(pages.report!)).toContain('\\<script\\>');
  });

  it('cut long tables with a count and the name of the whole table', () => {
    const { annex } = pagesOf(run);
    expect(run.results.occupations.used).toBeGreaterThan(200);
    expect(annex).toMatch(
      /Shown are the first <data[^>]*>200<\/data> of\s+<data[^>]*data-rows="errors"[^>]*>\d+<\/data>; all of them stand in tables\/errors\.csv/,
    );
    const many = Array.from({ length: 200 }, (_, k) => ({ ...run.results.marks[0]!, mark: `P${k}` }));
    const crowded = pagesOf(withResults({ marks: many }));
    for (const { mark } of many) expect(crowded.annex).toContain(`<bdi>${mark}</bdi>`);
  });
});

describe('pictures of long studies', () => {
  it('are named instead of shown where they would make the annex too long, the least needed first', () => {
    const svg = `<svg xmlns="http://www.w3.org/2000/svg">${'x'.repeat(300_000)}</svg>`;
    const picture = (name: string): ReportPicture => ({
      svg,
      description: `Of ${name}`,
      file: `charts/${name}.svg`,
    });
    const pictures: ReportPictures = {
      ...NO_PICTURES,
      horizontal: picture('fit'),
      days: [picture('days')],
      hourDays: [picture('cells')],
    };
    const annex = annexHtml(run, pictures);
    expect(annex.length).toBeLessThan(3e6);
    for (const name of ['fit', 'days']) expect(annex).toContain(`alt="Of ${name}"`);
    expect(annex).not.toContain('alt="Of cells"');
    expect(annex).toContain('Too large for this page, see charts/cells.svg: Of cells');
  });
});

describe('pages for everybody', () => {
  it('have one title, headings in order, named tables and pictures with words', () => {
    for (const [name, each] of Object.entries(
      pagesOf(run, { ...NO_PICTURES, proof: { svg: '<svg/>', description: 'words' } }),
    )) {
      expect(each, name).toContain('<html lang="en">');
      expect(each.match(/<title>[^<]+<\/title>/g), name).toHaveLength(1);
      expect(each.match(/<h1/g), name).toHaveLength(1);
      expect(each.indexOf('<h1'), name).toBeLessThan(each.indexOf('<h2'));
      expect(each, name).not.toMatch(/<h[3-6]/);
      expect(each.match(/<table/g)?.length, name).toBe(each.match(/<caption>[^\n]/g)?.length);
      expect(each, name).not.toMatch(/<img(?![^>]*alt="[^"])/);
      const ids = [...each.matchAll(/ id="([^"]+)"/g)].map(([, id]) => id);
      expect(new Set(ids).size, name).toBe(ids.length);
      for (const [, target] of each.matchAll(/href="#([^"]+)"/g)) expect(ids, name).toContain(target);
    }
  });

  it('are the same bytes when written twice', () => {
    expect(pagesOf(run)).toEqual(pagesOf(run));
  });

  it('turn lengths in sentences into feet, and leave ratios alone', () => {
    const feet = new Page({
      ...run.results,
      study: { ...run.results.study, reportUnits: 'international-foot' },
    });
    // 304.8 mm and 1.609344 km are a foot and a mile by definition.
    expect(feet.text('off by 304.8 mm, stops at 1.609344 km, 2 mm per km')).toBe(
      'off by 1.000 ft, stops at 1.0 mi, 2 mm per km',
    );
    expect(feet.text('P1 (−304.8, +609.6 mm), 152.4 to 304.8 mm on 7 days; 15.9 km')).toBe(
      'P1 (−1.000, +2.000 ft), 0.500 to 1.000 ft on 7 days; 9.8 mi',
    );
    expect(formatNumber(1609.347 / 1000, 'distance', readerUnits('us-survey-foot'))).toBe('1.0');
    expect(
      ruleSentence(
        { ...run.results.rules[0]!, maximumBaselineKm: 8, limitMm: 30.48, reason: null },
        undefined,
        readerUnits('international-foot'),
      ),
    ).toMatch(/^Up to 4\.9\u00a0mi from the base: 95\u00a0% of horizontal positions within 0\.1\u00a0ft/);
  });

  it('gives weights in three meanings that fit each other', () => {
    for (const { component, perAxis, radialRms, share95 } of run.results.adjustmentWeights) {
      if (component === 'horizontal') {
        expect(radialRms!.constantMm! / perAxis.constantMm!).toBeCloseTo(Math.SQRT2, 12);
        // √(-ln 0.05) = 1.7308: radius of 95 % over radial RMS (Rayleigh distribution, from memory)
        expect(share95.ppm! / radialRms!.ppm!).toBeCloseTo(1.7308, 4);
      } else {
        expect(radialRms).toBeNull();
        expect(share95.constantMm! / perAxis.constantMm!).toBeCloseTo(1.96, 3);
      }
    }
    const tables = pagesOf(run).weights!;
    expect(tables).toContain('One standard deviation per axis');
  });
});

describe('what analysts load', () => {
  const folder = testFolder();

  beforeAll(async () => {
    await writeOutputs(run, folder.path, folder.write('rows.csv', 'file,row\n'));
  }, 120_000);

  const read = (name: string): string => readFileSync(join(folder.path, name), 'utf8');

  it('is Arrow with types and nulls, the same as the CSV', () => {
    const { header, rows } = reportTables(run).find(({ name }) => name === 'errors')!;
    const arrow = fromArrow(readFileSync(join(folder.path, 'exports/errors.arrow')));
    expect(arrow.columnNames()).toEqual(header);
    expect(arrow.numRows()).toBe(rows.length);
    rows.forEach((row, i) => {
      for (const [k, name] of header.entries())
        expect(arrow.get(name, i) ?? null, name).toEqual(row[k] ?? null);
    });
    expect(
      arrowBytes({
        name: 'x',
        header: ['a', 'b'],
        rows: [
          ['1', Number.NaN],
          ['2', 3],
        ],
      }),
    ).toEqual(
      arrowBytes({
        name: 'x',
        header: ['a', 'b'],
        rows: [
          ['1', null],
          ['2', 3],
        ],
      }),
    );
  });

  it('is GeoJSON of all marks with their mean errors', () => {
    const { type, features } = JSON.parse(read('exports/marks.geojson'));
    expect(type).toBe('FeatureCollection');
    expect(features).toHaveLength(run.results.marks.length);
    for (const { geometry, properties } of features) {
      const { position } = run.control.marks.get(properties.mark)!;
      const [longitude, latitude] = geometry.coordinates;
      expect(longitude).toBeCloseTo(position.longitudeDeg, 8);
      expect(latitude).toBeCloseTo(position.latitudeDeg, 8);
    }
    const { mark, base, east } = run.results.marks[3]!;
    expect(features[3].properties).toMatchObject({ mark, base, eastMm: east });
  });

  it.for([
    ['r', 'Rscript', ['-e']],
    ['r-arrow', 'Rscript', ['-e']],
    ['python', 'python3', ['-c']],
    ['python-arrow', 'python3', ['-c']],
  ] as const)('is loaded as the page of %s shows', ([kind, program, args], { skip }) => {
    const needs = kind === 'r-arrow' ? 'library(arrow)' : kind === 'python-arrow' ? 'import pyarrow' : '1';
    if (printed(program, [...args, needs], folder.path) === null) {
      skip(`${program} or the package for ${kind} is not installed`);
    }
    const near = run.errors.filter(({ baselineKm }, i) => baselineKm < 5 && run.weights[i]! >= 0.5);
    const squares = near.map(({ east, north }) => east ** 2 + north ** 2);
    const rms = Math.sqrt(squares.reduce((a, b) => a + b, 0) / squares.length);
    // Errors are written to a hundredth of a millimetre.
    expect(Number(printed(program, [...args, shownBlock(kind)], folder.path))).toBeCloseTo(rms, 2);
  });

  it('has one CSV for every table, and Markdown beside every page', () => {
    const names = reportTables(run).map(({ name }) => name);
    expect(new Set(names).size).toBe(names.length);
    for (const name of names) expect(existsSync(join(folder.path, 'tables', `${name}.csv`)), name).toBe(true);
    for (const name of ['report', 'annex', 'card', 'weights']) {
      expect(read(`${name}.md`)).toBe(markdownOf(read(`${name}.html`)));
      expect(statSync(join(folder.path, `${name}.html`)).size).toBeLessThan(3_000_000);
    }
    expect(read('tables/weights.csv').split('\n')[0]).toContain('perAxisConstantMm');
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
