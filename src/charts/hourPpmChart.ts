import type { HourClass, HourHarmonics, TimeOfDay } from '../days/index.js';
import { inputError } from '../logs/index.js';
import { type ChartSpec, chartSpec, type View } from './chartSpec.js';
import { COLORS, FONT_SIZE, QUIET_INK } from './theme.js';
import { componentTitle, counted, pWords, roundUp } from './words.js';

/** What {@link hourPpmChart} draws. */
export interface HourPpmInput {
  /** From `timeOfDay`, or of `results.timeOfDay`, which has its notes among the messages. */
  readonly timeOfDay: Omit<TimeOfDay, 'notes'> & Partial<Pick<TimeOfDay, 'notes'>>;
}

const LEVEL = 0.05;
const WIDTH_PX = 620;
const HEIGHT_PX = 300;

interface HourRow {
  readonly from: number;
  /** Beyond 24 where work goes on over midnight. */
  readonly to: number;
  readonly middle: number;
  readonly ppm: number;
  readonly low: number;
  readonly high: number;
  readonly text: string;
}

/**
 * The ppm in each third of the working hours with its interval, and whether they differ.
 * @throws InputError when there are no hours to compare
 */
export function hourPpmChart({ timeOfDay }: HourPpmInput): ChartSpec {
  const { pValue, hours, notes = [] } = timeOfDay;
  const rows = hourRows(hours);
  if (rows.length === 0) {
    const why = notes[0]?.text ?? 'No hours could be compared.';
    throw inputError('bad-option', `Expected the ppm of some hours, came none. ${why}`);
  }
  const title = titleOf(timeOfDay);
  const subtitle = [
    `Equal thirds of the working hours, adjusted for the days they fall on${pValue === null ? '' : `; ${pWords(pValue)} by days`}`,
    ...(timeOfDay.harmonics === null ? [] : [waveWords(timeOfDay.harmonics)]),
    ...notes.filter(({ code }) => code !== 'hours-differ').map(({ text }) => text),
  ];
  return chartSpec(title, subtitle, describe(timeOfDay, title), {
    width: WIDTH_PX,
    height: HEIGHT_PX,
    layer: layers(rows),
  });
}

/** The smooth course in words: its curve has no level of its own. */
const waveWords = ({ count, ratio, highestHour, pValue }: HourHarmonics): string =>
  `A daily course of ${count === 1 ? 'one wave' : 'two waves'} is highest at ${highestHour.toFixed(0)}\u00a0h, ${ratio.toFixed(1)} times its lowest; ${pWords(pValue)} by days`;

function hourRows(hours: readonly HourClass[]): HourRow[] {
  const first = hours[0]?.from ?? 0;
  const onward = (hour: number): number => (hour < first ? hour + 24 : hour);
  return hours.flatMap(({ from, to, ppm, occupations, days }) => {
    if (ppm.estimate === null) return [];
    const [start, end] = [onward(from), to <= first ? to + 24 : to];
    return [
      {
        from: start,
        to: end,
        middle: (start + end) / 2,
        ppm: ppm.estimate,
        low: ppm.low ?? ppm.estimate,
        high: ppm.high ?? ppm.estimate,
        text: `${counted(occupations, 'occupation')} on ${counted(days, 'day')}`,
      },
    ];
  });
}

function layers(rows: readonly HourRow[]): View[] {
  const most = roundUp(Math.max(...rows.map(({ high }) => high), 0.01) * 1.15);
  const [first, last] = [Math.min(...rows.map(({ from }) => from)), Math.max(...rows.map(({ to }) => to))];
  const x = {
    type: 'quantitative',
    scale: { domain: [first - 0.3, last + 0.3], nice: false, zero: false },
    axis: { title: 'local mean solar time, h', labelExpr: 'datum.value % 24', tickMinStep: 1 },
  };
  const y = {
    type: 'quantitative',
    scale: { domain: [0, most], nice: false },
    axis: { title: 'ppm, mm per km', tickCount: 5 },
  };
  const data = { values: rows };
  return [
    {
      data,
      mark: { type: 'rect', color: COLORS.water, opacity: 0.16 },
      encoding: {
        x: { ...x, field: 'from' },
        x2: { field: 'to' },
        y: { ...y, field: 'low' },
        y2: { field: 'high' },
      },
    },
    {
      data,
      mark: { type: 'rule', color: COLORS.water, strokeWidth: 3 },
      encoding: { x: { ...x, field: 'from' }, x2: { field: 'to' }, y: { ...y, field: 'ppm' } },
    },
    {
      data,
      mark: { type: 'rule', color: COLORS.ink, strokeWidth: 1.6 },
      encoding: { x: { ...x, field: 'middle' }, y: { ...y, field: 'low' }, y2: { field: 'high' } },
    },
    {
      data,
      mark: { type: 'circle', color: COLORS.ink, size: 58, opacity: 1 },
      encoding: { x: { ...x, field: 'middle' }, y: { ...y, field: 'ppm' } },
    },
    {
      data,
      mark: { type: 'text', align: 'left', dx: 9, dy: -9, fontWeight: 'bold', fontSize: FONT_SIZE.text },
      encoding: {
        x: { ...x, field: 'middle' },
        y: { ...y, field: 'ppm' },
        text: { field: 'ppm', type: 'quantitative', format: '.2f' },
      },
    },
    {
      data,
      mark: { type: 'text', y: HEIGHT_PX - 10, color: QUIET_INK },
      encoding: { x: { ...x, field: 'middle' }, text: { field: 'text' } },
    },
  ];
}

const hourWords = ({ from, to }: HourClass): string => `${from.toFixed(1)} to ${to.toFixed(1)} h`;

function titleOf({ component, pValue, hours }: HourPpmInput['timeOfDay']): string {
  const name = `${componentTitle(component)} ppm`;
  if (pValue === null) return `${name} by hour: too few days to tell`;
  if (pValue >= LEVEL) return `${name}: no hour is shown to differ`;
  const known = hours.filter(({ ppm }) => ppm.estimate !== null);
  const worst = known.reduce((a, b) => (b.ppm.estimate! > a.ppm.estimate! ? b : a));
  return `${name} depends on the hour: ${worst.ppm.estimate!.toFixed(2)} from ${hourWords(worst)}`;
}

function describe({ component, hours }: HourPpmInput['timeOfDay'], title: string): string {
  const parts = hours.flatMap((one) => {
    const { estimate, low, high } = one.ppm;
    if (estimate === null) return [];
    const limits = low === null || high === null ? '' : ` (${low.toFixed(2)} to ${high.toFixed(2)})`;
    return [`${estimate.toFixed(2)}${limits} from ${hourWords(one)}`];
  });
  return `${title}. The ${component} ppm in mm per km by local mean solar time: ${parts.join(', ')}.`;
}
