import { inputError, suggestion } from '../logs/index.js';
import type { Reference } from './errorModel.js';
import { COMPONENT_COLUMNS, type Component, type FitComponent, FORM_CURVES, type Form } from './forms.js';

export interface FitOptions<C extends FitComponent = Component> {
  readonly component: C;
  /** Default `root-sum-square`. */
  readonly form?: Form | undefined;
  /** Default `absolute`: errors against the published coordinates. */
  readonly reference?: Reference | undefined;
  /** Level of the two-sided intervals; default 0.95. */
  readonly confidence?: number | undefined;
  /** Let suspected wrong fixes count less, found in the errors themselves (needs all three); default false. */
  readonly screen?: boolean | undefined;
  /** Weights in [0, 1], one for each row, such as those of a screening; takes the place of `screen`. */
  readonly weights?: Float64Array | undefined;
}

/** Options with every default filled in. */
export interface ResolvedFitOptions<C extends FitComponent = Component> {
  readonly component: C;
  readonly form: Form;
  readonly reference: Reference;
  readonly confidence: number;
  readonly screen: boolean;
  readonly weights: Float64Array | null;
}

const REFERENCES: readonly Reference[] = ['absolute', 'repeatability', 'relative'];
const KNOWN_OPTIONS = ['component', 'form', 'reference', 'confidence', 'screen', 'weights'];

/** @throws InputError that names the option, what was expected and what came */
export function resolveFitOptions<C extends FitComponent>(options: FitOptions<C>): ResolvedFitOptions<C> {
  refuseUnknownOptions(options, KNOWN_OPTIONS);
  const { component, form = 'root-sum-square', reference = 'absolute', confidence = 0.95 } = options;
  const { screen = false, weights = null } = options;
  if (!Object.hasOwn(COMPONENT_COLUMNS, component)) {
    throw badOption('component', '"horizontal", "vertical", "east" or "north"', component);
  }
  if (!Object.hasOwn(FORM_CURVES, form)) {
    throw badOption('form', '"root-sum-square" or "linear-sum"', form);
  }
  if (!REFERENCES.includes(reference)) {
    throw badOption('reference', '"absolute", "repeatability" or "relative"', reference);
  }
  if (!(confidence > 0.5 && confidence < 1)) {
    throw badOption('confidence', 'a number between 0.5 and 1', confidence);
  }
  if (typeof screen !== 'boolean') throw badOption('screen', 'true or false', screen);
  if (weights !== null) checkWeights(weights);
  return { component, form, reference, confidence, screen, weights };
}

/** @throws InputError that names an option that is not known */
export function refuseUnknownOptions(options: object, known: readonly string[]): void {
  for (const key of Object.keys(options)) {
    if (known.includes(key)) continue;
    throw inputError(
      'bad-option',
      `Expected one of ${known.join(', ')}, came the option "${key}".${suggestion(key, known)} Correct it.`,
    );
  }
}

function checkWeights(weights: Float64Array): void {
  if (!(weights instanceof Float64Array)) {
    throw badOption('weights', 'a Float64Array with one weight for each row', typeof weights);
  }
  const bad = weights.findIndex((w) => !(w >= 0 && w <= 1));
  if (bad >= 0) throw badOption('weights', 'numbers from 0 to 1', String(weights[bad]));
}

export const badOption = (option: string, expected: string, came: unknown): Error =>
  inputError(
    'bad-option',
    `Expected ${expected} as ${option}, came ${JSON.stringify(came)}. Correct the option.`,
  );
