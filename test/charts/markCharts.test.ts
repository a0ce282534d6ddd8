import { describe, expect, it } from 'vitest';
import { simulateErrors } from '../../src/campaign/index.js';
import { type ChartSpec, markMapChart, markMeansChart, renderSvg } from '../../src/charts/index.js';
import { type MarkMean, markMeans } from '../../src/split/index.js';
import { layersOf, rowsWith } from './data.js';

const mean = (
  mark: string,
  baselineKm: number,
  azimuthDeg: number,
  rest: Partial<MarkMean> = {},
): MarkMean => ({
  mark,
  base: 'B1',
  baselineKm,
  azimuthDeg,
  occupations: 20,
  days: 5,
  east: 1,
  north: -2,
  up: 3,
  se: { east: 0.5, north: 0.4, up: 1 },
  ...rest,
});

/** Far enough from each other for one plan. */
const SPREAD = [
  mean('M1', 10, 90),
  mean('M2', 8, 200, { east: 3, north: 4 }),
  mean('M3', 9, 330, { north: null }),
];

const panelsOf = (chart: ChartSpec): Record<string, unknown>[] =>
  (chart.vegaLite.hconcat as Record<string, unknown>[] | undefined) ?? [chart.vegaLite];

const allRows = (chart: ChartSpec, ...fields: string[]) =>
  panelsOf(chart).flatMap((panel) => rowsWith(layersOf(panel), ...fields).flat());

describe('markMapChart', () => {
  it('puts marks where distance and direction say, with the same scale on both axes', () => {
    const chart = markMapChart({ marks: SPREAD, baseName: 'B1' });
    const [first] = allRows(chart, 'sizePx2');
    // 10 km at azimuth 90° is due east (plane trigonometry)
    expect(first!.eastKm).toBeCloseTo(10, 9);
    expect(first!.northKm).toBeCloseTo(0, 9);
    const panel = panelsOf(chart)[0]!;
    const encoding = (
      layersOf(panel)[0] as unknown as { encoding: Record<'x' | 'y', { scale: { domain: number[] } }> }
    ).encoding;
    const kmPerPx = (axis: 'x' | 'y', side: unknown): number =>
      (encoding[axis].scale.domain[1]! - encoding[axis].scale.domain[0]!) / (side as number);
    expect(kmPerPx('x', panel.width)).toBeCloseTo(kmPerPx('y', panel.height), 9);
  });

  it('says the largest mean horizontal error and draws arrows in proportion, none where it is not known', () => {
    const chart = markMapChart({ marks: SPREAD, baseName: 'B1' });
    expect(chart.title).toBe('3 marks, 8.0 to 10.0 km from base B1');
    // √(3² + 4²)
    expect(chart.subtitle[0]).toBe('Largest mean horizontal error: 5.0 mm at M2');
    const arrows = allRows(chart, 'order', 'mark').filter(({ mark }) => mark !== '');
    const length = (name: string): number => {
      const [tail, tip] = arrows.filter(({ mark }) => mark === name) as { eastKm: number; northKm: number }[];
      return Math.hypot(tip!.eastKm - tail!.eastKm, tip!.northKm - tail!.northKm);
    };
    expect(length('M1') / length('M2')).toBeCloseTo(Math.sqrt(5) / 5, 9);
    expect(arrows.some(({ mark }) => mark === 'M3')).toBe(false);
    const key = allRows(chart, 'order', 'mark').filter(({ mark }) => mark === '') as { eastKm: number }[];
    const keyMm = Number(/"(\d+) mm of mean horizontal error/.exec(JSON.stringify(chart.vegaLite))![1]);
    expect((key[1]!.eastKm - key[0]!.eastKm) / keyMm).toBeCloseTo(length('M2') / 5, 9);
  });

  it('enlarges marks that crowd near the base, and names each mark once', () => {
    const { rows } = simulateErrors({ markSigmaMm: { east: 3, north: 3, up: 5 } });
    const marks = markMeans(rows);
    const chart = markMapChart({ marks, baseName: 'B1' });
    expect(panelsOf(chart)).toHaveLength(2);
    // the outline layer and the text layer hold the same words
    const names = allRows(chart, 'text', 'x').map(({ text }) => text);
    for (const { mark } of marks) expect(names.filter((text) => text === mark)).toHaveLength(2);
  });

  it('draws rings at round distances', () => {
    const chart = markMapChart({ marks: SPREAD, baseName: 'B1' });
    const radii = [...new Set(allRows(chart, 'ringKm').map(({ ringKm }) => ringKm as number))];
    expect(radii.length).toBeGreaterThanOrEqual(3);
    for (const radius of radii) expect(radius % radii[0]!).toBe(0);
    for (const { ringKm, eastKm, northKm } of allRows(chart, 'ringKm')) {
      expect(Math.hypot(eastKm as number, northKm as number)).toBeCloseTo(ringKm as number, 9);
    }
  });

  it('refuses a base that no mark was measured from', () => {
    expect(() => markMapChart({ marks: SPREAD, baseName: 'B9' })).toThrow(
      'Expected marks measured from base "B9", came marks from "B1". Name a base of the table.',
    );
    expect(() => markMapChart({ marks: [], baseName: 'B9' })).toThrow('came none.');
  });

  it.each([
    ['spread marks', SPREAD],
    ['a single mark', [mean('only', 3, 10)]],
    ['marks at the base itself', [mean('here', 0, 0), mean('there', 1e-5, 90)]],
    ['no known plan errors', [mean('H1', 3, 10, { east: null }), mean('H2', 5, 100, { north: null })]],
    ['no error at all', [mean('Z', 3, 10, { east: 0, north: 0 })]],
    ['marks in one line', [mean('a', 1, 0), mean('b', 2, 0), mean('c', 40, 0)]],
  ])('draws %s without a warning', async (_, marks) => {
    expect(await renderSvg(markMapChart({ marks, baseName: 'B1' }))).toContain('</svg>');
  });
});

describe('markMeansChart', () => {
  const MARKS = [
    mean('far', 9, 0, { up: -4.26 }),
    mean('near', 1, 0, { se: { east: null, north: 0.2, up: 0.3 }, days: 1 }),
  ];

  it('names the largest mean, orders marks by distance and draws two standard errors', () => {
    const chart = markMeansChart({ marks: MARKS });
    expect(chart.title).toBe('Mean error of 2 marks: largest up \u22124.3 mm at far');
    expect(chart.subtitle[0]).toContain('no bar: one day only');
    const [east, north, up] = panelsOf(chart).map((panel) => rowsWith(layersOf(panel), 'mean').at(-1)!);
    expect(east!.map(({ label }) => label)).toEqual(['near, 1.0 km', 'far, 9.0 km']);
    expect(east![0]).toEqual({ label: 'near, 1.0 km', mean: 1, low: null, high: null });
    expect(north![1]).toEqual({ label: 'far, 9.0 km', mean: -2, low: -2.8, high: -1.2 });
    expect(up![1]!.mean).toBe(-4.26);
    const bars = rowsWith(layersOf(panelsOf(chart)[0]!), 'low')[0]!;
    expect(bars.map(({ label }) => label)).toEqual(['far, 9.0 km']);
  });

  it('says where a mean is not known, and tells the same mark from two bases apart', () => {
    const marks = [mean('M1', 2, 0, { up: null }), mean('M1', 5, 0, { base: 'B2' })];
    const chart = markMeansChart({ marks });
    const [row] = rowsWith(layersOf(panelsOf(chart)[2]!), 'text')[0]!;
    expect(row).toMatchObject({ label: 'M1 from B1, 2.0 km', text: 'not known' });
    expect(allRows(chart, 'mean').some(({ label }) => label === 'M1 from B2, 5.0 km')).toBe(true);
  });

  it('does not change the order of its input, and refuses an empty table', () => {
    const marks = Object.freeze([...MARKS]);
    markMeansChart({ marks });
    expect(marks.map(({ mark }) => mark)).toEqual(['far', 'near']);
    expect(() => markMeansChart({ marks: [] })).toThrow('Expected at least one mark, came none.');
  });

  it.each([
    ['two marks', MARKS],
    ['nothing known', [mean('x', 1, 0, { east: null, north: null, up: null })]],
    ['all zero', [mean('z', 1, 0, { east: 0, north: 0, up: 0, se: { east: null, north: null, up: null } })]],
  ])('draws %s without a warning', async (_, marks) => {
    expect(await renderSvg(markMeansChart({ marks }))).toContain('mean north error, mm');
  });
});
