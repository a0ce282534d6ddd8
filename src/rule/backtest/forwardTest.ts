import { dayModel } from '../../days/index.js';
import { type ErrorsInput, errorColumns } from '../../errors/index.js';
import { axesOf, type Component, type ErrorModel, fitErrorModel, sigmaAtMm } from '../../fit/index.js';
import { InputError } from '../../logs/index.js';
import { findFormDoubt } from '../formDoubt.js';
import { frozenMarks, newErrors } from '../frozenMarks.js';
import { crowdedDaysKept } from '../ground.js';
import { maximumBaseline } from '../maximumBaseline.js';
import { recordsOf } from '../records.js';
import { toleranceFactorAt } from '../tolerance.js';
import { addShot, finish, newShots } from './collect.js';
import { type RuleCount, RuleCounter } from './countRule.js';
import { logDensity } from './limits.js';
import type { BackTestOptions } from './options.js';
import { type BackTestScore, scoreShots } from './score.js';
import { refuseRelative } from './train.js';
import { growthOf, screeningOf, usable } from './withoutRows.js';

/** The first days fitted, the later ones judged, as it will be in use. */
export interface ForwardTest {
  readonly component: Component;
  readonly share: number;
  /** Last day that was learnt from, first and last that were judged; null where nothing was judged. */
  readonly fittedTo: string | null;
  readonly judgedFrom: string | null;
  readonly judgedTo: string | null;
  readonly daysFitted: number;
  readonly own: BackTestScore | null;
  readonly rules: readonly RuleCount[];
  /** Occupations of the later days on marks that the first days do not know. */
  readonly onNewMarks: number;
  /** Why nothing was judged; null otherwise. */
  readonly reason: string | null;
}

const FEWEST_FITTED = 15;
const FEWEST_JUDGED = 5;

/**
 * Fits the first half of the days (15 at least) and judges the others: everything is as it would have been known then,
 * except the weights of the screening and what a site's height adds. Whether the forms are in doubt is asked of the first
 * days alone, if `formDoubt` is given at all.
 * @param errors all that were fitted, suspects too
 * @throws InputError when a column is missing or the model is of reference `relative`
 */
export function forwardTest(
  errors: ErrorsInput,
  model: ErrorModel,
  options: BackTestOptions = {},
): ForwardTest {
  refuseRelative(model);
  const { share = 0.95, baseSigmaMm, basePpm, height } = options;
  const { component, form, reference, confidence } = model;
  const screening = usable(options.screening);
  const records = recordsOf(errors);
  const columns = errorColumns(errors);
  const dayOf = columns.texts('day', 'the back-test');
  const days = [...new Set(dayOf)].sort();
  const fitted = Math.max(FEWEST_FITTED, Math.ceil(days.length / 2));
  const none = (reason: string): ForwardTest => ({
    component,
    share,
    fittedTo: null,
    judgedFrom: null,
    judgedTo: null,
    daysFitted: 0,
    own: null,
    rules: [],
    onNewMarks: 0,
    reason,
  });
  if (days.length < FEWEST_FITTED + FEWEST_JUDGED) {
    return none(
      `${days.length} days are too few to fit the first and judge the later ones: that needs ${FEWEST_FITTED + FEWEST_JUDGED}`,
    );
  }
  const [last, first] = [days[fitted - 1]!, days[fitted]!];
  const rows = Array.from(dayOf.keys());
  const before = rows.filter((row) => dayOf[row]! <= last);
  const after = rows.filter((row) => dayOf[row]! > last);
  const weights = model.screened && screening !== null ? screening.weights : null;
  const own = before.map((row) => records[row]!);
  const ownWeights = weights === null ? undefined : Float64Array.from(before, (row) => weights[row]!);
  let fit: ErrorModel;
  try {
    fit = fitErrorModel(own, { component, form, reference, confidence, weights: ownWeights });
  } catch (error) {
    if (!(error instanceof InputError)) throw error;
    return none(`the first ${fitted} days cannot be fitted: ${error.messages[0]!.text.replace(/\.$/, '')}`);
  }
  const found = newErrors(columns, component, frozenMarks(fit), after);
  const shots = newShots();
  found.rows.forEach((row, k) => {
    const km = Math.sqrt(found.l[k]!);
    const sigma = sigmaAtMm(fit, km);
    const shot = { day: dayOf[row]!, km, y: found.y[k]!, weight: weights?.[row] ?? 1 };
    addShot(
      shots,
      shot,
      toleranceFactorAt(fit, share, km) * sigma,
      logDensity(shot.y, sigma ** 2, axesOf(component)),
    );
  });
  const ground = {
    dayModel: form === 'root-sum-square' ? dayModel(own, fit, ownWeights) : null,
    wrongFixes: growthOf(records, screening, before),
    crowdedDaysKept:
      screening === null || ownWeights === undefined
        ? null
        : crowdedDaysKept(own as readonly { readonly day: string }[], fit, screeningOf(screening, before)),
    baseSigmaMm,
    basePpm,
    height,
    formDoubt: options.formDoubt === undefined ? null : findFormDoubt(own, fit, ownWeights),
  };
  const used = own.filter((_, i) => ownWeights === undefined || ownWeights[i]! >= 0.5);
  const tolerances = (options.tolerances ?? []).filter((each) => each.component === component);
  const rules = tolerances.map((tolerance) => {
    const rule = maximumBaseline(used, fit, tolerance, ground);
    const counter = new RuleCounter(tolerance, columns, weights);
    if (rule.maximumBaselineKm === null) return counter.count();
    for (const day of days.slice(fitted)) {
      const own = newErrors(
        columns,
        component,
        frozenMarks(fit),
        after.filter((row) => dayOf[row] === day),
      );
      counter.addDay(day, own, rule.maximumBaselineKm);
    }
    return counter.count();
  });
  return {
    component,
    share,
    fittedTo: last,
    judgedFrom: first,
    judgedTo: days.at(-1)!,
    daysFitted: fitted,
    own: scoreShots(finish(shots, true), share, confidence),
    rules,
    onNewMarks: found.onNewMarks.length,
    reason: null,
  };
}
