import { InputError, type Message, message } from '../logs/index.js';
import {
  errorByOccupationLength,
  type Rule,
  type SecondVisits,
  secondVisits,
  twoVisitLimitMm,
  visitCorrelation,
} from '../rule/index.js';
import { randomStream } from '../stats/index.js';
import type { RuleInput } from './makeRules.js';
import type { Results } from './results.js';
import { rowLengths } from './rowLengths.js';
import type { SecondVisitsResult } from './ruleResultTypes.js';

/** Good pairs that lie beyond the limit of their difference: one in a thousand. */
const ALARM_SHARE = 1 / 1000;
/** Lengths of rows, as far as the data reach. */
const USUAL_KM = [1, 5, 10];

/**
 * What a second visit on the same day gains, and how errors depend on the number of epochs behind an occupation.
 * @param rules those of the study, to whose reach second visits are told of
 * @param weights of a screening, one for each error; null without one
 */
export function visitsAndLengths(
  { errors, used, models, options }: RuleInput,
  rules: readonly Rule[],
  weights: Float64Array | null,
  seed: number,
): {
  readonly results: Pick<Results, 'secondVisits' | 'errorByOccupationLength'>;
  readonly messages: readonly Message[];
} {
  const own = weights ?? undefined;
  const reasons = new Set<string>();
  const results = {
    secondVisits: models.flatMap((model): SecondVisitsResult[] => {
      // The correlation is that of the parts of root-sum-square.
      if (model.variance === null) return [];
      const random = randomStream(seed, `second visits ${model.component}`);
      const found = possible('What a second visit gains could not be found', reasons, () =>
        secondVisits(errors, model, {
          random,
          weights: own,
          lengthsKm: rowLengths(USUAL_KM, used, model.component, rules),
        }),
      );
      if (found === null) return [];
      const { dayModel = null } = options.get(model.component)!;
      return [
        {
          ...found,
          alarmShare: ALARM_SHARE,
          visits: found.visits.map((visit) => ({
            ...visit,
            differenceLimitMm: twoVisitLimitMm(model, dayModel, {
              firstKm: visit.baselineKm,
              secondKm: visit.baselineKm,
              when: 'same-day',
              bases: 'same',
              correlation: correlationOf(found, visit),
              alarmShare: ALARM_SHARE,
            }),
          })),
        },
      ];
    }),
    errorByOccupationLength: models.flatMap(
      (model) =>
        possible('Errors could not be told by the length of occupations', reasons, () =>
          errorByOccupationLength(errors, model, own),
        ) ?? [],
    ),
  };
  return { results, messages: [...reasons].map((text) => message('info', 'visits-not-compared', text)) };
}

const correlationOf = (
  { correlation }: SecondVisits,
  { baselineKm, minutes }: { readonly baselineKm: number; readonly minutes: number },
): number => (correlation === null ? 0 : visitCorrelation(correlation, baselineKm, minutes));

/** A reason is told once, and not for each component; what could not be found is left out. */
function possible<T>(what: string, reasons: Set<string>, make: () => T): T | null {
  try {
    return make();
  } catch (error) {
    if (!(error instanceof InputError)) throw error;
    reasons.add(`${what}: ${error.messages[0]!.text}`);
    return null;
  }
}
