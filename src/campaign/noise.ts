import { normalDeviates, type Random } from '../stats/index.js';
import type { Axes, CampaignSettings } from './options.js';
import type { PlannedVisit } from './schedule.js';

/** Share of the constant part's variance that lasts for minutes; the rest is new at every occupation. */
const LASTING_SHARE = 0.4;
const LASTING_MINUTES = 10;
/** How long the distance-dependent part, common to all rovers, lasts. */
const ATMOSPHERE_MINUTES = 40;

/** Unit-variance noise of one component at every visit. */
export interface ComponentNoise {
  /** Of the constant part. */
  readonly constant: Float64Array;
  /** Of the distance-dependent part. */
  readonly distance: Float64Array;
}

/**
 * Noise of one component for visits in time order. The constant part is 60 % white and 40 % a first-order
 * autoregression in time (time constant 10 min) of each rover; the distance-dependent part is
 * Gx cos(azimuth) + Gy sin(azimuth) with autoregressions Gx, Gy (40 min) common to the day. All start anew
 * every day. With `dependent` false everything is white. Every variance is 1.
 */
export function componentNoise(
  visits: readonly PlannedVisit[],
  dependent: boolean,
  random: Random,
): ComponentNoise {
  const normal = normalDeviates(random);
  const constant = new Float64Array(visits.length);
  const distance = new Float64Array(visits.length);
  const lasting = dependent ? LASTING_SHARE : 0;
  const atmosphereMin = dependent ? ATMOSPHERE_MINUTES : 0;
  let dayIndex = -1;
  let east = autoregression(normal, atmosphereMin);
  let north = autoregression(normal, atmosphereMin);
  const receivers = new Map<string, Autoregression>();
  for (const [i, visit] of visits.entries()) {
    if (visit.dayIndex !== dayIndex) {
      dayIndex = visit.dayIndex;
      east = autoregression(normal, atmosphereMin);
      north = autoregression(normal, atmosphereMin);
      receivers.clear();
    }
    let receiver = receivers.get(visit.rover);
    if (receiver === undefined) {
      receiver = autoregression(normal, LASTING_MINUTES);
      receivers.set(visit.rover, receiver);
    }
    constant[i] = Math.sqrt(1 - lasting) * normal() + Math.sqrt(lasting) * receiver(visit.startMs);
    const azimuth = (visit.mark.azimuthDeg * Math.PI) / 180;
    distance[i] = Math.cos(azimuth) * north(visit.startMs) + Math.sin(azimuth) * east(visit.startMs);
  }
  return { constant, distance };
}

/** Noise of every component, each from its own stream; east and north correlated as the settings say. */
export function correlatedNoise(
  { dependent, eastNorthCorrelation: r }: CampaignSettings,
  visits: readonly PlannedVisit[],
  stream: (label: keyof Axes) => Random,
): Record<keyof Axes, ComponentNoise> {
  const [east, own, up] = (['east', 'north', 'up'] as const).map((axis) =>
    componentNoise(visits, dependent, stream(axis)),
  ) as [ComponentNoise, ComponentNoise, ComponentNoise];
  const rest = Math.sqrt(1 - r * r);
  const mixed = (part: keyof ComponentNoise): Float64Array =>
    r === 0 ? own[part] : own[part].map((value, i) => r * east[part][i]! + rest * value);
  return { east, north: { constant: mixed('constant'), distance: mixed('distance') }, up };
}

/**
 * What turns normal errors of unit variance into t errors of unit variance, one factor for each visit:
 * √((ν − 2)/χ²_ν); all 1 for normal errors.
 */
export function tailFactors(degrees: number | null, visits: number, random: Random): Float64Array {
  const factors = new Float64Array(visits).fill(1);
  if (degrees === null) return factors;
  const normal = normalDeviates(random);
  return factors.map(() => {
    let chiSquare = 0;
    for (let k = 0; k < degrees; k++) chiSquare += normal() ** 2;
    return Math.sqrt((degrees - 2) / chiSquare);
  });
}

/** The value at a time, milliseconds; times never go back. */
type Autoregression = (timeMs: number) => number;

/**
 * A stationary first-order autoregression of variance 1 in continuous time: the correlation over t minutes
 * is exp(−t / timeConstantMin), and 0 when that is 0.
 */
function autoregression(normal: () => number, timeConstantMin: number): Autoregression {
  let lastMs = Number.NEGATIVE_INFINITY;
  let value = 0;
  return (timeMs) => {
    const kept = timeConstantMin === 0 ? 0 : Math.exp(-(timeMs - lastMs) / (60_000 * timeConstantMin));
    value = kept * value + Math.sqrt(1 - kept * kept) * normal();
    lastMs = timeMs;
    return value;
  };
}
