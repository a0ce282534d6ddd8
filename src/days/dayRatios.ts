import type { FitData } from '../fit/index.js';
import { type DayIndex, dayIndex } from './dayIndex.js';

/** How large the squared errors of each day are against the model, counted where the ppm matters. */
export interface DayRatios extends DayIndex {
  /** ω = w B l/μ: how much of a row's expected square comes from the distance. */
  readonly omega: Float64Array;
  /** u = y/μ. */
  readonly ratio: Float64Array;
  /** f = Σ ω u / Σ ω of each day; 1 for a day that says nothing of distance. */
  readonly factors: Float64Array;
  /** Σ ω and Σ w (B l/μ)² of each day. */
  readonly omegaSums: Float64Array;
  readonly omegaSquares: Float64Array;
}

/** @param A,B displayed estimates, mm² and ppm² */
export function dayRatios({ y, l, w, day }: FitData, A: number, B: number): DayRatios {
  const index = dayIndex(day);
  const { dayOf, days } = index;
  const omega = new Float64Array(y.length);
  const ratio = new Float64Array(y.length);
  const [omegaSums, omegaSquares, tops] = [0, 0, 0].map(() => new Float64Array(days.length)) as [
    Float64Array,
    Float64Array,
    Float64Array,
  ];
  for (let i = 0; i < y.length; i++) {
    const mu = A + B * l[i]!;
    const share = (B * l[i]!) / mu;
    const d = dayOf[i]!;
    omega[i] = w[i]! * share;
    ratio[i] = y[i]! / mu;
    omegaSums[d]! += omega[i]!;
    omegaSquares[d]! += w[i]! * share * share;
    tops[d]! += omega[i]! * ratio[i]!;
  }
  const factors = tops.map((top, d) => (omegaSums[d]! > 0 ? top / omegaSums[d]! : 1));
  return { ...index, omega, ratio, factors, omegaSums, omegaSquares };
}
