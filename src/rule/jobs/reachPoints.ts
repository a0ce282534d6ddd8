import { baselineBetween, type Geodetic } from '../../geodesy/index.js';
import { inputError } from '../../logs/index.js';
import type { PositionPromise } from '../promise.js';
import type { Rule } from '../rule.js';

/** A point of a job, or a base; a height that is not known is NaN. */
export interface JobPlace {
  readonly name: string;
  readonly position: Geodetic;
}

/** A point from one base. */
export interface JobReach {
  readonly point: string;
  readonly base: string;
  readonly baselineKm: number;
  /** Point minus base, m; null where the height is not known. */
  readonly heightDifferenceM: number | null;
  /** The rule reaches it; null where there is no rule. */
  readonly holds: boolean | null;
  /** What can be promised there, mm; null with a reason. */
  readonly promisedMm: number | null;
  readonly reason: string | null;
  /** The rule was found from this base. */
  readonly baseOfRule: boolean;
}

/** A point with the base from which most can be promised: the nearest one. */
export interface JobPoint {
  readonly point: string;
  readonly nearest: JobReach;
  /** Bases from which the rule reaches it, the nearest first. */
  readonly reachedFrom: readonly string[];
  readonly needsAnotherBase: boolean;
}

export interface JobPlan {
  readonly limitMm: number;
  readonly share: number;
  readonly maximumBaselineKm: number | null;
  readonly points: readonly JobPoint[];
  /** Every point from every base, in the order of points and lengths. */
  readonly reaches: readonly JobReach[];
  readonly sentence: string;
}

/**
 * Which base reaches which point of a job under a rule, what can be promised there, and which points need another base.
 * @param promise what may be promised at a length, as `promiser` gives it
 * @throws InputError without points or bases, or for a name that stands twice
 */
export function reachPoints(
  points: readonly JobPlace[],
  bases: readonly JobPlace[],
  rule: Rule,
  promise: (baselineKm: number) => PositionPromise,
): JobPlan {
  checkPlaces('point', points);
  checkPlaces('base', bases);
  const found = points.map((point): { point: JobPoint; reaches: JobReach[] } => {
    const reaches = bases
      .map((base) => reachFrom(point, base, rule, promise))
      .sort((a, b) => a.baselineKm - b.baselineKm || (a.base < b.base ? -1 : 1));
    const reachedFrom = reaches.filter(({ holds }) => holds === true).map(({ base }) => base);
    return {
      point: {
        point: point.name,
        nearest: reaches[0]!,
        reachedFrom,
        needsAnotherBase: reachedFrom.length === 0,
      },
      reaches,
    };
  });
  const jobPoints = found.map(({ point }) => point);
  const { limitMm, share, maximumBaselineKm } = rule;
  return {
    limitMm,
    share,
    maximumBaselineKm,
    points: jobPoints,
    reaches: found.flatMap(({ reaches }) => reaches),
    sentence: sentenceOf(jobPoints, rule),
  };
}

function reachFrom(
  point: JobPlace,
  base: JobPlace,
  { maximumBaselineKm, conditions }: Rule,
  promise: (baselineKm: number) => PositionPromise,
): JobReach {
  const { heightM } = point.position;
  const known = !Number.isNaN(heightM);
  const { lengthKm, heightDifferenceM } = baselineBetween(base.position, {
    ...point.position,
    heightM: known ? heightM : base.position.heightM,
  });
  const { limitMm, reason } = promise(lengthKm);
  return {
    point: point.name,
    base: base.name,
    baselineKm: lengthKm,
    heightDifferenceM: known ? heightDifferenceM : null,
    holds: maximumBaselineKm === null ? null : lengthKm <= maximumBaselineKm,
    promisedMm: limitMm,
    reason,
    baseOfRule: conditions.bases.includes(base.name),
  };
}

function checkPlaces(what: 'point' | 'base', places: readonly JobPlace[]): void {
  if (places.length === 0) {
    throw inputError('no-job-places', `Expected at least one ${what} of a job, came none. Add one.`);
  }
  const seen = new Set<string>();
  for (const { name, position } of places) {
    if (seen.has(name)) {
      throw inputError(
        'job-place-twice',
        `Expected each ${what} of a job once, came ${JSON.stringify(name)} twice. Remove or rename one.`,
      );
    }
    seen.add(name);
    if (Number.isNaN(position.latitudeDeg) || Number.isNaN(position.longitudeDeg)) {
      throw inputError(
        'job-place-without-position',
        `Expected a plan position of ${what} ${JSON.stringify(name)}, came none. Fill in its coordinates.`,
      );
    }
  }
}

function sentenceOf(points: readonly JobPoint[], { limitMm, maximumBaselineKm, reason }: Rule): string {
  if (maximumBaselineKm === null)
    return `No point can be promised ${limitMm} mm, because there is no rule: ${reason}.`;
  const far = points.filter(({ needsAnotherBase }) => needsAnotherBase);
  if (far.length === 0) return `All ${points.length} points lie within the maximum baseline of a base.`;
  const names = far
    .slice(0, 10)
    .map(({ point }) => JSON.stringify(point))
    .join(', ');
  const more = far.length > 10 ? ` and ${far.length - 10} more` : '';
  return `${far.length} of ${points.length} points lie beyond the maximum baseline of every base: ${names}${more}. Put a base nearer to them, or agree on a wider tolerance.`;
}
