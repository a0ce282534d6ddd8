import { leastSquares, RankDeficientError, studentTQuantile } from '../../stats/index.js';
import type { MarkVector } from './markVectors.js';

/** One number that all marks of a base have in common. */
export interface CommonParameter {
  readonly name:
    | 'shift-east'
    | 'shift-north'
    | 'shift-up'
    | 'scale'
    | 'rotation'
    | 'tilt-east'
    | 'tilt-north';
  /** mm for shifts, ppm (mm per km) for scale, seconds of arc for rotation, mm per km for tilts. */
  readonly unit: 'mm' | 'ppm' | 'arcsec' | 'mm/km';
  readonly estimate: number;
  /** Null where the marks are too few to tell. */
  readonly standardError: number | null;
  /** Marks beyond those that the parameters need, and so degrees of freedom of the standard error. */
  readonly degreesOfFreedom: number;
}

/** A rotation of 1 mm per km in seconds of arc. */
const ARCSEC_PER_MM_PER_KM = (1e-6 * 180 * 3600) / Math.PI;

/**
 * What the vectors of a base's marks have in common: shift, scale and rotation in plan, shift and two tilts in height, at
 * the base. Rotation counts anticlockwise; a tilt is the growth of the vertical error to the east or north. Marks count
 * by the scatter of their days and by an error of their own that is estimated with it (Paule & Mandel 1982, from memory).
 * With too few marks, or marks on one line or in one place, only the shift is given.
 */
export function commonParameters(vectors: readonly MarkVector[]): CommonParameter[] {
  return [...planParameters(vectors), ...heightParameters(vectors)];
}

function planParameters(vectors: readonly MarkVector[]): CommonParameter[] {
  const used = vectors.filter(({ east }) => !Number.isNaN(east));
  if (used.length === 0) return [];
  const n = used.length;
  const fill = (east: (v: MarkVector) => number, north: (v: MarkVector) => number): Float64Array =>
    Float64Array.from({ length: 2 * n }, (_, i) => (i < n ? east(used[i]!) : north(used[i - n]!)));
  const y = fill(
    ({ east }) => east,
    ({ north }) => north,
  );
  const se = fill(
    ({ planSe }) => planSe,
    ({ planSe }) => planSe,
  );
  const shifts = [
    fill(
      () => 1,
      () => 0,
    ),
    fill(
      () => 0,
      () => 1,
    ),
  ];
  const scale = fill(
    ({ eastKm }) => eastKm,
    ({ northKm }) => northKm,
  );
  const rotation = fill(
    ({ northKm }) => -northKm,
    ({ eastKm }) => eastKm,
  );
  const fit = solved([...shifts, scale, rotation], y, se) ?? solved(shifts, y, se)!;
  return named(fit, ['shift-east', 'shift-north', 'scale', 'rotation']);
}

function heightParameters(vectors: readonly MarkVector[]): CommonParameter[] {
  const used = vectors.filter(({ up, eastKm }) => !Number.isNaN(up) && !Number.isNaN(eastKm));
  if (used.length === 0) return [];
  const column = (of: (v: MarkVector) => number): Float64Array => Float64Array.from(used, of);
  const y = column(({ up }) => up);
  const se = column(({ upSe }) => upSe);
  const ones = column(() => 1);
  const full = [ones, column(({ eastKm }) => eastKm), column(({ northKm }) => northKm)];
  const fit = solved(full, y, se) ?? solved([ones], y, se)!;
  return named(fit, ['shift-up', 'tilt-east', 'tilt-north']);
}

interface Fit {
  readonly estimates: readonly number[];
  readonly standardErrors: readonly number[] | null;
  readonly degreesOfFreedom: number;
}

function named(fit: Fit, names: readonly CommonParameter['name'][]): CommonParameter[] {
  return fit.estimates.map((value, k) => {
    const name = names[k]!;
    const unit = UNITS[name];
    const factor = unit === 'arcsec' ? ARCSEC_PER_MM_PER_KM : 1;
    const se = fit.standardErrors?.[k] ?? null;
    return {
      name,
      unit,
      estimate: value * factor,
      standardError: se === null ? null : se * factor,
      degreesOfFreedom: fit.degreesOfFreedom,
    };
  });
}

const UNITS: Readonly<Record<CommonParameter['name'], CommonParameter['unit']>> = {
  'shift-east': 'mm',
  'shift-north': 'mm',
  'shift-up': 'mm',
  scale: 'ppm',
  rotation: 'arcsec',
  'tilt-east': 'mm/km',
  'tilt-north': 'mm/km',
};

/** Null when the columns cannot be told apart, or no mark is left over to judge them by. */
function solved(columns: readonly Float64Array[], y: Float64Array, se: Float64Array): Fit | null {
  const shiftOnly = columns.every((column) => column.every((value) => value === 0 || value === 1));
  const degreesOfFreedom = y.length - columns.length;
  if (degreesOfFreedom < (shiftOnly ? 0 : 1)) return null;
  const known = Array.from(se).filter((value) => value > 0);
  const usual =
    known.length === 0 ? 0 : Math.sqrt(known.reduce((sum, value) => sum + value ** 2, 0) / known.length);
  const variance = se.map((value) => (value > 0 ? value : usual) ** 2);
  const fitWith = (own: number) => {
    const weights = variance.map((value) => (value + own > 0 ? 1 / (value + own) : 1));
    return { weights, ...leastSquares(columns, y, weights) };
  };
  try {
    const own = degreesOfFreedom === 0 ? 0 : ownVariance(fitWith, degreesOfFreedom, y);
    const { coefficients, residualSumOfSquares, unscaledCovariance } = fitWith(own);
    const weighted = usual > 0 || own > 0;
    // Without an error of their own and without scatter of days the residuals alone tell the size.
    const factor = weighted
      ? 1
      : degreesOfFreedom === 0
        ? Number.NaN
        : residualSumOfSquares / degreesOfFreedom;
    const standardErrors = unscaledCovariance.map((row, k) => Math.sqrt(row[k]! * factor));
    const told = degreesOfFreedom > 0 || usual > 0;
    return { estimates: [...coefficients], standardErrors: told ? standardErrors : null, degreesOfFreedom };
  } catch (error) {
    if (error instanceof RankDeficientError) return null;
    throw error;
  }
}

/** The variance of the marks' own errors at which the weighted residuals are as large as they should be, mm². */
function ownVariance(
  fitWith: (own: number) => { readonly residualSumOfSquares: number },
  degreesOfFreedom: number,
  y: Float64Array,
): number {
  const excess = (own: number): number => fitWith(own).residualSumOfSquares - degreesOfFreedom;
  const squares = y.reduce((sum, value) => sum + value ** 2, 0) || 1;
  let [low, high] = [1e-9 * squares, squares];
  if (excess(low) <= 0) return 0;
  for (let k = 0; k < 100; k++) {
    const middle = (low + high) / 2;
    if (excess(middle) > 0) low = middle;
    else high = middle;
  }
  return high;
}

/** Whether a parameter is told from nothing at 99 %; one without a standard error never is. */
export function isTold({ estimate, standardError, degreesOfFreedom }: CommonParameter): boolean {
  if (standardError === null) return false;
  // The scatter of days speaks where no mark is left over.
  const factor = degreesOfFreedom > 0 ? studentTQuantile(0.995, degreesOfFreedom) : 3;
  return Math.abs(estimate) > factor * standardError;
}
