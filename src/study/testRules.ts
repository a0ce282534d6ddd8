import { InputError, type Message } from '../logs/index.js';
import { type BackTestOptions, backTest, forwardTest, leaveGroupOut } from '../rule/index.js';
import { usedBaseErrors } from './baseErrors.js';
import type { RuleInput } from './makeRules.js';
import type { BackTestResult } from './ruleResultTypes.js';
import type { Study } from './study.js';

const GROUPS = ['crew', 'rover', 'base'] as const;
/** Leaving out the only crew leaves nothing to learn from. */
const FEWEST_GROUPS = 2;

/**
 * Proves models and rules on days that they have not seen: each day left out in turn, the later days by the first, and
 * each crew, receiver and base by the others.
 */
export function testRules(
  input: RuleInput,
  { tolerances, specSheet }: Study,
): { backTest: BackTestResult[]; messages: Message[] } {
  const { errors, models, days, wrongFixes } = input;
  const messages: Message[] = [];
  const results = models.flatMap((model): BackTestResult[] => {
    const { component } = model;
    const judged = days.find((each) => each.component === component);
    const screening = wrongFixes?.weights ? wrongFixes.screening : null;
    const options: BackTestOptions = {
      dayModel: judged?.model.posterior ? judged.model : null,
      screening,
      tolerances: tolerances.filter((tolerance) => tolerance.component === component),
      specSheet,
      ...usedBaseErrors(component, input),
      formDoubt: input.doubts.get(component),
      crowdedDaysKept: input.options.get(component)!.crowdedDaysKept,
      height: component === 'vertical' ? input.height : undefined,
    };
    try {
      const { own, notes, ...tested } = backTest(errors, model, options);
      messages.push(...notes);
      if (own === null) return [];
      const groups = GROUPS.filter((by) => new Set(errors.map((error) => error[by])).size >= FEWEST_GROUPS);
      return [
        {
          ...tested,
          ...own,
          forward: forwardTest(errors, model, options),
          groups: groups.flatMap((by) =>
            leaveGroupOut(errors, model, { by, weights: wrongFixes?.weights ?? undefined }).map((group) => ({
              by,
              ...group,
            })),
          ),
        },
      ];
    } catch (error) {
      // A fit relative to setups has no marks to be judged by.
      if (!(error instanceof InputError)) throw error;
      messages.push(...error.messages.map((told) => ({ ...told, severity: 'warning' as const })));
      return [];
    }
  });
  return { backTest: results, messages };
}
