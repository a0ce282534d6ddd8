import type { StandardResult } from '../../rule/index.js';
import type { RuleInput } from '../makeRules.js';
import type { FileResult } from '../results.js';
import type { StandardName } from '../ruleSettings.js';
import type { Study } from '../study.js';
import { budgets } from './budgets.js';
import { checkPointStandard } from './checkPointStandards.js';
import { fieldTests } from './fieldTests.js';
import { landTitle } from './landTitle.js';

/** What standards are compared with. */
export interface StandardsInput extends RuleInput {
  /** What each of the errors counts in the fits; null without screening. */
  readonly weights: Float64Array | null;
  readonly files: readonly Pick<FileResult, 'resolution'>[];
}

const MAKERS: Readonly<Record<StandardName, (input: StandardsInput, study: Study) => StandardResult[]>> = {
  NSSDA: (input, study) => [checkPointStandard('NSSDA', input, study)],
  ASPRS: (input, study) => [checkPointStandard('ASPRS', input, study)],
  'ISO 17123-8': fieldTests,
  GUM: budgets,
  'land-title': landTitle,
};

/** The standards that the study asks for, each with its conditions checked; a field test has an entry of its own. */
export const studyStandards = (input: StandardsInput, study: Study): StandardResult[] =>
  study.standards.flatMap((name) => MAKERS[name](input, study));
