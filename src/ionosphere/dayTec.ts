import type { Geographic } from '../geodesy/index.js';
import type { Message } from '../logs/index.js';
import { sum } from '../stats/index.js';
import { solarHour } from '../time/index.js';
import type { DaySpan } from './daySpan.js';
import { delayPerTecuM, L1_HZ } from './delays.js';
import { outsideMapsNote } from './ionex/joinMaps.js';
import { type TimeScheme, tecAt } from './ionex/tecAt.js';
import { steepestGradient, tecGradientAt } from './ionex/tecGradient.js';
import type { TecMaps } from './ionex/tecMaps.js';
import { type KlobucharCoefficients, klobucharVerticalM } from './klobuchar.js';

/** The ionosphere above a site in the daytime of one day of a study. NaN where the maps give none. */
export interface DayTec {
  readonly day: string;
  /** Vertical TEC of the daytime, TECU. */
  readonly tecMax: number;
  readonly tecMean: number;
  /** Mean over the daytime of the steepest gradient, and its greatest value, TECU per 100 km on the shell. */
  readonly gradientMean: number;
  readonly gradientMax: number;
  /** `tecMean` minus that of the day before, TECU; NaN when the calendar day before is not among the days. */
  readonly changeFromDayBefore: number;
  /** Vertical TEC of the broadcast model in the same hours, as a climate to compare with; NaN without coefficients. */
  readonly klobucharMax: number;
  readonly klobucharMean: number;
  /** Share of the daytime for which the maps give TEC, 0 to 1. */
  readonly knownShare: number;
}

export interface DayTecOptions {
  /** Daytime in hours of local mean solar time; default 8 to 18. */
  readonly fromHour?: number | undefined;
  readonly toHour?: number | undefined;
  /** Time between the values that are looked up, minutes; default 15. */
  readonly stepMinutes?: number | undefined;
  /** Default `rotated`. */
  readonly scheme?: TimeScheme | undefined;
  readonly klobuchar?: KlobucharCoefficients | undefined;
}

export interface DaysTec {
  /** In the order of the days given. */
  readonly days: readonly DayTec[];
  readonly messages: readonly Message[];
}

const MINUTE_MS = 60_000;
const DAY_MS = 86_400_000;

/**
 * The ionosphere above a site, day by day, from maps.
 * @throws RangeError for an impossible daytime or step
 */
export function dayTec(
  maps: TecMaps,
  site: Geographic,
  days: readonly DaySpan[],
  options: DayTecOptions = {},
): DaysTec {
  const { fromHour = 8, toHour = 18, stepMinutes = 15, scheme = 'rotated', klobuchar } = options;
  if (!(fromHour >= 0 && fromHour < toHour && toHour <= 24))
    throw new RangeError(
      `fromHour, toHour: expected hours of one day in order, received ${fromHour}, ${toHour}`,
    );
  if (!(stepMinutes > 0 && stepMinutes <= 120))
    throw new RangeError(`stepMinutes: expected 0 to 120, received ${stepMinutes}`);
  const looked: number[] = [];
  const alone = days.map((span): DayTec => {
    const times = daytimes(span, site.longitudeDeg, fromHour, toHour, stepMinutes);
    for (const ms of times) looked.push(ms);
    const tec = times.map((ms) => tecAt(maps, ms, site, scheme)).filter(isKnown);
    const gradients = times
      .map((ms) => 100 * steepestGradient(tecGradientAt(maps, ms, site, scheme)))
      .filter(isKnown);
    const climate = klobuchar === undefined ? [] : times.map((ms) => climateTecu(ms, site, klobuchar));
    return {
      day: span.day,
      tecMax: greatest(tec),
      tecMean: mean(tec),
      gradientMean: mean(gradients),
      gradientMax: greatest(gradients),
      changeFromDayBefore: Number.NaN,
      klobucharMax: greatest(climate),
      klobucharMean: mean(climate),
      knownShare: times.length === 0 ? 0 : tec.length / times.length,
    };
  });
  const meanOf = new Map(alone.map(({ day, tecMean }) => [day, tecMean]));
  const note = outsideMapsNote(maps, looked);
  return {
    days: alone.map((one) => ({
      ...one,
      changeFromDayBefore: one.tecMean - (meanOf.get(dayBefore(one.day)) ?? Number.NaN),
    })),
    messages: note === null ? [] : [note],
  };
}

/** Times on whole steps of UTC within a day at which the Sun's hour is in the daytime, its ends included. */
function daytimes(
  { startMs, endMs }: DaySpan,
  longitudeDeg: number,
  fromHour: number,
  toHour: number,
  stepMinutes: number,
): number[] {
  const stepMs = stepMinutes * MINUTE_MS;
  const times: number[] = [];
  for (let ms = Math.ceil(startMs / stepMs) * stepMs; ms < endMs; ms += stepMs) {
    const hour = solarHour(ms, longitudeDeg);
    if (hour >= fromHour && hour <= toHour) times.push(ms);
  }
  return times;
}

const climateTecu = (ms: number, site: Geographic, coefficients: KlobucharCoefficients): number =>
  klobucharVerticalM(site.latitudeDeg, site.longitudeDeg, (ms % DAY_MS) / 1000, coefficients) /
  delayPerTecuM(L1_HZ);

const dayBefore = (day: string): string =>
  new Date(Date.parse(`${day}T00:00:00Z`) - DAY_MS).toISOString().slice(0, 10);

const isKnown = (value: number): boolean => !Number.isNaN(value);

const mean = (values: readonly number[]): number =>
  values.length === 0 ? Number.NaN : sum(values) / values.length;

const greatest = (values: readonly number[]): number =>
  values.length === 0 ? Number.NaN : values.reduce((a, b) => Math.max(a, b));
