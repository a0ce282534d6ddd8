import { inputError, type Message, message } from '../../logs/index.js';
import { sigmaLimitsMm } from '../errorCurve.js';
import type { ErrorModel } from '../errorModel.js';
import { asVariance, type FormEstimate } from '../estimate.js';
import { axesOf, type Component, type FitComponent } from '../forms.js';
import { type MarkComponent, markComponent } from './markComponent.js';

/** The absolute model put together from repeatability and the marks' own errors. */
export interface ComposedAbsolute<C extends FitComponent = Component> {
  /** Null with fewer than 3 marks on 3 days, or without intervals: the notes say why. */
  readonly model: ErrorModel<C> | null;
  readonly markComponent: MarkComponent;
  readonly notes: readonly Message[];
}

/**
 * Errors against the published coordinates from a fit of repeatability: the ppm is that of repeatability, which no
 * error of a mark can feign; the constant is √(a² + s²) with the spread s of the marks' own errors, its limits by the
 * recovery of variance estimates (MOVER; Zou & Donner 2008; from memory).
 * @param model a fit with `reference: 'repeatability'`
 * @throws InputError when the model has another reference, or the form linear-sum
 */
export function composeAbsolute<C extends FitComponent>(model: ErrorModel<C>): ComposedAbsolute<C> {
  if (model.form !== 'root-sum-square') {
    throw inputError(
      'bad-model',
      'Expected a fit of form "root-sum-square", came one of form "linear-sum": the errors of marks add to its square only. Fit repeatability with form: "root-sum-square".',
    );
  }
  const marks = markComponent(model);
  if (marks.sigmaMm.estimate === null) return { model: null, markComponent: marks, notes: marks.notes };
  const own = axesOf(model.component) * marks.sigmaMm.estimate ** 2;
  const { fitted } = model;
  const withMarks: FormEstimate = {
    ...fitted,
    p: fitted.p + own,
    displayP: fitted.displayP + own,
    constantAtFloor: fitted.displayP + own === 0,
  };
  const composed: ErrorModel<C> = {
    ...model,
    reference: 'absolute',
    markComponent: marks,
    fitted: withMarks,
    variance: asVariance(withMarks),
    axes: null,
    interval: `${model.interval}; constant with the errors of ${marks.marksUsed} marks by MOVER`,
    notes: [
      ...model.notes.filter(({ code }) => code !== 'constant-not-identified'),
      ...marks.notes,
      holdsMarks(marks),
    ],
  };
  const estimate = Math.sqrt(withMarks.displayP);
  const limits = sigmaLimitsMm(composed, 0, model.confidence);
  const constantMm =
    limits === null ? { estimate, low: null, high: null } : { estimate, low: limits[0], high: limits[1] };
  const done = { ...composed, constantMm };
  return { model: done, markComponent: marks, notes: done.notes };
}

const holdsMarks = ({ sigmaMm, marksUsed }: MarkComponent): Message =>
  message(
    'info',
    'marks-in-constant',
    `Against the published coordinates: the constant contains errors of ${sigmaMm.estimate!.toFixed(1)} mm per axis that are the same every day (${marksUsed} marks). The ppm is that with which a position is found again.`,
  );
