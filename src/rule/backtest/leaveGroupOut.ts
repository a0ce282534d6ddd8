import { type ErrorsInput, errorColumns, groupIndices } from '../../errors/index.js';
import { axesOf, type ErrorModel } from '../../fit/index.js';
import { InputError } from '../../logs/index.js';
import { recordsOf } from '../records.js';
import { toleranceFactorAt } from '../tolerance.js';
import { addShot, finish, newShots } from './collect.js';
import { logDensity, trainedSigmaMm } from './limits.js';
import { type BackTestScore, scoreShots } from './score.js';
import { type BackTestData, judged, refuseRelative, train } from './train.js';

/** How the model of the others fits one crew, receiver or base. */
export interface LeftOutGroup {
  readonly group: string;
  readonly occupations: number;
  readonly score: BackTestScore | null;
  /** Why it could not be judged; null otherwise. */
  readonly reason: string | null;
}

export interface LeaveGroupOutOptions {
  readonly by: 'crew' | 'rover' | 'base';
  readonly share?: number | undefined;
  /** Weights in [0, 1] with which the model was fitted. */
  readonly weights?: Float64Array | undefined;
}

/**
 * Leaves out each crew, receiver or base in turn, learns from the others and judges its shots: does the model of the
 * firm hold for one that it has not seen?
 * @throws InputError when the column is missing or the model is of reference `relative`
 */
export function leaveGroupOut(
  errors: ErrorsInput,
  model: ErrorModel,
  { by, share = 0.95, weights }: LeaveGroupOutOptions,
): LeftOutGroup[] {
  refuseRelative(model);
  const columns = errorColumns(errors);
  const names = columns.texts(by, `leaving out each ${by}`);
  const days = columns.texts('day', 'the back-test');
  const data: BackTestData = {
    records: recordsOf(errors),
    columns,
    days,
    weights: model.screened ? (weights ?? null) : null,
    model,
  };
  const groups = [...groupIndices(names)].sort(([a], [b]) => (a < b ? -1 : 1));
  return groups.map(([group, rows]): LeftOutGroup => {
    const others = Array.from(names.keys()).filter((row) => names[row] !== group);
    const none = (reason: string): LeftOutGroup => ({ group, occupations: rows.length, score: null, reason });
    if (others.length === 0) return none(`there is no other ${by}`);
    try {
      const trained = train(data, others);
      const shots = judged(data, trained, rows);
      const collected = newShots();
      shots.rows.forEach((row, k) => {
        const km = Math.sqrt(shots.l[k]!);
        const sigma = trainedSigmaMm(trained.fitted, km);
        const shot = { day: days[row]!, km, y: shots.y[k]!, weight: data.weights?.[row] ?? 1 };
        const limit = toleranceFactorAt(model, share, km) * sigma;
        addShot(collected, shot, limit, logDensity(shot.y, sigma ** 2, axesOf(model.component)));
      });
      const score = scoreShots(finish(collected, true), share, model.confidence);
      if (score === null) return none('its shots lie on marks that the others never visited');
      return { group, occupations: rows.length, score, reason: null };
    } catch (error) {
      if (!(error instanceof InputError)) throw error;
      return none('without it the others cannot be fitted');
    }
  });
}
