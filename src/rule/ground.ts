import { type DayModel, dayModel } from '../days/index.js';
import {
  type ErrorModel,
  fitErrorModel,
  type Screening,
  type WrongFixGrowth,
  wrongFixGrowth,
} from '../fit/index.js';
import type { Surroundings } from './conditions.js';
import type { FormDoubt } from './formDoubt.js';

/** What a rule stands on beside the errors. */
export interface RuleGround {
  readonly model: ErrorModel;
  /** How days differ; null or absent: the rule is pooled over all days. */
  readonly dayModel?: DayModel | null | undefined;
  /** How the share of wrong fixes grows with distance; null or absent: none were searched for. */
  readonly wrongFixes?: WrongFixGrowth | null | undefined;
}

export interface RuleOptions extends Surroundings {
  readonly dayModel?: DayModel | null | undefined;
  readonly wrongFixes?: WrongFixGrowth | null | undefined;
  /**
   * The same ground with the suspects of crowded days taken as good ({@link crowdedDaysKept}): of both rules the shorter
   * one counts.
   */
  readonly crowdedDaysKept?: RuleGround | null | undefined;
  /**
   * The form that cannot be told from that of the model ({@link findFormDoubt}): at each length the larger spread of both
   * counts.
   */
  readonly formDoubt?: FormDoubt | null | undefined;
  /** A site far above or below its base, vertical rules only. */
  readonly height?: HeightAllowance | undefined;
}

/** What a height difference between base and site adds to the vertical spread. */
export interface HeightAllowance {
  /** Site minus base, m. */
  readonly differenceM: number;
  /** mm per 100 m of height difference: the upper limit of the fitted term, to be on the safe side. */
  readonly mmPer100M: number;
  /** Largest height difference among the shots, m, up or down; a site beyond it has no rule. */
  readonly seenM?: number | undefined;
}

/** A screening whose suspects on crowded days are taken as good; null when no day was crowded. */
export function crowdedScreeningKept(
  errors: readonly { readonly day: string }[],
  screening: Screening,
): Screening | null {
  const crowded = new Set(screening.crowdedDays);
  if (crowded.size === 0) return null;
  const kept = (row: number): boolean => crowded.has(errors[row]!.day);
  return {
    ...screening,
    weights: screening.weights.map((weight, row) => (kept(row) ? 1 : weight)),
    responsibilities: screening.responsibilities.map((pi, row) => (kept(row) && !Number.isNaN(pi) ? 0 : pi)),
    suspected: screening.suspected.filter((row) => !kept(row)),
  };
}

/**
 * Fits the errors again with the suspects of crowded days taken as good: three suspects on a day may be a burst of
 * wrong fixes or a degraded day, and a rule must hold for either.
 * @param model the fit in which all suspects were screened
 * @returns null when no day was crowded
 * @throws InputError as fitErrorModel
 */
export function crowdedDaysKept(
  errors: readonly { readonly day: string }[],
  model: ErrorModel,
  screening: Screening,
): RuleGround | null {
  const kept = crowdedScreeningKept(errors, screening);
  if (kept === null) return null;
  const { weights } = kept;
  const { component, form, reference, confidence } = model;
  const again = fitErrorModel(errors, { component, form, reference, confidence, weights });
  return {
    model: again,
    dayModel: form === 'root-sum-square' ? dayModel(errors, again, weights) : null,
    wrongFixes: wrongFixGrowth(errors, kept),
  };
}

/** What the base's coordinates and a height difference add to σ² of a component, mm². */
export function addedVariance(
  component: ErrorModel['component'],
  { baseSigmaMm = 0, height }: Pick<RuleOptions, 'baseSigmaMm' | 'height'>,
): number {
  const base = (component === 'horizontal' ? 2 : 1) * baseSigmaMm ** 2;
  const ofHeight = height === undefined ? 0 : ((height.mmPer100M * height.differenceM) / 100) ** 2;
  return base + ofHeight;
}
