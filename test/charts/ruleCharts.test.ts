import { beforeAll, describe, expect, it } from 'vitest';
import { simulateErrors } from '../../src/campaign/index.js';
import {
  backTestChart,
  chartInUnits,
  errorByBaselineChart,
  markMapChart,
  renderSvg,
  ruleMovesChart,
} from '../../src/charts/index.js';
import { dayModel } from '../../src/days/index.js';
import { fitErrorModel } from '../../src/fit/index.js';
import { backTest, forwardTest } from '../../src/rule/index.js';
import { markMeans } from '../../src/split/index.js';
import { type BackTestResult, type RuleMove, readerUnits } from '../../src/study/index.js';
import { fewRows, fullInput, layersOf, SPEC_SHEET, tolerance } from './data.js';

const feet = readerUnits('international-foot');

describe('ruleMovesChart', () => {
  const move = (kind: RuleMove['kind'], subject: string | null, km: number | null): RuleMove => ({
    component: 'horizontal',
    limitMm: 25,
    share: 0.95,
    dayShare: 0.9,
    kind,
    subject,
    maximumBaselineKm: km,
    reason: km === null ? '9 days are too few' : null,
  });
  const moves = [
    move('as stated', null, 8.98),
    move('without a mark', 'CP03', 9.7),
    move('without a crew', 'ridge', 0.4),
    move('other form', 'linear-sum', null),
  ];
  const words = ({ kind, subject }: RuleMove): string => `${kind} ${subject ?? ''}`.trim();
  const bars = (chart: { vegaLite: Record<string, unknown> }) =>
    (chart.vegaLite.vconcat as Record<string, unknown>[])
      .flatMap((panel) => layersOf(panel))
      .find(({ mark }) => mark.type === 'bar')!.data.values;

  it('says how far the limit moves, rounded down, and draws one bar a change', () => {
    const chart = ruleMovesChart({ moves, words });
    expect(chart.title).toBe('With one thing changed: 25 mm in plan 0.4 to 9.7 km (rule 8.9)');
    expect(bars(chart).map(({ km, text }) => [km, text])).toEqual([
      [8.98, '8.9 km'],
      [9.7, '9.7 km'],
      [0.4, '0.4 km'],
      [0, 'no rule'],
    ]);
    expect(chart.description).toContain('without a crew ridge: 0.4 km');
  });

  it('is in the units of the reader', () => {
    const chart = ruleMovesChart({ moves, words, units: feet });
    // 8.98 km are 5.58 miles of 1.609344 km, 25 mm are 0.082 ft of 304.8 mm.
    expect(chart.title).toBe('With one thing changed: 0.082 ft in plan 0.2 to 6.0 mi (rule 5.5)');
  });

  it('is drawn, twice the same, and refused without a distance', async () => {
    const svg = await renderSvg(ruleMovesChart({ moves, words }));
    expect(svg).toContain('no rule');
    expect(await renderSvg(ruleMovesChart({ moves, words }))).toBe(svg);
    expect(() => ruleMovesChart({ moves: [move('as stated', null, null)], words })).toThrow(
      'Expected a rule that gives a distance',
    );
  });
});

describe('backTestChart', () => {
  let test: BackTestResult;
  beforeAll(() => {
    const rows = fewRows();
    const model = fitErrorModel(rows, { component: 'horizontal' });
    const options = {
      dayModel: dayModel(rows, model),
      specSheet: SPEC_SHEET,
      tolerances: [tolerance('horizontal', 25)],
    };
    const { own, notes, ...tested } = backTest(rows, model, options);
    test = { ...tested, ...own!, forward: forwardTest(rows, model, options), groups: [] };
  }, 120_000);

  it('draws the shares as they were found, and says them', async () => {
    const chart = backTestChart({ backTest: [test] });
    expect(chart.title).toContain(`${Number((100 * test.observedShare).toFixed(1))} % in plan`);
    const [panel] = chart.vegaLite.hconcat as Record<string, unknown>[];
    const circles = layersOf(panel!).filter(({ mark }) => mark.type === 'circle');
    expect(circles[0]!.data.values.map(({ share }) => share)).toEqual(
      test.lengthClasses.map(({ observedShare }) => observedShare),
    );
    const squares = layersOf(panel!).find(({ mark }) => mark.type === 'square')!;
    expect(squares.data.values.map(({ share }) => share)).toEqual(
      test.specSheet!.lengthClasses.map(({ observedShare }) => observedShare),
    );
    const svg = await renderSvg(chart);
    expect(svg).toContain('own model');
    expect(await renderSvg(chart)).toBe(svg);
    expect(() => backTestChart({ backTest: [] })).toThrow('Expected a back-test');
  });

  it('leaves the spec sheet out where there is none', () => {
    const chart = backTestChart({ backTest: [{ ...test, specSheet: null }] });
    expect(JSON.stringify(chart)).not.toContain('pec sheet');
  });
});

describe('chartInUnits', () => {
  it('turns axes and words into feet and miles, and leaves the data alone', async () => {
    const chart = errorByBaselineChart(fullInput(fewRows(), 'horizontal', 25));
    const turned = chartInUnits(chart, feet);
    expect(chartInUnits(chart, readerUnits('metric'))).toBe(chart);
    expect(turned.title).toMatch(/^Horizontal error: 0\.02\d ft \+ \d\.\d\d ppm/);
    expect(turned.description).not.toMatch(/ mm\b| km\b|millimetres/);
    const circles = (of: typeof chart) =>
      layersOf(of.vegaLite).find(({ mark }) => mark.type === 'circle')!.data.values;
    expect(circles(turned)).toEqual(circles(chart));
    const svg = await renderSvg(turned);
    expect(svg).toContain('baseline length, mi');
    expect(svg).toContain('0.082 ft holds to');
    expect(svg).not.toMatch(/\d mm|\d km/);
  });

  it('has round ticks in the units of the reader', () => {
    const chart = markMapChart({ marks: markMeans(fewRows()), baseName: fewRows()[0]!.base });
    const texts = JSON.stringify(chartInUnits(chart, feet).vegaLite);
    const axis = /"title":"east of the base, mi","tickCount":\d+,"values":(\[[^\]]*\])/.exec(texts);
    const [values] = axis === null ? [[]] : [JSON.parse(axis[1]!) as number[]];
    for (const km of values) {
      const miles = km / 1.609344;
      expect(Math.abs(miles - Math.round(miles * 10) / 10)).toBeLessThan(1e-9);
    }
    expect(texts).not.toContain('base, km');
  });
});

describe('many occupations', () => {
  it('are counted in cells, so that 50 000 take no more drawing than 1000', async () => {
    const { rows } = simulateErrors({ days: 100, occupationsPerDay: { from: 500, to: 500 }, seed: 5 });
    expect(rows.length).toBeGreaterThan(49_000);
    const model = fitErrorModel(rows, { component: 'horizontal' });
    const svg = await renderSvg(errorByBaselineChart({ errors: rows, model }));
    expect(svg.length).toBeLessThan(300_000);
    expect(svg).toContain('occupations in a cell');
  }, 60_000);
});
