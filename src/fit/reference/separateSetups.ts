import type { FitData } from '../prepareErrors.js';
import { cellMeans, type MarkCells, othersMeans, othersVariance } from './markCells.js';
import { varianceModel } from './varianceModel.js';
import type { Visits } from './visits.js';

/** The offsets common to all errors of each setup, taken out of them. */
export interface SeparatedSetups {
  /** Scaled squared residuals with the offsets' own variance added back, mm². */
  readonly y: Float64Array;
  /** Signed residuals by axis on the same scale. */
  readonly components: readonly Float64Array[];
  /** Names of the setups in order. */
  readonly setups: readonly string[];
  /** Offset of each setup by axis, mm, and its standard error per axis. */
  readonly offsetMm: readonly Float64Array[];
  readonly standardErrorMm: Float64Array;
  /** Correlation of the occupations of one visit. */
  readonly rho: number;
  readonly A: number;
  readonly B: number;
  readonly converged: boolean;
}

const MOST_PASSES = 300;
const TOLERANCE = 1e-10;
/** Turns between setups and marks in one pass. */
const TURNS = 5;

/**
 * Takes the common offset β of each setup out of the errors e = β + ε. β is the mean of the visits, each weighted by
 * the inverse of its variance μ (ρ + (1 - ρ)/n); ρ, the correlation within a visit, comes from the scatter within
 * visits. A squared residual misses the variance 1/W of β, which is added back: with ρ = 0 that is restricted maximum
 * likelihood with fixed setup effects (Patterson & Thompson 1971; Smyth 2002; from memory). Where marks repeat, the mean
 * of each mark's other days is found in turns with β and taken out too.
 * @param setup setup of each entry
 * @param marks cells of marks and days, each mark with two counting cells or more; null leaves the marks' errors in
 */
export function separateSetups(
  data: FitData,
  setup: readonly string[],
  visits: Visits,
  marks: MarkCells | null,
): SeparatedSetups {
  const { l, w, components } = data;
  const axes = components.length;
  const setups = [...new Set(setup)].sort();
  const index = new Map(setups.map((name, s) => [name, s]));
  const setupOf = Int32Array.from(setup, (name) => index.get(name)!);
  const visit = visitSums(data, visits, setupOf);
  const state: { offset: Float64Array[]; mark: Float64Array[]; standardError: Float64Array } = {
    offset: components.map(() => new Float64Array(setups.length)),
    mark: components.map(() => new Float64Array(l.length)),
    standardError: new Float64Array(setups.length),
  };
  /** One turn: what marks say given the setups, then the setups given the marks. */
  const turn = (visitWeight: Float64Array): Float64Array => {
    const total = new Float64Array(setups.length);
    visitWeight.forEach((value, v) => {
      total[visit.setup[v]!]! += value;
    });
    for (let c = 0; c < axes; c++) {
      const column = components[c]!;
      if (marks !== null) {
        const [free, own] = [new Float64Array(l.length), new Float64Array(l.length)];
        const offset = state.offset[c]!;
        for (let i = 0; i < free.length; i++) free[i] = column[i]! - offset[setupOf[i]!]!;
        const others = othersMeans(marks, cellMeans(marks, free, w));
        for (let i = 0; i < own.length; i++) own[i] = others[marks.cellOf[i]!]!;
        // What all marks and all setups have in common cannot be told apart: it is counted to the setups.
        const common = weightedMean(visit.mean(own), visitWeight);
        for (let i = 0; i < own.length; i++) own[i]! -= common;
        state.mark[c] = own;
      }
      const mark = state.mark[c]!;
      const alone = new Float64Array(l.length);
      for (let i = 0; i < alone.length; i++) alone[i] = column[i]! - mark[i]!;
      const means = visit.mean(alone);
      const sums = new Float64Array(setups.length);
      visitWeight.forEach((value, v) => {
        sums[visit.setup[v]!]! += value * means[v]!;
      });
      state.offset[c] = sums.map((value, s) => value / total[s]!);
    }
    return total;
  };
  // Plain loops here and in the turns: they run in every pass, and map takes several times as long.
  const residual = (c: number): Float64Array => {
    const [column, mark, offset] = [components[c]!, state.mark[c]!, state.offset[c]!];
    const values = new Float64Array(column.length);
    for (let i = 0; i < values.length; i++) values[i] = column[i]! - mark[i]! - offset[setupOf[i]!]!;
    return values;
  };
  const squares = (): Float64Array => {
    const sums = new Float64Array(l.length);
    for (let c = 0; c < axes; c++) {
      const values = residual(c);
      for (let i = 0; i < sums.length; i++) sums[i]! += values[i]! ** 2;
    }
    return sums;
  };

  for (let k = 0; k < (marks === null ? 1 : TURNS); k++) turn(visit.weight);
  let model = varianceModel({ y: squares(), l, w });
  let [A, B] = [model.displayP, model.displayQ];
  let [rho, converged] = [0, false];
  let y: Float64Array = new Float64Array(0);
  let share = new Float64Array(l.length);
  for (let pass = 0; pass < MOST_PASSES && !converged; pass++) {
    const mu = (length: number): number => A + B * length;
    if (visit.repeats > 0) {
      let scatter = 0;
      for (let i = 0; i < l.length; i++) scatter += visit.within[i]! / mu(l[i]!);
      rho = Math.min(1, Math.max(0, 1 - scatter / visit.repeats));
    }
    const perAxis = visit.l.map((length) => mu(length) / axes);
    const meanShare = visit.weight.map((n) => rho + (1 - rho) / Math.max(n, 1));
    const visitWeight = perAxis.map((value, v) => (visit.counts(v) ? 1 / (value * meanShare[v]!) : 0));
    let total: Float64Array = new Float64Array(setups.length);
    for (let k = 0; k < (marks === null ? 1 : TURNS); k++) total = turn(visitWeight);
    if (marks !== null) {
      const byCell = othersVariance(
        marks,
        rho,
        Float64Array.from(marks.cells, (cell) => mu(cell.l)),
      );
      share = new Float64Array(l.length);
      for (let i = 0; i < share.length; i++) share[i] = byCell[marks.cellOf[i]!]!;
    }
    state.standardError = standardErrors(visit, visitWeight, total, perAxis, meanShare, share);
    y = squares();
    for (let i = 0; i < y.length; i++) y[i] = (y[i]! + axes / total[setupOf[i]!]!) / (1 + share[i]!);
    model = varianceModel({ y, l, w }, { p: A, q: Math.max(B, 1e-6) });
    const change =
      Math.abs(model.displayP - A) / Math.max(A, 1e-9) + Math.abs(model.displayQ - B) / (B + 1e-9);
    [A, B] = [model.displayP, model.displayQ];
    converged = change < TOLERANCE;
  }
  return {
    y,
    components: components.map((_, c) => residual(c).map((value, i) => value / Math.sqrt(1 + share[i]!))),
    setups,
    offsetMm: state.offset,
    standardErrorMm: state.standardError,
    rho,
    A,
    B,
    converged,
  };
}

function weightedMean(values: Float64Array, weights: Float64Array): number {
  let [sum, total] = [0, 0];
  for (let i = 0; i < values.length; i++) {
    sum += weights[i]! * values[i]!;
    total += weights[i]!;
  }
  return sum / total;
}

/** Below this weight a visit has no mean. */
const LEAST_WEIGHT = 0.5;

function visitSums({ components, l, w }: FitData, { visitOf, count }: Visits, setupOf: Int32Array) {
  const weight = new Float64Array(count);
  const lengths = new Float64Array(count);
  const rows = new Float64Array(count);
  const setup = new Int32Array(count);
  const first = new Int32Array(count);
  for (let i = visitOf.length - 1; i >= 0; i--) {
    const v = visitOf[i]!;
    weight[v]! += w[i]!;
    lengths[v]! += l[i]!;
    rows[v]! += 1;
    setup[v] = setupOf[i]!;
    first[v] = i;
  }
  const mean = (column: Float64Array): Float64Array => {
    const sums = new Float64Array(count);
    for (let i = 0; i < column.length; i++) sums[visitOf[i]!]! += w[i]! * column[i]!;
    return sums.map((value, v) => (weight[v]! > 0 ? value / weight[v]! : 0));
  };
  const means = components.map(mean);
  const counts = (v: number): boolean => weight[v]! >= LEAST_WEIGHT;
  const within = w.map((value, i) => {
    const v = visitOf[i]!;
    if (!counts(v)) return 0;
    return value * components.reduce((sum, column, c) => sum + (column[i]! - means[c]![v]!) ** 2, 0);
  });
  const repeats = weight.reduce((sum, n, v) => sum + (counts(v) ? Math.max(0, n - 1) : 0), 0);
  return { weight, setup, first, mean, within, repeats, counts, l: lengths.map((sum, v) => sum / rows[v]!) };
}

/** Standard error of each offset: scatter of its visits, and of the marks' means that were taken out of them. */
function standardErrors(
  visit: ReturnType<typeof visitSums>,
  visitWeight: Float64Array,
  total: Float64Array,
  perAxis: Float64Array,
  meanShare: Float64Array,
  share: Float64Array,
): Float64Array {
  const sums = new Float64Array(total.length);
  visitWeight.forEach((value, v) => {
    sums[visit.setup[v]!]! += value ** 2 * perAxis[v]! * (meanShare[v]! + share[visit.first[v]!]!);
  });
  return sums.map((value, s) => Math.sqrt(value) / total[s]!);
}
