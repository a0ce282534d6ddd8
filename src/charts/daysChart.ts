import type { DailyFactor } from '../days/index.js';
import { inputError } from '../logs/index.js';
import type { SkyDay } from '../study/index.js';
import { type ChartSpec, chartSpec, type View } from './chartSpec.js';
import { calendarDays, dayChannel } from './dayAxis.js';
import { type Activity, activityPanel } from './daysActivity.js';
import { type DayCause, factorPanel, kindsOf } from './daysFactors.js';
import { daysDescription, daysSubtitle, daysTitle } from './daysWords.js';

/** What {@link daysChart} draws. */
export interface DaysInput {
  /** From `dailyFactors`, of one component or both. */
  readonly factors: readonly DailyFactor[];
  /** Verdicts on degraded days, of `judgeDegradedDays` or `results.degradedDays`, written beside them. */
  readonly explanations?: readonly DayCause[] | undefined;
  /** Days of `results.sky`: their activity is drawn as bars beneath. */
  readonly sky?: readonly SkyDay[] | undefined;
  /** Which activity; default the greatest Kp where it is known, else Ap, else the greatest Hp. */
  readonly activity?: 'kpMax' | 'hpMax' | 'ap' | undefined;
}

/**
 * How the ppm differed from day to day, which days are degraded, and what the sky did on them.
 * @throws InputError when there is no daily factor
 */
export function daysChart({ factors, explanations = [], sky = [], activity }: DaysInput): ChartSpec {
  if (factors.length === 0) {
    throw inputError(
      'bad-option',
      'Expected daily factors, came none. Hand in those of a study whose days can be judged.',
    );
  }
  const days = calendarDays(factors.map(({ day }) => day));
  const shown = new Set(days);
  const inRange = sky.filter(({ day }) => shown.has(day));
  const isKnown = (name: Activity): boolean => inRange.some((one) => one[name] !== null);
  const measure = activity ?? (['kpMax', 'ap', 'hpMax'] as const).find(isKnown) ?? 'kpMax';
  const bars = inRange.flatMap((one) =>
    one[measure] === null ? [] : [{ day: one.day, value: one[measure] }],
  );
  const components = (['horizontal', 'vertical'] as const).filter((component) =>
    factors.some((one) => one.component === component),
  );
  const degraded = [...new Set(factors.filter((one) => one.degraded === true).map(({ day }) => day))];
  const kinds = kindsOf(factors, explanations);
  const panels = components.map((component, k): View => {
    const own = factors.filter((one) => one.component === component);
    const verdicts = explanations.filter((one) => one.component === component);
    const isLast = k === components.length - 1 && bars.length === 0;
    return factorPanel({
      component,
      factors: own,
      verdicts,
      x: dayChannel(days, isLast),
      degraded,
      kinds,
    });
  });
  if (bars.length > 0) panels.push(activityPanel(measure, bars, dayChannel(days, true), degraded));
  const words = {
    factors,
    components,
    hasBars: bars.length > 0,
    measure,
  };
  return chartSpec(daysTitle(words), daysSubtitle(words), daysDescription(words), {
    vconcat: panels,
    spacing: 14,
  });
}
