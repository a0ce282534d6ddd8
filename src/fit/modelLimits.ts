import { type Message, message } from '../logs/index.js';
import type { Vector2 } from '../stats/index.js';
import { type ClusterTerms, covariance, dominantDay, naiveCovariance } from './clusterCovariance.js';
import type { EstimateWithLimits } from './errorModel.js';
import type { VarianceEstimate } from './estimate.js';
import { contrastEstimate, usesLogScale, varianceLimits } from './intervals.js';
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

const A_ALONE: Vector2 = [1, 0];
const B_ALONE: Vector2 = [0, 1];

/** Intervals of constant and ppm, and what must be said of them. */
export interface ModelLimits {
  readonly constantMm: EstimateWithLimits;
  readonly ppm: EstimateWithLimits;
  readonly ppmIfIndependent: EstimateWithLimits;
  readonly interval: string;
  readonly notes: readonly Message[];
}

/** Limits of a = √A and b = √B from the cluster-robust covariance, or from the day score where data are thin. */
export function modelLimits(
  data: FitData,
  variance: VarianceEstimate,
  terms: ClusterTerms,
  informationNumber: number,
  confidence: number,
): ModelLimits {
  const { A, B, displayA, displayB, constantAtFloor } = variance;
  const robust = covariance(terms, 'CR3');
  const a = contrastEstimate(A, B, terms, robust, A_ALONE);
  const b = contrastEstimate(A, B, terms, robust, B_ALONE);
  const useScore = informationNumber < SCORE_BELOW;
  // A score interval wholly below zero would claim a ppm of exactly zero: chance alone allows more than that.
  const scoreOr = (otherwise: readonly [number, number]): readonly [number, number] => {
    const limits = scoreLimits(data, data.day, A, B, confidence);
    return limits[1] > 0 ? limits : otherwise;
  };
  const constant = rooted(displayA, varianceLimits(a, confidence));
  const robustLimits = varianceLimits(b, confidence);
  const ppm = rooted(displayB, useScore ? scoreOr(robustLimits) : robustLimits);
  const naive = naiveCovariance(terms, data.components.length as 1 | 2);
  const ifIndependent = varianceLimits(
    { value: B, standardError: Math.sqrt(naive[2]), degreesOfFreedom: Math.max(1, data.y.length - 2) },
    confidence,
  );
  const upperOnly = informationNumber < UPPER_LIMIT_BELOW;
  const scale = usesLogScale(b) ? 'log' : 'raw';
  return {
    constantMm: constantAtFloor ? { ...constant, estimate: 0, low: 0 } : constant,
    ppm: upperOnly ? { estimate: null, low: 0, high: ppm.high } : ppm,
    ppmIfIndependent: { ...rooted(displayB, ifIndependent), estimate: upperOnly ? null : ppm.estimate },
    interval: useScore ? 'inverted day score' : `CR3 by day, Satterthwaite, ${scale} scale`,
    notes: [
      ...(constantAtFloor ? [constantNote()] : []),
      ...ppmNote(informationNumber, scale === 'log', ppm.high),
      ...dominanceNote(terms),
    ],
  };
}

/** Square roots; the displayed estimate may differ from the unconstrained one, and its interval always holds it. */
function rooted(
  variance: number,
  [low, high]: readonly [number, number],
): EstimateWithLimits & { high: number } {
  return {
    estimate: Math.sqrt(variance),
    low: Math.sqrt(Math.min(low, variance)),
    high: Math.sqrt(Math.max(high, variance)),
  };
}

const constantNote = (): Message =>
  message(
    'warning',
    'constant-not-identified',
    'No short shots: the constant part is not identified, only its upper limit. Add shots close to the base.',
  );

function ppmNote(informationNumber: number, clearlyPositive: boolean, high: number): Message[] {
  if (informationNumber < UPPER_LIMIT_BELOW) {
    return [
      message(
        'warning',
        'ppm-upper-limit-only',
        `The shots say too little of distance for a ppm; it is below ${high.toFixed(2)} ppm. Add shots farther from the base.`,
      ),
    ];
  }
  if (!clearlyPositive) {
    return [
      message(
        'warning',
        'ppm-not-distinguishable',
        `The ppm is not distinguishable from zero; its upper limit is ${high.toFixed(2)} ppm. Add days with shots farther from the base.`,
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
      `Day ${day} alone carries most of the information on distance. Compare the fit without it, and add days with far shots.`,
    ),
  ];
}
