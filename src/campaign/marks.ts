import { baselineBetween, type Geodetic, geocentricToGeodetic, localFrame } from '../geodesy/index.js';
import { type Random, uniformBetween } from '../stats/index.js';
import { refuse } from './checks.js';
import { wholeBetween } from './draw.js';
import { roundTo } from './rounding.js';

/** A mark as planned: where it lies as seen from the base. */
export interface MarkPlan {
  readonly name: string;
  /** Straight distance from the base, km. */
  readonly baselineKm: number;
  /** Direction from the base, degrees from north over east. */
  readonly azimuthDeg: number;
  /** Ellipsoidal height, m. */
  readonly heightM: number;
  /** How the coordinates came about; `simulated` when not given. */
  readonly source?: string;
  /** What surrounds the mark; `open` when not given. */
  readonly sky?: string;
}

/**
 * How to invent marks: distances spread evenly in log, azimuths at random, heights at random but none
 * steeper than 1:4 as seen from the base.
 */
export interface MarkGenerator {
  readonly count: number;
  readonly nearestKm: number;
  readonly farthestKm: number;
  readonly lowestM: number;
  readonly highestM: number;
}

/** A mark of a campaign: the coordinates as published, and its baseline from the base. */
export interface CampaignMark extends Geodetic {
  readonly name: string;
  readonly baselineKm: number;
  readonly azimuthDeg: number;
  readonly heightDifferenceM: number;
  readonly source: string;
  readonly sky: string;
}

/** Steeper than this, height over distance, no invented mark is seen from the base. */
const STEEPEST = 0.25;

/** Invents marks `M01`, `M02`, … from near to far. Distances in km, heights in m. */
export function inventMarks(base: Geodetic, generator: MarkGenerator, random: Random): MarkPlan[] {
  const { count, nearestKm, farthestKm, lowestM, highestM } = generator;
  return Array.from({ length: count }, (_, i) => {
    const baselineKm = nearestKm * (farthestKm / nearestKm) ** ((i + random()) / count);
    const azimuthDeg = wholeBetween(random, 0, 3599) / 10;
    const reachM = STEEPEST * baselineKm * 1000;
    const nearestHeightM = Math.min(Math.max(base.heightM, lowestM), highestM);
    const low = Math.max(lowestM, Math.min(base.heightM - reachM, nearestHeightM));
    const high = Math.min(highestM, Math.max(base.heightM + reachM, nearestHeightM));
    const heightM = uniformBetween(random, low, high);
    return { name: `M${String(i + 1).padStart(2, '0')}`, baselineKm, azimuthDeg, heightM };
  });
}

/**
 * Puts a planned mark on the ellipsoid. The straight distance and the azimuth come out as planned up to
 * the rounding of its published coordinates (1e-9 degrees, 0.1 mm).
 * Throws a `RangeError` for a mark that is farther above or below the base than away from it.
 */
export function placeMark(base: Geodetic, plan: MarkPlan): CampaignMark {
  if (Math.abs(plan.heightM - base.heightM) >= plan.baselineKm * 1000)
    refuse(`marks ${plan.name}`, `a height less than ${plan.baselineKm} km from the base's`, plan.heightM);
  const frame = localFrame(base);
  const goalM = plan.baselineKm * 1000;
  let outM = goalM;
  let azimuthDeg = plan.azimuthDeg;
  let position: Geodetic = base;
  // Curvature and the height difference make the straight line longer than the way in the base's
  // horizon, and the normals of the ellipsoid turn it a little: repeat, corrected by what came out.
  for (let pass = 0; pass < 8; pass++) {
    const azimuth = (azimuthDeg * Math.PI) / 180;
    const flat = frame.toGeocentric({
      eastM: outM * Math.sin(azimuth),
      northM: outM * Math.cos(azimuth),
      upM: 0,
    });
    position = { ...geocentricToGeodetic(flat), heightM: plan.heightM };
    const reached = baselineBetween(base, position);
    outM = Math.sqrt(Math.max(0, outM ** 2 + goalM ** 2 - (reached.lengthKm * 1000) ** 2));
    azimuthDeg += ((plan.azimuthDeg - reached.azimuthDeg + 540) % 360) - 180;
  }
  const published = {
    latitudeDeg: roundTo(position.latitudeDeg, 9),
    longitudeDeg: roundTo(position.longitudeDeg, 9),
    heightM: roundTo(plan.heightM, 4),
  };
  const { name, source = 'simulated', sky = 'open' } = plan;
  return { name, ...published, ...baselineTo(base, published), source, sky };
}

/** The same mark with its baseline from another base. */
export function seenFrom(base: Geodetic, mark: CampaignMark): CampaignMark {
  return { ...mark, ...baselineTo(base, mark) };
}

function baselineTo(base: Geodetic, mark: Geodetic) {
  const { lengthKm, azimuthDeg, heightDifferenceM } = baselineBetween(base, mark);
  return { baselineKm: lengthKm, azimuthDeg, heightDifferenceM };
}
