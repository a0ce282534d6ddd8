import { type DailyFactor, type DayExplanation, DEGRADED_FACTOR } from '../days/index.js';
import type { Component } from '../fit/index.js';
import { LABEL_LINE_PX, type View } from './chartSpec.js';
import { type DayLabel, flagLayers, type PlacedLabel, placedLabels } from './daysLabels.js';
import { COLORS, FONT_SIZE, QUIET_INK } from './theme.js';

/** What a degraded day is put down to. */
export type DayCause = Pick<DayExplanation, 'component' | 'day' | 'verdict' | 'subject'>;

export const DAYS_WIDTH_PX = 640;
const HEIGHT_PX = 190;
const TICKS = [0.1, 0.2, 0.3, 0.5, 0.7, 1, 1.5, 2, 3, 5, 10];

/** How degraded days are told apart at a glance; a cause on the ground is named beside its day. */
const KINDS = [
  { kind: 'degraded', shape: 'diamond', fill: COLORS.ink },
  { kind: 'grows with distance', shape: 'diamond', fill: COLORS.ink },
  { kind: 'not explained', shape: 'diamond', fill: 'white' },
  { kind: 'cause on the ground', shape: 'square', fill: COLORS.ink },
] as const;
type Kind = (typeof KINDS)[number]['kind'];

function kindOf(day: string, verdicts: readonly DayCause[]): Kind {
  const found = verdicts.find((one) => one.day === day);
  if (found === undefined) return 'degraded';
  const { verdict } = found;
  return verdict === 'grows with distance' || verdict === 'not explained' ? verdict : 'cause on the ground';
}

/** The kinds of degraded days that a chart has, in the order of its legend. */
export function kindsOf(factors: readonly DailyFactor[], verdicts: readonly DayCause[]): Kind[] {
  const found = new Set(
    factors
      .filter(({ degraded }) => degraded === true)
      .map(({ day, component }) =>
        kindOf(
          day,
          verdicts.filter((one) => one.component === component),
        ),
      ),
  );
  return KINDS.map(({ kind }) => kind).filter((kind) => found.has(kind));
}

/** Days that any component calls degraded, as columns behind a panel, so that one follows them down to the bars. */
export const degradedColumns = (degraded: readonly string[], x: View): View => ({
  data: { values: degraded.map((day) => ({ day })) },
  mark: { type: 'rect', color: COLORS.mist, opacity: 0.75 },
  encoding: { x: { ...x, field: 'day' } },
});

/** What a panel of daily factors is drawn from. */
export interface FactorPanel {
  readonly component: Component;
  readonly factors: readonly DailyFactor[];
  readonly verdicts: readonly DayCause[];
  /** The channel of days. */
  readonly x: View;
  /** Days that any component calls degraded. */
  readonly degraded: readonly string[];
  /** Kinds of degraded days of the whole chart. */
  readonly kinds: readonly Kind[];
}

/** Daily factors of one component with their bands; degraded days by shape, and by word where there is a cause. */
export function factorPanel({ component, factors, verdicts, x, degraded, kinds }: FactorPanel): View {
  const rows = factors.map(({ day, factor, low, high, degraded: isDegraded }) => ({
    day,
    factor,
    low,
    high,
    kind: isDegraded === true ? kindOf(day, verdicts) : null,
  }));
  const [ordinary, bad] = [
    rows.filter(({ kind }) => kind === null),
    rows.filter(({ kind }) => kind !== null),
  ];
  const { domain } = x.scale as { readonly domain: readonly string[] };
  const labels = placedLabels(runLabels(bad, rows, verdicts), domain, DAYS_WIDTH_PX);
  const [least, most] = factorRange(rows, labels);
  const y = {
    type: 'quantitative',
    scale: { type: 'log', domain: [least, most], nice: false },
    axis: {
      title: `${component} daily factor`,
      values: TICKS.filter((tick) => tick >= least && tick <= most),
      format: '~g',
    },
  };
  const encoding = { x: { ...x, field: 'day' }, y: { ...y, field: 'factor' } };
  const level = (value: number, mark: View): View => ({
    data: { values: [{ factor: value }] },
    mark: { type: 'rule', color: QUIET_INK, ...mark },
    encoding: { y: { ...y, field: 'factor' } },
  });
  return {
    width: DAYS_WIDTH_PX,
    height: HEIGHT_PX,
    layer: [
      degradedColumns(degraded, x),
      level(1, { strokeWidth: 1.2 }),
      level(DEGRADED_FACTOR, { strokeWidth: 1.2, strokeDash: [5, 4] }),
      {
        data: { values: rows },
        mark: { type: 'rule', color: COLORS.water, strokeWidth: 3, opacity: 0.45 },
        encoding: { x: { ...x, field: 'day' }, y: { ...y, field: 'low' }, y2: { field: 'high' } },
      },
      {
        data: { values: ordinary },
        mark: { type: 'circle', color: COLORS.water, size: 40, opacity: 1 },
        encoding,
      },
      ...(bad.length === 0 ? [] : [badLayer(bad, encoding, kinds)]),
      ...flagLayers(labels, x, y),
    ],
  };
}

/** Degraded days, told apart by shape and filling. */
function badLayer(bad: readonly View[], encoding: View, kinds: readonly Kind[]): View {
  const shown = KINDS.filter(({ kind }) => kinds.includes(kind));
  const domain = shown.map(({ kind }) => kind);
  // the same in every panel, so that one legend serves all
  const legend = {
    orient: 'top',
    title: null,
    offset: 6,
    symbolSize: 110,
    labelFontSize: FONT_SIZE.small,
    columnPadding: 24,
  };
  return {
    data: { values: bad },
    mark: { type: 'point', stroke: COLORS.ink, strokeWidth: 1.8, size: 110, opacity: 1 },
    encoding: {
      ...encoding,
      shape: { field: 'kind', scale: { domain, range: shown.map(({ shape }) => shape) }, legend },
      fill: { field: 'kind', scale: { domain, range: shown.map(({ fill }) => fill) }, legend },
    },
  };
}

/** Ends of the logarithmic axis, with room above the bands for the lines of words. */
function factorRange(
  rows: readonly { readonly low: number; readonly high: number }[],
  labels: readonly PlacedLabel[],
): [number, number] {
  const least = Math.min(...rows.map(({ low }) => low), 0.5) / 1.1;
  const highest = Math.max(...rows.map(({ high }) => high), 2) * 1.1;
  const lines = labels.reduce((most, { line }) => Math.max(most, line + 1), 0);
  const used = Math.max(0.4, 1 - (lines * LABEL_LINE_PX) / HEIGHT_PX);
  return [least, least * (highest / least) ** (1 / used)];
}

/** Causes on the ground, one label for days in a row with the same cause. */
function runLabels(
  bad: readonly { readonly day: string; readonly high: number; readonly kind: Kind | null }[],
  all: readonly { readonly day: string }[],
  verdicts: readonly DayCause[],
): DayLabel[] {
  const place = new Map(all.map(({ day }, k) => [day, k]));
  const labels: DayLabel[] = [];
  let previous: { readonly day: string; readonly word: string } | null = null;
  for (const { day, high, kind } of bad) {
    if (kind !== 'cause on the ground') {
      previous = null;
      continue;
    }
    const { verdict, subject } = verdicts.find((one) => one.day === day)!;
    const word = subject === null ? verdict : `${verdict} ${subject}`;
    const goesOn =
      previous !== null && previous.word === word && place.get(day)! - place.get(previous.day)! === 1;
    if (!goesOn) labels.push({ day, word, high });
    previous = { day, word };
  }
  return labels;
}
