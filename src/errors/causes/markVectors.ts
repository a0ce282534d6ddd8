import { type Control, coordinatesOn } from '../../control/index.js';
import {
  type Geodetic,
  geocentricToGeodetic,
  geodeticToGeocentric,
  type LocalVector,
  localFrame,
} from '../../geodesy/index.js';
import { median } from '../../stats/index.js';
import type { OccupationError } from '../computeErrors.js';
import { groupIndices } from '../groupIndices.js';

/** Where a mark is measured, on the whole, beside where it should be. */
export interface MarkVector {
  readonly mark: string;
  readonly base: string;
  /** Place of the mark in the base's horizon, km. */
  readonly eastKm: number;
  readonly northKm: number;
  /** Measured minus known in the base's horizon, mm: medians of day medians; NaN for what is not known of the mark. */
  readonly east: number;
  readonly north: number;
  readonly up: number;
  /** The plan alone, as if the heights agreed: another kind of height leans it outward, since verticals part. */
  readonly levelEast: number;
  readonly levelNorth: number;
  /** Standard errors of one axis of the plan and of the height, from the scatter of days; NaN on fewer than 3 days. */
  readonly planSe: number;
  readonly upSe: number;
  readonly days: number;
  readonly occupations: number;
  readonly known: Geodetic;
  readonly measured: Geodetic;
}

/** Standard error of a median of normal values over that of their mean, and standard deviation over MAD (normal theory). */
const MEDIAN_FACTOR = Math.sqrt(Math.PI / 2);
const MAD_TO_SIGMA = 1.4826022185;
/** Fewer days say nothing of their own scatter. */
const FEWEST_DAYS = 3;

/**
 * The vectors of all marks from all bases, nearest first. Medians, so that wrong fixes and single blunders do not matter.
 * @param errors all errors, also those set aside for being far off
 */
export function markVectors(errors: readonly OccupationError[], control: Control): MarkVector[] {
  const groups = groupIndices(errors.map(({ mark, base }) => `${mark}\u0000${base}`));
  return [...groups.values()]
    .map((indices) =>
      markVector(
        indices.map((i) => errors[i]!),
        control,
      ),
    )
    .sort(
      (a, b) =>
        Math.hypot(a.eastKm, a.northKm) - Math.hypot(b.eastKm, b.northKm) ||
        (`${a.mark}\u0000${a.base}` < `${b.mark}\u0000${b.base}` ? -1 : 1),
    );
}

function markVector(errors: readonly OccupationError[], control: Control): MarkVector {
  const latest = errors.reduce((a, b) => (b.day > a.day ? b : a));
  const markAt = coordinatesOn(control.marks.get(latest.mark)!, latest.day)!.position;
  const base = coordinatesOn(control.bases.get(latest.base)!, latest.day)!.position;
  const east = typical(errors, 'east');
  const north = typical(errors, 'north');
  const up = typical(errors, 'up');
  const planKnown = !Number.isNaN(east.value);
  const known: Geodetic = {
    latitudeDeg: planKnown ? markAt.latitudeDeg : base.latitudeDeg,
    longitudeDeg: planKnown ? markAt.longitudeDeg : base.longitudeDeg,
    heightM: Number.isNaN(markAt.heightM) ? base.heightM : markAt.heightM,
  };
  const there = localFrame(base);
  const offset = {
    eastM: (east.value || 0) / 1000,
    northM: (north.value || 0) / 1000,
    upM: (up.value || 0) / 1000,
  };
  const from = geodeticToGeocentric(known);
  const measured = placeOf(known, offset);
  const turnedTo = (to: Geodetic): LocalVector => {
    const { xM, yM, zM } = geodeticToGeocentric(to);
    return there.rotate({ xM: xM - from.xM, yM: yM - from.yM, zM: zM - from.zM });
  };
  const turned = turnedTo(measured);
  const level = turnedTo({ ...measured, heightM: known.heightM });
  const place: LocalVector = there.toLocal(from);
  const orNan = (value: number, has: boolean): number => (has ? value : Number.NaN);
  return {
    mark: latest.mark,
    base: latest.base,
    eastKm: planKnown ? place.eastM / 1000 : Number.NaN,
    northKm: planKnown ? place.northM / 1000 : Number.NaN,
    east: orNan(turned.eastM * 1000, planKnown),
    north: orNan(turned.northM * 1000, planKnown),
    up: orNan(turned.upM * 1000, !Number.isNaN(up.value)),
    levelEast: orNan(level.eastM * 1000, planKnown),
    levelNorth: orNan(level.northM * 1000, planKnown),
    planSe: Math.sqrt((east.se ** 2 + north.se ** 2) / 2),
    upSe: up.se,
    days: new Set(errors.map(({ day }) => day)).size,
    occupations: errors.length,
    known,
    measured,
  };
}

/**
 * The place to which an error leads: east and north in the horizon of the mark, and a difference of heights, which far
 * away is another thing than the way up in that horizon.
 */
function placeOf(known: Geodetic, { eastM, northM, upM }: LocalVector): Geodetic {
  const frame = localFrame(known);
  let vertical = upM;
  let place = geocentricToGeodetic(frame.toGeocentric({ eastM, northM, upM: vertical }));
  // Each step leaves a small part of the rest: ten are enough for a thousand kilometres.
  for (let k = 0; k < 10; k++) {
    vertical += known.heightM + upM - place.heightM;
    place = geocentricToGeodetic(frame.toGeocentric({ eastM, northM, upM: vertical }));
  }
  return place;
}

function typical(
  errors: readonly OccupationError[],
  component: 'east' | 'north' | 'up',
): { value: number; se: number } {
  const known = errors.filter((error) => !Number.isNaN(error[component]));
  if (known.length === 0) return { value: Number.NaN, se: Number.NaN };
  const days = [...groupIndices(known.map(({ day }) => day)).values()].map((indices) =>
    median(indices.map((i) => known[i]![component])),
  );
  const value = median(days);
  if (days.length < FEWEST_DAYS) return { value, se: Number.NaN };
  const sigma = MAD_TO_SIGMA * median(days.map((day) => Math.abs(day - value)));
  return { value, se: (MEDIAN_FACTOR * sigma) / Math.sqrt(days.length) };
}
