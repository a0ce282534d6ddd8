import type { JudgedShots } from './score.js';

/** One shot as it is judged. */
export interface Shot {
  readonly day: string;
  readonly km: number;
  readonly y: number;
  readonly weight: number;
}

/** Shots gathered day after day. */
export const newShots = () => ({
  days: [] as string[],
  km: [] as number[],
  errorMm: [] as number[],
  limitMm: [] as number[],
  weights: [] as number[],
  density: [] as number[],
});

export function addShot(
  to: ReturnType<typeof newShots>,
  shot: Shot,
  limitMm: number,
  density: number | null,
): void {
  to.days.push(shot.day);
  to.km.push(shot.km);
  to.errorMm.push(Math.sqrt(shot.y));
  to.limitMm.push(limitMm);
  to.weights.push(shot.weight);
  to.density.push(density ?? Number.NaN);
}

export const finish = (shots: ReturnType<typeof newShots>, withDensity: boolean): JudgedShots => ({
  days: shots.days,
  baselineKm: Float64Array.from(shots.km),
  errorMm: Float64Array.from(shots.errorMm),
  limitMm: Float64Array.from(shots.limitMm),
  weights: Float64Array.from(shots.weights),
  logDensity: withDensity ? Float64Array.from(shots.density) : null,
});
