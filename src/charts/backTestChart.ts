import { inputError } from '../logs/index.js';
import { type BackTestResult, type ReaderUnits, readerUnits } from '../study/index.js';
import { type ChartSpec, chartSpec, type View } from './chartSpec.js';
import { COLORS, FONT_SIZE, OCHRE_TEXT } from './theme.js';
import { percentWords, shortNumber } from './words.js';

/** What {@link backTestChart} draws. */
export interface BackTestChartInput {
  /** From the results: what was found on days left out, one for each component. */
  readonly backTest: readonly BackTestResult[];
  readonly units?: ReaderUnits | undefined;
}

const WIDTH_PX = 300;
const HEIGHT_PX = 250;

interface Row {
  readonly group: string;
  readonly share: number;
  readonly low: number | null;
  readonly high: number | null;
}

/**
 * Share of positions inside the limit on days that had no part in it, by class of distance: the own limit beside that of
 * the spec sheet. A good limit lies on the line at its share.
 * @throws InputError when there was no back-test
 */
export function backTestChart({ backTest, units = readerUnits('metric') }: BackTestChartInput): ChartSpec {
  if (backTest.length === 0) {
    throw inputError(
      'bad-option',
      'Expected a back-test, came none. Hand in that of a study with enough days.',
    );
  }
  const sheet = sheetWords(backTest);
  const least = Math.min(...backTest.flatMap((test) => [test.share, ...lowest(test)]));
  const domain: [number, number] = [Math.max(0, Math.floor(10 * (least - 0.03)) / 10), 1];
  const title = `On days not seen, ${backTest.map((test) => `${percentWords(test.observedShare)} ${place(test)}`).join(' and ')} lay inside the own limit for ${percentWords(backTest[0]!.share)}`;
  return chartSpec(
    title,
    [
      'Each day is judged by limits that were found without it; bars: 95 % intervals, which count days',
      ...(sheet === null ? [] : [sheet]),
    ],
    `Share of positions inside the limit by distance from the base. ${title}. ${sheet === null ? '' : `${sheet}. `}${backTest
      .flatMap((test) =>
        test.lengthClasses.map(
          (one) =>
            `${place(test)}, ${classWords(one, units)} ${units.distance.name}: ${percentWords(one.observedShare)}`,
        ),
      )
      .join('; ')}.`,
    {
      hconcat: backTest.map((test, k) => panelView(test, units, domain, k === 0)),
      spacing: 30,
    },
  );
}

/** The lowest things to be drawn; intervals may be cut, points not. */
const lowest = ({ lengthClasses, specSheet }: BackTestResult): number[] =>
  [...lengthClasses, ...(specSheet?.lengthClasses ?? [])].map(({ observedShare }) => observedShare);

const place = ({ component }: BackTestResult): string =>
  component === 'horizontal' ? 'in plan' : 'in height';

function sheetWords(backTest: readonly BackTestResult[]): string | null {
  const parts = backTest.flatMap((test) =>
    test.specSheet === null ? [] : [`${percentWords(test.specSheet.observedShare)} ${place(test)}`],
  );
  return parts.length === 0 ? null : `Inside the limit of the spec sheet: ${parts.join(' and ')}`;
}

const classWords = (
  { fromKm, toKm }: { readonly fromKm: number; readonly toKm: number | null },
  { distance }: ReaderUnits,
): string =>
  toKm === null
    ? `over ${shortNumber(fromKm * distance.perOurs)}`
    : `${shortNumber(fromKm * distance.perOurs)}–${shortNumber(toKm * distance.perOurs)}`;

function panelView(
  test: BackTestResult,
  units: ReaderUnits,
  domain: readonly [number, number],
  first: boolean,
): View {
  const rowsOf = (classes: BackTestResult['lengthClasses']): Row[] =>
    classes.map((one) => ({
      group: classWords(one, units),
      share: one.observedShare,
      low: one.low === null ? null : Math.max(domain[0], one.low),
      high: one.high,
    }));
  const own = rowsOf(test.lengthClasses);
  const sheet = rowsOf(test.specSheet?.lengthClasses ?? []);
  const groups = own.map(({ group }) => group);
  const x = {
    field: 'group',
    type: 'ordinal',
    scale: { domain: groups },
    sort: null,
    axis: { title: `distance from the base, ${units.distance.name}`, labelAngle: 0 },
  };
  const y = {
    type: 'quantitative',
    scale: { domain, nice: false, zero: false },
    axis: first
      ? { title: 'share of positions inside the limit', format: '.0%', tickCount: 6 }
      : { title: null, format: '.0%', tickCount: 6 },
  };
  const line = { data: { values: [{ share: test.share }] } };
  return {
    title: {
      text: `${place(test)}, limit for ${percentWords(test.share)}`,
      anchor: 'start',
      fontSize: FONT_SIZE.text,
      fontWeight: 'normal',
      color: COLORS.ink,
      offset: 6,
    },
    width: WIDTH_PX,
    height: HEIGHT_PX,
    layer: [
      {
        ...line,
        mark: { type: 'rule', color: COLORS.brick, strokeWidth: 2 },
        encoding: { y: { ...y, field: 'share' } },
      },
      {
        data: { values: sheet },
        mark: { type: 'line', color: COLORS.ochre, strokeDash: [6, 4], strokeWidth: 2 },
        encoding: { x, y: { ...y, field: 'share' } },
      },
      {
        data: { values: sheet },
        mark: { type: 'square', color: 'white', stroke: COLORS.ochre, strokeWidth: 2, size: 60, opacity: 1 },
        encoding: { x, y: { ...y, field: 'share' } },
      },
      {
        data: { values: own.filter(({ low }) => low !== null) },
        mark: { type: 'rule', color: COLORS.water, strokeWidth: 2 },
        encoding: { x, y: { ...y, field: 'low' }, y2: { field: 'high' } },
      },
      {
        data: { values: own },
        mark: { type: 'circle', color: COLORS.water, size: 80, opacity: 1 },
        encoding: { x, y: { ...y, field: 'share' } },
      },
      ...(first ? keyLayers(sheet.length > 0) : []),
    ],
  };
}

/** What circles and squares are, in the lower left corner where no share lies. */
function keyLayers(sheet: boolean): View[] {
  const entries = [
    ...(sheet
      ? [
          {
            px: HEIGHT_PX - 36,
            text: 'spec sheet',
            shape: 'square',
            color: 'white',
            ink: COLORS.ochre,
            words: OCHRE_TEXT,
          },
        ]
      : []),
    {
      px: HEIGHT_PX - 16,
      text: 'own model',
      shape: 'circle',
      color: COLORS.water,
      ink: COLORS.water,
      words: COLORS.water,
    },
  ];
  return entries.flatMap(({ px, text, shape, color, ink, words }): View[] => [
    {
      data: { values: [{}] },
      mark: { type: 'point', shape, filled: true, color, stroke: ink, strokeWidth: 2, size: 60, opacity: 1 },
      encoding: { x: { value: 14 }, y: { value: px } },
    },
    {
      data: { values: [{}] },
      mark: { type: 'text', text, align: 'left', baseline: 'middle', color: words },
      encoding: { x: { value: 26 }, y: { value: px } },
    },
  ]);
}
