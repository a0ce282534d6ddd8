import type { AxisFits } from './errorModel.js';
import { estimateForm, type FormEstimate } from './estimate.js';
import type { Form } from './forms.js';
import type { FitData } from './prepareErrors.js';

/**
 * East and north each fitted by itself.
 * @param withDistance false where the lengths are too alike for a distance term: one RMS each
 */
export function axisFits(data: FitData, form: Form, withDistance: boolean): AxisFits | null {
  const [east, north] = data.components;
  if (east === undefined || north === undefined) return null;
  const fitted = (column: Float64Array): FormEstimate => {
    const y = column.map((value) => value * value);
    return withDistance ? estimateForm({ y, l: data.l, w: data.w }, form) : meanAlone(y, data.w, form);
  };
  const fits = { east: fitted(east), north: fitted(north) };
  return fits.east.converged && fits.north.converged ? fits : null;
}

/** The estimate of one RMS for all lengths. */
export function meanAlone(y: Float64Array, w: Float64Array, form: Form): FormEstimate {
  let [top, bottom] = [0, 0];
  for (let i = 0; i < y.length; i++) {
    top += w[i]! * y[i]!;
    bottom += w[i]!;
  }
  const p = form === 'root-sum-square' ? top / bottom : Math.sqrt(top / bottom);
  return {
    form,
    p,
    q: 0,
    displayP: p,
    displayQ: 0,
    constantAtFloor: false,
    converged: true,
    iterations: 0,
  };
}
