import type { OccupationError } from '../errors/index.js';
import type { Component } from '../fit/index.js';
import { longestSupportedKm, type Rule, tabledLengths } from '../rule/index.js';

/**
 * Lengths of the rows of a component's tables: usual ones, how far the farthest rule of all reaches, and the longest length
 * that the data support, km. Where they support none, the farthest occupation ends the tables.
 * @param used errors that count, at least one
 */
export function rowLengths(
  usualKm: readonly number[],
  used: readonly OccupationError[],
  component: Component,
  rules: readonly Rule[],
): number[] {
  const lastKm =
    longestSupportedKm(used, component) ?? used.reduce((far, { baselineKm }) => Math.max(far, baselineKm), 0);
  return tabledLengths(usualKm, lastKm, [farthestRuleKm(rules)]);
}

/** How far the farthest rule reaches; 0 where none does. */
const farthestRuleKm = (rules: readonly Rule[]): number =>
  rules.reduce((far, { maximumBaselineKm }) => Math.max(far, maximumBaselineKm ?? 0), 0);
