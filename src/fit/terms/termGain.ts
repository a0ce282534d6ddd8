import { scoreGain } from '../logScore.js';
import { solveTerms, type TermSolution, varianceAt } from './solveTerms.js';
import type { TermDesign } from './termData.js';

/** What a term gains in predicting days that were left out. */
export interface TermGain {
  /** Mean over days of the log score per shot that the term gains; null where days cannot be left out. */
  readonly gain: number | null;
  readonly se: number | null;
  /** Only a gain of more than one standard error counts. */
  readonly verdict: 'matters' | 'not shown to matter' | 'cannot be told';
}

const FEWEST_DAYS = 4;

/** Leaves out each day in turn, and scores it with and without the term of a parameter. */
export function termGain(design: TermDesign, { theta }: TermSolution, parameter: number): TermGain {
  const reduced = withoutTerm(design, parameter);
  const reducedStart = solveTerms(reduced, startWithout(theta, parameter));
  const unknown = { gain: null, se: null, verdict: 'cannot be told' } as const;
  if (reducedStart === null) return unknown;
  const gains: number[] = [];
  for (let d = 0; d < design.dayNames.length; d++) {
    const shots = weightOfDay(design, d);
    if (shots === 0) continue;
    const withIt = solveTerms(design, theta, d);
    const withoutIt = solveTerms(reduced, reducedStart.theta, d);
    // A day without which the term cannot be told says nothing of it.
    if (!withIt?.converged || !withoutIt?.converged) continue;
    gains.push((scoreOfDay(design, withIt.theta, d) - scoreOfDay(reduced, withoutIt.theta, d)) / shots);
  }
  if (gains.length < FEWEST_DAYS) return unknown;
  const { gain, se, winner } = scoreGain(gains);
  return { gain, se, verdict: winner === 1 ? 'matters' : 'not shown to matter' };
}

function withoutTerm(design: TermDesign, parameter: number): TermDesign {
  const multiplier = parameter - design.additive.length;
  return {
    ...design,
    additive: design.additive.filter((_, a) => a !== parameter),
    multipliers: design.multipliers.filter((_, m) => m !== multiplier),
  };
}

/** Constant and ppm stay positive, and the others begin at 0. */
const startWithout = (theta: Float64Array, parameter: number): Float64Array =>
  theta
    .filter((_, j) => j !== parameter)
    .map((value, j) => (j === 0 ? Math.max(value, 1e-6) : j === 1 ? Math.max(value, 0) : 0));

function weightOfDay({ w, dayOf }: TermDesign, day: number): number {
  let sum = 0;
  for (let i = 0; i < w.length; i++) if (dayOf[i] === day) sum += w[i]!;
  return sum;
}

/** Gaussian log score, negative additive terms taken as 0; a radial square has two axes of half its variance. */
function scoreOfDay(design: TermDesign, theta: Float64Array, day: number): number {
  const { y, w, dayOf, components, additive } = design;
  const shown = theta.map((value, j) => (j < additive.length ? Math.max(0, value) : value));
  let score = 0;
  for (let i = 0; i < y.length; i++) {
    if (dayOf[i] !== day || !(w[i]! > 0)) continue;
    const perAxis = varianceAt(design, shown, i) / components;
    score -= (w[i]! / 2) * (components * Math.log(2 * Math.PI * perAxis) + y[i]! / perAxis);
  }
  return score;
}
