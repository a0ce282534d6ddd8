import { type ErrorsInput, errorColumns, groupIndices } from '../../errors/index.js';
import { type ErrorModel, type FitData, referenceData } from '../../fit/index.js';
import { inputError } from '../../logs/index.js';

/** Two occupations of one mark on one day, from one base. */
export interface VisitPair {
  readonly day: string;
  readonly minutes: number;
  readonly baselineKm: number;
  /** Product of both errors over their variance: its mean is the correlation. */
  readonly product: number;
  /** Share of the variance that comes from the distance. */
  readonly farShare: number;
}

const LONGEST_MINUTES = 240;

/**
 * All pairs up to four hours apart. In a fit of repeatability both errors share the mean of the mark's other days, whose
 * part h is taken out: ρ = r (1 + h) - h.
 * @throws InputError when a column is missing or the model has no distance term of root-sum-square
 */
export function visitPairs(errors: ErrorsInput, model: ErrorModel, weights?: Float64Array): VisitPair[] {
  const { component, reference, variance } = model;
  if (variance === null) {
    throw inputError(
      'bad-option',
      `Expected a model of the form "root-sum-square" for pairs of visits, came "${model.form}". Fit the errors in that form.`,
    );
  }
  const referenced = referenceData(errors, { component, reference, weights });
  const { data } = referenced;
  const columns = errorColumns(errors);
  const text = (name: string): string[] =>
    columns.has(name) ? columns.texts(name, 'pairs of visits') : new Array<string>(columns.length).fill('');
  const [bases, setups] = [text('base'), text('setup')];
  const starts = columns.numbers('startMs', 'pairs of visits');
  const marks = columns.texts('mark', 'pairs of visits');
  const share = referenced.repeatability?.othersShare ?? new Float64Array(data.y.length);
  const { displayA: A, displayB: B } = variance;
  const keys = data.day.map((day, i) => {
    const row = data.rows[i]!;
    return JSON.stringify([day, marks[row], bases[row], setups[row]]);
  });
  const pairs: VisitPair[] = [];
  for (const members of groupIndices(keys).values()) {
    const known = members
      .filter((i) => data.w[i]! >= 0.5 && !Number.isNaN(starts[data.rows[i]!]!))
      .sort((i, j) => starts[data.rows[i]!]! - starts[data.rows[j]!]! || data.y[i]! - data.y[j]!);
    known.forEach((i, a) => {
      for (const j of known.slice(a + 1)) {
        const minutes = (starts[data.rows[j]!]! - starts[data.rows[i]!]!) / 60_000;
        if (minutes > LONGEST_MINUTES) break;
        pairs.push(pairOf(data, i, j, minutes, A, B, (share[i]! + share[j]!) / 2));
      }
    });
  }
  return pairs;
}

function pairOf(
  { components, l, day }: FitData,
  i: number,
  j: number,
  minutes: number,
  A: number,
  B: number,
  h: number,
): VisitPair {
  const mu = A + B * l[i]!;
  const raw = components.reduce((sum, column) => sum + column[i]! * column[j]!, 0) / mu;
  return {
    day: day[i]!,
    minutes,
    baselineKm: Math.sqrt(l[i]!),
    product: raw * (1 + h) - h,
    farShare: (B * l[i]!) / mu,
  };
}
