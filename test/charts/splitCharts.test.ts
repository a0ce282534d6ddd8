import { describe, expect, it } from 'vitest';
import { simulateErrors } from '../../src/campaign/index.js';
import {
  type ChartSpec,
  renderSvg,
  shareInsideChart,
  splitChart,
  twoWayChart,
  wrongFixShareChart,
} from '../../src/charts/index.js';
import { fitErrorModel, screenWrongFixes, wrongFixGrowth, wrongFixShareAtKm } from '../../src/fit/index.js';
import { maximumBaseline } from '../../src/rule/index.js';
import {
  flaggedByLength,
  LENGTH_EDGES_KM,
  shareInsideByDistance,
  summarizeBy,
  summarizeByTwo,
} from '../../src/split/index.js';
import { fewRows, layersOf, rowsWith, tolerance } from './data.js';

const rows = fewRows();
const LENGTHS = { column: 'baselineKm', edges: LENGTH_EDGES_KM };
const drawnRows = (chart: ChartSpec, ...fields: string[]) =>
  rowsWith(layersOf(chart.vegaLite), ...fields).flat();

describe('splitChart', () => {
  const table = summarizeBy(rows, LENGTHS);

  it('draws the RMS and limits of the summary, hollow where there is too little', () => {
    const chart = splitChart({ rows: table, component: 'vertical', by: 'baseline length, km' });
    const points = layersOf(chart.vegaLite).filter(({ mark }) => mark.type === 'point');
    const drawn = points.flatMap(({ data, mark }) => data.values.map((one) => ({ ...one, fill: mark.fill })));
    expect(drawn).toHaveLength(table.length);
    for (const { from, to, verticalRms, tooFew, occupations, days } of table) {
      const { estimate, low, high } = verticalRms!;
      const row = (drawn as Record<string, unknown>[]).find(({ label }) => label === `${from} to ${to}`)!;
      expect(row).toMatchObject({ rms: estimate, low, high, tooFew });
      expect(row.fill === 'white').toBe(tooFew);
      expect(row.text).toBe(`${occupations} shots, ${days} days${tooFew ? ': too few' : ''}`);
    }
    const sizes = table.filter(({ tooFew }) => !tooFew).map(({ verticalRms }) => verticalRms!.estimate);
    expect(chart.title).toContain(
      `Vertical error by baseline length: ${Math.min(...sizes).toFixed(1)}\u00a0mm`,
    );
    expect(chart.title).toContain(`to ${Math.max(...sizes).toFixed(1)}\u00a0mm`);
  });

  it('names the share of visits without a fix, and too few plainly', () => {
    const visits = [
      { mark: 'CP', fixedRows: 0 },
      { mark: 'CP', fixedRows: 3 },
    ];
    const one = rows.slice(0, 5).map((row) => ({ ...row, mark: 'CP' }));
    const chart = splitChart({
      rows: summarizeBy(one, 'mark', { visits }),
      component: 'horizontal',
      by: 'mark',
    });
    expect(drawnRows(chart, 'text')[0]!.text).toBe('5 shots, 1 day: too few; 50 % without a fix');
    expect(chart.title).toBe('Horizontal error by mark: too few to compare');
    expect(chart.subtitle[1]).toContain('Hollow: too few');
  });

  it('says so where there is one class alone', () => {
    const [only] = summarizeBy(rows, { column: 'baselineKm', edges: [0, 100] });
    const chart = splitChart({ rows: [only!], component: 'vertical', by: 'baseline length, km' });
    expect(chart.title).toBe(
      `Vertical error by baseline length: one class only, ${only!.verticalRms!.estimate.toFixed(1)}\u00a0mm\u00a0(0\u00a0to\u00a0100)`,
    );
  });

  it('compares days by their occupations, without bars', () => {
    const chart = splitChart({ rows: summarizeBy(rows, 'day'), component: 'horizontal', by: 'day' });
    expect(chart.title).toMatch(/^Horizontal error by day: \d+\.\d\u00a0mm\u00a0\(2025-/);
    expect(chart.subtitle[0]).toContain('without intervals, for no class has two days');
  });

  it('draws the 40 fullest of very many, in their order, and says so', () => {
    const many = Array.from({ length: 60 }, (_, k) => ({
      ...table[0]!,
      group: `P${k}`,
      from: null,
      to: null,
      occupations: 10 + k,
    }));
    const chart = splitChart({ rows: many, component: 'horizontal', by: 'mark' });
    const labels = [...new Set(drawnRows(chart, 'label', 'text').map(({ label }) => label))];
    expect(labels).toEqual(many.slice(20).map(({ group }) => group));
    expect(chart.subtitle.at(-1)).toBe('The 40 of 60 classes with the most occupations');
  });

  it('leaves out groups without the component, and refuses none', () => {
    const gaps = [{ ...table[0]!, verticalRms: null }, table[1]!];
    expect(
      drawnRows(splitChart({ rows: gaps, component: 'vertical', by: 'x' }), 'rms', 'text'),
    ).not.toHaveLength(0);
    expect(() => splitChart({ rows: gaps.slice(0, 1), component: 'vertical', by: 'x' })).toThrow(
      'Expected groups with a vertical RMS, came none.',
    );
  });
});

describe('twoWayChart', () => {
  const cells = summarizeByTwo(rows, 'crew', LENGTHS);
  const chart = twoWayChart({ cells, component: 'horizontal', first: 'crew', second: 'baseline length, km' });

  it('writes the RMS into every cell, in brackets where there is too little', () => {
    const texts = drawnRows(chart, 'text', 'rms');
    const layers = layersOf(chart.vegaLite);
    const coloured = layers.filter(({ mark }) => mark.type === 'rect').flatMap(({ data }) => data.values);
    expect(texts.filter(({ tooFew }) => tooFew)).toHaveLength(cells.filter(({ tooFew }) => tooFew).length);
    expect(coloured).toHaveLength(cells.filter(({ tooFew }) => !tooFew).length);
    for (const { first, second, horizontalRms, tooFew } of cells) {
      const name = `${second.from} to ${second.to}`;
      const drawn = texts.find(({ across, down }) => across === first.group && down === name)!;
      const number = horizontalRms!.estimate.toFixed(horizontalRms!.estimate < 100 ? 1 : 0);
      expect(drawn.text).toBe(tooFew ? `(${number})` : number);
    }
  });

  it('puts classes in the order of their limits', () => {
    const [layer] = layersOf(chart.vegaLite) as unknown as {
      encoding: { y: { scale: { domain: string[] } } };
    }[];
    const starts = layer!.encoding.y.scale.domain.map((name) => Number(name.split(' to ')[0]));
    expect(starts).toEqual([...starts].sort((a, b) => a - b));
  });

  it('refuses what cannot be read or has nothing', () => {
    const wide = summarizeByTwo(rows, 'day', 'crew');
    expect(() => twoWayChart({ cells: wide, component: 'horizontal', first: 'day', second: 'crew' })).toThrow(
      'Expected at most 14 classes across and 40 down, came 20 and',
    );
    expect(() => twoWayChart({ cells: [], component: 'vertical', first: 'a', second: 'b' })).toThrow(
      'came none',
    );
  });
});

describe('wrongFixShareChart', () => {
  const errors = simulateErrors({ days: 30, seed: 8, wrongFixes: {} }).rows;
  const screening = screenWrongFixes(errors);
  const growth = wrongFixGrowth(errors, screening);
  const classes = flaggedByLength(errors, screening.suspected);
  const input = { growth, classes, longestKm: 34 };

  it('draws the growth as its own function gives it, and the counts of each class', () => {
    const chart = wrongFixShareChart(input);
    const curve = drawnRows(chart, 'low', 'high');
    for (const { baselineKm, percent, high } of curve) {
      const at = wrongFixShareAtKm(growth, baselineKm as number);
      expect(percent).toBeCloseTo(100 * at.mean, 10);
      expect(high).toBeCloseTo(100 * at.high95, 10);
    }
    expect(classes.reduce((total, { flagged }) => total + flagged, 0)).toBe(screening.suspected.length);
    expect(classes.reduce((total, { occupations }) => total + occupations, 0)).toBe(errors.length);
    const texts = drawnRows(chart, 'text').map(({ text }) => text);
    for (const { flagged, occupations } of classes) expect(texts).toContain(`${flagged}/${occupations}`);
    expect(chart.subtitle[0]).toContain(`${screening.suspected.length} suspected of`);
  });

  it('says what cannot be excluded where none is suspected', () => {
    const clean = simulateErrors({ days: 30, seed: 8 }).rows;
    const none = screenWrongFixes(clean);
    const chart = wrongFixShareChart({
      growth: wrongFixGrowth(clean, none),
      classes: flaggedByLength(clean, none.suspected),
      longestKm: 34,
    });
    if (none.suspected.length > 0) throw new Error('the seed gives a suspect: choose another');
    expect(chart.title).toMatch(/^No wrong fix is suspected; up to [\d.]+ % at 34 km cannot be excluded$/);
  });
});

describe('shareInsideChart', () => {
  const limit = tolerance('horizontal', 15);
  const shares = shareInsideByDistance(rows, { component: 'horizontal', limitMm: 15 });

  it('draws the shares as given, what is asked for and the rule', () => {
    const model = fitErrorModel(rows, { component: 'horizontal' });
    const rule = { ...maximumBaseline(rows, model, limit), maximumBaselineKm: 4.26 };
    const chart = shareInsideChart({ shares, tolerance: limit, rule });
    const drawn = drawnRows(chart, 'percent', 'low');
    for (const { baselineKm, share, low, high } of shares)
      expect(drawn).toContainEqual({
        baselineKm,
        percent: 100 * share,
        low: 100 * (low ?? share),
        high: 100 * (high ?? share),
      });
    expect(JSON.stringify(chart.vegaLite)).toContain('rule: 4.2 km');
    expect(JSON.stringify(chart.vegaLite)).toContain('95 % asked for');
  });

  it('says how far the share held, by what was measured', () => {
    const at = (baselineKm: number, share: number) => ({
      ...shares[0]!,
      baselineKm,
      share,
      low: null,
      high: null,
    });
    const title = (...list: ReturnType<typeof at>[]) =>
      shareInsideChart({ shares: list, tolerance: limit }).title;
    expect(title(at(1, 1), at(4, 0.96), at(9, 0.9))).toBe(
      'Horizontal: 95 % inside 15 mm of all positions out to 4.0 km',
    );
    expect(title(at(1, 1), at(4, 0.96))).toBe('Horizontal: 95 % inside 15 mm as far as 4.0 km');
    expect(title(at(1, 0.9))).toBe('Horizontal: fewer than 95 % inside 15 mm already at 1.0 km');
    expect(() => shareInsideChart({ shares: [], tolerance: limit })).toThrow('came none');
  });
});

const errors = simulateErrors({ days: 12, seed: 5, wrongFixes: {} }).rows;
const screening = screenWrongFixes(errors);
const charts: [string, () => ChartSpec][] = [
  ['a split', () => splitChart({ rows: summarizeBy(rows, 'mark'), component: 'horizontal', by: 'mark' })],
  [
    'one group',
    () => splitChart({ rows: summarizeBy(rows.slice(0, 1), 'mark'), component: 'horizontal', by: 'mark' }),
  ],
  [
    'a two-way split',
    () =>
      twoWayChart({
        cells: summarizeByTwo(rows, 'direction', 'crew'),
        component: 'vertical',
        first: 'direction',
        second: 'crew',
      }),
  ],
  [
    'one cell',
    () =>
      twoWayChart({
        cells: summarizeByTwo(rows.slice(0, 1), 'crew', 'mark'),
        component: 'vertical',
        first: 'crew',
        second: 'mark',
      }),
  ],
  [
    'wrong fixes',
    () =>
      wrongFixShareChart({
        growth: wrongFixGrowth(errors, screening),
        classes: flaggedByLength(errors, screening.suspected),
        longestKm: 34,
      }),
  ],
  [
    'shares inside',
    () =>
      shareInsideChart({
        shares: shareInsideByDistance(rows, { component: 'vertical', limitMm: 20 }),
        tolerance: tolerance('vertical', 20),
      }),
  ],
];

it.each(charts)('draws %s without a warning, the same bytes twice, and no bare RMS', async (_, make) => {
  const svg = await renderSvg(make());
  expect(svg).toContain('</svg>');
  expect(await renderSvg(make())).toBe(svg);
  const text = JSON.stringify(make());
  expect(text.replace(/(radial|vertical) RMS/gi, '')).not.toMatch(/\bRMS\b/);
  expect(text).not.toMatch(/NaN|undefined/);
});
