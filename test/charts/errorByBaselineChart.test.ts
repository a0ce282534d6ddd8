import { describe, expect, it } from 'vitest';
import { simulateErrors } from '../../src/campaign/index.js';
import { errorByBaselineChart, renderSvg } from '../../src/charts/index.js';
import { errorTable } from '../../src/errors/index.js';
import { errorCurve, fitErrorModel } from '../../src/fit/index.js';
import { specSheetSigmaMm } from '../../src/rule/index.js';
import { fewRows, fullInput, layersOf, manyRows, rowsWith, tolerance } from './data.js';

describe('errorByBaselineChart', () => {
  it('says the finding in its title and what it rests on below', () => {
    const input = fullInput(fewRows(), 'horizontal', 25);
    const { title, subtitle } = errorByBaselineChart(input);
    const { constantMm, ppm, occupations } = input.model;
    expect(title).toBe(
      `Horizontal error: ${constantMm.estimate!.toFixed(1)} mm + ${ppm.estimate!.toFixed(2)} ppm (root-sum-square)`,
    );
    expect(subtitle[0]).toContain('Radial RMS, absolute reference; 95 % intervals ');
    expect(subtitle[0]).toContain(`${constantMm.low!.toFixed(1)} to ${constantMm.high!.toFixed(1)} mm`);
    expect(subtitle[1]).toContain(`${occupations} occupations on 20 days at 14 marks`);
  });

  it('draws the occupations, the measured classes and the limits exactly as they were given', () => {
    const rows = fewRows();
    const input = fullInput(rows, 'horizontal', 25);
    const chart = errorByBaselineChart(input);
    const layers = layersOf(chart.vegaLite);
    const points = layers.find(({ mark }) => mark.type === 'circle')!.data.values;
    const hidden = Number(/not shown: (\d+) error/.exec(chart.subtitle[1]!)?.[1] ?? 0);
    expect(points.length + hidden).toBe(rows.length);
    const given = new Set(rows.map((row) => `${row.baselineKm} ${Math.hypot(row.east, row.north)}`));
    for (const { baselineKm, errorMm } of points) expect(given).toContain(`${baselineKm} ${errorMm}`);
    const classes = rowsWith(layers, 'rmsMm').flat();
    for (const row of input.bins) {
      const drawn = classes.filter(({ group }) => group === row.group);
      expect(drawn.length).toBeGreaterThan(0);
      for (const one of drawn) {
        const { estimate, low, high } = row.horizontalRms!;
        expect(one).toMatchObject({ baselineKm: row.baselineKm, rmsMm: estimate, lowMm: low, highMm: high });
        expect(one.tooFew).toBe(row.tooFew);
      }
    }
    expect(rowsWith(layers, 'limitMm')[0]![0]!.limitMm).toBe(25);
    expect(rowsWith(layers, 'maximumBaselineKm')[0]![0]!.maximumBaselineKm).toBe(
      input.rule.maximumBaselineKm,
    );
  });

  it('draws the curves of the model, its 95 % and the spec sheet as their own functions give them', () => {
    const input = fullInput(fewRows(), 'vertical', 40);
    const layers = layersOf(errorByBaselineChart(input).vegaLite);
    const end = input.model.longestKm;
    const ends = layers
      .filter(({ mark, data }) => mark.type === 'line' && 'errorMm' in (data.values[0] ?? {}))
      .map(({ data }) => data.values.at(-1)!);
    for (const point of ends) expect(point.baselineKm).toBe(end);
    const heights = new Set(ends.map((point) => (point.errorMm as number).toFixed(6)));
    const [{ sigmaMm, lowMm, highMm }] = errorCurve(input.model, [end]) as [
      ReturnType<typeof errorCurve>[number],
    ];
    // 1.959964 σ hold 95 % of Gaussian errors (tables of the normal distribution, from memory)
    expect(heights).toContain(sigmaMm.toFixed(6));
    expect([...heights].some((mm) => Math.abs(Number(mm) - 1.959964 * sigmaMm) < 1e-4)).toBe(true);
    expect(heights).toContain(specSheetSigmaMm(input.specSheet, 'vertical', end).toFixed(6));
    expect(heights.size).toBe(3);
    const band = layers.find(({ mark }) => mark.type === 'area')!.data.values;
    expect(band.at(-1)).toEqual({ baselineKm: end, lowMm, highMm });
  });

  it('takes the share of the tolerance for the upper curve, but none above 95 %', () => {
    const rows = fewRows();
    const model = fitErrorModel(rows, { component: 'horizontal' });
    const words = (share: number) =>
      JSON.stringify(
        errorByBaselineChart({ errors: rows, model, tolerance: { ...tolerance('horizontal', 25), share } })
          .vegaLite,
      );
    expect(words(0.9)).toContain('90 % of positions,');
    expect(words(0.99)).toContain('95 % of positions,');
  });

  it('shows counts instead of points when there are many, and loses none', () => {
    const rows = manyRows();
    const chart = errorByBaselineChart(fullInput(rows, 'horizontal', 25));
    const layers = layersOf(chart.vegaLite);
    expect(layers.some(({ mark }) => mark.type === 'circle')).toBe(false);
    const cells = rowsWith(layers, 'count', 'xFrom')[0]!;
    const hidden = Number(/not shown: (\d+) error/.exec(chart.subtitle[1]!)![1]);
    expect(cells.reduce((sum, { count }) => sum + (count as number), hidden)).toBe(rows.length);
    const cutMm = Number(/above (\d+) mm/.exec(chart.subtitle[1]!)![1]);
    expect(rows.filter(({ east, north }) => Math.hypot(east, north) > cutMm)).toHaveLength(hidden);
  });

  it('writes the rule beside the length, rounded down', () => {
    const input = fullInput(fewRows(), 'horizontal', 25);
    const chart = errorByBaselineChart({ ...input, rule: { ...input.rule, maximumBaselineKm: 7.98 } });
    expect(JSON.stringify(chart.vegaLite)).toContain('"25 mm holds to 7.9 km"');
    expect(chart.description).toContain('25 mm holds to 7.9 km.');
  });

  it.each([
    ['null', 9, 25, '9 days are too few: a rule needs 15 days'],
    ['0', 20, 8, 'the constant alone exceeds the tolerance'],
  ])('gives the reason where the maximum baseline is %s, and draws no line', (_, days, limitMm, reason) => {
    const { rows } = simulateErrors({ days, occupationsPerDay: { from: 8, to: 12 } });
    const chart = errorByBaselineChart(fullInput(rows, 'horizontal', limitMm));
    expect(chart.subtitle.at(-1)).toContain(`No maximum baseline for ${limitMm} mm: ${reason}`);
    expect(chart.description).toContain(reason);
    expect(rowsWith(layersOf(chart.vegaLite), 'maximumBaselineKm')).toHaveLength(0);
  });

  it('says what is missing when distances are too alike or the days too few', () => {
    const marks = { count: 4, nearestKm: 1, farthestKm: 2 };
    const near = simulateErrors({ days: 5, marks }).rows;
    const alike = errorByBaselineChart({
      errors: near,
      model: fitErrorModel(near, { component: 'horizontal' }),
    });
    expect(alike.title).toMatch(/^Horizontal error: \d+\.\d mm from \d\.\d to \d\.\d km, ppm not known$/);
    const short = simulateErrors({ days: 3 }).rows;
    const few = errorByBaselineChart({
      errors: short,
      model: fitErrorModel(short, { component: 'vertical' }),
    });
    expect(few.subtitle[0]).toBe('Vertical RMS, absolute reference; too few days for an interval');
    const upperOnly = errorByBaselineChart({
      errors: near,
      model: {
        ...fitErrorModel(near, { component: 'horizontal' }),
        ppm: { estimate: null, low: 0, high: 2.104 },
      },
    });
    expect(upperOnly.title).toContain('mm + less than 2.10 ppm (root-sum-square)');
  });

  it('never says RMS without its kind, and has words for those who do not see it', () => {
    for (const component of ['horizontal', 'vertical'] as const) {
      const chart = errorByBaselineChart(fullInput(fewRows(), component, 30));
      const bare = JSON.stringify(chart).replace(/(radial|vertical) RMS/gi, '');
      expect(bare).not.toMatch(/\bRMS\b/);
      expect(chart.description).toContain(`${chart.title.split(': ')[1]!.split(' (')[0]}`);
      expect(chart.description.length).toBeGreaterThan(200);
    }
  });

  it('is the same for a table and for records, and leaves its input alone', () => {
    const rows = fewRows().map((row) => Object.freeze(row));
    const input = fullInput(rows, 'horizontal', 25);
    const table = errorTable(rows as unknown as Parameters<typeof errorTable>[0]);
    expect(errorByBaselineChart({ ...input, errors: table })).toEqual(errorByBaselineChart(input));
  });

  it('leaves out occupations without the component', () => {
    const rows = fewRows();
    const input = fullInput(rows, 'vertical', 40);
    const gaps = rows.map((row, i) => (i < 5 ? { ...row, up: Number.NaN } : row));
    const all = layersOf(errorByBaselineChart(input).vegaLite).find(({ mark }) => mark.type === 'circle')!;
    const some = layersOf(errorByBaselineChart({ ...input, errors: gaps }).vegaLite).find(
      ({ mark }) => mark.type === 'circle',
    )!;
    expect(some.data.values).toEqual(all.data.values.slice(5));
  });

  it('refuses a tolerance, a rule or a table that do not fit', () => {
    const rows = fewRows();
    const input = fullInput(rows, 'horizontal', 25);
    expect(() => errorByBaselineChart({ ...input, tolerance: tolerance('vertical', 40) })).toThrow(
      'Expected a horizontal tolerance for a model of the horizontal error, came a vertical one. Hand in the tolerance of the same component.',
    );
    expect(() => errorByBaselineChart({ ...input, rule: { ...input.rule, component: 'vertical' } })).toThrow(
      'Expected a horizontal rule',
    );
    expect(() => errorByBaselineChart({ ...input, errors: [{ baselineKm: 1, east: 2 }] })).toThrow('"north"');
  });

  it.each([
    ['few', fewRows, 'horizontal', 25],
    ['few', fewRows, 'vertical', 60],
    ['many', manyRows, 'horizontal', 25],
    ['many', manyRows, 'vertical', 40],
  ] as const)('draws %s occupations without a warning (%s, %s)', async (_, rows, component, limitMm) => {
    const svg = await renderSvg(errorByBaselineChart(fullInput(rows(), component, limitMm)));
    expect(svg).toContain('own error model:');
    expect(svg).toContain(`tolerance ${limitMm} mm`);
  });
});
