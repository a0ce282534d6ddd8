import { type Control, coordinatesOn } from '../control/index.js';
import { baselineBetween } from '../geodesy/index.js';
import { solarHour } from '../time/index.js';
import type { Visit } from './occupation.js';

/** A visit with where and at which hour it was, by the published coordinates: known also without a fix. */
export interface PlacedVisit extends Visit {
  /** Straight distance from base to mark, km; NaN for a mark whose plan position is not known. */
  readonly baselineKm: number;
  /** Direction base → mark, degrees from north. */
  readonly azimuthDeg: number;
  /** Local mean solar time at the mark, hours; NaN without a time of day. */
  readonly solarHour: number;
  /** Sky of the mark; empty where it is not stated. */
  readonly sky: string;
}

/** A mark of which only the height is not known stands as high as the base: that changes its length by little. */
export function placeVisits(visits: readonly Visit[], control: Control): PlacedVisit[] {
  return visits.map((visit): PlacedVisit => {
    const mark = control.marks.get(visit.mark);
    const base = control.bases.get(visit.base);
    const markAt = mark && coordinatesOn(mark, visit.day)?.position;
    const baseAt = base && coordinatesOn(base, visit.day)?.position;
    const sky = mark?.sky ?? '';
    if (!markAt || !baseAt || Number.isNaN(markAt.latitudeDeg))
      return { ...visit, baselineKm: Number.NaN, azimuthDeg: Number.NaN, solarHour: Number.NaN, sky };
    const heightM = Number.isNaN(markAt.heightM) ? baseAt.heightM : markAt.heightM;
    const { lengthKm, azimuthDeg } = baselineBetween(baseAt, { ...markAt, heightM });
    const hour = solarHour(visit.startMs, markAt.longitudeDeg);
    return { ...visit, baselineKm: lengthKm, azimuthDeg, solarHour: hour, sky };
  });
}
