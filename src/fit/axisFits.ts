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
  const added = addedBack(data.y, east, north);
  const fitted = (column: Float64Array): FormEstimate => {
    const y = column.map((value, i) => value * value + (added?.[i] ?? 0));
    return withDistance ? estimateForm({ y, l: data.l, w: data.w }, form) : meanAlone(y, data.w, form);
  };
  const fits = { east: fitted(east), north: fitted(north) };
  return fits.east.converged && fits.north.converged ? fits : null;
}

/**
 * What squares hold for each axis beyond the signed components, as the variance of a setup's offset; null for rounding.
 */
function addedBack(y: Float64Array, east: Float64Array, north: Float64Array): Float64Array | null {
  const added = y.map((value, i) => (value - east[i]! ** 2 - north[i]! ** 2) / 2);
  return added.some((value, i) => Math.abs(value) > 1e-9 * y[i]!) ? added : null;
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
