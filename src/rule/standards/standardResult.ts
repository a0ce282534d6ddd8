import type { Component } from '../../fit/index.js';
import type { StandardCondition, StandardHead } from './condition.js';

/** One number of a comparison. */
export interface StandardFigure {
  readonly what: string;
  readonly component: Component | null;
  /** Distance from the base for which it holds; null where it holds for the shots as they are. */
  readonly baselineKm: number | null;
  readonly valueMm: number | null;
  /** One-sided 95 % limits of the value, where they are known. */
  readonly lowMm: number | null;
  readonly highMm: number | null;
  /** What the standard allows; null where it only defines. */
  readonly allowedMm: number | null;
  /** `null`: the standard has no limit of its own. */
  readonly verdict: 'holds' | 'exceeded' | 'cannot be told' | null;
}

/** A standard with its definition, its conditions checked and what came out. */
export interface StandardResult extends StandardHead {
  /** Name under which the study asks for it. */
  readonly name: string;
  readonly figures: readonly StandardFigure[];
  /** What the data lack for a statement in the words of the standard; empty when nothing. */
  readonly lacking: readonly string[];
  readonly outcome: string;
}

/** A figure with only what is given. */
export const figure = (
  what: string,
  valueMm: number | null,
  more: Partial<Omit<StandardFigure, 'what' | 'valueMm'>> = {},
): StandardFigure => ({
  what,
  component: null,
  baselineKm: null,
  valueMm,
  lowMm: null,
  highMm: null,
  allowedMm: null,
  verdict: null,
  ...more,
});

/** Conditions that are not met, or that the data do not tell of, in words. */
export const lackingOf = (conditions: readonly StandardCondition[]): string[] =>
  conditions.flatMap(({ text, met }) =>
    met === true ? [] : [met === false ? `not met: ${text}` : `to be shown by other means: ${text}`],
  );
