import type { ErrorModel } from '../errorModel.js';
import { axesOf, type FitComponent } from '../forms.js';
import { marksInUse } from './markComponent.js';
import { markVariance, type VarianceWithLimits } from './markVariance.js';

/** The part of a composed model's a² that belongs to the marks, mm². */
export type OwnVariance = VarianceWithLimits;

/**
 * @param tail probability beyond each of the limits
 * @returns null for a model that is not composed
 */
export function ownVariance(
  { markComponent, component }: ErrorModel<FitComponent>,
  tail: number,
): OwnVariance | null {
  if (markComponent === null) return null;
  const axes = axesOf(component);
  const { estimate, low, high } = markVariance(marksInUse(markComponent.marks), 1 - 2 * tail);
  return { estimate: axes * estimate, low: axes * low, high: axes * high };
}
