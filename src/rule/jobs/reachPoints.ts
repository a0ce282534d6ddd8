import { baselineBetween, type Geodetic } from '../../geodesy/index.js';
import { inputError } from '../../logs/index.js';
import type { Rule } from '../rule.js';
import type { JobPlace, JobPlan, JobPoint, JobReach, PlannedPlace, RuleFromBase } from './jobPlan.js';

/**
 * Which base reaches which point of a job under a rule, what can be promised there, and which points need another base.
 * @param general the rule of the study
 * @param fromBase the rule from a base whose own coordinates are known worse than those behind the rule; else the general one
 * @throws InputError without points or bases, or for a name that stands twice
 */
export function reachPoints(
  points: readonly JobPlace[],
  bases: readonly JobPlace[],
  general: RuleFromBase,
  fromBase: (base: string) => RuleFromBase = () => general,
): JobPlan {
  checkPlaces('point', points);
  checkPlaces('base', bases);
  const found = points.map((point): { point: JobPoint; reaches: JobReach[] } => {
    const reaches = bases
      .map((base) => reachFrom(point, base, fromBase(base.name)))
      .sort((a, b) => a.baselineKm - b.baselineKm || (a.base < b.base ? -1 : 1));
    const reachedFrom = reaches.filter(({ holds }) => holds === true).map(({ base }) => base);
    const best = reaches.reduce((a, b) => (least(b) < least(a) ? b : a));
    return {
      point: {
        point: point.name,
        ...placeOf(point.position),
        bestBase: best.base,
        baselineKm: best.baselineKm,
        promisedMm: best.promisedMm,
        reason: best.reason,
        reachedFrom,
        needsAnotherBase: reaches.every(({ holds }) => holds === null) ? null : reachedFrom.length === 0,
      },
      reaches,
    };
  });
  const jobPoints = found.map(({ point }) => point);
  const { component, limitMm, share, dayShare, confidence, maximumBaselineKm, reason } = general.rule;
  return {
    component,
    limitMm,
    share,
    dayShare,
    confidence,
    maximumBaselineKm,
    reason,
    bases: bases.map(({ name, position }) => {
      const { rule } = fromBase(name);
      return {
        base: name,
        ...placeOf(position),
        maximumBaselineKm: rule.maximumBaselineKm,
        reason: rule.reason,
        baseOfRule: general.rule.conditions.bases.includes(name),
      };
    }),
    points: jobPoints,
    reaches: found.flatMap(({ reaches }) => reaches),
    sentence: sentenceOf(jobPoints, general.rule),
  };
}

/** What cannot be promised is worse than any promise. */
const least = ({ promisedMm }: JobReach): number => promisedMm ?? Number.POSITIVE_INFINITY;

const placeOf = ({ latitudeDeg, longitudeDeg, heightM }: Geodetic): PlannedPlace => ({
  latitudeDeg,
  longitudeDeg,
  heightM: Number.isNaN(heightM) ? null : heightM,
});

function reachFrom(
  point: JobPlace,
  base: JobPlace,
  { rule: { maximumBaselineKm }, promise }: RuleFromBase,
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
  const far = points.filter(({ needsAnotherBase }) => needsAnotherBase === true);
  if (far.length === 0) {
    return points.length === 1
      ? 'The point lies within the maximum baseline of a base.'
      : `All ${points.length} points lie within the maximum baseline of a base.`;
  }
  const names = far
    .slice(0, 10)
    .map(({ point }) => JSON.stringify(point))
    .join(', ');
  const more = far.length > 10 ? ` and ${far.length - 10} more` : '';
  return `${far.length} of ${points.length} points ${far.length === 1 ? 'lies' : 'lie'} beyond the maximum baseline of every base: ${names}${more}. Put a base nearer to ${far.length === 1 ? 'it' : 'them'}, or agree on a wider tolerance.`;
}
