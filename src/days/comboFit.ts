import { DAY_COMBOS, dayPrior, MEDIAN_COUNT, NOTHING, priorSupport, THETAS } from './dayGrid.js';

/** What the likelihoods of all days say of the combos. */
export interface ComboFit {
  /** Probability of each combo; they sum to 1. */
  readonly weights: Float64Array;
  /** Likelihood of each day under each combo, combos × days; 0 for combos too unlikely to be reckoned. */
  readonly marginals: Float64Array;
}

/** Every so many medians are reckoned in any case; what lies between only where the likelihood leads. */
const STRIDE = 5;
/** A combo whose log likelihood is so much below the best has a weight under 1e-13. */
const HOPELESS = 30;
/** A combo that makes a day impossible keeps a finite logarithm. */
const LEAST = 1e-300;

/** @param likelihood relative likelihoods, days × thetas */
export function comboFit(likelihood: Float64Array): ComboFit {
  const likelihoods = likelihoodsOf(likelihood);
  const logs = new Float64Array(DAY_COMBOS.length).fill(Number.NEGATIVE_INFINITY);
  let best = Number.NEGATIVE_INFINITY;
  const reckon = (j: number): number => {
    if (logs[j] === Number.NEGATIVE_INFINITY) logs[j] = logMarginal(likelihoods, j);
    if (logs[j]! > best) best = logs[j]!;
    return logs[j]!;
  };
  const groups = Array.from({ length: DAY_COMBOS.length / MEDIAN_COUNT }, (_, g) => g * MEDIAN_COUNT);
  for (const group of groups) for (let i = 0; i < MEDIAN_COUNT; i += STRIDE) reckon(group + i);
  for (const group of groups) {
    for (let i = 0; i < MEDIAN_COUNT; i += STRIDE) {
      const here = logs[group + i]!;
      const [before, after] = [logs[group + i - STRIDE], logs[group + i + STRIDE]];
      const top = (i === 0 || here >= before!) && (i === MEDIAN_COUNT - 1 || here >= after!);
      if (top) climb(reckon, group, i, () => best - HOPELESS);
    }
  }
  const weights = logs.map((value, j) => Math.exp(value - best) * DAY_COMBOS[j]!.width);
  const total = weights.reduce((a, b) => a + b);
  return { weights: weights.map((weight) => weight / total), marginals: likelihoods.marginals };
}

/** The same for every combo, however unlikely. */
export function everyCombo(likelihood: Float64Array): Float64Array {
  const likelihoods = likelihoodsOf(likelihood);
  for (let j = 0; j < DAY_COMBOS.length; j++) logMarginal(likelihoods, j);
  return likelihoods.marginals;
}

/** From a median whose neighbours at the stride are lower: to the top beside it, then down both flanks. */
function climb(reckon: (j: number) => number, group: number, start: number, floor: () => number): void {
  let top = start;
  for (let i = Math.max(0, start - STRIDE); i <= Math.min(MEDIAN_COUNT - 1, start + STRIDE); i++) {
    if (reckon(group + i) > reckon(group + top)) top = i;
  }
  for (const step of [-1, 1]) {
    for (let i = top + step; i >= 0 && i < MEDIAN_COUNT && reckon(group + i) > floor(); i += step);
  }
}

interface Likelihoods {
  /** Days × thetas, and the part of each row that counts. */
  readonly rows: Float64Array;
  readonly first: Uint8Array;
  readonly end: Uint8Array;
  readonly marginals: Float64Array;
}

function likelihoodsOf(rows: Float64Array): Likelihoods {
  const days = rows.length / THETAS.length;
  return { rows, ...daySupport(rows), marginals: new Float64Array(DAY_COMBOS.length * days) };
}

/** Fills the marginals of a combo and gives the sum of their logarithms. */
function logMarginal({ rows, first, end, marginals }: Likelihoods, j: number): number {
  const prior = dayPrior();
  const { first: firsts, end: ends } = priorSupport();
  const thetas = THETAS.length;
  const from = j * thetas;
  const days = first.length;
  const own = j * days;
  let sumOfLogs = 0;
  for (let d = 0; d < days; d += 4) {
    // Four days at a time, the last ones twice: one sum alone waits for each of its additions.
    const [d1, d2, d3] = [Math.min(d + 1, days - 1), Math.min(d + 2, days - 1), Math.min(d + 3, days - 1)];
    const low = Math.max(firsts[j]!, Math.min(first[d]!, first[d1]!, first[d2]!, first[d3]!));
    const high = Math.min(ends[j]!, Math.max(end[d]!, end[d1]!, end[d2]!, end[d3]!));
    const at0 = d * thetas;
    const at1 = d1 * thetas;
    const at2 = d2 * thetas;
    const at3 = d3 * thetas;
    let t0 = LEAST;
    let t1 = LEAST;
    let t2 = LEAST;
    let t3 = LEAST;
    for (let k = low; k < high; k++) {
      const p = prior[from + k]!;
      t0 += p * rows[at0 + k]!;
      t1 += p * rows[at1 + k]!;
      t2 += p * rows[at2 + k]!;
      t3 += p * rows[at3 + k]!;
    }
    marginals[own + d] = t0;
    marginals[own + d1] = t1;
    marginals[own + d2] = t2;
    marginals[own + d3] = t3;
  }
  for (let d = 0; d < days; d++) sumOfLogs += Math.log(marginals[own + d]!);
  return sumOfLogs;
}

/** For every day the first θ whose likelihood counts, and the one after the last. */
export function daySupport(likelihood: Float64Array): {
  readonly first: Uint8Array;
  readonly end: Uint8Array;
} {
  const days = likelihood.length / THETAS.length;
  const [first, end] = [new Uint8Array(days), new Uint8Array(days)];
  for (let d = 0; d < days; d++) {
    const row = likelihood.subarray(d * THETAS.length, (d + 1) * THETAS.length);
    first[d] = row.findIndex((value) => value > NOTHING);
    end[d] = row.findLastIndex((value) => value > NOTHING) + 1;
  }
  return { first, end };
}
