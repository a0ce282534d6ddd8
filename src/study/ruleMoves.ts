import type { OccupationError } from '../errors/index.js';
import { type ErrorModel, fitErrorModel, sigmaAtMm } from '../fit/index.js';
import { InputError } from '../logs/index.js';
import type { Rule } from '../rule/index.js';
import type { ComponentFits } from './fitComponents.js';

/** What was done otherwise than in the rule itself. */
export type RuleMoveKind =
  | 'as stated'
  | 'without a mark'
  | 'without a far mark'
  | 'without a day'
  | 'without a crew'
  | 'wrong fixes counted in'
  | 'other form'
  | 'other reference';

/** A rule found again with one thing changed. */
export interface RuleMove {
  readonly component: Rule['component'];
  readonly limitMm: number;
  readonly share: number;
  readonly dayShare: number;
  readonly kind: RuleMoveKind;
  /** The mark, day, crew, form or reference; null where none is named. */
  readonly subject: string | null;
  readonly maximumBaselineKm: number | null;
  /** Why it is null or 0, or ends where it does. */
  readonly reason: string | null;
}

/** Errors, what each counts in the fits, and the fit: all from which a rule is found. */
export interface RuleGroundwork {
  readonly errors: readonly OccupationError[];
  /** Places of these errors among all. */
  readonly rows: readonly number[];
  readonly weights: Float64Array | null;
  readonly model: ErrorModel;
}

interface Change {
  readonly kind: RuleMoveKind;
  readonly subject: string | null;
  /** Which errors stay. */
  readonly keep: (error: OccupationError) => boolean;
  readonly screened: boolean;
  readonly options: Partial<Pick<ErrorModel, 'form' | 'reference'>>;
}

/**
 * How far the first rule of each component moves: found again without the worst mark, without each of the marks
 * that set its reach where it ends with the data, without the worst day, without each crew, with suspected
 * wrong fixes counted in, in the other form, and from the other reference. The worst is the one whose errors are largest
 * against the fitted spread at their distance.
 * @param rules those of the study
 * @param findRules the same rules from another groundwork, in the same order
 */
export function ruleMoves(
  errors: readonly OccupationError[],
  weights: Float64Array | null,
  components: readonly ComponentFits[],
  rules: readonly Rule[],
  findRules: (groundwork: RuleGroundwork) => readonly Rule[],
): RuleMove[] {
  return components.flatMap(({ basis, fits }) => {
    // The others move alike, and each takes as long as all rules of a run.
    const stated = rules.filter(({ component }) => component === basis.component).slice(0, 1);
    if (stated.length === 0) return [];
    const far = reachMarks(errors, stated[0]!);
    const moved = changesOf(errors, weights, basis, fits, far).flatMap((change) => {
      const groundwork = changed(errors, weights, basis, fits, change);
      return typeof groundwork === 'string'
        ? stated.map((rule) => move(rule, change, null, groundwork))
        : findRules(groundwork).map((rule) => move(rule, change, rule.maximumBaselineKm, rule.reason));
    });
    const asStated = { kind: 'as stated', subject: null } as const;
    return [...stated.map((rule) => move(rule, asStated, rule.maximumBaselineKm, rule.reason)), ...moved];
  });
}

const move = (
  { component, limitMm, share, dayShare }: Rule,
  { kind, subject }: Pick<Change, 'kind' | 'subject'>,
  maximumBaselineKm: number | null,
  reason: string | null,
): RuleMove => ({ component, limitMm, share, dayShare, kind, subject, maximumBaselineKm, reason });

function changesOf(
  errors: readonly OccupationError[],
  weights: Float64Array | null,
  basis: ErrorModel,
  fits: ComponentFits['fits'],
  farMarks: readonly string[],
): Change[] {
  const plain = { keep: () => true, screened: weights !== null, options: {} };
  const mark = worst(errors, weights, basis, ({ mark }) => mark);
  const day = worst(errors, weights, basis, ({ day }) => day);
  const crews = [...new Set(errors.map(({ crew }) => crew))].filter((crew) => crew !== '').sort();
  const otherForm = basis.form === 'root-sum-square' ? 'linear-sum' : 'root-sum-square';
  const otherReference = basis.reference === 'absolute' ? 'repeatability' : 'absolute';
  return [
    ...(mark === null
      ? []
      : [
          {
            ...plain,
            kind: 'without a mark' as const,
            subject: mark,
            keep: (e: OccupationError) => e.mark !== mark,
          },
        ]),
    ...farMarks
      .filter((name) => name !== mark)
      .map((name) => ({
        ...plain,
        kind: 'without a far mark' as const,
        subject: name,
        keep: (e: OccupationError) => e.mark !== name,
      })),
    ...(day === null
      ? []
      : [
          {
            ...plain,
            kind: 'without a day' as const,
            subject: day,
            keep: (e: OccupationError) => e.day !== day,
          },
        ]),
    // Without the only crew nothing is left.
    ...(crews.length < 2 ? [] : crews).map((crew) => ({
      ...plain,
      kind: 'without a crew' as const,
      subject: crew,
      keep: (e: OccupationError) => e.crew !== crew,
    })),
    ...(weights?.some((weight) => weight < 0.5)
      ? [{ ...plain, kind: 'wrong fixes counted in' as const, subject: null, screened: false }]
      : []),
    { ...plain, kind: 'other form', subject: otherForm, options: { form: otherForm } },
    ...(fits.some(({ model }) => model.reference === otherReference && model.screened === basis.screened)
      ? [
          {
            ...plain,
            kind: 'other reference' as const,
            subject: otherReference,
            options: { reference: otherReference } as const,
          },
        ]
      : []),
  ];
}

/** A reach needs two marks at or beyond it. */
const MARKS_OF_A_REACH = 2;

/** The farthest marks at or beyond the end of a rule that ends where the data do: without them it may end sooner. */
function reachMarks(
  errors: readonly OccupationError[],
  { maximumBaselineKm, longestSupportedKm }: Rule,
): string[] {
  if (maximumBaselineKm === null || maximumBaselineKm !== longestSupportedKm) return [];
  const far = new Map<string, number>();
  for (const { mark, baselineKm } of errors) {
    if (baselineKm >= maximumBaselineKm) far.set(mark, Math.max(baselineKm, far.get(mark) ?? 0));
  }
  return [...far]
    .sort(([a, x], [b, y]) => y - x || (a < b ? -1 : 1))
    .slice(0, MARKS_OF_A_REACH)
    .map(([mark]) => mark);
}

/** The changed groundwork, or why there is none. */
function changed(
  errors: readonly OccupationError[],
  weights: Float64Array | null,
  basis: ErrorModel,
  fits: ComponentFits['fits'],
  { keep, screened, options, kind }: Change,
): RuleGroundwork | string {
  const rows = [...errors.keys()].filter((i) => keep(errors[i]!));
  const kept = rows.map((i) => errors[i]!);
  const keptWeights = weights === null || !screened ? null : Float64Array.from(rows, (i) => weights[i]!);
  const { component, form, reference, confidence } = { ...basis, ...options };
  // What was fitted already, composed fits among them, is not fitted again.
  const known = fits.find(
    ({ model, composed }) =>
      // Days are judged by the errors of a fit, which a composed one has not.
      !composed &&
      model.form === form &&
      model.reference === reference &&
      model.screened === (keptWeights !== null),
  );
  if (known !== undefined && !kind.startsWith('without')) {
    return { errors: kept, rows, weights: keptWeights, model: known.model };
  }
  try {
    const model = fitErrorModel(kept, {
      component,
      form,
      reference,
      confidence,
      ...(keptWeights === null ? {} : { weights: keptWeights }),
    });
    return { errors: kept, rows, weights: keptWeights, model };
  } catch (error) {
    if (!(error instanceof InputError)) throw error;
    return error.messages[0]!.text;
  }
}

/** Fewer occupations than these make no worst mark or day. */
const FEWEST_OCCUPATIONS = 5;

/** The group with the largest mean of squared errors over the fitted variance; null when there is no choice. */
function worst(
  errors: readonly OccupationError[],
  weights: Float64Array | null,
  model: ErrorModel,
  groupOf: (error: OccupationError) => string,
): string | null {
  const groups = new Map<string, { sum: number; count: number }>();
  const measured = (error: OccupationError): boolean =>
    !Number.isNaN(model.component === 'horizontal' ? error.east + error.north : error.up);
  errors.forEach((error, i) => {
    const weight = weights?.[i] ?? 1;
    if (weight < 0.5 || !measured(error)) return;
    const size = model.component === 'horizontal' ? Math.hypot(error.east, error.north) : Math.abs(error.up);
    const group = groups.get(groupOf(error)) ?? { sum: 0, count: 0 };
    group.sum += (size / sigmaAtMm(model, error.baselineKm)) ** 2;
    group.count += 1;
    groups.set(groupOf(error), group);
  });
  const judged = [...groups].filter(([, { count }]) => count >= FEWEST_OCCUPATIONS);
  if (judged.length < 3) return null;
  const ratio = ({ sum, count }: { sum: number; count: number }): number => sum / count;
  return judged.sort(([a, x], [b, y]) => ratio(y) - ratio(x) || (a < b ? -1 : 1))[0]![0];
}
