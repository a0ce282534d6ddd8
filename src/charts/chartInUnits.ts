import { type ReaderUnit, type ReaderUnits, textInUnits } from '../study/index.js';
import type { ChartSpec, View } from './chartSpec.js';

/**
 * A chart in the units of a reader: axes get round ticks in his units, and lengths in titles and labels are turned into
 * them. The data stay as they are.
 * @param names that look like lengths and stay
 */
export function chartInUnits(chart: ChartSpec, units: ReaderUnits, names: readonly string[] = []): ChartSpec {
  if (units.kind === 'metric') return chart;
  const text = (words: string): string => inWords(words, units, names);
  return {
    title: text(chart.title),
    subtitle: chart.subtitle.map(text),
    description: text(chart.description),
    vegaLite: turned(chart.vegaLite, units, names) as View,
  };
}

const inWords = (words: string, units: ReaderUnits, names: readonly string[]): string =>
  textInUnits(words, units, names).replaceAll('millimetres', 'feet').replaceAll('kilometres', 'miles');

/** Parts of a specification that are no words of a chart. */
const NO_WORDS = new Set([
  '$schema',
  'config',
  'field',
  'type',
  'labelExpr',
  'format',
  'expr',
  'color',
  'stroke',
  'fill',
  'font',
]);

function turned(part: unknown, units: ReaderUnits, names: readonly string[]): unknown {
  if (typeof part === 'string') return inWords(part, units, names);
  if (Array.isArray(part)) return part.map((each) => turned(each, units, names));
  if (part === null || typeof part !== 'object') return part;
  const result: Record<string, unknown> = {};
  for (const [key, value] of Object.entries(part)) {
    result[key] = NO_WORDS.has(key) ? value : turned(value, units, names);
  }
  return withAxis(result, units);
}

/** A channel whose axis names mm or km as its unit. */
function withAxis(channel: Record<string, unknown>, units: ReaderUnits): Record<string, unknown> {
  const axis = channel.axis as { readonly title?: unknown; readonly tickCount?: number } | null | undefined;
  const domain = (channel.scale as { readonly domain?: unknown } | undefined)?.domain;
  if (channel.type !== 'quantitative' || typeof axis?.title !== 'string' || !Array.isArray(domain))
    return channel;
  const unit = / (mm|km)$/.exec(axis.title)?.[1];
  if (unit === undefined) return channel;
  const { name, perOurs } = unit === 'mm' ? units.error : units.distance;
  const values = roundTicks(domain as [number, number], perOurs, axis.tickCount ?? 6);
  return {
    ...channel,
    axis: {
      ...axis,
      title: axis.title.replace(/ (mm|km)$/, ` ${name}`),
      values,
      labelExpr: `format(datum.value * ${perOurs}, '~g')`,
    },
  };
}

/** Places of ticks, in our unit, that are round in the unit of the reader. */
function roundTicks(
  [from, to]: readonly [number, number],
  perOurs: ReaderUnit['perOurs'],
  count: number,
): number[] {
  const rough = ((to - from) * perOurs) / count;
  const power = 10 ** Math.floor(Math.log10(rough));
  const step = power * (rough / power > 5 ? 10 : rough / power > 2 ? 5 : rough / power > 1 ? 2 : 1);
  const first = Math.ceil((from * perOurs) / step - 1e-9);
  const last = Math.floor((to * perOurs) / step + 1e-9);
  return Array.from({ length: last - first + 1 }, (_, k) => ((first + k) * step) / perOurs);
}
