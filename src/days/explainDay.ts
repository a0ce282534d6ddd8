import { type ErrorsInput, errorColumns, type Visit } from '../errors/index.js';
import type { FitData } from '../fit/index.js';
import { inputError, message } from '../logs/index.js';
import { type ConditionColumns, dayConditions } from './dayConditions.js';
import { type DayEvidence, dayEvidence, SUBSTANTIAL } from './dayEvidence.js';
import { type DayExplanation, LEVEL, type TestedCondition, type TestedSetup } from './dayExplanation.js';
import type { DayModel, DayPosterior } from './dayModel.js';
import { type GuiltyPart, growthEvidence, guiltyPart, pickShots } from './dayParts.js';
import { explanationText } from './explanationText.js';
import { familyAdjusted } from './falseDiscovery.js';
import { type SetupOffset, setupOffsets, squaresWithout, testOffset } from './setupOffsets.js';

export interface ExplainOptions {
  /** Visits with and without a fix; without them missing fixes are not judged. */
  readonly visits?: readonly Visit[] | undefined;
}

/** Columns of the errors that take part where they exist, aligned with the rows of the fit. */
export interface DayCovariates extends ConditionColumns {
  readonly crew: readonly string[] | null;
  readonly rover: readonly string[] | null;
}

/**
 * Puts every degraded day to a cause on the ground first: an offset of the setup, one mark, one crew, one receiver; what
 * is left either grows with distance, as the sky would have it, or is not explained. No day is dropped.
 * @param errors those of the model; `setup`, `mark`, `crew`, `rover`, `satellites`, `pdop`, `ageSeconds` take part where
 *   they exist
 * @returns nothing where no day is degraded or none can be named
 * @throws InputError for errors that are not those of the model
 */
export function judgeDegradedDays(
  errors: ErrorsInput,
  model: DayModel,
  options: ExplainOptions = {},
): DayExplanation[] {
  return explainDays(model.degradedDays ?? [], errors, model, options);
}

/**
 * The same for one day, degraded or not.
 * @throws RangeError for a day that the model does not have, or a model without a posterior
 */
export function explainDay(
  day: string,
  errors: ErrorsInput,
  model: DayModel,
  options: ExplainOptions = {},
): DayExplanation {
  return explainDays([day], errors, model, options)[0]!;
}

function explainDays(
  days: readonly string[],
  errors: ErrorsInput,
  model: DayModel,
  { visits = [] }: ExplainOptions,
): DayExplanation[] {
  if (days.length === 0) return [];
  return explainDaysOf(days, covariatesOf(errors, posteriorOf(model).data), model, visits);
}

function posteriorOf({ posterior }: DayModel): DayPosterior {
  if (posterior !== null) return posterior;
  throw new RangeError('model: expected a day model that could judge days, received one that could not');
}

function covariatesOf(errors: ErrorsInput, data: FitData): DayCovariates {
  const columns = errorColumns(errors);
  const last = data.rows.reduce((a, b) => Math.max(a, b), 0);
  const days = columns.texts('day', 'the causes of a day');
  if (last >= columns.length || data.rows.some((row, i) => days[row] !== data.day[i])) {
    throw inputError(
      'bad-option',
      `Expected the errors of the day model, came ${columns.length} others. Hand in the errors that the model was made from.`,
    );
  }
  const texts = (name: string): string[] | null => {
    if (!columns.has(name)) return null;
    const all = columns.texts(name, 'the causes of a day');
    return Array.from(data.rows, (row) => all[row]!);
  };
  const numbers = (name: string): Float64Array | null => {
    if (!columns.has(name)) return null;
    const all = columns.numbers(name, 'the causes of a day');
    return Float64Array.from(data.rows, (row) => all[row]!);
  };
  return {
    crew: texts('crew'),
    rover: texts('rover'),
    satellites: numbers('satellites'),
    pdop: numbers('pdop'),
    ageSeconds: numbers('ageSeconds'),
  };
}

/**
 * The same with the circumstances of every row of the model's data. Chances are adjusted for all tests on all days asked
 * for (Holm).
 */
export function explainDaysOf(
  days: readonly string[],
  covariates: DayCovariates,
  model: DayModel,
  visits: readonly Visit[],
): DayExplanation[] {
  const posterior = posteriorOf(model);
  const { data } = posterior;
  const evidence = dayEvidence(posterior);
  const offsets = setupOffsets(model);
  const tested = days.map((day) => ({
    day,
    setups: daySetups(day, data, offsets, evidence),
    conditions: dayConditions(day, data.day, covariates, visits),
  }));
  const adjusted = familyAdjusted(
    tested.flatMap(({ setups, conditions }) => [...setups, ...conditions].map(({ pValue }) => pValue)),
  );
  let next = 0;
  return tested.map(({ day, setups, conditions }) => {
    const withP = <T>(list: readonly T[]) => list.map((each) => ({ ...each, adjustedP: adjusted[next++]! }));
    const testedSetups = withP(setups);
    const testedConditions = withP(conditions).map((each) => ({
      ...each,
      unusual: each.adjustedP < LEVEL,
    }));
    return explanation(day, data, covariates, model, evidence, testedSetups, testedConditions);
  });
}

function daySetups(
  day: string,
  data: FitData,
  offsets: readonly SetupOffset[],
  evidence: DayEvidence,
): Omit<TestedSetup, 'adjustedP'>[] {
  const rows = rowsOf(data, day);
  return offsets
    .filter((own) => own.day === day)
    .flatMap((own) => {
      const test = testOffset(own, offsets);
      if (test === null) return [];
      const changed = new Map(own.rows.map((i, k) => [i, squaresWithout(data, own)[k]!]));
      const shots = pickShots(data, rows);
      const y = rows.map((i) => changed.get(i) ?? data.y[i]!);
      return [{ setup: own.setup, ...test, restEvidence: evidence.ordinaryOverDegraded({ ...shots, y }) }];
    });
}

const rowsOf = ({ day }: FitData, wanted: string): number[] =>
  [...day.keys()].filter((i) => day[i] === wanted);

function explanation(
  day: string,
  data: FitData,
  covariates: DayCovariates,
  model: DayModel,
  evidence: DayEvidence,
  setups: readonly TestedSetup[],
  conditions: readonly TestedCondition[],
): DayExplanation {
  const estimate = model.dayEstimates.find((each) => each.day === day);
  if (estimate === undefined) {
    throw new RangeError(`day: expected a day of the model, received ${JSON.stringify(day)}`);
  }
  const rows = rowsOf(data, day);
  const part = (names: readonly string[] | null): GuiltyPart | null =>
    names === null ? null : guiltyPart(data, rows, names, evidence);
  const found = {
    mark: part(data.mark),
    crew: part(covariates.crew),
    receiver: part(covariates.rover),
    growthEvidence: growthEvidence(data, rows, evidence),
  };
  const facts = {
    component: model.component,
    day,
    factor: estimate.factor.estimate,
    probabilityDegraded: estimate.probabilityDegraded,
    occupations: estimate.occupations,
    ...verdictOf(setups, found),
    setups,
    ...found,
    conditions,
  };
  return { ...facts, note: message('warning', 'degraded-day-judged', explanationText(facts)) };
}

type Found = Pick<DayExplanation, 'mark' | 'crew' | 'receiver' | 'growthEvidence'>;

/**
 * The narrowest cause that suffices: without the offset of a setup, which leaves every shot to be judged, the day must no
 * longer look degraded; without a part of it, which may take all far shots away, it must look ordinary. A crew and its
 * receiver, when both suffice, are told by the crew.
 */
function verdictOf(
  setups: readonly TestedSetup[],
  { mark, crew, receiver, growthEvidence: growth }: Found,
): Pick<DayExplanation, 'verdict' | 'subject'> {
  if (mark !== null) return { verdict: 'one mark', subject: mark.name };
  const setup = setups.find(
    ({ adjustedP, restEvidence }) => adjustedP < LEVEL && restEvidence >= SUBSTANTIAL,
  );
  if (setup !== undefined) return { verdict: 'bad setup', subject: setup.setup };
  if (crew !== null) return { verdict: 'one crew', subject: crew.name };
  if (receiver !== null) return { verdict: 'one receiver', subject: receiver.name };
  if (growth >= SUBSTANTIAL) return { verdict: 'grows with distance', subject: null };
  return { verdict: 'not explained', subject: null };
}
