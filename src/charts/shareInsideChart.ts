import { inputError } from '../logs/index.js';
import type { Rule, Tolerance } from '../rule/index.js';
import type { ShareInside } from '../split/index.js';
import { type ChartSpec, chartSpec, type View } from './chartSpec.js';
import { COLORS } from './theme.js';
import { counted, kmRoundedDown, percentWords, shortNumber } from './words.js';

/** What {@link shareInsideChart} draws. */
export interface ShareInsideInput {
  /** From `shareInsideByDistance` with the limit of the tolerance. */
  readonly shares: readonly ShareInside[];
  readonly tolerance: Tolerance;
  /** The rule for the same tolerance, as an upright line. */
  readonly rule?: Rule | undefined;
}

const WIDTH_PX = 620;
const HEIGHT_PX = 320;

/**
 * How many of the positions up to each distance were inside a tolerance, against the share that is asked for.
 * @throws InputError when there is no distance
 */
export function shareInsideChart({ shares, tolerance, rule }: ShareInsideInput): ChartSpec {
  const last = shares.at(-1);
  if (last === undefined) {
    throw inputError(
      'bad-option',
      'Expected shares by distance, came none. Hand in errors of the component of the tolerance.',
    );
  }
  const { component, limitMm, share } = tolerance;
  const km = rule?.maximumBaselineKm ?? null;
  const limit = `${shortNumber(limitMm)} mm`;
  const title = `${component === 'horizontal' ? 'Horizontal' : 'Vertical'}: ${heldWords(shares, limit, share)}`;
  return chartSpec(
    title,
    [
      `Share inside ${limit} of all occupations from the base out to a distance; 95 % band by days`,
      'What was measured, all days together: no limit for days to come',
    ],
    `${title}. Of ${counted(last.occupations, 'occupation')} out to ${last.baselineKm.toFixed(1)} km ${percentWords(last.share)} lie inside; ${percentWords(share)} are asked for.${km === null || km <= 0 ? '' : ` The rule ends at ${kmRoundedDown(km)} km.`}`,
    { width: WIDTH_PX, height: HEIGHT_PX, layer: layers(shares, tolerance, km) },
  );
}

/** Up to where the share stays at what is asked for, by what was measured. */
function heldWords(shares: readonly ShareInside[], limit: string, asked: number): string {
  const failing = shares.findIndex(({ share }) => share < asked);
  const where = (km: number): string => `${km.toFixed(1)} km`;
  if (failing < 0)
    return `${percentWords(asked)} inside ${limit} as far as ${where(shares.at(-1)!.baselineKm)}`;
  if (failing === 0)
    return `fewer than ${percentWords(asked)} inside ${limit} already at ${where(shares[0]!.baselineKm)}`;
  return `${percentWords(asked)} inside ${limit} of all positions out to ${where(shares[failing - 1]!.baselineKm)}`;
}

function layers(shares: readonly ShareInside[], { share: asked }: Tolerance, ruleKm: number | null): View[] {
  const rows = shares.map(({ baselineKm, share, low, high }) => ({
    baselineKm,
    percent: 100 * share,
    low: 100 * (low ?? share),
    high: 100 * (high ?? share),
  }));
  const least = Math.min(100 * asked, ...rows.map(({ percent, low }) => Math.max(low, percent - 15)));
  const floor = Math.max(0, Math.floor((least - 3) / 5) * 5);
  const longest = rows.at(-1)!.baselineKm;
  const x = {
    type: 'quantitative',
    scale: { domain: [0, longest * 1.02], nice: false },
    axis: { title: 'from the base out to, km', tickCount: 8 },
  };
  const y = {
    type: 'quantitative',
    scale: { domain: [floor, 100], nice: false, zero: false },
    axis: { title: 'inside the tolerance, %', tickCount: 6 },
  };
  const at = (field: string): View => ({ x: { ...x, field: 'baselineKm' }, y: { ...y, field } });
  return [
    {
      data: { values: rows },
      mark: { type: 'area', interpolate: 'step-after', clip: true, color: COLORS.water, opacity: 0.2 },
      encoding: { ...at('low'), y2: { field: 'high' } },
    },
    {
      data: { values: rows },
      mark: { type: 'line', interpolate: 'step-after', color: COLORS.water, strokeWidth: 2.5 },
      encoding: at('percent'),
    },
    {
      data: { values: rows },
      mark: { type: 'circle', color: COLORS.water, size: 36, opacity: 1 },
      encoding: at('percent'),
    },
    {
      data: { values: [{ percent: 100 * asked }] },
      mark: { type: 'rule', color: COLORS.brick, strokeWidth: 2 },
      encoding: { y: { ...y, field: 'percent' } },
    },
    {
      data: { values: [{ percent: 100 * asked, text: `${percentWords(asked)} asked for` }] },
      mark: {
        type: 'text',
        x: WIDTH_PX - 6,
        align: 'right',
        baseline: 'bottom',
        dy: -5,
        color: COLORS.brick,
      },
      encoding: { y: { ...y, field: 'percent' }, text: { field: 'text' } },
    },
    ...(ruleKm === null || ruleKm <= 0 ? [] : ruleLayers(ruleKm, x)),
  ];
}

function ruleLayers(km: number, x: View): View[] {
  const data = { values: [{ km, text: `rule: ${kmRoundedDown(km)} km` }] };
  const encoding = { x: { ...x, field: 'km' } };
  return [
    { data, mark: { type: 'rule', color: COLORS.brick, strokeWidth: 1.6, strokeDash: [6, 4] }, encoding },
    {
      data,
      mark: { type: 'text', y: HEIGHT_PX - 10, align: 'left', dx: 6, color: COLORS.brick },
      encoding: { ...encoding, text: { field: 'text' } },
    },
  ];
}
