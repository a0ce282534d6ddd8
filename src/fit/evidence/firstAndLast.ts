import { type ErrorsInput, errorColumns } from '../../errors/index.js';
import { type Message, message } from '../../logs/index.js';
import type { Reference } from '../errorModel.js';
import type { FitComponent } from '../forms.js';
import { referenceData } from '../reference/referenceData.js';
import { visitsOf } from '../reference/visits.js';
import { pairedRatio, type RmsRatio } from './ratioOfMeanSquares.js';

export interface FirstAndLastOptions {
  readonly component: FitComponent;
  readonly reference?: Reference | undefined;
  readonly confidence?: number | undefined;
  readonly weights?: Float64Array | undefined;
}

/** The first occupation of a visit beside its last, where a visit has several. */
export interface FirstAndLast {
  /** Visits with two occupations or more, and the days on which they were made. */
  readonly visits: number;
  readonly days: number;
  /** RMS of the first over RMS of the last; null with fewer than 10 visits on 5 days. */
  readonly first: RmsRatio | null;
  readonly message: Message;
}

const FEWEST_VISITS = 10;
const FEWEST_DAYS = 5;
const LEVEL = 0.05;

/**
 * Compares the first and the last occupation of each visit, counting days: a first one that is worse was taken too soon
 * after the receiver had its fix.
 * @throws InputError when `mark` or `startMs` is missing, or as fitErrorModel
 */
export function firstAndLast(errors: ErrorsInput, options: FirstAndLastOptions): FirstAndLast {
  const { component, reference = 'absolute', confidence = 0.95, weights } = options;
  const columns = errorColumns(errors);
  const { data } = referenceData(errors, { component, reference, weights });
  const pick = <T>(values: ArrayLike<T>): T[] => Array.from(data.rows, (row) => values[row]!);
  const setups = columns.has('setup') ? pick(columns.texts('setup', 'firstAndLast')) : data.day.map(() => '');
  const startMs = Float64Array.from(pick(columns.numbers('startMs', 'firstAndLast')));
  const { visitOf } = visitsOf({
    // A visit never reaches into another day.
    setup: setups.map((setup, i) => `${setup}\u0000${data.day[i]}`),
    mark: pick(columns.texts('mark', 'firstAndLast')),
    rover: columns.has('rover') ? pick(columns.texts('rover', 'firstAndLast')) : null,
    startMs,
  });
  const ends = new Map<number, { first: number; last: number }>();
  visitOf.forEach((v, i) => {
    if (Number.isNaN(startMs[i]!) || !(data.w[i]! >= 0.5)) return;
    const known = ends.get(v) ?? { first: i, last: i };
    ends.set(v, {
      first: startMs[i]! < startMs[known.first]! ? i : known.first,
      last: startMs[i]! > startMs[known.last]! ? i : known.last,
    });
  });
  const pairs = [...ends.values()]
    .filter(({ first, last }) => first !== last)
    .sort((a, b) => a.first - b.first);
  const days = pairs.map(({ first }) => data.day[first]!);
  const count = new Set(days).size;
  const enough = pairs.length >= FEWEST_VISITS && count >= FEWEST_DAYS;
  const ratio = enough
    ? pairedRatio(
        days,
        pairs.map(({ first }) => data.y[first]!),
        pairs.map(({ last }) => data.y[last]!),
        confidence,
      )
    : null;
  return { visits: pairs.length, days: count, first: ratio, message: verdict(ratio, pairs.length, count) };
}

function verdict(ratio: RmsRatio | null, visits: number, days: number): Message {
  const counts = `${visits} ${visits === 1 ? 'visit' : 'visits'} with several occupations on ${days} ${days === 1 ? 'day' : 'days'}`;
  if (ratio === null) {
    return message(
      'info',
      'first-not-compared',
      `Whether the first occupation of a visit is worse than the last cannot be told from ${counts}. It takes ${FEWEST_VISITS} such visits on ${FEWEST_DAYS} days.`,
    );
  }
  const told = `errors of the first are ${ratio.ratio.toFixed(2)} times those of the last (${ratio.low.toFixed(2)} to ${ratio.high.toFixed(2)}; ${counts})`;
  if (ratio.pValue >= LEVEL) {
    return message(
      'info',
      'first-not-shown-to-differ',
      `The first occupation of a visit is not shown to differ from the last: ${told}.`,
    );
  }
  return ratio.ratio > 1
    ? message(
        'warning',
        'first-worse',
        `The first occupation of a visit is worse than the last: ${told}. Wait longer after the fix before the first shot.`,
      )
    : message(
        'info',
        'first-better',
        `The first occupation of a visit is better than the last: ${told}. Look at what happens during a visit.`,
      );
}
