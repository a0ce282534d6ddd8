import { dayModel } from '../days/index.js';
import { InputError } from '../logs/index.js';
import {
  crowdedDaysKept,
  noRule,
  type Rule,
  type RuleOptions,
  ruleFinder,
  screeningOf,
} from '../rule/index.js';
import { usedBaseErrors } from './baseErrors.js';
import type { ComponentFits } from './fitComponents.js';
import type { RuleInput } from './makeRules.js';
import { type RuleGroundwork, type RuleMove, ruleMoves } from './ruleMoves.js';

/** How far the rules of a study move, each time with a day model and wrong fixes as in the rules themselves. */
export function movedRules(
  input: RuleInput,
  components: readonly ComponentFits[],
  rules: readonly Rule[],
): RuleMove[] {
  const { errors, wrongFixes } = input;
  return ruleMoves(errors, wrongFixes?.weights ?? null, components, rules, (groundwork) => {
    const { model, weights } = groundwork;
    const tolerances = rules.filter(({ component }) => component === model.component).slice(0, 1);
    const used =
      weights === null ? groundwork.errors : groundwork.errors.filter((_, i) => weights[i]! >= 0.5);
    try {
      return tolerances.map(ruleFinder(used, model, optionsOf(groundwork, input)));
    } catch (error) {
      if (!(error instanceof InputError)) throw error;
      const { text } = error.messages[0]!;
      return tolerances.map((tolerance) => noRule(used, tolerance, text));
    }
  });
}

function optionsOf({ errors, rows, weights, model }: RuleGroundwork, input: RuleInput): RuleOptions {
  const screening =
    weights === null || input.wrongFixes === null ? null : screeningOf(input.wrongFixes.screening, rows);
  const days = model.form === 'root-sum-square' ? dayModel(errors, model, weights ?? undefined) : null;
  return {
    dayModel: days?.posterior ? days : null,
    wrongFixes: screening === null ? null : input.wrongFixes!.growth,
    crowdedDaysKept: screening === null ? null : crowdedDaysKept(errors, model, screening),
    // Which form it is does not turn on one mark, day or crew.
    formDoubt: isOwnForm(model, input) ? input.doubts.get(model.component) : null,
    visits: input.visits,
    f107: input.f107,
    height: model.component === 'vertical' ? input.height : undefined,
    ...usedBaseErrors(model.component, input),
  };
}

const isOwnForm = ({ component, form }: RuleGroundwork['model'], { models }: RuleInput): boolean =>
  models.some((model) => model.component === component && model.form === form);
