import type { RankAssociation } from '../days/index.js';
import { inputError } from '../logs/index.js';
import type { SkyPoint } from '../study/index.js';
import { type ChartSpec, chartSpec, type View } from './chartSpec.js';
import { COLORS } from './theme.js';
import { counted, pWords } from './words.js';

/** What {@link associationChart} draws. */
export interface AssociationInput {
  /** One a day, from `skyPoints`; days on which one of the two is not known are not drawn. */
  readonly points: readonly SkyPoint[];
  /** From `rankAssociation` or `results.sky`, of the same days. */
  readonly association: Pick<RankAssociation, 'days' | 'spearman' | 'low' | 'high' | 'pValue'> & {
    readonly adjustedPValue?: number | null | undefined;
  };
  /** What was compared, as axes are named: `horizontal daily factor`, `greatest Kp`. */
  readonly outcome: string;
  readonly measure: string;
}

const WIDTH_PX = 520;
const HEIGHT_PX = 320;
const LEVEL = 0.05;
/** A line of the subtitle over a chart of this width. */
const CAUTION =
  'Going together names no cause: season, hours of work, crews and sites may move both on the same days';

/**
 * An outcome of the days against a measure of the sky, one point a day, with wording that keeps going together and
 * causing apart.
 * @throws InputError when no day has both
 */
export function associationChart({ points, association, outcome, measure }: AssociationInput): ChartSpec {
  const known = points.filter((one) => !Number.isNaN(one.outcome) && !Number.isNaN(one.measure));
  if (known.length === 0) {
    throw inputError(
      'bad-option',
      `Expected days with ${outcome} and ${measure}, came none. Hand in days that have both.`,
    );
  }
  const title = titleOf(association, outcome, measure);
  const named = known.some(({ degraded }) => degraded === true);
  return chartSpec(
    title,
    [sizeWords(association), CAUTION, ...(named ? ['Diamonds: degraded days'] : [])],
    `${title}. ${sizeWords(association)}. ${CAUTION}.`,
    { width: WIDTH_PX, height: HEIGHT_PX, layer: layers(known, outcome, measure) },
  );
}

function layers(points: readonly SkyPoint[], outcome: string, measure: string): View[] {
  const isShare = outcome.startsWith('share');
  const isFactor = outcome.endsWith('factor');
  const x = {
    type: 'quantitative',
    field: 'measure',
    scale: { zero: false, padding: 12 },
    axis: { title: axisTitle(measure), tickCount: 8 },
  };
  const y = {
    type: 'quantitative',
    field: 'outcome',
    scale: isFactor ? { type: 'log', padding: 12, nice: false } : { zero: true },
    axis: {
      title: isShare ? 'share of visits without a fix' : outcome,
      ...(isFactor ? { values: [0.2, 0.5, 0.7, 1, 1.5, 2, 3, 5, 10], format: '~g' } : {}),
      ...(isShare ? { format: '.0%' } : {}),
    },
  };
  // a layer without rows would leave its axis without ends
  const layer = (values: readonly SkyPoint[], mark: View): View[] =>
    values.length === 0
      ? []
      : [
          {
            data: {
              values: values.map(({ day, outcome: value, measure: of }) => ({
                day,
                outcome: value,
                measure: of,
              })),
            },
            mark: { opacity: 0.85, ...mark },
            encoding: { x, y },
          },
        ];
  return [
    ...layer(
      points.filter(({ degraded }) => degraded !== true),
      { type: 'circle', color: COLORS.water, size: 60 },
    ),
    ...layer(
      points.filter(({ degraded }) => degraded === true),
      { type: 'point', shape: 'diamond', filled: true, color: COLORS.ink, size: 130, opacity: 1 },
    ),
  ];
}

const UNITS: Readonly<Record<string, string>> = {
  'F10.7': 'solar flux units',
  'least Dst': 'nT',
  TEC: 'TECU, daytime mean',
  'TEC gradient': 'TECU per 100 km',
  'TEC change': 'TECU from the day before, either way',
};

const axisTitle = (measure: string): string =>
  UNITS[measure] === undefined ? `${measure} of the day` : `${measure}, ${UNITS[measure]}`;

function titleOf(
  { pValue, adjustedPValue, spearman, days }: AssociationInput['association'],
  outcome: string,
  measure: string,
): string {
  const pair = `${outcome[0]!.toUpperCase()}${outcome.slice(1)} and ${measure}`;
  const chance = adjustedPValue ?? pValue;
  if (spearman === null || chance === null) return `${pair}: too few days to tell`;
  if (chance > LEVEL)
    return `${pair}: not shown to go together on ${counted(days, 'day').replace(' ', '\u00a0')}`;
  return `${pair} ${spearman > 0 ? 'rise together' : 'go opposite ways'} on ${counted(days, 'day').replace(' ', '\u00a0')}, cause not shown`;
}

function sizeWords({ spearman, low, high, pValue, adjustedPValue }: AssociationInput['association']): string {
  if (spearman === null) return 'No rank correlation can be given';
  const [middle, from, to] = [spearman, low, high].map((value) => value?.toFixed(2).replace('-', '\u2212'));
  const limits = from === undefined || to === undefined ? '' : ` (${from} to ${to})`;
  return `Spearman’s rank correlation ${middle}${limits}; ${chanceWords(pValue, adjustedPValue ?? null)}`;
}

function chanceWords(pValue: number | null, adjusted: number | null): string {
  if (pValue === null) return 'too few days for a test';
  return adjusted === null
    ? pWords(pValue)
    : `${pWords(pValue)}; with all comparisons counted ${pWords(adjusted)}`;
}
