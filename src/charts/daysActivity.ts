import type { View } from './chartSpec.js';
import { DAYS_WIDTH_PX, degradedColumns } from './daysFactors.js';
import { COLORS, QUIET_INK } from './theme.js';
import { roundUp } from './words.js';

const HEIGHT_PX = 90;
/** Kp 5-, where the storm scale of NOAA begins: G1, a minor storm. */
const STORM_KP = 14 / 3;

/** Which activity of `SkyDay` is drawn. */
export type Activity = 'kpMax' | 'hpMax' | 'ap';

export const activityWords = (measure: Activity): string =>
  ({ kpMax: 'greatest Kp', hpMax: 'greatest Hp', ap: 'Ap' })[measure];

/** Bars of geomagnetic activity, one a day. */
export function activityPanel(
  measure: Activity,
  bars: readonly { readonly day: string; readonly value: number }[],
  x: View,
  degraded: readonly string[],
): View {
  const isAp = measure === 'ap';
  const most = isAp
    ? roundUp(Math.max(...bars.map(({ value }) => value), 10))
    : Math.max(9, ...bars.map(({ value }) => Math.ceil(value)));
  const y = {
    type: 'quantitative',
    scale: { domain: [0, most], nice: false },
    axis: { title: activityWords(measure), ...(isAp ? { tickCount: 4 } : { values: [0, 3, 5, 7, 9, 12] }) },
  };
  return {
    width: DAYS_WIDTH_PX,
    height: HEIGHT_PX,
    layer: [
      degradedColumns(degraded, x),
      {
        data: { values: bars },
        mark: { type: 'bar', color: COLORS.water },
        encoding: { x: { ...x, field: 'day' }, y: { ...y, field: 'value' } },
      },
      ...(measure === 'kpMax' ? stormLine(y) : []),
    ],
  };
}

/** From here on a day is a storm; named at the right, outside the bars. */
function stormLine(y: View): View[] {
  const data = { values: [{ value: STORM_KP, word: 'G1 storm' }] };
  return [
    {
      data,
      mark: { type: 'rule', color: QUIET_INK, strokeDash: [2, 3] },
      encoding: { y: { ...y, field: 'value' } },
    },
    {
      data,
      mark: { type: 'text', align: 'left', baseline: 'middle', x: DAYS_WIDTH_PX + 6, color: QUIET_INK },
      encoding: { y: { ...y, field: 'value' }, text: { field: 'word' } },
    },
  ];
}
