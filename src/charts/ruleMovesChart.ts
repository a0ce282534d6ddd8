import { inputError } from '../logs/index.js';
import { type ReaderUnits, type RuleMove, readerUnits } from '../study/index.js';
import { type ChartSpec, chartSpec, type View } from './chartSpec.js';
import { AMOUNT_RAMP, COLORS, FONT_SIZE, QUIET_INK } from './theme.js';
import { kmRoundedDown, shortNumber } from './words.js';

/** What {@link ruleMovesChart} draws. */
export interface RuleMovesInput {
  /** From the results: of each component the moves of its first limit are drawn. */
  readonly moves: readonly RuleMove[];
  /** What was changed, in a few words. */
  readonly words: (move: RuleMove) => string;
  readonly units?: ReaderUnits | undefined;
}

const WIDTH_PX = 430;
const ROW_PX = 24;

/**
 * How far a limit moves when one mark, day or crew is left out, or one thing is done otherwise: one bar each.
 * @throws InputError when no move gives a distance
 */
export function ruleMovesChart({ moves, words, units = readerUnits('metric') }: RuleMovesInput): ChartSpec {
  const panels = (['horizontal', 'vertical'] as const).flatMap((component) => {
    const own = moves.filter((move) => move.component === component);
    const first = own.filter(({ limitMm, share }) => limitMm === own[0]!.limitMm && share === own[0]!.share);
    return first.some(({ maximumBaselineKm }) => maximumBaselineKm) ? [first] : [];
  });
  if (panels.length === 0) {
    throw inputError(
      'bad-option',
      'Expected a rule that gives a distance, came none. Hand in the moves of such a rule.',
    );
  }
  const longest = Math.max(...panels.flat().map(({ maximumBaselineKm }) => maximumBaselineKm ?? 0));
  const findings = panels.map((panel) => finding(panel, units));
  return chartSpec(
    `With one thing changed: ${findings.join(', ')}`,
    ['Each bar is the limit found again with one thing changed; the upright line is the rule'],
    `Bar chart. ${findings.join('. ')}. ${panels
      .flatMap((panel) => panel.map((move) => `${words(move)}: ${valueWords(move, units)}`))
      .join('; ')}.`,
    {
      vconcat: panels.map((panel) => panelView(panel, words, units, longest * units.distance.perOurs * 1.04)),
      spacing: 26,
    },
  );
}

const placeWords = ({ component }: RuleMove): string =>
  component === 'horizontal' ? 'in plan' : 'in height';

const limitWords = ({ limitMm }: RuleMove, { error }: ReaderUnits): string =>
  `${error.name === 'mm' ? shortNumber(limitMm) : String(Number((limitMm * error.perOurs).toFixed(error.decimals)))} ${error.name}`;

const distanceOf = ({ maximumBaselineKm }: RuleMove, { distance }: ReaderUnits): number =>
  (maximumBaselineKm ?? 0) * distance.perOurs;

function valueWords(move: RuleMove, units: ReaderUnits): string {
  return move.maximumBaselineKm === null
    ? 'no rule'
    : `${kmRoundedDown(distanceOf(move, units))} ${units.distance.name}`;
}

/** `25 mm in plan 4.3 to 9.7 km (rule 8.9)`. */
function finding(panel: readonly RuleMove[], units: ReaderUnits): string {
  const [stated, ...rest] = panel as [RuleMove, ...RuleMove[]];
  const head = `${limitWords(stated, units)} ${placeWords(stated)}`;
  const lengths = rest.flatMap((move) => (move.maximumBaselineKm === null ? [] : [distanceOf(move, units)]));
  if (lengths.length === 0) return `${head} ${valueWords(stated, units)}`;
  const [low, high] = [Math.min(...lengths), Math.max(...lengths)].map(kmRoundedDown);
  const range = low === high ? low : `${low} to ${high}`;
  const rule =
    stated.maximumBaselineKm === null ? 'no rule' : `rule ${kmRoundedDown(distanceOf(stated, units))}`;
  return `${head} ${range} ${units.distance.name} (${rule})`;
}

/** Bars shorter than this share of the longest have no room for their number. */
const ROOM_SHARE = 0.18;

function panelView(
  panel: readonly RuleMove[],
  words: RuleMovesInput['words'],
  units: ReaderUnits,
  most: number,
): View {
  const rows = panel.map((move) => ({
    label: words(move),
    km: distanceOf(move, units),
    text: valueWords(move, units),
    inside: distanceOf(move, units) > ROOM_SHARE * most,
    color: move.kind === 'as stated' ? COLORS.water : AMOUNT_RAMP[2],
    ink: move.kind === 'as stated' ? 'white' : COLORS.ink,
  }));
  const labels = rows.map(({ label }) => label);
  const y = {
    field: 'label',
    type: 'nominal',
    scale: { domain: labels, paddingInner: 0.3 },
    sort: null,
    axis: { title: null, ticks: false, domain: false, labelPadding: 8 },
  };
  const x = {
    type: 'quantitative',
    scale: { domain: [0, most], nice: false },
    axis: { title: `holds to, ${units.distance.name}`, tickCount: 6 },
  };
  return {
    title: {
      text: `${limitWords(panel[0]!, units)} ${placeWords(panel[0]!)}`,
      anchor: 'start',
      fontSize: FONT_SIZE.text,
      fontWeight: 'normal',
      color: COLORS.ink,
      offset: 4,
    },
    width: WIDTH_PX,
    height: labels.length * ROW_PX,
    layer: [
      {
        data: { values: [{ km: rows[0]!.km }] },
        mark: { type: 'rule', color: COLORS.ink, strokeWidth: 1.2 },
        encoding: { x: { ...x, field: 'km' } },
      },
      {
        data: { values: rows },
        mark: { type: 'bar' },
        encoding: { y, x: { ...x, field: 'km' }, color: { field: 'color', type: 'nominal', scale: null } },
      },
      {
        data: { values: rows.filter(({ inside }) => inside) },
        // At the beginning of the bar, where no rule can cross it.
        mark: { type: 'text', align: 'left', baseline: 'middle', dx: 6 },
        encoding: {
          y,
          x: { datum: 0, type: 'quantitative' },
          text: { field: 'text' },
          color: { field: 'ink', type: 'nominal', scale: null },
        },
      },
      {
        data: { values: rows.filter(({ inside }) => !inside) },
        mark: { type: 'text', align: 'left', baseline: 'middle', dx: 6, color: QUIET_INK },
        encoding: { y, x: { ...x, field: 'km' }, text: { field: 'text' } },
      },
    ],
  };
}
