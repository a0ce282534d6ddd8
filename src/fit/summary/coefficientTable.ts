import { sigmaAtMm, sigmaLimitsMm } from '../errorCurve.js';
import type { ErrorModel, EstimateWithLimits } from '../errorModel.js';
import { fittedSigmaMm } from '../estimate.js';
import { type FitComponent, FORM_CURVES } from '../forms.js';

/** A number of a fit with its limits at the model's confidence; null is what the data cannot defend. */
export interface Coefficient extends EstimateWithLimits {
  readonly name: string;
  readonly unit: 'mm' | 'mm per km' | 'mm per axis';
}

/** Lengths at which σ is stated, as far as the data reach, km. */
const STATED_AT_KM = [1, 5, 10, 20, 30];

/**
 * The numbers of a fit as a table: constant, ppm, σ at some lengths within the data, and where they were found the
 * single axes (without limits: they have the weights of the radial fit), the marks' own errors and the setups' spread.
 */
export function coefficientTable(model: ErrorModel<FitComponent>): readonly Coefficient[] {
  return [
    { name: 'constant', unit: 'mm', ...model.constantMm },
    { name: 'ppm', unit: 'mm per km', ...model.ppm },
    ...STATED_AT_KM.filter((km) => km >= model.shortestKm && km <= model.longestKm).map((km) =>
      spreadAt(model, km),
    ),
    ...axisCoefficients(model),
    ...(model.markComponent === null
      ? []
      : [{ name: 'errors of marks', unit: 'mm per axis', ...model.markComponent.sigmaMm } as const]),
    ...(model.setups === null
      ? []
      : [{ name: 'spread of setups', unit: 'mm per axis', ...alone(model.setups.sigmaBaseMm) } as const]),
  ];
}

function spreadAt(model: ErrorModel<FitComponent>, km: number): Coefficient {
  const limits = sigmaLimitsMm(model, km, model.confidence);
  return {
    name: `spread at ${km} km`,
    unit: 'mm',
    estimate: sigmaAtMm(model, km),
    low: limits?.[0] ?? null,
    high: limits?.[1] ?? null,
  };
}

function axisCoefficients({ axes, form, ppm }: ErrorModel<FitComponent>): Coefficient[] {
  if (axes === null) return [];
  const { sigma } = FORM_CURVES[form];
  return (['east', 'north'] as const).flatMap((axis): Coefficient[] => {
    const fitted = axes[axis];
    return [
      { name: `constant, ${axis}`, unit: 'mm', ...alone(fittedSigmaMm(fitted, 0)) },
      ...(ppm.estimate === null
        ? []
        : [{ name: `ppm, ${axis}`, unit: 'mm per km', ...alone(sigma(fitted.displayQ)) } as const]),
    ];
  });
}

const alone = (estimate: number): EstimateWithLimits => ({ estimate, low: null, high: null });
