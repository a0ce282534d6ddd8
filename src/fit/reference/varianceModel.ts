import { meanAlone } from '../axisFits.js';
import { tooAlike } from '../constantAlone.js';
import { estimateForm, type FormEstimate } from '../estimate.js';
import { FORM_CURVES } from '../forms.js';
import type { SquaredErrors } from '../scoring.js';

/**
 * The root-sum-square model (p, q) = (a², b²) of squared errors; one mean square where the lengths are too alike for two
 * terms.
 */
export function varianceModel(
  data: SquaredErrors,
  start?: { readonly p: number; readonly q: number },
): FormEstimate {
  return tooAlike(data.l, data.w)
    ? meanAlone(data.y, data.w, 'root-sum-square')
    : estimateForm(data, 'root-sum-square', start);
}

/** μ of a fit at a squared length, kept positive also beyond the lengths to which it was fitted. */
export function varianceAt({ form, p, q }: Pick<FormEstimate, 'form' | 'p' | 'q'>, l: number): number {
  const curve = FORM_CURVES[form];
  return Math.max(curve.variance(p + q * curve.regressor(l)), 1e-3 * curve.variance(p));
}
