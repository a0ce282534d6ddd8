import { type ErrorModel, fitErrorModel, type Screening } from '../../fit/index.js';
import { crowdedScreeningKept, type RuleGround } from '../ground.js';
import type { DayNodes } from '../reach/dayLimits.js';
import { wrongFixShares } from '../reach/demandedShare.js';
import { type PreparedGround, preparedDays, prepareGround, reachOf } from '../reach/preparedGround.js';
import { reach } from '../reach/scan.js';
import { whyNoRule } from '../reasons.js';
import { longestSupportedKm } from '../supportedLength.js';
import type { Tolerance } from '../tolerance.js';
import { type RuleCount, RuleCounter } from './countRule.js';
import type { BackTestOptions } from './options.js';
import type { BackTestData } from './train.js';
import { growthOf } from './withoutRows.js';

/** A ground with the screening behind it. */
interface Way {
  readonly prepared: PreparedGround;
  readonly screening: Screening | null;
  readonly weights: Float64Array | null;
  readonly suspectDays: ReadonlySet<string | undefined>;
}

/** Counts out the rules that the study has at all. */
export function ruleJudges(
  data: BackTestData,
  tolerances: readonly Tolerance[],
  options: BackTestOptions,
  screening: Screening | null,
) {
  const { records, model, weights, days } = data;
  const { dayModel, crowdedDaysKept: kept } = options;
  const used = Array.from(records.keys()).filter((row) => weights === null || weights[row]! >= 0.5);
  const pick = (rows: readonly number[]): object[] => rows.map((row) => records[row]!);
  const growth = growthOf(records, screening, Array.from(records.keys()));
  const wayOf = (ground: RuleGround, own: Screening | null): Way => ({
    prepared: prepareGround(ground, options),
    screening: own,
    weights: own === screening ? weights : (own?.weights ?? null),
    suspectDays: new Set(own?.suspected.map((row) => days[row])),
  });
  const keptScreening =
    kept && screening
      ? crowdedScreeningKept(
          days.map((day) => ({ day })),
          screening,
        )
      : null;
  const ways = [
    wayOf({ model, dayModel, wrongFixes: growth }, screening),
    ...(kept && keptScreening ? [wayOf(kept, keptScreening)] : []),
  ];
  const supportedKm = longestSupportedKm(pick(used), model.component);
  const refused = tolerances.map((tolerance) =>
    whyNoRule(pick(used), ways[0]!.prepared, tolerance, supportedKm),
  );
  const counters = tolerances.map((tolerance) => new RuleCounter(tolerance, data.columns, weights));
  return {
    /** @param nodes of the day model without the day: of all suspects left out, and of those of crowded days kept */
    judge(
      day: string,
      others: readonly number[],
      shots: Parameters<RuleCounter['addDay']>[1],
      nodes: readonly (DayNodes | null)[],
    ) {
      if (refused.every((reason) => reason !== null)) return;
      const supported = longestSupportedKm(pick(used.filter((row) => days[row] !== day)), model.component);
      if (supported === null) return;
      const grounds = ways.map((way, k) => groundWithout(data, way, day, others, nodes[k] ?? null, options));
      tolerances.forEach((tolerance, t) => {
        if (refused[t] !== null) return;
        const reaches = grounds.map((ground) => reach(reachOf(ground, tolerance).holds, supported).km);
        counters[t]!.addDay(day, shots, Math.min(...reaches));
      });
    },
    counts: (): RuleCount[] => counters.map((counter) => counter.count()),
  };
}

/** A ground as the other days give it. */
function groundWithout(
  data: BackTestData,
  { prepared, screening, weights, suspectDays }: Way,
  day: string,
  others: readonly number[],
  nodes: DayNodes | null,
  options: BackTestOptions,
): PreparedGround {
  const { records } = data;
  if (nodes === null) {
    const wrongFixes = growthOf(records, screening, others);
    return prepareGround({ model: pooledWithout(data, weights, others), wrongFixes }, options);
  }
  // A day without suspects hardly moves their share; one with suspects must not be judged by them.
  const shares = suspectDays.has(day)
    ? wrongFixShares(growthOf(records, screening, others))
    : prepared.shares;
  return preparedDays({ ...prepared, shares }, nodes);
}

/** The model of the other days, where a rule is pooled over days. */
function pooledWithout(
  { records, model }: BackTestData,
  weights: Float64Array | null,
  others: readonly number[],
): ErrorModel {
  const { component, form, reference, confidence } = model;
  return fitErrorModel(
    others.map((row) => records[row]!),
    {
      component,
      form,
      reference,
      confidence,
      weights: weights === null ? undefined : Float64Array.from(others, (row) => weights[row]!),
    },
  );
}
