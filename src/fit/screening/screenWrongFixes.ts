import { type ErrorColumns, type ErrorsInput, errorColumns } from '../../errors/index.js';
import { inputError, type Message } from '../../logs/index.js';
import { badOption, refuseUnknownOptions } from '../options.js';
import { numbersOf } from '../prepareErrors.js';
import { orderRows } from '../rowOrder.js';
import { suspectedRuns } from './events.js';
import { groupByMarkAndDay, type MarkDays, markResiduals } from './markResiduals.js';
import { fitMixture } from './mixture.js';
import { screeningNotes, tooFewNote } from './screeningNotes.js';
import { clusteredShare, type WrongFixShare } from './wrongFixShare.js';

/** From what wrong fixes are judged: errors minus the median of their mark's day medians, or the errors themselves. */
export type ScreeningResiduals = 'mark-medians' | 'errors';

export interface ScreeningOptions {
  /** Default `mark-medians` where half of the occupations are on marks visited on 3 days or more, else `errors`. */
  readonly residuals?: ScreeningResiduals | undefined;
  /** Level of the interval of the share; default 0.95. */
  readonly confidence?: number | undefined;
}

/** What a search for wrong fixes found. Rows are those of the errors that came in, from 0. */
export interface Screening {
  readonly residuals: ScreeningResiduals;
  /** Components that were judged together. */
  readonly components: readonly ('east' | 'north' | 'up')[];
  /** What each row counts in a fit: 1 less its probability to be a wrong fix; all 1 when refused. */
  readonly weights: Float64Array;
  /** Probability of each row to be a wrong fix; NaN for rows that took no part. */
  readonly responsibilities: Float64Array;
  /** Rows more likely wrong than not, ascending, for review. */
  readonly suspected: readonly number[];
  /** Days with three suspects or more: a degraded day can look like this. */
  readonly crowdedDays: readonly string[];
  /** Null when nothing was screened. */
  readonly share: WrongFixShare | null;
  /** Too many to be chance: something else is wrong, and the weights are all 1. */
  readonly refused: boolean;
  readonly iterations: number;
  readonly converged: boolean;
  readonly notes: readonly Message[];
}

const COLUMNS = ['east', 'north', 'up'] as const;
/** Fewer occupations than these say nothing of what is ordinary. */
const FEWEST = 20;
const MOST_SHARE = 0.05;
const MOST_SUSPECTED = 0.2;
const CROWD = 3;
/** A mark's median needs this many days to be its own, not that of its shots. */
const DAYS_OF_MARK = 3;

/**
 * Finds suspected wrong fixes: gross errors that stand apart from what the length and the day explain, as vectors of all
 * known components (`fitMixture`). Nothing is deleted: each row gets a weight.
 * @param errors with `day`, `baselineKm` and any of `east`, `north`, `up` (mm); `mark` for `mark-medians`; `startMs` and
 *   `rover` tell runs of wrong fixes from single ones
 * @throws InputError when an option is wrong or a column is missing
 */
export function screenWrongFixes(errors: ErrorsInput, options: ScreeningOptions = {}): Screening {
  const confidence = resolveConfidence(options);
  const columns = errorColumns(errors);
  const days = columns.texts('day', 'screening');
  const lengths = columns.numbers('baselineKm', 'screening');
  const components = COLUMNS.filter((name) => columns.has(name));
  if (components.length === 0) {
    throw inputError(
      'missing-column',
      'Expected a column "east", "north" or "up" in the errors, needed for screening, came none of them. Add the column.',
    );
  }
  const values = COLUMNS.map((name) =>
    columns.has(name)
      ? columns.numbers(name, 'screening')
      : new Float64Array(columns.length).fill(Number.NaN),
  );
  const rows = Int32Array.from(lengths.keys()).filter(
    (i) =>
      lengths[i]! > 0 && Number.isFinite(lengths[i]!) && values.some((column) => !Number.isNaN(column[i]!)),
  );
  const markDays = byMark(columns, rows, days, options.residuals);
  const residuals = options.residuals ?? (marksRepeat(rows, markDays) ? 'mark-medians' : 'errors');
  const judged = residuals === 'errors' ? values : values.map((column) => markResiduals(column, markDays!));
  const common = { residuals, components };
  if (rows.length < FEWEST) return notScreened(common, columns.length, rows.length);

  const order = orderRows(rows, days, [lengths, ...judged]);
  const dayNames = [...new Set(Array.from(order, (row) => days[row]!))];
  const dayNumber = new Map(dayNames.map((day, d) => [day, d]));
  const dayOf = Int32Array.from(order, (row) => dayNumber.get(days[row]!)!);
  const mixture = fitMixture({
    errors: judged.map((column) => numbersOf(order, (row) => column[row]!)),
    l: numbersOf(order, (row) => lengths[row]! ** 2),
    dayOf,
    days: dayNames.length,
  });
  const responsibilities = new Float64Array(columns.length).fill(Number.NaN);
  order.forEach((row, k) => {
    responsibilities[row] = mixture.responsibilities[k]!;
  });
  const isSuspected = (row: number): boolean => responsibilities[row]! > 0.5;
  const suspected = Array.from(responsibilities.keys()).filter(isSuspected);
  const share = {
    events: suspectedRuns(columns, order, isSuspected).length,
    ...clusteredShare(mixture.responsibilities, dayOf, dayNames.length, confidence),
  };
  const refused = share.estimate > MOST_SHARE || suspected.length > MOST_SUSPECTED * rows.length;
  const found = {
    ...common,
    weights: responsibilities.map((pi) => (refused || Number.isNaN(pi) ? 1 : 1 - pi)),
    responsibilities,
    suspected,
    crowdedDays: crowdedDays(suspected, days),
    share,
    refused,
    iterations: mixture.iterations,
    converged: mixture.converged,
  };
  return { ...found, notes: screeningNotes(found, rows.length, loneRows(rows, residuals, markDays)) };
}

function resolveConfidence(options: ScreeningOptions): number {
  refuseUnknownOptions(options, ['residuals', 'confidence']);
  const { residuals, confidence = 0.95 } = options;
  if (residuals !== undefined && residuals !== 'mark-medians' && residuals !== 'errors') {
    throw badOption('residuals', '"mark-medians" or "errors"', residuals);
  }
  if (!(confidence > 0.5 && confidence < 1)) {
    throw badOption('confidence', 'a number between 0.5 and 1', confidence);
  }
  return confidence;
}

function byMark(
  columns: ErrorColumns,
  rows: Int32Array,
  days: readonly string[],
  residuals: ScreeningResiduals | undefined,
): MarkDays | null {
  if (residuals === 'errors' || (residuals === undefined && !columns.has('mark'))) return null;
  return groupByMarkAndDay(rows, columns.texts('mark', 'residuals "mark-medians"'), days);
}

function marksRepeat(rows: Int32Array, markDays: MarkDays | null): boolean {
  if (markDays === null) return false;
  const { markOf, daysOfMark } = markDays;
  const repeated = rows.reduce((sum, row) => sum + Number(daysOfMark[markOf[row]!]! >= DAYS_OF_MARK), 0);
  return repeated >= 0.5 * rows.length;
}

/** Rows whose mark was visited on one day only, so that its median is their own. */
function loneRows(rows: Int32Array, residuals: ScreeningResiduals, markDays: MarkDays | null): number {
  if (residuals === 'errors' || markDays === null) return 0;
  const { markOf, daysOfMark } = markDays;
  return rows.reduce((sum, row) => sum + Number(daysOfMark[markOf[row]!] === 1), 0);
}

function crowdedDays(suspected: readonly number[], days: readonly string[]): string[] {
  const counts = new Map<string, number>();
  for (const row of suspected) counts.set(days[row]!, (counts.get(days[row]!) ?? 0) + 1);
  return [...counts].flatMap(([day, count]) => (count >= CROWD ? [day] : [])).sort();
}

const notScreened = (
  common: Pick<Screening, 'residuals' | 'components'>,
  length: number,
  rows: number,
): Screening => ({
  ...common,
  weights: new Float64Array(length).fill(1),
  responsibilities: new Float64Array(length).fill(Number.NaN),
  suspected: [],
  crowdedDays: [],
  share: null,
  refused: false,
  iterations: 0,
  converged: true,
  notes: [tooFewNote(rows, FEWEST)],
});
