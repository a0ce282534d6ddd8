import type { ErrorsInput } from '../../errors/index.js';
import { InputError, type Message } from '../../logs/index.js';
import type { Component } from '../forms.js';
import { referenceData } from './referenceData.js';

/** The offset common to all errors of one setup, mm; null where it cannot be told from errors of the marks. */
export interface SetupOffsets {
  readonly setup: string;
  readonly visits: number;
  readonly east: number | null;
  readonly north: number | null;
  readonly up: number | null;
  /** Standard errors of the offsets, mm. */
  readonly se: { readonly east: number | null; readonly north: number | null; readonly up: number | null };
  readonly separable: boolean;
  /** Why not separable; null where it is. */
  readonly reason: string | null;
}

/**
 * Offsets of all setups in plan and height.
 * @param options weights in [0, 1], one for each row
 * @returns the setups in order of their names, and why a component is missing
 * @throws InputError when `setup`, `mark`, `startMs` or `azimuthDeg` is missing
 */
export function setupOffsets(
  errors: ErrorsInput,
  { weights }: { readonly weights?: Float64Array | undefined } = {},
): { readonly setups: readonly SetupOffsets[]; readonly messages: readonly Message[] } {
  const messages: Message[] = [];
  const of = (component: Component) => {
    try {
      return referenceData(errors, { component, reference: 'relative', weights }).setups!.setups;
    } catch (error) {
      if (!(error instanceof InputError) || error.messages.some(({ code }) => code === 'missing-column'))
        throw error;
      messages.push(...error.messages);
      return [];
    }
  };
  const [plan, heights] = [of('horizontal'), of('vertical')];
  const byName = <T extends { readonly setup: string }>(list: readonly T[]): Map<string, T> =>
    new Map(list.map((one) => [one.setup, one]));
  const [inPlan, inHeight] = [byName(plan), byName(heights)];
  const names = [...new Set([...inPlan.keys(), ...inHeight.keys()])].sort();
  const setups = names.map((setup): SetupOffsets => {
    const [p, h] = [inPlan.get(setup), inHeight.get(setup)];
    const separable = (p?.separable ?? false) || (h?.separable ?? false);
    return {
      setup,
      visits: Math.max(p?.visits ?? 0, h?.visits ?? 0),
      east: p?.offsetMm?.[0] ?? null,
      north: p?.offsetMm?.[1] ?? null,
      up: h?.offsetMm?.[0] ?? null,
      se: {
        east: p?.standardErrorMm ?? null,
        north: p?.standardErrorMm ?? null,
        up: h?.standardErrorMm ?? null,
      },
      separable,
      reason: separable ? null : (p?.reason ?? h?.reason ?? null),
    };
  });
  return { setups, messages };
}
