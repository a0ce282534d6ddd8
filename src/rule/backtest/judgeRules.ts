import { type ErrorModel, fitErrorModel, type Screening } from '../../fit/index.js';
import type { DayNodes } from '../reach/dayLimits.js';
import { wrongFixShares } from '../reach/demandedShare.js';
import { preparedDays, prepareGround, reachOf } from '../reach/preparedGround.js';
import { reach } from '../reach/scan.js';
import { whyNoRule } from '../reasons.js';
import { longestSupportedKm } from '../supportedLength.js';
import type { Tolerance } from '../tolerance.js';
import { type RuleCount, RuleCounter } from './countRule.js';
import type { BackTestOptions } from './options.js';
import type { BackTestData } from './train.js';
import { growthOf } from './withoutRows.js';

/** Counts out the rules that the study has at all. */
export function ruleJudges(
  data: BackTestData,
  tolerances: readonly Tolerance[],
  { dayModel, baseSigmaMm, basePpm, height, formDoubt }: BackTestOptions,
  screening: Screening | null,
) {
  const { records, model, weights, days } = data;
  const used = Array.from(records.keys()).filter((row) => weights === null || weights[row]! >= 0.5);
  const pick = (rows: readonly number[]): object[] => rows.map((row) => records[row]!);
  const growth = growthOf(records, screening, Array.from(records.keys()));
  const added = { baseSigmaMm, basePpm, height, formDoubt };
  const prepared = prepareGround({ model, dayModel, wrongFixes: growth }, added);
  const supportedKm = longestSupportedKm(pick(used), model.component);
  const refused = tolerances.map((tolerance) => whyNoRule(pick(used), prepared, tolerance, supportedKm));
  const counters = tolerances.map((tolerance) => new RuleCounter(tolerance, data.columns, weights));
  const suspectDays = new Set(screening?.suspected.map((row) => days[row]!));
  return {
    judge(
      day: string,
      others: readonly number[],
      shots: Parameters<RuleCounter['addDay']>[1],
      nodes: DayNodes | null,
    ) {
      if (refused.every((reason) => reason !== null)) return;
      const supported = longestSupportedKm(pick(used.filter((row) => days[row] !== day)), model.component);
      if (supported === null) return;
      // A day without suspects hardly moves their share; one with suspects must not be judged by them.
      const shares = suspectDays.has(day)
        ? wrongFixShares(growthOf(records, screening, others))
        : prepared.shares;
      const ground =
        nodes === null
          ? prepareGround(
              { model: pooledWithout(data, others), wrongFixes: growthOf(records, screening, others) },
              added,
            )
          : preparedDays({ ...prepared, shares }, nodes);
      tolerances.forEach((tolerance, t) => {
        if (refused[t] === null) {
          counters[t]!.addDay(day, shots, reach(reachOf(ground, tolerance).holds, supported).km);
        }
      });
    },
    counts: (): RuleCount[] => counters.map((counter) => counter.count()),
  };
}

/** The model of the other days, where a rule is pooled over days. */
function pooledWithout({ records, weights, model }: BackTestData, others: readonly number[]): ErrorModel {
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
