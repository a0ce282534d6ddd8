import type { EstimateWithLimits } from '../fit/index.js';
import { type Message, message } from '../logs/index.js';
import type { Rule } from '../rule/index.js';
import type { LeftOutDays } from './dayResultTypes.js';
import { fitComponents, formDoubtOf, markSigmaOf } from './fitComponents.js';
import { dayModelOfFit, ppmInterval } from './judgeDays.js';
import { partOfRule, type RuleInput, toleranceRules, withRuleOptions } from './makeRules.js';
import type { Results } from './results.js';
import { screenStudy } from './screenStudy.js';
import type { Study } from './study.js';

/**
 * Screens, fits and makes the rules a second time with the days that the study file leaves out, so that both results can
 * be shown.
 * @param whole errors and visits before days were left out
 * @param ground of the rules without them: bases, the height of a site and the sun are the same for both
 */
export function withLeftOutDays(
  { errors, visits }: Pick<RuleInput, 'errors' | 'visits'>,
  ground: RuleInput,
  study: Study,
): LeftOutDays {
  const named = new Set(study.leaveOutDays);
  const left = errors.filter(({ day }) => named.has(day));
  const wrongFixes = screenStudy(errors, study);
  const weights = wrongFixes?.weights ?? null;
  const { components } = fitComponents(errors, weights, study);
  const models = components.map(({ basis }) => basis);
  const days = models.flatMap((model) => dayModelOfFit(errors, weights, model));
  const used = weights === null ? errors : errors.filter((_, i) => weights[i]! >= 0.5);
  const again = withRuleOptions({
    ...ground,
    errors,
    used,
    visits,
    models,
    doubts: new Map(components.map((each) => [each.component, formDoubtOf(each)])),
    days,
    markSigmaMm: new Map(components.map((each) => [each.component, markSigmaOf(each)])),
    wrongFixes,
  });
  const rules = toleranceRules(again, study);
  return {
    days: [...new Set(left.map(({ day }) => day))].sort(),
    occupations: left.length,
    fits: models.map((model) => ({
      component: model.component,
      constantMm: model.constantMm,
      ppm: ppmInterval(
        model,
        days.find(({ component }) => component === model.component),
      ).ppm,
      occupations: model.occupations,
      days: model.days,
    })),
    rules: rules.map(partOfRule),
  };
}

/** Both results in sentences, one message a component. */
export function leftOutMessages(
  { days, fits: fitsWith, rules: rulesWith }: LeftOutDays,
  { fits, rules }: Pick<Results, 'fits' | 'rules'>,
): Message[] {
  const one = days.length === 1;
  const what = one ? `day ${days[0]}, which is left out,` : `the ${days.length} days left out`;
  const them = one ? 'it' : 'them';
  return fitsWith.map(({ component, ppm }) => {
    const own = fits.find((fit) => fit.basisOfRule && fit.component === component);
    const without = own === undefined ? 'there is no fit' : ppmText(own.ppm);
    const lengths = rulesWith.flatMap((rule, k): string[] =>
      rule.component !== component
        ? []
        : [
            ` The maximum baseline for ${rule.limitMm} mm is ${kmText(rule)} with ${them}, ${kmText(rules[k]!)} without.`,
          ],
    );
    return message(
      'warning',
      'left-out-days-weigh',
      `With ${what} the ${component} ppm is ${ppmText(ppm)}, without ${them} ${without}.${lengths.join('')} Show both results, and say why the ${one ? 'day is' : 'days are'} left out.`,
    );
  });
}

function ppmText({ estimate, low, high }: EstimateWithLimits): string {
  if (estimate === null) return high === null ? 'not known' : `at most ${high.toFixed(2)}`;
  const limits = low === null || high === null ? '' : ` (${low.toFixed(2)} to ${high.toFixed(2)})`;
  return `${estimate.toFixed(2)}${limits}`;
}

const kmText = ({ maximumBaselineKm }: Pick<Rule, 'maximumBaselineKm'>): string =>
  maximumBaselineKm === null
    ? 'not given'
    : `${(Math.floor(maximumBaselineKm * 10 + 1e-9) / 10).toFixed(1)} km`;
