import { nodesWithoutDay } from '../../days/index.js';
import { type ErrorsInput, errorColumns, groupIndices } from '../../errors/index.js';
import { axesOf, type Component, type ErrorModel, type Reference } from '../../fit/index.js';
import { InputError, type Message, message } from '../../logs/index.js';
import type { DayNodes } from '../reach/dayLimits.js';
import { reachByHalves } from '../reach/scan.js';
import { recordsOf } from '../records.js';
import { type SpecSheet, specSheetSigmaMm } from '../specSheet.js';
import { type Tolerance, toleranceFactor, toleranceFactorAt } from '../tolerance.js';
import { addShot, finish, newShots } from './collect.js';
import { type RuleCount, RuleCounter } from './countRule.js';
import { ruleJudges } from './judgeRules.js';
import { logDensity, mixtureLimit, trainedSigmaMm } from './limits.js';
import type { BackTestOptions } from './options.js';
import { type BackTestScore, scoreShots } from './score.js';
import { type BackTestData, judged, refuseRelative, train } from './train.js';
import { usable } from './withoutRows.js';

/** How limits and rules hold on days that they have not seen. */
export interface BackTest {
  readonly component: Component;
  readonly reference: Reference;
  readonly share: number;
  /** Limits from the RMS of the own model, as a reader of "a mm + b ppm" would set them; null when no day can be judged. */
  readonly own: BackTestScore | null;
  /** Limits from the mixture over days. */
  readonly predictive: BackTestScore | null;
  /** Limits from the spec sheet. */
  readonly specSheet: BackTestScore | null;
  /** Every tolerance counted out, each day with the rule made without it. */
  readonly rules: readonly RuleCount[];
  /** The same with the lengths that the spec sheet allows, its uncertainty and all else left aside. */
  readonly specSheetRules: readonly RuleCount[];
  readonly notes: readonly Message[];
}

/**
 * Leaves out each day in turn, learns from the others and judges the day: constant, ppm, the marks' means, how days
 * differ, how wrong fixes grow, and the rules. Kept from the whole study are the weights of the screening, the ratio of
 * east to north, that of both forms where they are in doubt, and the constant's relative standard error; the day model drops the judged day from its weights and
 * keeps the slope to which days refer.
 * @param errors all that were fitted, suspects too
 * @throws InputError when a column is missing or the model is of reference `relative`
 */
export function backTest(errors: ErrorsInput, model: ErrorModel, options: BackTestOptions = {}): BackTest {
  refuseRelative(model);
  const { share = 0.95, specSheet = null, dayModel } = options;
  const { component, reference, confidence } = model;
  const screening = usable(options.screening);
  const records = recordsOf(errors);
  const columns = errorColumns(errors);
  const days = columns.texts('day', 'the back-test');
  const data: BackTestData = {
    records,
    columns,
    days,
    weights: model.screened ? (screening?.weights ?? null) : null,
    model,
  };
  const tolerances = (options.tolerances ?? []).filter((each) => each.component === component);
  const posterior = model.form === 'root-sum-square' ? (dayModel?.posterior ?? null) : null;
  const withoutDay = posterior && nodesWithoutDay(posterior);
  const keptPosterior = posterior && (options.crowdedDaysKept?.dayModel?.posterior ?? null);
  const keptWithoutDay = keptPosterior && nodesWithoutDay(keptPosterior);
  const rules = ruleJudges(data, tolerances, options, screening);
  const sheet = specSheet && tolerances.map((tolerance) => new RuleCounter(tolerance, columns, data.weights));
  const allowed =
    specSheet === null ? [] : tolerances.map((tolerance) => specSheetReachKm(specSheet, tolerance));
  const [own, predictive, ofSheet] = [newShots(), newShots(), newShots()];
  const notJudged: string[] = [];
  const all = Array.from(days.keys());
  for (const [day, rows] of [...groupIndices(days)].sort(([a], [b]) => (a < b ? -1 : 1))) {
    const others = all.filter((row) => days[row] !== day);
    const trained = trainOrNull(data, others);
    if (trained === null) {
      notJudged.push(day);
      continue;
    }
    const shots = judged(data, trained, rows);
    const { fitted } = trained;
    const nodes: DayNodes | null =
      withoutDay && posterior && posterior.A > 0
        ? {
            B: posterior.B,
            // The constant without the day, with the uncertainty that it has in the whole study.
            nodes: withoutDay(day).map((node) => ({ ...node, A: (node.A * fitted.displayP) / posterior.A })),
          }
        : null;
    const keptNodes: DayNodes | null =
      nodes && keptWithoutDay && keptPosterior
        ? {
            B: keptPosterior.B,
            nodes: keptWithoutDay(day).map((node) => ({
              ...node,
              A: (node.A * fitted.displayP) / posterior!.A,
            })),
          }
        : null;
    const mixture = nodes && mixtureLimit(component, nodes, fitted.displayP);
    shots.rows.forEach((row, k) => {
      const km = Math.sqrt(shots.l[k]!);
      const shot = { day, km, y: shots.y[k]!, weight: data.weights?.[row] ?? 1 };
      const factor = toleranceFactorAt(model, share, km);
      const equal = factor / toleranceFactor(component, share);
      const sigma = trainedSigmaMm(fitted, km);
      const axes = axesOf(component);
      addShot(own, shot, factor * sigma, logDensity(shot.y, sigma ** 2, axes));
      if (mixture !== null) addShot(predictive, shot, equal * mixture(km, share), null);
      if (specSheet !== null) {
        const stated = specSheetSigmaMm(specSheet, component, km);
        addShot(
          ofSheet,
          shot,
          toleranceFactor(component, share) * stated,
          logDensity(shot.y, stated ** 2, axes),
        );
      }
    });
    rules.judge(day, others, shots, [nodes, keptNodes]);
    for (const [t, counter] of sheet?.entries() ?? []) counter.addDay(day, shots, allowed[t]!);
  }
  return {
    component,
    reference,
    share,
    own: scoreShots(finish(own, true), share, confidence),
    predictive: withoutDay === null ? null : scoreShots(finish(predictive, false), share, confidence),
    specSheet: specSheet === null ? null : scoreShots(finish(ofSheet, true), share, confidence),
    rules: rules.counts(),
    specSheetRules: sheet?.map((counter) => counter.count('the spec sheet')) ?? [],
    notes: notJudged.length === 0 ? [] : [notJudgedNote(notJudged.length)],
  };
}

/** A spec sheet knows no supported length. */
const LONGEST_KM = 1000;

/** How far a spec sheet would have a tolerance hold, in steps of 0.1 km. */
function specSheetReachKm(sheet: SpecSheet, { component, share, limitMm }: Tolerance): number {
  const factor = toleranceFactor(component, share);
  return reachByHalves((km) => factor * specSheetSigmaMm(sheet, component, km) <= limitMm, LONGEST_KM).km;
}

function trainOrNull(data: BackTestData, rows: readonly number[]) {
  try {
    const trained = train(data, rows);
    return trained.fitted.converged ? trained : null;
  } catch (error) {
    if (error instanceof InputError) return null;
    throw error;
  }
}

const notJudgedNote = (days: number): Message =>
  message(
    'info',
    'days-not-back-tested',
    `${days} ${days === 1 ? 'day takes' : 'days take'} no part in the back-test: without ${days === 1 ? 'it' : 'each of them'} the others cannot be fitted. Add days with both near and far shots.`,
  );
