import type { FormDoubt } from '../formDoubt.js';

/** What of a limit is left for the errors that the model tells of, and the way back. */
export interface LimitLeft {
  /** mm; 0 where nothing is left. */
  readonly leftMm: (limitMm: number, baselineKm: number) => number;
  readonly neededMm: (leftMm: number, baselineKm: number) => number;
}

/**
 * An error of the base's own coordinate stretches every baseline by the same ppm in all positions: it is taken off the
 * limit in full, since no share of the positions escapes it. Where the form is in doubt, the rest is scaled by the ratio
 * of both spreads.
 */
export function limitLeft({
  basePpm = 0,
  formDoubt: doubt,
}: {
  readonly basePpm?: number | undefined;
  readonly formDoubt?: FormDoubt | null | undefined;
}): LimitLeft {
  const ratio = (km: number): number => doubt?.ratioAt(km) ?? 1;
  return {
    leftMm: (limitMm, km) => Math.max(0, limitMm - basePpm * km) * ratio(km),
    neededMm: (leftMm, km) => leftMm / ratio(km) + basePpm * km,
  };
}
