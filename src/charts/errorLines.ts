import { type ErrorModel, type EstimateWithLimits, errorCurve, spreadMm } from '../fit/index.js';
import { type SpecSheet, specSheetSigmaMm, toleranceFactorAt } from '../rule/index.js';
import { COLORS } from './theme.js';
import { percentWords } from './words.js';

/** A curve over the plot with the words at its right end. */
export interface ErrorLine {
  readonly points: readonly { readonly baselineKm: number; readonly errorMm: number }[];
  readonly label: readonly string[];
  readonly color: string;
  readonly widthPx: number;
  /** Dash pattern, px; empty for a full line. */
  readonly dash: readonly number[];
  readonly bold: boolean;
}

/** One point of the band of a fitted curve, mm. */
export interface BandPoint {
  readonly baselineKm: number;
  readonly lowMm: number;
  readonly highMm: number;
}

/** Lengths at which curves are drawn: 0 to the longest one. */
const STEPS = 120;

const curveLengthsKm = (longestKm: number): number[] =>
  Array.from({ length: STEPS + 1 }, (_, k) => (k / STEPS) * longestKm);

/** The share whose curve is drawn: that of the tolerance, but none that an RMS says nothing of (above 95 %). */
export const drawnShare = (toleranceShare: number | undefined): number =>
  Math.min(toleranceShare ?? 0.95, 0.95);

/**
 * The fitted curve, the curve that a share of positions stays below by it, and the spec sheet's.
 * @param longestKm where the curves end: no farther than the data
 */
export function errorLines(
  model: ErrorModel,
  share: number,
  specSheet: SpecSheet | undefined,
  longestKm: number,
): ErrorLine[] {
  const lengths = curveLengthsKm(longestKm);
  const curve = errorCurve(model, lengths);
  const lines: ErrorLine[] = [
    {
      points: curve.map(({ baselineKm, sigmaMm }) => ({ baselineKm, errorMm: sigmaMm })),
      label: ['own error model:', model.basis],
      color: COLORS.water,
      widthPx: 3,
      dash: [],
      bold: true,
    },
    {
      points: curve.map(({ baselineKm, sigmaMm }) => ({
        baselineKm,
        errorMm: toleranceFactorAt(model, share, baselineKm) * sigmaMm,
      })),
      label: [`${percentWords(share)} of positions,`, 'by the own model'],
      color: COLORS.water,
      widthPx: 1.6,
      dash: [2, 3],
      bold: false,
    },
  ];
  if (specSheet !== undefined) {
    lines.push({
      points: lengths.map((baselineKm) => ({
        baselineKm,
        errorMm: specSheetSigmaMm(specSheet, model.component, baselineKm),
      })),
      label: ['spec sheet:', model.basis],
      color: COLORS.ochre,
      widthPx: 2.2,
      dash: [9, 5],
      bold: false,
    });
  }
  return lines;
}

/** The band of the fitted curve; empty where the model has no interval. */
export function errorBand(model: ErrorModel, longestKm: number, ppm: EstimateWithLimits): BandPoint[] {
  const { ppm: own, constantMm, form } = model;
  const at = (slope: number | null, baselineKm: number): number | null =>
    slope === null || constantMm.estimate === null
      ? null
      : spreadMm(form, constantMm.estimate, slope, baselineKm);
  return errorCurve(model, curveLengthsKm(longestKm)).flatMap(({ baselineKm, lowMm, highMm }) => {
    if (lowMm === null || highMm === null) return [];
    // Limits that are stated wider than the model's move the ends of the band with them.
    const low = ppm.low === own.low ? null : at(ppm.low, baselineKm);
    const high = ppm.high === own.high ? null : at(ppm.high, baselineKm);
    return [{ baselineKm, lowMm: Math.min(lowMm, low ?? lowMm), highMm: Math.max(highMm, high ?? highMm) }];
  });
}
