import { assumedBase, type Base, type Control } from '../control/index.js';
import { assumedBasePpm, type OccupationError } from '../errors/index.js';
import type { Component } from '../fit/index.js';
import type { Surroundings } from '../rule/index.js';

/** What the coordinates of bases add to a rule. */
export type BaseErrors = Pick<Surroundings, 'baseSigmaMm' | 'basePpm'>;

/**
 * The largest stated standard deviation, and the largest ppm of an assumed coordinate. A base on an assumed coordinate
 * shifts all positions by metres, which no rule can hold: only what it adds to baselines counts.
 */
export function baseErrors(component: Component, bases: readonly Base[]): BaseErrors {
  const assumed = bases.map(assumedBase);
  const stated = bases
    .filter((_, k) => assumed[k] === null)
    .map((base) => (component === 'horizontal' ? base.horizontalSigmaMm : base.verticalSigmaMm))
    .filter((sigma) => !Number.isNaN(sigma));
  const ppm = assumed.flatMap((found) => (found === null ? [] : [assumedBasePpm(found.sizeM)]));
  return {
    baseSigmaMm: stated.length === 0 ? undefined : Math.max(...stated),
    basePpm: ppm.length === 0 ? undefined : Math.max(...ppm),
  };
}

/** Of the bases from which the errors were measured. */
export function usedBaseErrors(
  component: Component,
  { used, control }: { readonly used: readonly OccupationError[]; readonly control: Control },
): BaseErrors {
  const names = new Set(used.map(({ base }) => base));
  return baseErrors(
    component,
    [...names].map((name) => control.bases.get(name)!),
  );
}
