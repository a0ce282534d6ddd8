/** `horizontal` is the radial error √(E² + N²), `vertical` the height error. */
export type Component = 'horizontal' | 'vertical';

/** One axis of the horizontal error, fitted beside it for display and comparison. */
export type Axis = 'east' | 'north';

/** Whatever an error model can be fitted to. */
export type FitComponent = Component | Axis;

/** The columns of the errors that make up a component. */
export const COMPONENT_COLUMNS = {
  horizontal: ['east', 'north'],
  vertical: ['up'],
  east: ['east'],
  north: ['north'],
} as const satisfies Record<FitComponent, readonly string[]>;

/** Axes in a squared error of the component: two of the horizontal one. */
export const axesOf = (component: FitComponent): number => COMPONENT_COLUMNS[component].length;

/** What σ of a component is. */
export const BASIS = {
  horizontal: 'radial RMS',
  vertical: 'vertical RMS',
  east: 'east RMS',
  north: 'north RMS',
} as const satisfies Record<FitComponent, string>;

/** How the spread of errors grows with baseline length: σ² = a² + b² L², or σ = a + b L. */
export type Form = 'root-sum-square' | 'linear-sum';

/**
 * A form as a function of its linear predictor η = p + q x. Root-sum-square has (p, q) = (a², b²), x = L², σ² = η;
 * linear-sum has (p, q) = (a, b), x = L, σ = η.
 */
export interface FormCurve {
  /** x at a squared length. */
  readonly regressor: (squaredKm: number) => number;
  /** σ² at η, and its derivative. */
  readonly variance: (eta: number) => number;
  readonly slope: (eta: number) => number;
  /** σ at η > 0; also takes a parameter, or a limit of one, to a or b. */
  readonly sigma: (eta: number) => number;
}

export const FORM_CURVES: Readonly<Record<Form, FormCurve>> = {
  'root-sum-square': {
    regressor: (squaredKm) => squaredKm,
    variance: (eta) => eta,
    slope: () => 1,
    sigma: Math.sqrt,
  },
  'linear-sum': {
    regressor: Math.sqrt,
    variance: (eta) => eta * eta,
    slope: (eta) => 2 * eta,
    sigma: (eta) => eta,
  },
};

/**
 * Spread at a baseline length by a form, in mm.
 * @param constantMm a
 * @param ppm b, mm per km
 */
export function spreadMm(form: Form, constantMm: number, ppm: number, baselineKm: number): number {
  return form === 'root-sum-square'
    ? Math.hypot(constantMm, ppm * baselineKm)
    : constantMm + ppm * baselineKm;
}
