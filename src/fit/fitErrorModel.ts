import type { ErrorsInput } from '../errors/index.js';
import { type Message, message } from '../logs/index.js';
import type { Vector2 } from '../stats/index.js';
import { axisFits } from './axisFits.js';
import { clusterTerms, covariance, sharedMeansFactor } from './clusterCovariance.js';
import { constantAlone, tooAlike, tooAlikeNote } from './constantAlone.js';
import type { ErrorModel, ModelUncertainty, Reference, SetupSummary } from './errorModel.js';
import { asVariance, estimateForm } from './estimate.js';
import { BASIS, type FitComponent, FORM_CURVES, type Form } from './forms.js';
import { informationNumber } from './information.js';
import { constantNote, modelLimits, tellsPpm } from './modelLimits.js';
import { axisNote, dataNotes } from './notes.js';
import { type FitOptions, resolveFitOptions } from './options.js';
import type { FitData } from './prepareErrors.js';
import { markSupport, markSupportNote } from './reference/markSupport.js';
import { type ReferencedData, referenceData } from './reference/referenceData.js';
import type { SetupSeparation } from './reference/relative.js';
import { screenWrongFixes } from './screening/screenWrongFixes.js';

/** From 4 days on there is an interval at all. */
const FEWEST_DAYS = 4;
/** What wrong fixes are judged from; of `relative` what the marks allow. */
const SCREENED_ON = { absolute: 'errors', repeatability: 'mark-medians', relative: undefined } as const;

/**
 * Fits σ² = a² + b² L² (or σ = a + b L, form `linear-sum`) to the errors of occupations and gives a and b with intervals
 * that count days, not shots.
 *
 * Point estimate: gamma quasi-likelihood (`solveForm`). Intervals: cluster-robust covariance CR3 by day with
 * Satterthwaite degrees of freedom, on the log scale beyond two standard errors; for data with little information on
 * distance the inverted day score. The horizontal component is radial: σ is the root-mean-square of √(E² + N²).
 * With `screen` suspected wrong fixes count less ({@link screenWrongFixes}); their weights are then taken as known.
 *
 * @param errors table or records with `day`, `baselineKm` (km) and `east`, `north` or `up` (mm); `repeatability` also needs
 *   `mark` (and takes `base`), `relative` also `mark`, `setup`, `startMs` and `azimuthDeg` (and takes `rover`, `base`);
 *   elsewhere `mark` and `setup` sharpen the notes
 * @throws InputError when an option or a column is missing or unknown, or no occupation has the component
 */
export function fitErrorModel<C extends FitComponent>(
  errors: ErrorsInput,
  options: FitOptions<C>,
): ErrorModel<C> {
  const { component, form, reference, confidence, screen, weights } = resolveFitOptions(options);
  const screening =
    screen && weights === null ? screenWrongFixes(errors, { residuals: SCREENED_ON[reference] }) : null;
  const referenced = referenceData(errors, { component, reference, weights: weights ?? screening?.weights });
  const model = fitReferenced(referenced, {
    component,
    form,
    confidence,
    screened: weights !== null || (screening !== null && !screening.refused),
    withInterval: screening?.converged !== false,
  });
  return { ...model, notes: [...(screening?.notes ?? []), ...model.notes] };
}

/** What a fit to errors that already count from their reference needs. */
export interface ReferencedFitOptions<C extends FitComponent> {
  readonly component: C;
  readonly form: Form;
  readonly confidence: number;
  readonly screened: boolean;
  /** False where nothing may be said of uncertainty. */
  readonly withInterval: boolean;
}

/** The model of errors that already count from their reference. */
export function fitReferenced<C extends FitComponent>(
  referenced: ReferencedData,
  { component, form, confidence, screened, withInterval: allowed }: ReferencedFitOptions<C>,
): ErrorModel<C> {
  const { reference, data, absolute } = referenced;
  const days = new Set(data.day).size;
  const shortestKm = Math.sqrt(data.l.reduce((a, b) => Math.min(a, b)));
  const longestKm = Math.sqrt(data.l.reduce((a, b) => Math.max(a, b)));
  const alike = tooAlike(data.l, data.w);
  const withInterval = allowed && days >= FEWEST_DAYS;
  const core = alike
    ? { ...constantAlone(data, form, confidence, withInterval), notes: [tooAlikeNote()] }
    : distanceModel(data, reference, form, confidence, withInterval);
  return {
    component,
    reference,
    form,
    screened,
    basis: BASIS[component],
    confidence,
    occupations: data.y.length,
    days,
    marks: data.mark === null ? null : new Set(data.mark).size,
    shortestKm,
    longestKm,
    ...core,
    variance: form === 'root-sum-square' ? asVariance(core.fitted) : null,
    axes: axisFits(data, form, !alike),
    ...referenceTerms(referenced, core.uncertainty),
    notes: [
      ...referenced.notes,
      ...dataNotes(absolute, component, reference),
      ...axisNote(data),
      ...core.notes,
    ],
  };
}

/** What a model keeps of its reference. */
function referenceTerms({ repeatability, setups }: ReferencedData, uncertainty: ModelUncertainty | null) {
  const factor = (contrast: Vector2): number => sharedMeansFactor(uncertainty!.terms, contrast);
  return {
    repeatability: repeatability && {
      rho: repeatability.rho,
      sharedMeans: uncertainty && { constant: factor([1, 0]), ppm: factor([0, 1]) },
      setAside: repeatability.setAside,
      markDays: repeatability.markDays,
    },
    setups: setups && setupSummary(setups),
    markComponent: null,
  };
}

function setupSummary({ data, setAside, onLoneMarks, ...summary }: SetupSeparation): SetupSummary {
  return summary;
}

function distanceModel(
  data: FitData,
  reference: Reference,
  form: Form,
  confidence: number,
  withInterval: boolean,
) {
  const fitted = estimateForm(data, form);
  const number = informationNumber(data, fitted.displayP, fitted.displayQ, form);
  if (!withInterval || !fitted.converged) {
    const { sigma } = FORM_CURVES[form];
    const point = (parameter: number) => ({ estimate: sigma(parameter), low: null, high: null });
    const { constantAtFloor, converged } = fitted;
    return {
      fitted,
      informationNumber: number,
      uncertainty: null,
      constantMm: point(fitted.displayP),
      ppm: tellsPpm(number) ? point(fitted.displayQ) : { estimate: null, low: null, high: null },
      ppmIfIndependent: { estimate: null, low: null, high: null },
      interval: 'none',
      notes: [
        ...(converged ? [] : [notConverged()]),
        ...(constantAtFloor ? [constantNote()] : []),
        ...(tellsPpm(number) ? [] : [ppmUnknown()]),
      ],
    };
  }
  const terms = clusterTerms(data, data.day, fitted.p, fitted.q, form);
  const limits = modelLimits(data, fitted, terms, number, confidence);
  const support = tellsPpm(number) ? markSupport(data, fitted, reference) : null;
  return {
    fitted,
    informationNumber: number,
    uncertainty: { terms, covariance: covariance(terms, 'CR3') },
    ...limits,
    notes: [...limits.notes, ...markSupportNote(support, reference)],
  };
}

const notConverged = (): Message =>
  message(
    'warning',
    'not-converged',
    'The fit did not converge; its numbers are the last step and have no intervals. Look at the chart for errors of another kind than the rest.',
  );

const ppmUnknown = (): Message =>
  message(
    'warning',
    'ppm-unknown',
    'The shots say too little of distance for a ppm. Add days, and shots farther from the base.',
  );
