import { dot } from '../stats/index.js';
import { FORM_CURVES, type Form } from './forms.js';
import { type FormSolution, type SquaredErrors, solveForm } from './scoring.js';
import { sumsByLength } from './sumsByLength.js';

/** Root-sum-square model μ = A + B l: A in mm², B in ppm² (mm²/km²). */
export interface VarianceEstimate {
  /** Unconstrained solution, for inference; B may be slightly negative. */
  readonly A: number;
  readonly B: number;
  /** For display: B cut at 0, A at its floor shown as 0, each with the other term fitted again. */
  readonly displayA: number;
  readonly displayB: number;
  /** A stands at its floor: no short shots identify the constant. */
  readonly constantAtFloor: boolean;
  readonly converged: boolean;
  readonly iterations: number;
}

/**
 * A fitted form, whichever it is. (p, q) is (a², b²) in mm² and ppm² for root-sum-square, (a, b) in mm and ppm for
 * linear-sum; it is the unconstrained solution, for inference, and q may be slightly negative.
 */
export interface FormEstimate extends FormSolution {
  readonly form: Form;
  /** For display: q cut at 0, p at its floor shown as 0, each with the other one fitted again. */
  readonly displayP: number;
  readonly displayQ: number;
}

/**
 * Fits σ² = A + B L², see {@link solveForm}.
 * @param start a solution nearby, from which fewer steps are needed; default half of the mean square each
 */
export function estimateVariance(
  data: SquaredErrors,
  start?: { readonly A: number; readonly B: number },
): VarianceEstimate {
  return asVariance(estimateForm(data, 'root-sum-square', start && { p: start.A, q: start.B }));
}

/** Fits a form and applies the rules of display. Errors that are all 0 give 0 and 0. */
export function estimateForm(
  errors: SquaredErrors,
  form: Form,
  start?: { readonly p: number; readonly q: number },
): FormEstimate {
  const data = sumsByLength(errors);
  const { y, w } = data;
  const meanSquare = dot(w, y) / w.reduce((sum, value) => sum + value, 0);
  if (!(meanSquare > 0)) {
    const converged = y.length > 0;
    return {
      form,
      ...{ p: 0, q: 0, displayP: 0, displayQ: 0 },
      ...{ constantAtFloor: true, converged, iterations: 0 },
    };
  }
  const solution = solveForm(data, form, start);
  const ofVariance = (variance: number): number =>
    form === 'root-sum-square' ? variance : Math.sqrt(variance);
  let [displayP, displayQ] = [solution.p, solution.q];
  if (solution.q < 0) [displayP, displayQ] = [ofVariance(meanSquare), 0];
  if (solution.constantAtFloor) [displayP, displayQ] = [0, ofVariance(meanRatio(data))];
  return { form, ...solution, displayP, displayQ };
}

export const asVariance = (found: FormEstimate): VarianceEstimate => ({
  A: found.p,
  B: found.q,
  displayA: found.displayP,
  displayB: found.displayQ,
  constantAtFloor: found.constantAtFloor,
  converged: found.converged,
  iterations: found.iterations,
});

/** σ of a displayed fit at a length, mm. */
export function fittedSigmaMm({ form, displayP, displayQ }: FormEstimate, baselineKm: number): number {
  const curve = FORM_CURVES[form];
  return curve.sigma(displayP + displayQ * curve.regressor(baselineKm ** 2));
}

/** Σ w (y/l) / Σ w: the maximum-likelihood b² in both forms when the constant is 0. */
function meanRatio({ y, l, w }: SquaredErrors): number {
  let [top, bottom] = [0, 0];
  for (let i = 0; i < y.length; i++) {
    top += (w[i]! * y[i]!) / l[i]!;
    bottom += w[i]!;
  }
  return top / bottom;
}
