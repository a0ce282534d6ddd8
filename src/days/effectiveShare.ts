import type { FitData } from '../fit/index.js';
import { inputError } from '../logs/index.js';
import { rowsWithinDays } from './dayIndex.js';
import { type DayRatios, dayRatios } from './dayRatios.js';

/** Lags are added in pairs up to this one. */
const LAST_LAG = 40;
/** Sums of a few correlations of noise overstate what shots are worth by 10-25 %. */
const CAUTION = 0.8;

/** How much shots that follow each other on a day are worth, against as many independent ones. */
export interface EffectiveShare {
  /** 1/(1 + 2 Σ ρ), ρ the correlations within days up to the first pair of lags that is not positive. */
  readonly fromCorrelation: number;
  /** The share to use: 0.8 of it, at most 1 and at least one shot a day. */
  readonly share: number;
}

/**
 * Effective share κ of the shots: lag correlations, in time order within days, of the squared errors against the level
 * of their own day; initial positive sequence (Geyer 1992; from memory).
 * @param A,B displayed estimates, mm² and ppm²
 * @throws InputError when the errors tell no times
 */
export function effectiveShare(data: FitData, A: number, B: number): EffectiveShare {
  const ratios = dayRatios(data, A, B);
  const fromCorrelation = 1 / correlationTime(inTimeOrder(data, ratios));
  const smallest = ratios.days.length / data.y.length;
  return { fromCorrelation, share: Math.min(1, Math.max(smallest, CAUTION * fromCorrelation)) };
}

/** Deviations from the level of the day, and the day of each, in order of time. */
interface Series {
  readonly values: Float64Array;
  readonly dayOf: Int32Array;
}

function inTimeOrder({ startMs }: FitData, ratios: DayRatios): Series {
  if (startMs === null) {
    throw inputError(
      'missing-column',
      'Expected a column "startMs" in the errors, needed for the order of shots within a day, came none. Add the start of each occupation.',
    );
  }
  const { dayOf, omega, ratio, factors } = ratios;
  const order = rowsWithinDays(ratios, startMs);
  const deviation = (i: number): number => {
    const level = factors[dayOf[i]!]!;
    return level > 0 ? omega[i]! * (ratio[i]! / level - 1) : 0;
  };
  return { values: Float64Array.from(order, deviation), dayOf: order.map((i) => dayOf[i]!) };
}

/** 1 + 2 Σ ρ over the initial positive sequence; 1 where nothing varies. */
function correlationTime({ values, dayOf }: Series): number {
  const lagSum = (lag: number): number => {
    let total = 0;
    for (let i = 0; i + lag < values.length; i++) {
      if (dayOf[i] === dayOf[i + lag]) total += values[i]! * values[i + lag]!;
    }
    return total;
  };
  const square = lagSum(0);
  if (square === 0) return 1;
  let time = 1;
  for (let lag = 1; lag < LAST_LAG; lag += 2) {
    const pair = (lagSum(lag) + lagSum(lag + 1)) / square;
    if (pair <= 0) break;
    time += 2 * pair;
  }
  return time;
}
