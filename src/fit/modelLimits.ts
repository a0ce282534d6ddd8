import { type Message, message } from '../logs/index.js';
import type { Vector2 } from '../stats/index.js';
import { type ClusterTerms, covariance, dominantDay, naiveCovariance } from './clusterCovariance.js';
import type { EstimateWithLimits } from './errorModel.js';
import type { FormEstimate } from './estimate.js';
import { FORM_CURVES } from './forms.js';
import { type ContrastEstimate, contrastEstimate, usesLogScale, varianceLimits } from './intervals.js';
import type { FitData } from './prepareErrors.js';
import { scoreLimits } from './scoreInterval.js';

/** Below this information number the score interval holds its level better than CR3. */
const SCORE_BELOW = 15;
/** Below this one only an upper limit of the ppm can be given. */
const UPPER_LIMIT_BELOW = 5;
/** From this one on the ppm needs no caveat. */
const COMFORTABLE = 30;
/** A day beyond this share of the information, in some direction, is named. */
const DOMINANT_SHARE = 0.9;

const P_ALONE: Vector2 = [1, 0];
const Q_ALONE: Vector2 = [0, 1];

/** Intervals of constant and ppm, and what must be said of them. */
export interface ModelLimits {
  readonly constantMm: EstimateWithLimits;
  readonly ppm: EstimateWithLimits;
  readonly ppmIfIndependent: EstimateWithLimits;
  readonly interval: string;
  readonly notes: readonly Message[];
}

/** Limits of a and b from the cluster-robust covariance, or of b from the day score where data are thin. */
export function modelLimits(
  data: FitData,
  fitted: FormEstimate,
  terms: ClusterTerms,
  informationNumber: number,
  confidence: number,
): ModelLimits {
  const { form, p, q, displayP, displayQ, constantAtFloor } = fitted;
  const { sigma } = FORM_CURVES[form];
  const robust = covariance(terms, 'CR3');
  const a = contrastEstimate(p, q, terms, robust, P_ALONE);
  const b = contrastEstimate(p, q, terms, robust, Q_ALONE);
  const constant = around(displayP, varianceLimits(a, confidence), sigma);
  const { limits, interval } = ppmLimits(data, fitted, b, informationNumber, confidence);
  const ppm = around(displayQ, limits, sigma);
  const naive = naiveCovariance(terms, data.components.length as 1 | 2);
  const ifIndependent = varianceLimits(
    { value: q, standardError: Math.sqrt(naive[2]), degreesOfFreedom: Math.max(1, data.y.length - 2) },
    confidence,
  );
  const upperOnly = informationNumber < UPPER_LIMIT_BELOW;
  const high = Number.isFinite(ppm.high) ? ppm.high : null;
  return {
    constantMm: constantAtFloor ? { ...constant, estimate: 0, low: 0 } : constant,
    ppm: upperOnly || high === null ? { estimate: null, low: high === null ? null : 0, high } : ppm,
    ppmIfIndependent: {
      ...around(displayQ, ifIndependent, sigma),
      estimate: upperOnly ? null : ppm.estimate,
    },
    interval,
    notes: [
      ...(constantAtFloor ? [constantNote()] : []),
      ...ppmNote(informationNumber, ppm.low ?? 0, high, confidence),
      ...dominanceNote(terms),
    ],
  };
}

/** Limits of q and the name of the method behind them. */
function ppmLimits(
  data: FitData,
  { form, p, q }: FormEstimate,
  estimate: ContrastEstimate,
  informationNumber: number,
  confidence: number,
): { readonly limits: readonly [number, number]; readonly interval: string } {
  if (informationNumber < SCORE_BELOW) {
    const limits = scoreLimits(data, data.day, p, q, confidence, form);
    // A score interval wholly below zero would claim a ppm of exactly zero: chance alone allows more than that.
    if (limits[1] > 0) return { limits, interval: 'inverted day score' };
  }
  const scale = usesLogScale(estimate) ? 'log' : 'raw';
  return {
    limits: varianceLimits(estimate, confidence),
    interval: `CR3 by day, Satterthwaite, ${scale} scale`,
  };
}

/** As a or b; the displayed estimate may differ from the unconstrained one, and its interval always holds it. */
function around(
  parameter: number,
  [low, high]: readonly [number, number],
  sigma: (parameter: number) => number,
): EstimateWithLimits & { high: number } {
  return {
    estimate: sigma(parameter),
    low: sigma(Math.min(low, parameter)),
    high: sigma(Math.max(high, parameter)),
  };
}

export const constantNote = (): Message =>
  message(
    'warning',
    'constant-not-identified',
    'No short shots: the constant part is not identified, only its upper limit. Add shots close to the base.',
  );

/** What must be said of a ppm before it is used. */
function ppmNote(informationNumber: number, low: number, high: number | null, confidence: number): Message[] {
  if (high === null) {
    return [
      message(
        'warning',
        'ppm-without-limit',
        'The shots say nothing of distance: neither a ppm nor an upper limit of it can be given. Add days, and shots farther from the base.',
      ),
    ];
  }
  const upper = `the upper end of its ${Number((100 * confidence).toFixed(1))} % interval is ${high.toFixed(2)} ppm`;
  if (informationNumber < UPPER_LIMIT_BELOW) {
    return [
      message(
        'warning',
        'ppm-upper-limit-only',
        `The shots say too little of distance for a ppm; ${upper}. Add shots farther from the base.`,
      ),
    ];
  }
  if (low <= 0) {
    return [
      message(
        'warning',
        'ppm-not-distinguishable',
        `The ppm is not distinguishable from zero; ${upper}. Add days with shots farther from the base.`,
      ),
    ];
  }
  if (informationNumber >= COMFORTABLE) return [];
  return [
    message(
      'info',
      'ppm-indicative',
      `The ppm rests on few shots far from the base (information number ${informationNumber.toFixed(0)}, ${COMFORTABLE} is comfortable): it is indicative. Add days with far shots.`,
    ),
  ];
}

function dominanceNote(terms: ClusterTerms): Message[] {
  const { day, share } = dominantDay(terms);
  if (share <= DOMINANT_SHARE) return [];
  return [
    message(
      'warning',
      'one-day-dominates',
      `Day ${day} alone carries most of what is known of the constant or of the ppm. Compare the fit without it, and add days with both near and far shots.`,
    ),
  ];
}

/** Below this information number no estimate of the ppm is shown, with or without an interval. */
export const tellsPpm = (informationNumber: number): boolean => informationNumber >= UPPER_LIMIT_BELOW;
