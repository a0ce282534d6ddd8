import type { ErrorsInput } from '../errors/index.js';
import {
  type Comparison,
  type Component,
  compareForms,
  type ErrorModel,
  type Form,
  fitErrorModel,
  sigmaAtMm,
} from '../fit/index.js';

/** The form that days left out do not tell from the one behind the rule. */
export interface FormDoubt {
  readonly other: Form;
  /** σ of the rule's form over that of the other one at a length, at most 1: of both the larger spread counts. */
  readonly ratioAt: (baselineKm: number) => number;
}

/**
 * Between near and far shots the linear sum lies above root-sum-square, so a rule from the wrong form may be too long: in
 * doubt the larger spread counts.
 * @param comparison of both forms; where it prefers that of the model there is no doubt
 * @param other the same errors fitted in the other form
 */
export function formDoubt(
  model: ErrorModel,
  { verdict }: Pick<Comparison, 'verdict'>,
  other: ErrorModel | null,
): FormDoubt | null {
  if (other === null || verdict === model.form || !other.fitted.converged) return null;
  return {
    other: other.form,
    ratioAt(km) {
      const [own, against] = [sigmaAtMm(model, km), sigmaAtMm(other, km)];
      return own < against ? own / against : 1;
    },
  };
}

/**
 * The same with comparison and fit made here.
 * @param weights with which the model was fitted
 * @throws InputError as fitErrorModel
 */
export function findFormDoubt(
  errors: ErrorsInput,
  model: ErrorModel<Component>,
  weights?: Float64Array | undefined,
): FormDoubt | null {
  const { component, reference, confidence } = model;
  const form = model.form === 'root-sum-square' ? 'linear-sum' : 'root-sum-square';
  const comparison = compareForms(errors, { component, reference, weights });
  if (comparison.verdict === model.form) return null;
  return formDoubt(
    model,
    comparison,
    fitErrorModel(errors, { component, form, reference, confidence, weights }),
  );
}
