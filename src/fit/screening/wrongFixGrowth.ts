import { type ErrorsInput, errorColumns } from '../../errors/index.js';
import { inputError, type Message, message } from '../../logs/index.js';
import { suspectedRuns } from './events.js';
import type { Screening } from './screenWrongFixes.js';

/** Share of wrong fixes at a length: posterior mean and quantiles. */
export interface WrongFixShareAtKm {
  readonly baselineKm: number;
  readonly mean: number;
  readonly low5: number;
  /** What a rule reckons with. */
  readonly high80: number;
  readonly high95: number;
}

/** How the share of wrong fixes grows with distance; its value at a length is `wrongFixShareAtKm`. */
export interface WrongFixGrowth {
  readonly occupations: number;
  readonly suspected: number;
  /** Runs of suspected occupations that follow one another. */
  readonly events: number;
  readonly runLengths: readonly number[];
  /** How much less a suspect says than an independent one, by the lengths of runs. */
  readonly designEffect: number;
  /** Mean of log L, L in km and at least 0.5, at which the level is taken. */
  readonly meanLogKm: number;
  /** Posterior mean of the power of L with which the share grows. */
  readonly meanExponent: number;
  /** Posterior over the grid of levels and exponents, exponents outermost; sums to 1. */
  readonly posterior: Float64Array;
  readonly notes: readonly Message[];
}

const spaced = (from: number, to: number, points: number): Float64Array =>
  Float64Array.from({ length: points }, (_, k) => from + ((to - from) * k) / (points - 1));

/** Log share at the mean length, and power of L. */
const LEVELS = spaced(Math.log(2e-5), Math.log(0.3), 121);
const LEVEL_SHARES = LEVELS.map(Math.exp);
const EXPONENTS = spaced(0, 2.5, 51);
const NEAREST_KM = 0.5;
const LARGEST_SHARE = 0.5;
const FEWEST_EVENTS = 5;
/** More distinct lengths than these are put together in classes of a half per cent. */
const MOST_LENGTHS = 1000;
const CLASS_LOG_KM = 0.005;

/**
 * Posterior of the share of wrong fixes ε(L) = min(exp(α + γ (log L - mean log L)), ½) on a grid of (α, γ), the
 * likelihood tempered by the design effect of runs (Chandler & Bate 2007; Holmes & Walker 2017; from memory), prior
 * density proportional to exp(α/2 - γ).
 * @param errors those that were screened, with `baselineKm` and `day`; `startMs` and `rover` tell runs
 * @throws InputError when the screening was refused or is of other errors, or a column is missing
 */
export function wrongFixGrowth(errors: ErrorsInput, screening: Screening): WrongFixGrowth {
  const columns = errorColumns(errors);
  const lengths = columns.numbers('baselineKm', 'the growth of wrong fixes');
  refuseUnusable(screening, lengths.length);
  const rows = Int32Array.from(lengths.keys()).filter((i) => !Number.isNaN(screening.responsibilities[i]!));
  const suspects = new Set(screening.suspected);
  const runLengths = suspectedRuns(columns, rows, (row) => suspects.has(row)).sort((a, b) => b - a);
  const total = runLengths.reduce((sum, length) => sum + length, 0);
  const designEffect = (runLengths.reduce((sum, length) => sum + length ** 2, 0) + 1) / (total + 1);
  const logs = Float64Array.from(rows, (row) => logKm(lengths[row]!));
  const meanLogKm =
    logs
      .slice()
      .sort()
      .reduce((sum, value) => sum + value, 0) / logs.length;
  const cells = lengthClasses(logs, (k) => suspects.has(rows[k]!));
  const posterior = gridPosterior(cells, meanLogKm, designEffect);
  const meanExponent = posterior.reduce(
    (sum, weight, k) => sum + weight * EXPONENTS[Math.floor(k / LEVELS.length)]!,
    0,
  );
  return {
    occupations: rows.length,
    suspected: suspects.size,
    events: runLengths.length,
    runLengths,
    designEffect,
    meanLogKm,
    meanExponent,
    posterior,
    notes: growthNotes(runLengths.length, rows.length),
  };
}

/** The share at a length by the posterior. */
export function wrongFixShareAtKm(growth: WrongFixGrowth, baselineKm: number): WrongFixShareAtKm {
  const away = logKm(baselineKm) - growth.meanLogKm;
  const upToLevel = sumsUpToLevel(growth.posterior);
  const [low5, high80, high95] = [0.05, 0.8, 0.95].map((level) =>
    Math.exp(logQuantile(upToLevel, away, level)),
  ) as [number, number, number];
  return { baselineKm, mean: meanShare(growth.posterior, away), low5, high80, high95 };
}

function meanShare(posterior: Float64Array, away: number): number {
  const levels = LEVEL_SHARES.length;
  let mean = 0;
  for (let e = 0; e < EXPONENTS.length; e++) {
    const growth = Math.exp(EXPONENTS[e]! * away);
    for (let k = 0; k < levels; k++) {
      mean += posterior[e * levels + k]! * Math.min(LEVEL_SHARES[k]! * growth, LARGEST_SHARE);
    }
  }
  return mean;
}

/** A rule asks for the share at many lengths: sums are kept for as long as their posterior is in use. */
const knownSums = new WeakMap<Float64Array, Float64Array>();

/** Sums of the posterior up to each level, of every exponent by itself. */
function sumsUpToLevel(posterior: Float64Array): Float64Array {
  const known = knownSums.get(posterior);
  if (known !== undefined) return known;
  const sums = posterior.slice();
  for (let k = 0; k < sums.length; k++) if (k % LEVELS.length > 0) sums[k]! += sums[k - 1]!;
  knownSums.set(posterior, sums);
  return sums;
}

const LEVEL_STEP = LEVELS[1]! - LEVELS[0]!;

/**
 * The smallest log share up to which the posterior has a probability: halving between the grid's ends, then the grid
 * point itself. For each exponent the levels ascend, so that no sorting is needed.
 */
function logQuantile(upToLevel: Float64Array, away: number, level: number): number {
  const count = LEVELS.length;
  const most = Math.log(LARGEST_SHARE);
  const lastUpTo = (e: number, log: number): number =>
    Math.min(count, Math.floor((log - EXPONENTS[e]! * away - LEVELS[0]!) / LEVEL_STEP + 1e-9) + 1);
  const below = (log: number): number => {
    if (log >= most) return 1;
    let total = 0;
    for (let e = 0; e < EXPONENTS.length; e++) {
      const levels = lastUpTo(e, log);
      if (levels > 0) total += upToLevel[e * count + levels - 1]!;
    }
    return total;
  };
  const widest = Math.abs(away) * EXPONENTS.at(-1)!;
  let [low, high] = [LEVELS[0]! - widest - 1, most];
  while (high - low > 1e-10) {
    const middle = (low + high) / 2;
    if (below(middle) >= level) high = middle;
    else low = middle;
  }
  if (high >= most) return most;
  // The greatest grid point up to there is the one that brought the sum to the level.
  let found = Number.NEGATIVE_INFINITY;
  for (let e = 0; e < EXPONENTS.length; e++) {
    const levels = lastUpTo(e, high);
    if (levels > 0) found = Math.max(found, LEVELS[levels - 1]! + EXPONENTS[e]! * away);
  }
  return Math.min(found, most);
}

const logKm = (km: number): number => Math.log(Math.max(km, NEAREST_KM));

/** Log share of grid point k so far from the mean of log L. */
const logShare = (k: number, away: number): number =>
  Math.min(
    LEVELS[k % LEVELS.length]! + EXPONENTS[Math.floor(k / LEVELS.length)]! * away,
    Math.log(LARGEST_SHARE),
  );

interface LengthClass {
  readonly logKm: number;
  readonly rows: number;
  readonly suspected: number;
}

/** Numbers of occupations and suspects by distinct length, or by narrow classes of it where there are many. */
function lengthClasses(logs: Float64Array, suspected: (k: number) => boolean): LengthClass[] {
  const coarse = new Set(logs).size > MOST_LENGTHS;
  const classes = new Map<number, { logKm: number; rows: number; suspected: number }>();
  logs.forEach((log, k) => {
    const center = coarse ? Math.round(log / CLASS_LOG_KM) * CLASS_LOG_KM : log;
    let own = classes.get(center);
    if (own === undefined) {
      own = { logKm: center, rows: 0, suspected: 0 };
      classes.set(center, own);
    }
    own.rows += 1;
    own.suspected += Number(suspected(k));
  });
  return [...classes.values()].sort((a, b) => a.logKm - b.logKm);
}

function gridPosterior(cells: readonly LengthClass[], meanLogKm: number, designEffect: number): Float64Array {
  const logs = new Float64Array(LEVELS.length * EXPONENTS.length).map((_, k) => {
    let likelihood = 0;
    for (const cell of cells) {
      const log = logShare(k, cell.logKm - meanLogKm);
      likelihood += cell.suspected * log + (cell.rows - cell.suspected) * Math.log1p(-Math.exp(log));
    }
    const prior = LEVELS[k % LEVELS.length]! / 2 - EXPONENTS[Math.floor(k / LEVELS.length)]!;
    return likelihood / designEffect + prior;
  });
  const largest = logs.reduce((a, b) => Math.max(a, b));
  const weights = logs.map((log) => Math.exp(log - largest));
  const total = weights.reduce((sum, weight) => sum + weight, 0);
  return weights.map((weight) => weight / total);
}

function growthNotes(events: number, occupations: number): Message[] {
  if (events >= FEWEST_EVENTS) return [];
  const text =
    events === 0
      ? `No wrong fix was found in ${occupations} occupations: at most ${Number((300 / occupations).toPrecision(2))} % at 95 % confidence. Its growth with distance is assumed, not measured; more occupations narrow it.`
      : `There are few events of wrong fixes (${events}): the growth with distance is mostly assumed. More occupations far from the base would show it.`;
  return [message('info', events === 0 ? 'no-wrong-fixes' : 'few-wrong-fixes', text)];
}

function refuseUnusable(screening: Screening, rows: number): void {
  if (screening.responsibilities.length !== rows) {
    throw inputError(
      'bad-option',
      `Expected a screening of these ${rows} rows, came one of ${screening.responsibilities.length}. Screen the same errors.`,
    );
  }
  if (screening.refused || screening.share === null) {
    throw inputError(
      'screening-refused',
      'Expected a screening that was carried out, came one that was refused or had too few occupations. Its notes say what to do first.',
    );
  }
}
