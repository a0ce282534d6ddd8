import { type ErrorsInput, errorColumns, groupIndices } from '../../errors/index.js';
import { InputError, inputError, type Message, message } from '../../logs/index.js';
import { chanceText, type Random } from '../../stats/index.js';
import type { ErrorModel, EstimateWithLimits, Reference } from '../errorModel.js';
import { fitReferenced } from '../fitErrorModel.js';
import type { Component } from '../forms.js';
import { resolveFitOptions } from '../options.js';
import { pickEntries } from '../prepareErrors.js';
import { referenceData } from '../reference/referenceData.js';
import { varianceModel } from '../reference/varianceModel.js';
import { groupScoreTest } from './groupScoreTest.js';

export type GroupBy = 'crew' | 'rover' | 'base' | 'setup';

export interface FitByGroupOptions {
  readonly by: GroupBy;
  readonly component: Component;
  /** Numbers in [0, 1). */
  readonly random: Random;
  readonly reference?: Reference | undefined;
  readonly confidence?: number | undefined;
  readonly weights?: Float64Array | undefined;
  /** Sign patterns of the test; default 1999. */
  readonly flips?: number | undefined;
}

/** Constant and ppm of one group; null limits and estimates have a reason. */
export interface GroupFit {
  readonly group: string;
  readonly occupations: number;
  readonly days: number;
  readonly constantMm: EstimateWithLimits;
  readonly ppm: EstimateWithLimits;
  /** What keeps the group's numbers from being given in full; null where nothing does. */
  readonly reason: string | null;
  /** Whether it takes part in the test. */
  readonly tested: boolean;
}

export type GroupVerdict = 'differ' | 'not shown to differ' | 'too few days to tell';

export interface GroupComparison {
  readonly by: GroupBy;
  readonly component: Component;
  readonly reference: Reference;
  /** In the order of their names. */
  readonly groups: readonly GroupFit[];
  /** Of the test that all tested groups share constant and ppm; null where it cannot be made. */
  readonly pValue: number | null;
  readonly verdict: GroupVerdict;
  readonly message: Message;
}

const DEFAULT_FLIPS = 1999;
/** A group takes part in the test from so many days and occupations on. */
export const FEWEST_DAYS_TESTED = 5;
const FEWEST_OCCUPATIONS_TESTED = 10;
const LEVEL = 0.05;

/**
 * Constant and ppm of each crew, rover, base or setup, and a test whether they differ. The reference is that of all groups
 * together, so that a crew which is always off keeps its offset.
 * @throws InputError when a column is missing or an option is not known
 */
export function fitByGroup(errors: ErrorsInput, options: FitByGroupOptions): GroupComparison {
  const { by, random, flips = DEFAULT_FLIPS } = options;
  if (!['crew', 'rover', 'base', 'setup'].includes(by)) {
    throw inputError(
      'bad-option',
      `Expected "crew", "rover", "base" or "setup" as by, came ${JSON.stringify(by)}. Correct the option.`,
    );
  }
  const { component, reference, confidence, weights } = resolveFitOptions({
    component: options.component,
    reference: options.reference,
    confidence: options.confidence,
    weights: options.weights,
  });
  const names = errorColumns(errors).texts(by, `fitByGroup by "${by}"`);
  const referenced = referenceData(errors, { component, reference, weights: weights ?? undefined });
  const group = Array.from(referenced.data.rows, (row) => names[row]!);
  const members = [...groupIndices(group)].sort(([a], [b]) => (a < b ? -1 : 1));
  const groups = members.map(([name, entries]): GroupFit => {
    const data = pickEntries(referenced.data, entries);
    const used = { ...referenced, data, absolute: pickEntries(referenced.absolute, entries), notes: [] };
    const days = new Set(data.day).size;
    const common = { group: name, occupations: entries.length, days };
    const tested = days >= FEWEST_DAYS_TESTED && entries.length >= FEWEST_OCCUPATIONS_TESTED;
    try {
      const model = fitReferenced(used, {
        component,
        form: 'root-sum-square',
        confidence,
        screened: weights !== null,
        withInterval: true,
      });
      const { constantMm, ppm } = model;
      return { ...common, tested, constantMm, ppm, reason: reasonOf(model) };
    } catch (error) {
      if (!(error instanceof InputError)) throw error;
      const none = { estimate: null, low: null, high: null };
      return { ...common, tested: false, constantMm: none, ppm: none, reason: error.messages[0]!.text };
    }
  });
  const testedNames = new Set(groups.flatMap((one) => (one.tested ? [one.group] : [])));
  const kept = Array.from(group.keys()).filter((i) => testedNames.has(group[i]!));
  const test =
    testedNames.size < 2
      ? null
      : groupScoreTest(
          { ...pickEntries(referenced.data, kept), group: kept.map((i) => group[i]!) },
          varianceModel(pickEntries(referenced.data, kept)),
          flips,
          random,
        );
  const pValue = test?.pValue ?? null;
  const verdict =
    pValue === null ? 'too few days to tell' : pValue < LEVEL ? 'differ' : 'not shown to differ';
  return {
    by,
    component,
    reference,
    groups,
    pValue,
    verdict,
    message: verdictMessage(by, groups, pValue, verdict),
  };
}

/** The first of the notes that says why a number or a limit is missing. */
function reasonOf({ constantMm, ppm, notes }: ErrorModel): string | null {
  const complete = [constantMm, ppm].every(
    ({ estimate, low, high }) => estimate !== null && low !== null && high !== null,
  );
  if (complete) return null;
  const CODES = [
    'too-few-days',
    'distances-too-alike',
    'not-converged',
    'ppm-unknown',
    'ppm-without-limit',
    'ppm-upper-limit-only',
  ];
  return notes.find(({ code }) => CODES.includes(code))?.text ?? 'The data say too little for an interval.';
}

function verdictMessage(
  by: GroupBy,
  groups: readonly GroupFit[],
  pValue: number | null,
  verdict: GroupVerdict,
): Message {
  const tested = groups.filter((one) => one.tested);
  const left = groups.length - tested.length;
  const leftOut =
    left === 0 ? '' : ` ${left} of ${groups.length} have too few days or occupations for the test.`;
  if (pValue === null) {
    return message(
      'info',
      'groups-not-compared',
      `Whether ${by}s differ cannot be told: ${tested.length} of ${groups.length} have ${FEWEST_DAYS_TESTED} days and ${FEWEST_OCCUPATIONS_TESTED} occupations, and each comparison needs several days. Add days.`,
    );
  }
  const p = chanceText(pValue);
  if (verdict === 'not shown to differ') {
    return message(
      'info',
      'groups-not-shown-to-differ',
      `The ${tested.length} ${by}s are not shown to differ (${p}); that is no proof that they are alike.${leftOut}`,
    );
  }
  return message(
    'warning',
    'groups-differ',
    `The ${tested.length} ${by}s differ in constant or ppm (${p})${range(tested, 'constantMm', 'mm')}${range(tested, 'ppm', 'ppm')}.${leftOut} Look at each of them, and at where and on which days they worked.`,
  );
}

function range(groups: readonly GroupFit[], term: 'constantMm' | 'ppm', unit: string): string {
  const known = groups
    .filter((one) => one[term].estimate !== null)
    .sort((a, b) => a[term].estimate! - b[term].estimate!);
  const [least, most] = [known[0], known.at(-1)];
  if (least === undefined || most === undefined || least === most) return '';
  const value = (one: GroupFit): string =>
    `${one[term].estimate!.toFixed(unit === 'mm' ? 1 : 2)} (${one.group})`;
  return `; ${unit === 'mm' ? 'constant' : 'ppm'} from ${value(least)} to ${value(most)} ${unit}`;
}
