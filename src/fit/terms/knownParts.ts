import type { EstimateWithLimits } from '../errorModel.js';
import type { FitComponent } from '../forms.js';
import { badOption } from '../options.js';

/** Standard deviations along one axis that are known beforehand, mm. */
export interface KnownSigmas {
  readonly centringMm?: number | undefined;
  readonly markMm?: number | undefined;
  /** Of rounding: the step over √12. */
  readonly resolutionMm?: number | undefined;
}

const NAMES = ['centringMm', 'markMm', 'resolutionMm'];

/** Their root sum of squares on the scale of the component: a radial error has two axes. */
export function knownParts(sigmas: KnownSigmas, component: FitComponent): number {
  for (const [name, sigma] of Object.entries(sigmas)) {
    if (!NAMES.includes(name)) throw badOption('knownSigmas', NAMES.join(', '), name);
    if (sigma !== undefined && !(sigma >= 0 && Number.isFinite(sigma))) {
      throw badOption(`knownSigmas.${name}`, 'a number of at least 0', sigma);
    }
  }
  const { centringMm = 0, markMm = 0, resolutionMm = 0 } = sigmas;
  const alongAxis = Math.hypot(centringMm, markMm, resolutionMm);
  return component === 'horizontal' ? Math.SQRT2 * alongAxis : alongAxis;
}

/** The constant and its limits without a known part, in quadrature and cut at 0. */
export function withoutKnown(constant: EstimateWithLimits, knownMm: number): EstimateWithLimits {
  const rest = (value: number | null): number | null =>
    value === null ? null : Math.sqrt(Math.max(0, value ** 2 - knownMm ** 2));
  return { estimate: rest(constant.estimate), low: rest(constant.low), high: rest(constant.high) };
}
