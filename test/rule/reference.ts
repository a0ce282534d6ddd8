import { dayModel } from '../../src/days/index.js';
import {
  type Component,
  fitErrorModel,
  type Screening,
  screenWrongFixes,
  wrongFixGrowth,
} from '../../src/fit/index.js';
import type { Tolerance } from '../../src/rule/index.js';
import { referenceErrors, referenceWrongFixes } from '../fit/reference.js';

export const tolerance = (limitMm: number, more: Partial<Tolerance> = {}): Tolerance => ({
  component: 'horizontal',
  limitMm,
  share: 0.95,
  dayShare: 0.9,
  confidence: 0.95,
  ...more,
});

/** A screening that suspects just these rows. */
export function suspecting(suspected: readonly number[], length: number): Screening {
  const responsibilities = new Float64Array(length);
  for (const row of suspected) responsibilities[row] = 1;
  return {
    residuals: 'errors',
    components: ['east', 'north', 'up'],
    weights: responsibilities.map((pi) => 1 - pi),
    responsibilities,
    suspected,
    crowdedDays: [],
    share: { events: 0, estimate: 0, low: 0, high: 0, designEffect: 1 },
    refused: false,
    iterations: 1,
    converged: true,
    notes: [],
  };
}

/** Model, day model and growth of wrong fixes of the set of habitual marks, as R fitted them. */
export function marksGround(component: Component, wrongFixes: 'known' | 'em') {
  const errors = referenceErrors('ref4_marks');
  const screening =
    wrongFixes === 'known'
      ? suspecting(
          referenceWrongFixes('ref4_marks').map((row) => row - 1),
          errors.length,
        )
      : screenWrongFixes(errors);
  const { weights } = screening;
  const model = fitErrorModel(errors, { component, reference: 'repeatability', weights });
  return {
    errors,
    screening,
    weights,
    model,
    dayModel: dayModel(errors, model, weights),
    wrongFixes: wrongFixGrowth(errors, screening),
  };
}
