import { inputError, suggestion } from '../logs/index.js';
import type { Component, Form } from './forms.js';

export interface FitOptions {
  readonly component: Component;
  /** Default `root-sum-square`. */
  readonly form?: Form | undefined;
  /** Default `absolute`: errors against the published coordinates. */
  readonly reference?: 'absolute' | undefined;
  /** Level of the two-sided intervals; default 0.95. */
  readonly confidence?: number | undefined;
}

/** Options with every default filled in. */
export interface ResolvedFitOptions {
  readonly component: Component;
  readonly form: 'root-sum-square';
  readonly reference: 'absolute';
  readonly confidence: number;
}

const KNOWN_OPTIONS = ['component', 'form', 'reference', 'confidence'];

/** @throws InputError that names the option, what was expected and what came */
export function resolveFitOptions(options: FitOptions): ResolvedFitOptions {
  for (const key of Object.keys(options)) {
    if (KNOWN_OPTIONS.includes(key)) continue;
    throw inputError(
      'bad-option',
      `Expected one of ${KNOWN_OPTIONS.join(', ')}, came the option "${key}".${suggestion(key, KNOWN_OPTIONS)} Correct it.`,
    );
  }
  const { component, form = 'root-sum-square', reference = 'absolute', confidence = 0.95 } = options;
  if (component !== 'horizontal' && component !== 'vertical') {
    throw badOption('component', '"horizontal" or "vertical"', component);
  }
  if (form !== 'root-sum-square') throw badOption('form', '"root-sum-square"', form);
  if (reference !== 'absolute') throw badOption('reference', '"absolute"', reference);
  if (!(confidence > 0.5 && confidence < 1)) {
    throw badOption('confidence', 'a number between 0.5 and 1', confidence);
  }
  return { component, form, reference, confidence };
}

const badOption = (option: string, expected: string, came: unknown): Error =>
  inputError(
    'bad-option',
    `Expected ${expected} as ${option}, came ${JSON.stringify(came)}. Correct the option.`,
  );
