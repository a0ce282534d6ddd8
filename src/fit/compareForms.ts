import type { ErrorsInput } from '../errors/index.js';
import { type Message, message } from '../logs/index.js';
import type { FitComponent, Form } from './forms.js';
import { fitWithoutEach } from './leaveOut.js';
import { logScore, scoreGain } from './logScore.js';
import { type FitOptions, refuseUnknownOptions, resolveFitOptions } from './options.js';
import { referenceData } from './reference/referenceData.js';

export interface CompareOptions<C extends FitComponent = FitComponent> {
  readonly component: C;
  /** Default `absolute`. */
  readonly reference?: FitOptions['reference'];
  /** Weights in [0, 1], one for each row; default 1. */
  readonly weights?: FitOptions['weights'];
}

/** How well both forms predict a day from the other days. */
export interface DayScore {
  readonly day: string;
  /** Weight of the shots of the day: their number where none is screened. */
  readonly shots: number;
  /** Log score of the day under the root-sum-square fit to the other days, and under the other form. */
  readonly rootSumSquare: number;
  readonly against: number;
}

/** Which form predicts days better that it has not seen. */
export interface Comparison<C extends FitComponent = FitComponent> {
  readonly component: C;
  readonly against: 'linear-sum';
  /** Mean over days of the log score per shot that root-sum-square gains over `against`; null below 4 days. */
  readonly gain: number | null;
  /** Standard error of the gain over days. */
  readonly se: number | null;
  readonly days: number;
  /** A form is named only if it is better by more than one standard error. */
  readonly verdict: Form | 'cannot be told apart';
  readonly scores: readonly DayScore[];
  readonly notes: readonly Message[];
}

const FEWEST_DAYS = 4;

/**
 * Leaves out each day, fits both forms to the others and scores the day by both. Sixty days still leave a third of
 * campaigns undecided; the choice matters little inside the lengths of the data and much beyond.
 * @throws InputError as fitErrorModel
 */
export function compareForms<C extends FitComponent>(
  errors: ErrorsInput,
  options: CompareOptions<C>,
): Comparison<C> {
  refuseUnknownOptions(options, ['component', 'reference', 'weights']);
  const { component, reference, weights } = resolveFitOptions(options);
  const { data } = referenceData(errors, { component, reference, weights: weights ?? undefined });
  const own = fitWithoutEach(data, data.day, 'root-sum-square');
  const other = fitWithoutEach(data, data.day, 'linear-sum');
  const axes = data.components.length;
  const scores = own.fits.flatMap(({ group, fitted }, d): DayScore[] => {
    const against = other.fits[d]!.fitted;
    if (fitted === null || against === null) return [];
    return [
      {
        day: group.name,
        shots: group.weights.reduce((sum, value) => sum + value, 0),
        rootSumSquare: logScore(fitted, own.cells, group, axes),
        against: logScore(against, own.cells, group, axes),
      },
    ];
  });
  const common = { component, against: 'linear-sum', days: scores.length, scores } as const;
  const left = leftOutNote(own.fits.length - scores.length);
  if (scores.length < FEWEST_DAYS) {
    const notes = [...left, tooFewNote(scores.length)];
    return { ...common, gain: null, se: null, verdict: 'cannot be told apart', notes };
  }
  const { gain, se, winner } = scoreGain(
    scores.map(({ shots, rootSumSquare, against }) => (rootSumSquare - against) / shots),
  );
  const verdict = ({ 1: 'root-sum-square', 0: 'cannot be told apart', [-1]: 'linear-sum' } as const)[winner];
  return { ...common, gain, se, verdict, notes: left };
}

const tooFewNote = (days: number): Message =>
  message(
    'info',
    'too-few-days-to-compare',
    `Expected at least ${FEWEST_DAYS} days that can be left out in turn to compare the forms, came ${days}. Add days with both near and far shots.`,
  );

const leftOutNote = (days: number): Message[] =>
  days === 0
    ? []
    : [
        message(
          'info',
          'days-not-compared',
          `${days} ${days === 1 ? 'day takes' : 'days take'} no part in the comparison of forms: without ${days === 1 ? 'it' : 'each of them'} the others cannot tell mm and ppm apart. Add days with both near and far shots.`,
        ),
      ];
