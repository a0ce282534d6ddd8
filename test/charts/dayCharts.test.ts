import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { simulateErrors } from '../../src/campaign/index.js';
import { placedLabels } from '../../src/charts/daysLabels.js';
import {
  associationChart,
  type ChartSpec,
  daysChart,
  hourDayChart,
  hourPpmChart,
  renderSvg,
} from '../../src/charts/index.js';
import { COLORS, FONT_SIZE, roughTextWidthPx } from '../../src/charts/theme.js';
import {
  type DailyFactor,
  dailyFactors,
  dayModel,
  hourDayRatios,
  type TimeOfDay,
  timeOfDay,
} from '../../src/days/index.js';
import { fitErrorModel } from '../../src/fit/index.js';
import { randomStream } from '../../src/stats/index.js';
import type { SkyDay, SkyPoint } from '../../src/study/index.js';
import { layersOf, rowsWith } from './data.js';

const { rows } = simulateErrors({
  days: 20,
  seed: 12,
  badDays: { runs: 1, runLength: 2, factor: { from: 4, to: 5 } },
});
const model = fitErrorModel(rows, { component: 'horizontal' });

const panels = (chart: ChartSpec): Record<string, unknown>[] =>
  (chart.vegaLite.vconcat as Record<string, unknown>[] | undefined) ?? [chart.vegaLite];
const allRows = (chart: ChartSpec, ...fields: string[]) =>
  panels(chart).flatMap((panel) => rowsWith(layersOf(panel), ...fields).flat());

const timeOf = (rest: Partial<TimeOfDay> = {}): TimeOfDay => ({
  component: 'horizontal',
  pValue: 0.002,
  hours: [
    { from: 8, to: 11, ppm: { estimate: 1, low: 0.8, high: 1.2 }, occupations: 100, days: 20 },
    { from: 11, to: 14, ppm: { estimate: 1.5, low: 1.3, high: 1.8 }, occupations: 90, days: 19 },
    { from: 14, to: 17, ppm: { estimate: 1.1, low: null, high: null }, occupations: 5, days: 1 },
  ],
  harmonics: null,
  notes: [],
  ...rest,
});

describe('hourPpmChart', () => {
  it('draws ppm and limits as given, and names the worst hours where they differ', () => {
    const chart = hourPpmChart({ timeOfDay: timeOf() });
    expect(chart.title).toBe('Horizontal ppm depends on the hour: 1.50 from 11.0 to 14.0 h');
    const drawn = allRows(chart, 'ppm', 'low', 'high');
    expect(drawn[1]).toMatchObject({
      from: 11,
      to: 14,
      ppm: 1.5,
      low: 1.3,
      high: 1.8,
      text: '90 occupations on 19 days',
    });
    expect(drawn[2]).toMatchObject({ ppm: 1.1, low: 1.1, high: 1.1 });
    expect(chart.description).toContain('1.00 (0.80 to 1.20) from 8.0 to 11.0 h');
  });

  it('says what cannot be told, in the words of the notes', () => {
    expect(hourPpmChart({ timeOfDay: timeOf({ pValue: 0.3 }) }).title).toBe(
      'Horizontal ppm: no hour is shown to differ',
    );
    const few = simulateErrors({ days: 6, seed: 2 }).rows;
    const fit = fitErrorModel(few, { component: 'vertical' });
    const chart = hourPpmChart({ timeOfDay: timeOfDay(few, fit, { random: randomStream(1) }) });
    expect(chart.title).toBe('Vertical ppm by hour: too few days to tell');
    expect(chart.subtitle.at(-1)).toContain('6 days are too few days to tell');
    expect(() => hourPpmChart({ timeOfDay: timeOf({ hours: [] }) })).toThrow(
      'Expected the ppm of some hours, came none.',
    );
  });

  it('tells a smooth course where one was fitted', () => {
    const harmonics = {
      count: 1,
      coefficients: [-0.3, -0.1],
      ratio: 1.84,
      highestHour: 13.25,
      pValue: 0.0001,
    } as const;
    expect(hourPpmChart({ timeOfDay: timeOf({ harmonics }) }).subtitle[1]).toBe(
      'A daily course of one wave is highest at 13\u00a0h, 1.8 times its lowest; p\u00a0<\u00a00.001 by days',
    );
  });

  it('puts night work behind each other over midnight', () => {
    const night = timeOf({
      hours: [22, 0, 2].map((from) => ({
        from,
        to: (from + 2) % 24,
        ppm: { estimate: 1, low: 0.9, high: 1.1 },
        occupations: 50,
        days: 20,
      })),
    });
    const drawn = allRows(hourPpmChart({ timeOfDay: night }), 'ppm', 'from').slice(0, 3);
    expect(drawn.map(({ from, to }) => [from, to])).toEqual([
      [22, 24],
      [24, 26],
      [26, 28],
    ]);
  });
});

describe('hourDayChart', () => {
  const cells = hourDayRatios(rows, model);

  it('draws every cell once, full or small, in the step of its ratio', () => {
    const chart = hourDayChart({ component: 'horizontal', cells });
    const drawn = allRows(chart, 'ratio', 'step');
    expect(drawn).toHaveLength(cells.length);
    for (const { ratio, step } of drawn as { ratio: number; step: string }[]) {
      const [low, high] = step.startsWith('below')
        ? [0, 0.75]
        : step.startsWith('above')
          ? [2.5, Number.POSITIVE_INFINITY]
          : step.split(' to ').map(Number);
      expect(ratio).toBeGreaterThanOrEqual(low!);
      expect(ratio).toBeLessThan(high!);
    }
    const most = Math.max(...cells.filter((cell) => cell.occupations >= 3).map(({ ratio }) => ratio));
    expect(chart.title).toContain(`up to ${most.toFixed(1)} times the model`);
  });

  it('refuses no cells, and says where every cell holds too little', () => {
    expect(() => hourDayChart({ component: 'vertical', cells: [] })).toThrow('came none');
    const [cell] = cells;
    expect(hourDayChart({ component: 'vertical', cells: [{ ...cell!, occupations: 1 }] }).title).toBe(
      'Vertical errors by hour and day: too few in every cell',
    );
  });
});

/** Degraded days as they are drawn, and what their shapes and fillings stand for. */
const badLayers = (chart: ChartSpec) =>
  panels(chart).flatMap((panel) => layersOf(panel).filter(({ encoding }) => 'shape' in encoding));
const kindsDrawn = (chart: ChartSpec) =>
  badLayers(chart).flatMap(({ data }) => data.values.map(({ day, kind }) => ({ day, kind })));
const shapesOf = (chart: ChartSpec) => {
  const { shape, fill } = badLayers(chart)[0]!.encoding as Record<
    'shape' | 'fill',
    { scale: { domain: string[]; range: string[] } }
  >;
  expect(fill.scale.domain).toEqual(shape.scale.domain);
  return shape.scale.domain.map((kind, k) => [kind, shape.scale.range[k], fill.scale.range[k]]);
};

describe('daysChart', () => {
  const factors = dailyFactors(dayModel(rows, model));
  const degraded = factors.filter((one) => one.degraded === true);
  const sky = factors.map(
    ({ day }, k): SkyDay => ({
      day,
      ap: k,
      kpMax: k % 9,
      hpMax: k / 2 + 0.5,
      f107: null,
      dstMin: null,
      indexShare: 1,
      tecMean: null,
      tecMax: null,
      gradientMean: null,
      tecChange: null,
      shorteningPpm: null,
      mapShare: 0,
      shareWithoutFix: null,
    }),
  );

  it('draws every factor with its band and tells degraded days by shape, column and word', () => {
    expect(degraded.length).toBeGreaterThan(0);
    const chart = daysChart({ factors });
    expect(chart.title).toBe(`Degraded days of 20: ${degraded.length} in horizontal ppm`);
    const drawn = allRows(chart, 'factor', 'low');
    for (const { day, factor, low, high } of factors)
      expect(
        drawn.some((one) => one.day === day && one.factor === factor && one.low === low && one.high === high),
      ).toBe(true);
    expect(kindsDrawn(chart)).toEqual(degraded.map(({ day }) => ({ day, kind: 'degraded' })));
    expect(shapesOf(chart)).toEqual([['degraded', 'diamond', COLORS.ink]]);
    for (const { day } of degraded) expect(chart.description).toContain(`${Number(day.slice(8))} Mar`);
  });

  it('tells what degraded days are put down to: by shape, and a cause on the ground by word', () => {
    const bad = new Set([1, 2, 5, 9, 12].map((k) => factors[k]!.day));
    const five = factors.map((one) => ({ ...one, degraded: bad.has(one.day) }));
    const verdicts = [
      ['one crew', 'ridge'],
      ['one crew', 'ridge'],
      ['grows with distance', null],
      ['not explained', null],
      ['bad setup', 'B1'],
    ] as const;
    const explanations = [...bad].map((day, k) => {
      const [verdict, subject] = verdicts[k]!;
      return { day, component: 'horizontal' as const, verdict, subject };
    });
    const chart = daysChart({ factors: five, explanations });
    expect(kindsDrawn(chart).map(({ kind }) => kind)).toEqual([
      'cause on the ground',
      'cause on the ground',
      'grows with distance',
      'not explained',
      'cause on the ground',
    ]);
    expect(shapesOf(chart)).toEqual([
      ['grows with distance', 'diamond', COLORS.ink],
      ['not explained', 'diamond', 'white'],
      ['cause on the ground', 'square', COLORS.ink],
    ]);
    // once for days in a row with one cause; line, outline and text each
    const labels = allRows(chart, 'word').map(({ day, word }) => `${day} ${word}`);
    const crew = `${factors[1]!.day} one crew ridge`;
    const setup = `${factors[12]!.day} bad setup B1`;
    expect(labels.sort()).toEqual([crew, crew, crew, setup, setup, setup].sort());
  });

  it('hangs words so that no line to a day runs through those of another', () => {
    const days = Array.from({ length: 40 }, (_, k) => `day ${k + 10}`);
    fc.assert(
      fc.property(
        fc.uniqueArray(fc.record({ at: fc.nat(39), size: fc.integer({ min: 3, max: 25 }) }), {
          selector: ({ at }) => at,
          minLength: 1,
        }),
        fc.boolean(),
        (picks, inLeftHalf) => {
          const labels = picks
            .filter(({ at }) => at < 20 === inLeftHalf)
            .map(({ at, size }) => ({ day: days[at]!, word: 'x'.repeat(size), high: 2 }));
          const placed = placedLabels(labels, days, 640);
          expect(placed.map(({ day }) => day).sort()).toEqual(labels.map(({ day }) => day).sort());
          const at = (day: string): number => ((days.indexOf(day) + 0.5) / 40) * 640;
          for (const one of placed)
            for (const other of placed) {
              if (one === other || other.line <= one.line) continue;
              // the line of the upper one goes down to its day past the words of the lower one
              const widthPx = roughTextWidthPx(other.word, FONT_SIZE.small, true);
              const [from, to] =
                other.align === 'left'
                  ? [at(other.day), at(other.day) + widthPx]
                  : [at(other.day) - widthPx, at(other.day)];
              expect(at(one.day) > from && at(one.day) < to).toBe(false);
            }
        },
      ),
      { seed: 5 },
    );
  });

  it('names the days on the axis by weeks, Mondays, where there are some', () => {
    const spring = factors.map((one, k) => ({
      ...one,
      day: `2025-03-${String(k + 5).padStart(2, '0')}`,
    }));
    const axisOf = (chart: ChartSpec): unknown =>
      (layersOf(panels(chart).at(-1)!)[0]!.encoding as { x: { axis: { values: string[] } } }).x.axis.values;
    const later = spring.map((one, k) => (k === 19 ? { ...one, day: '2025-03-30' } : one));
    expect(axisOf(daysChart({ factors: later }))).toEqual(['2025-03-10', '2025-03-17', '2025-03-24']);
    expect((axisOf(daysChart({ factors: spring })) as string[]).slice(0, 2)).toEqual([
      '2025-03-05',
      '2025-03-07',
    ]);
  });

  it('has bars of the greatest Kp, of Ap where that is asked for or Kp is not known, none without', () => {
    const bars = (chart: ChartSpec) =>
      panels(chart).flatMap((panel) => layersOf(panel).filter(({ mark }) => mark.type === 'bar'));
    const values = (chart: ChartSpec) =>
      bars(chart).flatMap(({ data }) => data.values.map(({ value }) => value));
    expect(values(daysChart({ factors, sky }))).toEqual(sky.map(({ kpMax }) => kpMax));
    expect(values(daysChart({ factors, sky, activity: 'ap' }))).toEqual(sky.map(({ ap }) => ap));
    const withoutKp = sky.map((one) => ({ ...one, kpMax: null }));
    expect(values(daysChart({ factors, sky: withoutKp }))).toEqual(sky.map(({ ap }) => ap));
    const withHp = withoutKp.map((one) => ({ ...one, ap: null }));
    expect(values(daysChart({ factors, sky: withHp }))).toEqual(sky.map(({ hpMax }) => hpMax));
    expect(daysChart({ factors, sky: withHp }).subtitle[1]).toContain('bars: greatest Hp of the day');
    const nothing = daysChart({ factors, sky: withHp.map((one) => ({ ...one, hpMax: null })) });
    expect(bars(nothing)).toEqual([]);
    expect(panels(nothing)).toHaveLength(1);
    expect(panels(daysChart({ factors, sky }))).toHaveLength(2);
  });

  it('has a panel for each component, and words for days that cannot be named or none', () => {
    const vertical = factors.map((one): DailyFactor => ({ ...one, component: 'vertical', degraded: false }));
    const both = daysChart({ factors: [...vertical, ...factors] });
    expect(panels(both)).toHaveLength(2);
    expect(both.title).toBe(`Degraded days of 20: ${degraded.length} in horizontal ppm, 0 in vertical ppm`);
    expect(daysChart({ factors: vertical }).title).toBe('No day of 20 is named degraded');
    const unnamed = factors.map((one) => ({ ...one, degraded: null }));
    expect(daysChart({ factors: unnamed }).title).toBe('Daily ppm of 20 days: degraded days cannot be named');
    expect(() => daysChart({ factors: [] })).toThrow('Expected daily factors, came none.');
  });
});

describe('associationChart', () => {
  const points: SkyPoint[] = [
    { day: '2025-03-01', outcome: 1, measure: 3, degraded: false },
    { day: '2025-03-02', outcome: 2.5, measure: 6, degraded: true },
    { day: '2025-03-03', outcome: Number.NaN, measure: 2, degraded: false },
  ];
  const association = { days: 2, spearman: 0.7, low: 0.4, high: 0.9, pValue: 0.004 };
  const input = { points, association, outcome: 'horizontal daily factor', measure: 'greatest Kp' };

  it('draws the days that have both, and says that going together names no cause', () => {
    const chart = associationChart(input);
    expect(allRows(chart, 'outcome', 'measure')).toHaveLength(2);
    expect(chart.title).toBe(
      'Horizontal daily factor and greatest Kp rise together on 2\u00a0days, cause not shown',
    );
    expect(chart.subtitle[0]).toContain('0.70 (0.40 to 0.90)');
    for (const told of [chart.subtitle.join(' '), chart.description])
      expect(told).toContain('names no cause');
  });

  it('goes by the chance adjusted for all comparisons, where it is given', () => {
    const adjusted = associationChart({ ...input, association: { ...association, adjustedPValue: 0.08 } });
    expect(adjusted.title).toContain('not shown to go together on 2\u00a0days');
    expect(adjusted.subtitle[0]).toContain('with all comparisons counted p\u00a0=\u00a00.08');
    const opposite = associationChart({ ...input, association: { ...association, spearman: -0.7 } });
    expect(opposite.title).toContain('go opposite ways');
    for (const missing of [{ pValue: null }, { spearman: null, pValue: null }]) {
      expect(associationChart({ ...input, association: { ...association, ...missing } }).title).toContain(
        'too few days to tell',
      );
    }
  });

  it('refuses days that have not both', () => {
    expect(() => associationChart({ ...input, points: points.slice(2) })).toThrow(
      'Expected days with horizontal daily factor and greatest Kp, came none.',
    );
  });
});

const factors = dailyFactors(dayModel(rows, model));
const charts: [string, () => ChartSpec][] = [
  ['hours', () => hourPpmChart({ timeOfDay: timeOf() })],
  ['hours and days', () => hourDayChart({ component: 'horizontal', cells: hourDayRatios(rows, model) })],
  [
    'hours of one day',
    () => hourDayChart({ component: 'horizontal', cells: hourDayRatios(rows, model).slice(0, 3) }),
  ],
  ['days', () => daysChart({ factors })],
  ['one day', () => daysChart({ factors: factors.slice(0, 1) })],
  [
    'days of many years',
    () => daysChart({ factors: factors.map((one, k) => ({ ...one, day: `20${10 + k}-03-01` })) }),
  ],
  [
    'a share without a fix',
    () =>
      associationChart({
        points: [{ day: 'a', outcome: 0, measure: 1, degraded: null }],
        association: { days: 1, spearman: null, low: null, high: null, pValue: null },
        outcome: 'share without a fix',
        measure: 'TEC',
      }),
  ],
];

it.each(charts)('draws %s without a warning, the same bytes twice', async (_, make) => {
  const svg = await renderSvg(make());
  expect(svg).toContain('</svg>');
  expect(await renderSvg(make())).toBe(svg);
  const { description, vegaLite } = make();
  expect(description.length).toBeGreaterThan(80);
  expect(JSON.stringify(vegaLite)).not.toMatch(/NaN|undefined/);
});
