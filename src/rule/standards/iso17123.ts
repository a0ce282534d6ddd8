import { inputError } from '../../logs/index.js';
import { chiSquareQuantile, fQuantile } from '../../stats/index.js';
import { FROM_MEMORY, type StandardCondition, type StandardHead } from './condition.js';

/** Plane coordinates and height of a rover point, m. */
export interface FieldPoint {
  readonly x: number;
  readonly y: number;
  readonly h: number;
}

/** One set: the first rover point, then the second. */
export interface FieldTestSet {
  /** From 1: a simplified test has one series, a full one three. */
  readonly series: number;
  /** UTC milliseconds; left out when not known. */
  readonly startMs?: number | undefined;
  readonly first: FieldPoint;
  readonly second: FieldPoint;
}

export interface FieldTestOptions {
  /** Known horizontal distance and height difference of the rover points, m. */
  readonly distanceM: number;
  readonly heightDifferenceM: number;
  /** Standard deviations known beforehand, mm: of the plan √(s_x² + s_y²), and of the height. */
  readonly predeterminedMm: { readonly plan: number; readonly height: number };
}

/** A set against what is known of the rover points. */
export interface SetCheck {
  readonly distanceM: number;
  readonly heightDifferenceM: number;
  readonly distanceErrorMm: number;
  readonly heightErrorMm: number;
  readonly withinLimits: boolean;
}

/** A standard deviation with its degrees of freedom. */
export interface SampleDeviation {
  readonly mm: number;
  readonly degreesOfFreedom: number;
}

export interface FieldTestResult extends StandardHead {
  readonly kind: 'simplified' | 'full';
  readonly sets: readonly SetCheck[];
  readonly limitsMm: { readonly distance: number; readonly height: number };
  /** √(s_x² + s_y²), and s_h. */
  readonly plan: SampleDeviation;
  readonly height: SampleDeviation;
  /** Whether the deviations are no larger than the predetermined ones allow at 95 %; null for a simplified test. */
  readonly planWithin: boolean | null;
  readonly heightWithin: boolean | null;
  /** Largest deviations that would still be. */
  readonly planLimitMm: number;
  readonly heightLimitMm: number;
}

const SETS_OF_SERIES = 5;
/** Multiple of the predetermined deviation that a set may be off. */
const SET_LIMIT = 2.5;
const LEVEL = 0.95;

/**
 * Field test of real-time positioning after ISO 17123-8 (procedure and formulas from memory): repeatability on two rover
 * points. Simplified: one series, each set against the known distance and height difference. Full: three series,
 * residuals from the mean of each point, chi-square tests of the deviations.
 * @throws InputError for sets that are no test of either kind
 */
export function isoFieldTest(sets: readonly FieldTestSet[], options: FieldTestOptions): FieldTestResult {
  const kind = kindOf(sets);
  const { distanceM, heightDifferenceM, predeterminedMm } = options;
  const limitsMm = {
    distance: SET_LIMIT * predeterminedMm.plan,
    height: SET_LIMIT * Math.SQRT2 * predeterminedMm.height,
  };
  const checks = sets.map(({ first, second }): SetCheck => {
    const distance = Math.hypot(second.x - first.x, second.y - first.y);
    const height = second.h - first.h;
    const distanceErrorMm = 1000 * (distance - distanceM);
    const heightErrorMm = 1000 * (height - heightDifferenceM);
    return {
      distanceM: distance,
      heightDifferenceM: height,
      distanceErrorMm,
      heightErrorMm,
      withinLimits:
        Math.abs(distanceErrorMm) <= limitsMm.distance && Math.abs(heightErrorMm) <= limitsMm.height,
    };
  });
  const degrees = 2 * (sets.length - 1);
  const variance = (axis: keyof FieldPoint): number =>
    (squaresAbout(sets.map(({ first }) => first[axis])) +
      squaresAbout(sets.map(({ second }) => second[axis]))) /
    degrees;
  const plan = { mm: 1000 * Math.sqrt(variance('x') + variance('y')), degreesOfFreedom: 2 * degrees };
  const height = { mm: 1000 * Math.sqrt(variance('h')), degreesOfFreedom: degrees };
  const planLimitMm = predeterminedMm.plan * upperFactor(plan.degreesOfFreedom);
  const heightLimitMm = predeterminedMm.height * upperFactor(height.degreesOfFreedom);
  return {
    standard: 'ISO 17123-8',
    definition: `${kind} field test: repeatability of ${sets.length} sets on two rover points`,
    conditions: conditions(sets, options),
    caution: `${FROM_MEMORY} Check in the printed standard which multiple it uses for the distance of a set.`,
    kind,
    sets: checks,
    limitsMm,
    plan,
    height,
    planWithin: kind === 'full' ? plan.mm <= planLimitMm : null,
    heightWithin: kind === 'full' ? height.mm <= heightLimitMm : null,
    planLimitMm,
    heightLimitMm,
  };
}

/** √(χ²(0.95, ν)/ν): how much larger than the true one a deviation may come out. */
export const upperFactor = (degreesOfFreedom: number): number =>
  Math.sqrt(chiSquareQuantile(LEVEL, degreesOfFreedom) / degreesOfFreedom);

/** Whether two deviations may be of one population, two-sided at 95 %. */
export function sameDeviation(first: SampleDeviation, second: SampleDeviation): boolean {
  const ratio = (first.mm / second.mm) ** 2;
  const high = fQuantile(1 - (1 - LEVEL) / 2, first.degreesOfFreedom, second.degreesOfFreedom);
  const low = 1 / fQuantile(1 - (1 - LEVEL) / 2, second.degreesOfFreedom, first.degreesOfFreedom);
  return ratio >= low && ratio <= high;
}

function squaresAbout(values: readonly number[]): number {
  const mean = values.reduce((sum, value) => sum + value, 0) / values.length;
  return values.reduce((sum, value) => sum + (value - mean) ** 2, 0);
}

function kindOf(sets: readonly FieldTestSet[]): 'simplified' | 'full' {
  const counts = new Map<number, number>();
  for (const { series } of sets) counts.set(series, (counts.get(series) ?? 0) + 1);
  const complete = [...counts.values()].every((count) => count === SETS_OF_SERIES);
  if (complete && counts.size === 1) return 'simplified';
  if (complete && counts.size === 3) return 'full';
  throw inputError(
    'bad-field-test',
    `Expected 1 or 3 series of ${SETS_OF_SERIES} sets, came ${counts.size} series of ${[...counts.values()].join(', ') || 'no'} sets. Measure the missing sets, or hand in one series alone for the simplified test.`,
  );
}

function conditions(sets: readonly FieldTestSet[], { distanceM }: FieldTestOptions): StandardCondition[] {
  const starts = sets.map(({ startMs }) => startMs ?? Number.NaN);
  const timed = starts.every((start) => !Number.isNaN(start));
  const first = [...new Set(sets.map(({ series }) => series))]
    .map((series) => Math.min(...starts.filter((_, k) => sets[k]!.series === series)))
    .sort((a, b) => a - b);
  const apart = first.slice(1).every((start, k) => start - first[k]! >= 90 * 60_000);
  return [
    { text: 'rover points 2 to 20 m apart', met: distanceM >= 2 && distanceM <= 20 },
    {
      text: 'their distance and height difference known to 3 mm or better by other means',
      met: null,
    },
    { text: 'starts of series at least 90 minutes apart', met: timed ? apart : null },
  ];
}
