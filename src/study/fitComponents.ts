import type { OccupationError } from '../errors/index.js';
import {
  type Comparison,
  type Component,
  chooseReference,
  compareForms,
  composeAbsolute,
  type ErrorModel,
  type Form,
  fitErrorModel,
  type MarkComponent,
  type MarkTest,
  type Reference,
  type ReferenceChoice,
  testMarks,
} from '../fit/index.js';
import { InputError, type Message, message } from '../logs/index.js';
import { type FormDoubt, formDoubt } from '../rule/index.js';
import { randomStream } from '../stats/index.js';
import type { Study } from './study.js';

/** One model that could be fitted. */
export interface FittedModel {
  readonly model: ErrorModel;
  /** Its constant was put together from repeatability and the marks' own errors. */
  readonly composed: boolean;
}

/** All that is fitted to the errors of one component. */
export interface ComponentFits {
  readonly component: Component;
  /** The fit on which the rules rest. */
  readonly basis: ErrorModel;
  /** Every reference, form, with and without screening; the basis is one of them. */
  readonly fits: readonly FittedModel[];
  readonly comparison: Comparison;
  /** The marks' own errors and their test; null where marks hardly repeat. */
  readonly markComponent: MarkComponent | null;
  readonly markTest: MarkTest | null;
}

const COMPONENTS: readonly Component[] = ['horizontal', 'vertical'];
const REFERENCES: readonly Reference[] = ['repeatability', 'absolute', 'relative'];
const FORMS: readonly Form[] = ['root-sum-square', 'linear-sum'];

/**
 * Fits each component that the errors hold, from every reference and in both forms; a component that cannot be fitted
 * leaves a message.
 * @param weights of a screening, one for each error; null without one
 */
export function fitComponents(
  errors: readonly OccupationError[],
  weights: Float64Array | null,
  study: Study,
): { components: ComponentFits[]; messages: Message[] } {
  if (errors.length === 0) {
    return {
      components: [],
      messages: [
        message(
          'error',
          'no-occupations',
          'No occupation is left to fit: no row is fixed and on a known mark. The account above says what became of the rows.',
        ),
      ],
    };
  }
  const components: ComponentFits[] = [];
  const messages: Message[] = [];
  for (const component of COMPONENTS) {
    try {
      const { fits, told } = fitComponent(errors, weights, component, study);
      components.push(fits);
      messages.push(...told.map((note) => ofComponent(component, note)));
    } catch (error) {
      if (!(error instanceof InputError)) throw error;
      messages.push(...error.messages);
    }
  }
  return { components, messages };
}

/** The fit of a component behind the rules, and what its reference was chosen by. */
function basisFit(
  errors: readonly OccupationError[],
  weights: Float64Array | null,
  component: Component,
  { reference: wanted, form, confidence }: Study,
): { basis: ErrorModel; choice: ReferenceChoice } {
  const screened = weights === null ? {} : { weights };
  const choice = chooseReference(errors, { component, ...screened });
  const reference = wanted === 'auto' ? choice.reference : wanted;
  return { basis: fitErrorModel(errors, { component, form, reference, confidence, ...screened }), choice };
}

/** How a message names the component that it is about. */
export const ofComponent = (component: Component, note: Message): Message => ({
  ...note,
  text: `${component === 'horizontal' ? 'Horizontal' : 'Vertical'}: ${note.text}`,
});

function fitComponent(
  errors: readonly OccupationError[],
  weights: Float64Array | null,
  component: Component,
  study: Study,
): { fits: ComponentFits; told: Message[] } {
  const { reference: wanted, confidence, seed } = study;
  const screened = weights === null ? {} : { weights };
  const { basis, choice } = basisFit(errors, weights, component, study);
  const { form: basisForm, reference } = basis;
  const common = { component, confidence };
  const others = FORMS.flatMap((form) =>
    (weights === null ? [screened] : [screened, {}]).flatMap((screening) =>
      REFERENCES.flatMap((each): FittedModel[] => {
        const isBasis = form === basisForm && each === reference && screening === screened;
        if (isBasis) return [{ model: basis, composed: false }];
        return possibleFits(errors, { ...common, ...screening, form, reference: each }, choice);
      }),
    ),
  );
  const repeated = others.find(
    ({ model }) =>
      model.reference === 'repeatability' &&
      model.form === 'root-sum-square' &&
      model.screened === basis.screened,
  );
  const marks = repeated === undefined ? null : markErrors(repeated.model, seed);
  const comparison = compareForms(errors, { component, reference, ...screened });
  return {
    fits: {
      component,
      basis,
      fits: others,
      comparison,
      markComponent: marks?.component ?? null,
      markTest: marks?.test ?? null,
    },
    told: [
      ...(wanted === 'auto' ? [choice.message] : []),
      ...basis.notes,
      ...comparison.notes,
      ...(marks?.component.notes ?? []),
      ...(marks?.test.notes ?? []),
    ],
  };
}

/** The other form with the reference and screening of the basis, where days left out do not tell the two apart. */
export function formDoubtOf({ basis, fits, comparison }: ComponentFits): FormDoubt | null {
  const other = fits.find(
    ({ model, composed }) =>
      !composed &&
      model.form !== basis.form &&
      model.reference === basis.reference &&
      model.screened === basis.screened,
  );
  return formDoubt(basis, comparison, other?.model ?? null);
}

/** Spread of the marks' own errors per axis, mm, that a fit of repeatability does not hold; undefined where it is not known. */
export const markSigmaOf = ({ basis, markComponent }: ComponentFits): number | undefined =>
  basis.reference === 'absolute' ? undefined : (markComponent?.sigmaMm.estimate ?? undefined);

/** A fit beside the basis: what the data do not allow is left out, for the basis has told of it. */
function possibleFits(
  errors: readonly OccupationError[],
  options: Parameters<typeof fitErrorModel<Component>>[1],
  choice: ReferenceChoice,
): FittedModel[] {
  try {
    if (
      options.reference === 'absolute' &&
      options.form === 'root-sum-square' &&
      choice.reference === 'repeatability'
    ) {
      const { model } = composeAbsolute(fitErrorModel(errors, { ...options, reference: 'repeatability' }));
      if (model !== null) return [{ model, composed: true }];
    }
    return [{ model: fitErrorModel(errors, options), composed: false }];
  } catch (error) {
    if (error instanceof InputError) return [];
    throw error;
  }
}

/** The marks' own errors and whether they are more than their days explain. */
function markErrors(model: ErrorModel, seed: number): { component: MarkComponent; test: MarkTest } | null {
  const { markComponent } = composeAbsolute(model);
  return { component: markComponent, test: testMarks(model, { random: randomStream(seed) }) };
}
