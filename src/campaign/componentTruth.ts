import { median } from '../stats/index.js';
import { runLengths } from './calendar.js';
import type { DrawnCampaign } from './drawCampaign.js';
import { hourFactor } from './hourFactor.js';
import type { Axes, CampaignSettings } from './options.js';

/** True parameters of one component; constants in mm, ppm in mm per km, all root-mean-square. */
export interface ComponentTruth {
  /** Constant part of a shot, without errors of marks and setups. */
  readonly constantMm: number;
  /** The same with the standard deviations of mark and setup errors in it. */
  readonly absoluteConstantMm: number;
  /** Over all days that could have been: ordinary spread and share of bad days taken into account. */
  readonly longRunPpm: number;
  /** Over the days that were drawn. */
  readonly drawnPpm: number;
  /** Of the median ordinary day; bad runs lift the median of all days a little above it. */
  readonly medianDayPpm: number;
  /** Of the median of the days drawn. */
  readonly drawnMedianDayPpm: number;
  /** Of each day drawn, in the order of the days. */
  readonly dayPpm: readonly number[];
}

/**
 * The truth of every component. All ppm contain the daily course as its root-mean-square over the times
 * of the planned visits.
 */
export function componentTruths(
  campaign: DrawnCampaign,
): Record<'east' | 'north' | 'up' | 'horizontal' | 'vertical', ComponentTruth> {
  const { settings, days, visits } = campaign;
  const factors = days.map((day) => day.factor);
  const course = rms(visits.map((visit) => hourFactor(settings.middayRise, visit.solarHour)));
  const truth = (...axes: readonly (keyof Axes)[]): ComponentTruth => {
    const radial = (part: Axes) => Math.hypot(...axes.map((axis) => part[axis]));
    const constantMm = radial(settings.constantMm);
    const ppm = radial(settings.ppm) * course;
    return {
      constantMm,
      absoluteConstantMm: Math.hypot(constantMm, radial(settings.markSigmaMm), radial(settings.setupSigmaMm)),
      longRunPpm: ppm * Math.sqrt(meanSquareDayFactor(settings)),
      drawnPpm: ppm * rms(factors),
      medianDayPpm: ppm,
      drawnMedianDayPpm: ppm * median(factors),
      dayPpm: factors.map((factor) => ppm * factor),
    };
  };
  const up = truth('up');
  return {
    east: truth('east'),
    north: truth('north'),
    up,
    horizontal: truth('east', 'north'),
    vertical: up,
  };
}

/**
 * Expected square of a day's factor: exp(2 sd²) of the log-normal part, times 1 on ordinary days and the
 * mean square (from² + from·to + to²)/3 of a uniform factor on bad ones.
 */
function meanSquareDayFactor(settings: CampaignSettings): number {
  const ordinary = Math.exp(2 * settings.dayFactorLogSd ** 2);
  if (settings.badDays === null) return ordinary;
  const { factor } = settings.badDays;
  const share = runLengths(settings.badDays).reduce((sum, length) => sum + length, 0) / settings.days;
  const meanSquare = (factor.from ** 2 + factor.from * factor.to + factor.to ** 2) / 3;
  return ordinary * (1 - share + share * meanSquare);
}

const rms = (values: readonly number[]): number =>
  Math.sqrt(values.reduce((sum, value) => sum + value * value, 0) / values.length);
