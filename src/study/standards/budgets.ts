import type { Component, ErrorModel } from '../../fit/index.js';
import { InputError } from '../../logs/index.js';
import {
  figure,
  lackingOf,
  longestSupportedKm,
  type StandardFigure,
  type StandardResult,
  uncertaintyBudget,
} from '../../rule/index.js';
import { usedBaseErrors } from '../baseErrors.js';
import type { Study } from '../study.js';
import type { StandardsInput } from './studyStandards.js';

const LENGTHS_KM = [1, 5, 10];
const CAUTION =
  'Definition and conditions are given from memory: the printed guide decides, and this is no certificate of conformity.';

/** The budget of one position at some lengths, both components in one entry. */
export function budgets(input: StandardsInput, study: Study): StandardResult[] {
  const own = input.models.map((model) => budgetsOf(model, input, study));
  const conditions = [
    { text: 'no correlation between the sources', met: null },
    {
      text: 'the constant is larger than what is taken out of it',
      met: own.every(({ larger }) => larger),
    },
    {
      text: "the error of the base's coordinates is stated",
      met: own.length > 0 && own.every(({ baseStated }) => baseStated),
    },
    { text: 'the centring of the rod is stated', met: study.centringSigmaMm > 0 },
  ];
  const why = own.flatMap(({ reason }) => (reason === null ? [] : [reason]));
  const figures = own.flatMap((one) => one.figures);
  return [
    {
      name: 'GUM',
      standard: 'JCGM 100 (GUM)',
      definition:
        'standard uncertainty of one position per axis, its sources in quadrature, expanded by Student’s t at the effective degrees of freedom; the marks are no part of it',
      conditions,
      caution: CAUTION,
      figures,
      lacking: [...lackingOf(conditions), ...why],
      outcome:
        figures.length === 0
          ? `No budget can be made: ${why.join('; ') || 'no component could be fitted'}.`
          : `${own.flatMap(({ sentence }) => (sentence === null ? [] : [sentence])).join(' ')}`,
    },
  ];
}

interface OwnBudgets {
  readonly figures: readonly StandardFigure[];
  readonly larger: boolean;
  readonly baseStated: boolean;
  readonly sentence: string | null;
  readonly reason: string | null;
}

function budgetsOf(
  model: ErrorModel<Component>,
  input: StandardsInput,
  { centringSigmaMm }: Study,
): OwnBudgets {
  const { component } = model;
  const { baseSigmaMm } = usedBaseErrors(component, input);
  const supportedKm = longestSupportedKm(input.used, component);
  const common = { baseStated: baseSigmaMm !== undefined, larger: true, sentence: null, reason: null };
  const lengths = LENGTHS_KM.filter((km) => supportedKm !== null && km <= supportedKm);
  if (lengths.length === 0) {
    return { ...common, figures: [], reason: `the ${component} shots support no length of a budget` };
  }
  try {
    const found = lengths.map((km) =>
      uncertaintyBudget(model, km, {
        baseSigmaMm,
        // The rod stands over the mark: its centring is an error in plan.
        centringSigmaMm: component === 'horizontal' ? centringSigmaMm : 0,
        resolutionStepMm: coarsestStep(component, input),
      }),
    );
    const last = found.at(-1)!;
    return {
      ...common,
      larger: found.every(({ conditions }) => conditions.every(({ met }) => met !== false)),
      figures: found.flatMap((budget) => figuresOf(budget)),
      sentence: `${component === 'horizontal' ? 'Plan, per axis' : 'Height'}, at ${last.baselineKm} km: standard uncertainty ${last.combinedMm.toFixed(1)} mm, expanded ${last.expandedMm.toFixed(1)} mm (95 %, k = ${last.coverageFactor.toFixed(2)}).`,
    };
  } catch (error) {
    if (!(error instanceof InputError)) throw error;
    return { ...common, figures: [], reason: `${component}: ${error.messages[0]!.text.replace(/\.$/, '')}` };
  }
}

function figuresOf(budget: ReturnType<typeof uncertaintyBudget>): StandardFigure[] {
  const { component, baselineKm, entries, combinedMm, expandedMm } = budget;
  const at = { component, baselineKm };
  return [
    ...entries.map(({ source, standardMm }) => figure(source, standardMm, at)),
    figure('combined standard uncertainty', combinedMm, at),
    figure('expanded uncertainty, 95 %', expandedMm, at),
  ];
}

/** Step of the coarsest log. */
function coarsestStep(component: Component, { files }: StandardsInput): number {
  const key = component === 'horizontal' ? 'horizontalStepMm' : 'verticalStepMm';
  return files.reduce((most, { resolution }) => Math.max(most, resolution?.[key] ?? 0), 0);
}
