import type { Control } from '../control/index.js';
import type { OccupationError, Visit } from '../errors/index.js';
import type { Component, ErrorModel } from '../fit/index.js';
import {
  checkShotLimits,
  crowdedDaysKept,
  type FormDoubt,
  type HeightAllowance,
  noRule,
  type PositionPromise,
  promiser,
  type Rule,
  type RuleOptions,
  ruleByHour,
  ruleBySeason,
  ruleFinder,
  ruleTable,
  type Tolerance,
  testSpecSheet,
  watchBasis,
} from '../rule/index.js';
import { usedBaseErrors } from './baseErrors.js';
import type { JudgedDays } from './judgeDays.js';
import type { Results } from './results.js';
import { rowLengths } from './rowLengths.js';
import type { PartRule } from './ruleResultTypes.js';
import type { WrongFixes } from './screenStudy.js';
import type { Study } from './study.js';

/** What rules are made from. */
export interface RuleInput {
  /** All errors that were fitted, suspected wrong fixes too, and those of them that count. */
  readonly errors: readonly OccupationError[];
  readonly used: readonly OccupationError[];
  readonly visits: readonly Visit[];
  readonly control: Control;
  readonly models: readonly ErrorModel[];
  /** The form that cannot be told from that of a model. */
  readonly doubts: ReadonlyMap<Component, FormDoubt | null>;
  readonly days: readonly Pick<JudgedDays, 'component' | 'model'>[];
  /** The site that vertical rules are for, where one is stated. */
  readonly height: HeightAllowance | undefined;
  readonly wrongFixes: WrongFixes | null;
  /** Spread of the marks' own errors per axis, mm, where the fit does not hold it. */
  readonly markSigmaMm: ReadonlyMap<Component, number | undefined>;
  /** F10.7 by day, where the sky is known. */
  readonly f107: ReadonlyMap<string, number>;
  /** What the rules of each component stand on beside the errors. */
  readonly options: ReadonlyMap<Component, RuleOptions>;
}

/**
 * The rules that the study asks for, and what else follows from the same models: a table of rules, rules of single hours
 * and months, the comparison with the spec sheet, limits of check shots, and what new days can be watched by.
 */
export function makeRules(
  input: RuleInput,
  { tolerances, specSheet, checkShots }: Study,
): Pick<
  Results,
  | 'rules'
  | 'ruleTable'
  | 'promises'
  | 'rulesByHour'
  | 'rulesBySeason'
  | 'specSheetTest'
  | 'checkShotLimits'
  | 'watch'
> {
  const { used, models, wrongFixes, options } = input;
  const dayModel = (component: Component) => options.get(component)!.dayModel ?? null;
  const usedWeights = wrongFixes?.weights?.filter((weight) => weight >= 0.5);
  const grouped = (make: typeof ruleByHour): (PartRule & { readonly group: string })[] =>
    models.flatMap((model) => {
      const { dayModel: _, crowdedDaysKept: __, ...rest } = options.get(model.component)!;
      const own = tolerances.filter(({ component }) => component === model.component);
      if (own.length === 0) return [];
      return make(used, model, own, { ...rest, weights: usedWeights }).map(({ group, rule }) => ({
        group,
        ...partOfRule(rule),
      }));
    });
  const rules = toleranceRules(input, { tolerances });
  return {
    rules,
    ruleTable: models.flatMap((model) => ruleTable(used, model, options.get(model.component)!)),
    rulesByHour: grouped(ruleByHour).map(({ group, ...rule }) => ({ hours: group, ...rule })),
    rulesBySeason: grouped(ruleBySeason).map(({ group, ...rule }) => ({ month: group, ...rule })),
    specSheetTest:
      specSheet === null
        ? []
        : models.map((model) =>
            testSpecSheet(used, model, specSheet, { dayModel: dayModel(model.component) }),
          ),
    promises: models.flatMap((model) => promisesOf(used, model, options.get(model.component)!)),
    checkShotLimits: models.map((model) =>
      checkShotLimits(model, dayModel(model.component), {
        ...checkShots,
        lengthsKm: rowLengths(USUAL_KM, used, model.component, rules),
        markSigmaMm: input.markSigmaMm.get(model.component),
        baseSigmaMm: options.get(model.component)!.baseSigmaMm,
      }),
    ),
    watch: models.map((model) => ({
      component: model.component,
      ...watchBasis(model, dayModel(model.component)),
    })),
  };
}

/** Lengths of rows, as far as the data reach. */
const USUAL_KM = [0.5, 1, 2, 5, 10, 15, 20];
const PROMISED_SHARES = [0.68, 0.95, 0.99];

/** The question of a rule turned round: what can be promised at some lengths. */
const promisesOf = (
  used: readonly OccupationError[],
  model: ErrorModel,
  options: RuleOptions,
): PositionPromise[] =>
  PROMISED_SHARES.flatMap((share) =>
    rowLengths(USUAL_KM, used, model.component, []).map(promiser(used, model, { ...options, share })),
  );

/** The rules of the study's tolerances, in their order, and nothing else. */
export function toleranceRules(
  { used, models, options }: RuleInput,
  { tolerances }: Pick<Study, 'tolerances'>,
): Rule[] {
  const finders = new Map(
    models.map((model) => [model.component, ruleFinder(used, model, options.get(model.component)!)]),
  );
  return tolerances.map(
    (tolerance) => finders.get(tolerance.component)?.(tolerance) ?? withoutFit(used, tolerance),
  );
}

/** What is kept of a rule of some hours or months, or beside the rule of the study. */
export const partOfRule = ({
  component,
  limitMm,
  share,
  maximumBaselineKm,
  bestEstimateKm,
  reason,
}: Rule): PartRule => ({
  component,
  limitMm,
  share,
  maximumBaselineKm,
  bestEstimateKm,
  reason,
});

const withoutFit = (used: readonly OccupationError[], tolerance: Tolerance): Rule =>
  noRule(used, tolerance, `no fit of the ${tolerance.component} component was possible`);

/** The input with what all rules of a component share, made once. */
export const withRuleOptions = (input: Omit<RuleInput, 'options'>): RuleInput => ({
  ...input,
  options: new Map(input.models.map((model) => [model.component, ruleOptions(model, input)])),
});

function ruleOptions(model: ErrorModel, input: Omit<RuleInput, 'options'>): RuleOptions {
  const { errors, visits, wrongFixes, days } = input;
  const judged = days.find(({ component }) => component === model.component);
  const screening = wrongFixes?.weights ? wrongFixes.screening : null;
  return {
    dayModel: judged?.model.posterior ? judged.model : null,
    wrongFixes: wrongFixes?.growth ?? null,
    crowdedDaysKept: screening === null ? null : crowdedDaysKept(errors, model, screening),
    formDoubt: input.doubts.get(model.component),
    visits,
    f107: input.f107,
    height: model.component === 'vertical' ? input.height : undefined,
    ...usedBaseErrors(model.component, input),
  };
}
