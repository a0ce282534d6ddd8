import { geodeticToGeocentric, localFrame } from '../geodesy/index.js';
import type { JobResult } from '../study/index.js';
import type { PlanPoint } from './mapFrame.js';

/** A point of a job or a base on the plan. */
export interface JobPlacePoint extends PlanPoint {
  readonly name: string;
  readonly kind: 'base' | 'reached' | 'not reached';
  /** How far the rule reaches from a base, km; null for points and without a rule. */
  readonly reachKm: number | null;
}

/** Bases first, then points: km east and north of the first base. */
export function jobPlan({ bases, points }: Pick<JobResult, 'bases' | 'points'>): JobPlacePoint[] {
  const frame = localFrame({ ...bases[0]!, heightM: 0 });
  const plan = (place: { readonly latitudeDeg: number; readonly longitudeDeg: number }): PlanPoint => {
    const { eastM, northM } = frame.toLocal(geodeticToGeocentric({ ...place, heightM: 0 }));
    return { eastKm: eastM / 1000, northKm: northM / 1000 };
  };
  return [
    ...bases.map(
      (base): JobPlacePoint => ({
        name: base.base,
        kind: 'base',
        ...plan(base),
        reachKm: base.maximumBaselineKm,
      }),
    ),
    ...points.map(
      (point): JobPlacePoint => ({
        name: point.point,
        kind: point.needsAnotherBase === false ? 'reached' : 'not reached',
        ...plan(point),
        reachKm: null,
      }),
    ),
  ];
}

/** Bases farther from every point than this many times the reach have no place on the map of the job. */
const FAR_FROM_JOB = 3;

/** Without bases that have nothing to do with the job; one base always stays. */
export function nearTheJob(places: readonly JobPlacePoint[]): JobPlacePoint[] {
  const points = places.filter(({ kind }) => kind !== 'base');
  const distanceOf = (base: JobPlacePoint): number =>
    points.reduce(
      (least, { eastKm, northKm }) =>
        Math.min(least, Math.hypot(eastKm - base.eastKm, northKm - base.northKm)),
      Number.POSITIVE_INFINITY,
    );
  const bases = places.filter(({ kind }) => kind === 'base');
  const nearest = Math.min(...bases.map(distanceOf));
  return places.filter(
    (place) =>
      place.kind !== 'base' ||
      distanceOf(place) <= Math.max(nearest, FAR_FROM_JOB * Math.max(place.reachKm ?? 0, 1)),
  );
}
