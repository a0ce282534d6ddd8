import type { ErrorsInput } from '../../errors/index.js';
import { type Message, message } from '../../logs/index.js';
import { studentTQuantile } from '../../stats/index.js';
import { tooAlike, tooAlikeNote } from '../constantAlone.js';
import type { EstimateWithLimits } from '../errorModel.js';
import { estimateVariance } from '../estimate.js';
import type { FitComponent } from '../forms.js';
import { varianceLimits } from '../intervals.js';
import { badOption, type FitOptions, refuseUnknownOptions, resolveFitOptions } from '../options.js';
import { type KnownSigmas, knownParts, withoutKnown } from './knownParts.js';
import { daySums, solveTerms, type TermSolution } from './solveTerms.js';
import { type Term, type TermDesign, termRows } from './termData.js';
import { type TermGain, termGain } from './termGain.js';
import { parameterEstimate, type TermUncertainty, termUncertainty } from './termUncertainty.js';

export interface TermOptions<C extends FitComponent = FitComponent> {
  readonly component: C;
  readonly terms: readonly Term[];
  /** What is known of the constant already, to be taken out of it in quadrature. */
  readonly knownSigmas?: KnownSigmas | undefined;
  readonly confidence?: number | undefined;
  readonly weights?: FitOptions['weights'];
}

/** One term: mm per 100 m of height difference, or the power k with which σ follows a value over its median. */
export interface TermEstimate extends EstimateWithLimits, TermGain {
  readonly term: Term;
  readonly unit: 'mm per 100 m' | 'power';
}

/** Constant and ppm beside further terms: σ² = (a² + b² L² + c² h²) Π (value/median)^2k. */
export interface TermsModel<C extends FitComponent = FitComponent> {
  readonly component: C;
  readonly terms: readonly TermEstimate[];
  readonly constantMm: EstimateWithLimits;
  readonly ppm: EstimateWithLimits;
  /** The constant without centring, marks and resolution; equal to it where nothing is known. */
  readonly ownConstantMm: EstimateWithLimits;
  /** Spread of what was taken out, mm. */
  readonly knownMm: number;
  readonly occupations: number;
  readonly days: number;
  readonly converged: boolean;
  readonly notes: readonly Message[];
}

const TERMS: readonly Term[] = ['height-difference', 'pdop', 'reported-sigma'];
const FEWEST_DAYS = 4;
const NONE = { estimate: null, low: null, high: null };

/**
 * Fits further terms beside constant and ppm, each with an interval that counts days (CR3) and a verdict: whether days
 * that were left out are predicted better with it by more than one standard error. PDOP and reported sigma are not
 * trusted but estimated: a power of 0 means that they do not matter, of 1 that the spread is proportional to them.
 * @param errors as for fitErrorModel, with `heightDifferenceM`, `pdop`, or `reportedHorizontalMm` and `reportedVerticalMm`
 * @throws InputError when an option or a column is missing or wrong
 */
export function fitTerms<C extends FitComponent>(
  errors: ErrorsInput,
  options: TermOptions<C>,
): TermsModel<C> {
  refuseUnknownOptions(options, ['component', 'terms', 'knownSigmas', 'confidence', 'weights']);
  const { terms: wanted, knownSigmas = {}, ...rest } = options;
  const { component, confidence, weights } = resolveFitOptions(rest as FitOptions<C>);
  checkTerms(wanted, component);
  const knownMm = knownParts(knownSigmas, component);
  const { design, terms, data, notes } = termRows(errors, component, wanted, weights ?? undefined);
  const days = design.dayNames.length;
  const common = { component, knownMm, occupations: design.y.length, days };
  const nothing = { terms: [], constantMm: NONE, ppm: NONE, ownConstantMm: NONE, converged: false };
  if (tooAlike(data.l, data.w)) return { ...common, ...nothing, notes: [...notes, tooAlikeNote()] };
  const start = startOf(design, estimateVariance(data));
  const solution = solveTerms(design, start);
  if (solution === null) return { ...common, ...nothing, notes: [...notes, notSeparable(terms)] };
  if (!solution.converged) return { ...common, ...nothing, notes: [...notes, notConverged()] };
  const uncertainty = days < FEWEST_DAYS ? null : termUncertainty(daySums(design, solution.theta));
  const root = (parameter: number): EstimateWithLimits =>
    rooted(solution, uncertainty, parameter, confidence);
  const constantMm = root(0);
  return {
    ...common,
    terms: terms.map((term, t) => {
      const additive = term === 'height-difference';
      const gain = termGain(design, solution, 2 + t);
      return {
        term,
        unit: additive ? 'mm per 100 m' : 'power',
        ...(additive ? root(2 + t) : power(solution, uncertainty, 2 + t, confidence)),
        ...gain,
      };
    }),
    constantMm,
    ppm: root(1),
    ownConstantMm: withoutKnown(constantMm, knownMm),
    converged: true,
    notes: [...notes, ...(uncertainty === null ? [noInterval(days)] : [])],
  };
}

/** Constant and ppm of the plain fit, both positive, and every other term 0. */
function startOf(
  { additive, multipliers }: TermDesign,
  { displayA, displayB }: { readonly displayA: number; readonly displayB: number },
): Float64Array {
  const start = new Float64Array(additive.length + multipliers.length);
  const small = 0.05 * displayA;
  [start[0], start[1]] = [Math.max(displayA, displayB * 0.01), Math.max(displayB, small / 100)];
  return start;
}

/** √ of an additive parameter, cut at 0. */
function rooted(
  { theta }: TermSolution,
  uncertainty: TermUncertainty | null,
  parameter: number,
  confidence: number,
): EstimateWithLimits {
  const variance = Math.max(0, theta[parameter]!);
  const estimate = Math.sqrt(variance);
  if (uncertainty === null) return { estimate, low: null, high: null };
  const [low, high] = varianceLimits(parameterEstimate(uncertainty, theta, parameter), confidence);
  return { estimate, low: Math.sqrt(Math.min(low, variance)), high: Math.sqrt(Math.max(high, variance)) };
}

function power(
  { theta }: TermSolution,
  uncertainty: TermUncertainty | null,
  parameter: number,
  confidence: number,
): EstimateWithLimits {
  const estimate = theta[parameter]!;
  if (uncertainty === null) return { estimate, low: null, high: null };
  const { standardError, degreesOfFreedom } = parameterEstimate(uncertainty, theta, parameter);
  const half = studentTQuantile((1 + confidence) / 2, degreesOfFreedom) * standardError;
  return { estimate, low: estimate - half, high: estimate + half };
}

function checkTerms(terms: readonly Term[], component: FitComponent): void {
  const list = Array.isArray(terms) ? terms : [];
  if (list.length === 0) throw badOption('terms', `a list of ${TERMS.join(', ')}`, terms);
  const unknown = list.find((term) => !TERMS.includes(term));
  if (unknown !== undefined) throw badOption('terms', `a list of ${TERMS.join(', ')}`, unknown);
  if (new Set(list).size < list.length) throw badOption('terms', 'each term once', list);
  if (list.includes('height-difference') && component !== 'vertical') {
    throw badOption('terms', `"height-difference" for the vertical component alone`, component);
  }
}

const notSeparable = (terms: readonly Term[]): Message =>
  message(
    'warning',
    'terms-not-separable',
    `The terms ${terms.join(', ')} cannot be told apart from constant, ppm and one another in these occupations. Ask for fewer terms, or take shots in which they differ.`,
  );

const notConverged = (): Message =>
  message(
    'warning',
    'not-converged',
    'The fit of the terms did not converge and gives no numbers. Ask for fewer terms.',
  );

const noInterval = (days: number): Message =>
  days < FEWEST_DAYS
    ? message(
        'warning',
        'too-few-days',
        `${days} ${days === 1 ? 'day is' : 'days are'} too few for an uncertainty of the terms. Add days: from ${FEWEST_DAYS} on there is an interval.`,
      )
    : message(
        'warning',
        'one-day-dominates',
        'One day alone tells of some term, so that no interval can be given. Add days on which the terms differ.',
      );
