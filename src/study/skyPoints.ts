import type { DailyFactor } from '../days/index.js';
import type { SkyDay, SkyMeasure, SkyOutcome } from './skyResult.js';

/** An outcome and a measure of the sky on one day. */
export interface SkyPoint {
  readonly day: string;
  /** NaN where it is not known. */
  readonly outcome: number;
  readonly measure: number;
  /** In the component of the outcome, in either for missing fixes; null where days cannot be named. */
  readonly degraded: boolean | null;
}

const MEASURES: Readonly<Record<SkyMeasure, (day: SkyDay) => number | null>> = {
  Ap: ({ ap }) => ap,
  'greatest Kp': ({ kpMax }) => kpMax,
  'greatest Hp': ({ hpMax }) => hpMax,
  'F10.7': ({ f107 }) => f107,
  'least Dst': ({ dstMin }) => dstMin,
  TEC: ({ tecMean }) => tecMean,
  'TEC gradient': ({ gradientMean }) => gradientMean,
  // a change of the ionosphere disturbs in either direction
  'TEC change': ({ tecChange }) => (tecChange === null ? null : Math.abs(tecChange)),
};

/** Both of every day, in the order of the days: what is compared and drawn. */
export function skyPoints(
  days: readonly SkyDay[],
  factors: readonly DailyFactor[],
  outcome: SkyOutcome,
  measure: SkyMeasure,
): SkyPoint[] {
  const own = factors.filter(
    ({ component }) => outcome === 'share without a fix' || outcome === `${component} daily factor`,
  );
  const byDay = new Map<string, DailyFactor[]>();
  for (const factor of own) byDay.set(factor.day, [...(byDay.get(factor.day) ?? []), factor]);
  return days.map((day): SkyPoint => {
    const found = byDay.get(day.day) ?? [];
    const named = found.filter(({ degraded }) => degraded !== null);
    return {
      day: day.day,
      outcome:
        outcome === 'share without a fix'
          ? (day.shareWithoutFix ?? Number.NaN)
          : (found[0]?.factor ?? Number.NaN),
      measure: MEASURES[measure](day) ?? Number.NaN,
      degraded: named.length === 0 ? null : named.some(({ degraded }) => degraded === true),
    };
  });
}
