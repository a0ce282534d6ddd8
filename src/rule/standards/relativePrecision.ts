import { type ErrorsInput, errorColumns, groupIndices } from '../../errors/index.js';
import { type ErrorModel, referenceData } from '../../fit/index.js';
import { inputError } from '../../logs/index.js';
import { eigenSymmetric2, radialQuantile, studentTQuantile } from '../../stats/index.js';
import { FROM_MEMORY, type StandardHead } from './condition.js';

/** A relative-precision limit: a constant and a proportional part, added linearly, of the semi-major axis at 95 %. */
export interface RelativeLimit {
  readonly constantMm: number;
  /** mm per km. */
  readonly ppm: number;
}

/** The limit of ALTA/NSPS land title surveys of 2016 and 2021: 2 cm + 50 ppm. */
export const LAND_TITLE_LIMIT: RelativeLimit = { constantMm: 20, ppm: 50 };

/** What a limit allows at a distance; in whatever unit of length both come, ppm taken from mm per km. */
export const relativeAllowance = ({ constantMm, ppm }: RelativeLimit, distanceM: number): number =>
  constantMm + (ppm * distanceM) / 1000;

/** Pairs of marks of one class of distance. */
export interface RelativeClass {
  readonly fromM: number;
  readonly toM: number;
  readonly pairs: number;
  readonly days: number;
  /** Semi-major axis of the 95 % ellipse of relative positions, mm, with one-sided 95 % limits. */
  readonly semiMajorMm: number;
  readonly lowMm: number | null;
  readonly highMm: number | null;
  /** What the limit allows at the shortest distance of the class. */
  readonly allowedMm: number;
  readonly verdict: 'holds' | 'exceeded' | 'cannot be told';
}

export interface RelativePrecision extends StandardHead {
  readonly limit: RelativeLimit;
  readonly classes: readonly RelativeClass[];
}

export interface RelativePrecisionOptions {
  readonly limit?: RelativeLimit | undefined;
  /** Weights in [0, 1] with which the model was fitted. */
  readonly weights?: Float64Array | undefined;
  /** Longest time between both shots, minutes; default 30. */
  readonly minutes?: number | undefined;
}

const EDGES_M = [0, 100, 250, 500, 1000, 2500, 5000, 10_000, 100_000];
const FEWEST_PAIRS = 10;
const FEWEST_DAYS = 5;

interface Pair {
  readonly day: string;
  readonly distanceM: number;
  readonly east: number;
  readonly north: number;
}

/**
 * Precision of points relative to one another, as land-title standards limit it: from pairs of marks shot from one setup
 * close in time, whose common error (base, atmosphere) cancels as it does between the points of a property. Errors from
 * base to rover say nothing of it.
 * @param model a horizontal fit, whose reference tells what the errors count from
 * @param errors with `mark`, `setup`, `startMs` and `azimuthDeg`
 * @throws InputError when a column is missing or the model is not horizontal
 */
export function relativePrecision(
  errors: ErrorsInput,
  model: ErrorModel,
  { limit = LAND_TITLE_LIMIT, weights, minutes = 30 }: RelativePrecisionOptions = {},
): RelativePrecision {
  if (model.component !== 'horizontal') {
    throw inputError(
      'bad-model',
      `Expected a horizontal model for relative precision, came a ${model.component} one. Hand in the horizontal one.`,
    );
  }
  const pairs = pairsOf(errors, model, weights, minutes);
  const classes = EDGES_M.slice(1).flatMap((toM, k): RelativeClass[] => {
    const fromM = EDGES_M[k]!;
    const own = pairs.filter(({ distanceM }) => distanceM >= fromM && distanceM < toM);
    return own.length === 0 ? [] : [classOf(own, fromM, toM, limit)];
  });
  const told = classes.filter(({ verdict }) => verdict !== 'cannot be told').length;
  return {
    standard: 'relative positional precision of land title surveys (ALTA/NSPS 2016, 2021)',
    definition: `semi-major axis of the 95 % ellipse between points of the property, at most ${limit.constantMm} mm + ${limit.ppm} ppm of their distance, added linearly; from pairs of marks of one setup within ${minutes} minutes`,
    conditions: [
      {
        text: `at least ${FEWEST_PAIRS} pairs on ${FEWEST_DAYS} days in a class of distance`,
        met: told > 0,
      },
      { text: 'the pairs are measured as points of a property are', met: null },
    ],
    caution: FROM_MEMORY,
    limit,
    classes,
  };
}

function pairsOf(
  errors: ErrorsInput,
  model: ErrorModel,
  weights: Float64Array | undefined,
  minutes: number,
): Pair[] {
  const { data } = referenceData(errors, { component: 'horizontal', reference: model.reference, weights });
  const columns = errorColumns(errors);
  const needed = 'relative precision';
  const marks = columns.texts('mark', needed);
  const setups = columns.texts('setup', needed);
  const starts = columns.numbers('startMs', needed);
  const azimuths = columns.numbers('azimuthDeg', needed);
  const pairs: Pair[] = [];
  const keys = data.day.map((day, i) => JSON.stringify([day, setups[data.rows[i]!]]));
  for (const members of groupIndices(keys).values()) {
    const known = members
      .filter((i) => data.w[i]! >= 0.5 && !Number.isNaN(starts[data.rows[i]!]!))
      .sort((i, j) => starts[data.rows[i]!]! - starts[data.rows[j]!]! || data.y[i]! - data.y[j]!);
    known.forEach((i, a) => {
      for (const j of known.slice(a + 1)) {
        const [first, second] = [data.rows[i]!, data.rows[j]!];
        if (starts[second]! - starts[first]! > minutes * 60_000) break;
        if (marks[first] === marks[second]) continue;
        const angle = ((azimuths[second]! - azimuths[first]!) * Math.PI) / 180;
        const [p, q] = [Math.sqrt(data.l[i]!), Math.sqrt(data.l[j]!)];
        pairs.push({
          day: data.day[i]!,
          distanceM: 1000 * Math.sqrt(Math.max(0, p * p + q * q - 2 * p * q * Math.cos(angle))),
          east: data.components[0]![j]! - data.components[0]![i]!,
          north: data.components[1]![j]! - data.components[1]![i]!,
        });
      }
    });
  }
  return pairs;
}

function classOf(pairs: readonly Pair[], fromM: number, toM: number, limit: RelativeLimit): RelativeClass {
  const days = groupIndices(pairs.map(({ day }) => day));
  const semiMajorMm = semiMajor(pairs);
  const distances = pairs.map(({ distanceM }) => distanceM);
  const allowedMm = relativeAllowance(limit, Math.min(...distances));
  // What holds must hold at the shortest distance; what is exceeded must be so even at the longest.
  const mostAllowedMm = relativeAllowance(limit, Math.max(...distances));
  const common = { fromM, toM, pairs: pairs.length, days: days.size, semiMajorMm, allowedMm };
  if (pairs.length < FEWEST_PAIRS || days.size < FEWEST_DAYS) {
    return { ...common, lowMm: null, highMm: null, verdict: 'cannot be told' };
  }
  // Delete-one-day jackknife of the log (Efron & Tibshirani 1993; from memory).
  const logs = [...days.keys()].map((day) => Math.log(semiMajor(pairs.filter((pair) => pair.day !== day))));
  const mean = logs.reduce((sum, value) => sum + value, 0) / logs.length;
  const squares = logs.reduce((sum, value) => sum + (value - mean) ** 2, 0);
  const error = Math.sqrt(((logs.length - 1) / logs.length) * squares);
  const factor = Math.exp(studentTQuantile(0.95, logs.length - 1) * error);
  const [lowMm, highMm] = [semiMajorMm / factor, semiMajorMm * factor];
  const verdict = highMm <= allowedMm ? 'holds' : lowMm > mostAllowedMm ? 'exceeded' : 'cannot be told';
  return { ...common, lowMm, highMm, verdict };
}

/** Mean products about zero: a constant offset of pairs is an error too. */
function semiMajor(pairs: readonly Pair[]): number {
  const mean = (of: (pair: Pair) => number): number =>
    pairs.reduce((sum, pair) => sum + of(pair), 0) / pairs.length;
  const { values } = eigenSymmetric2([
    mean(({ east }) => east ** 2),
    mean(({ east, north }) => east * north),
    mean(({ north }) => north ** 2),
  ]);
  return radialQuantile(1, 1, 0.95) * Math.sqrt(values[1]);
}
