import type { ErrorsInput } from '../../errors/index.js';
import { type Message, message } from '../../logs/index.js';
import type { Reference } from '../errorModel.js';
import type { FitComponent } from '../forms.js';
import { referenceData } from '../reference/referenceData.js';
import { type RmsRatio, ratioOfMeanSquares, type Side } from './ratioOfMeanSquares.js';

export interface FarDaysOptions {
  readonly component: FitComponent;
  /** Shots from here on are far, km. */
  readonly farKm: number;
  /** Shots up to here are compared, km; default half of `farKm`. */
  readonly nearKm?: number | undefined;
  readonly reference?: Reference | undefined;
  readonly confidence?: number | undefined;
  readonly weights?: Float64Array | undefined;
}

/** Whether days with far shots are better or worse days than the others, seen on near marks. */
export interface FarDays {
  readonly daysWithFar: number;
  readonly daysWithoutFar: number;
  /** RMS of near shots on days with far shots over that on other days; null with fewer than 5 days of either kind. */
  readonly near: RmsRatio | null;
  readonly message: Message;
}

const FEWEST_DAYS = 5;
const LEVEL = 0.05;

/**
 * Compares the near shots of days with and without far shots, counting days. Where far marks are visited on good days
 * only, the ppm comes out too small for the others.
 * @throws InputError as fitErrorModel
 */
export function daysWithFarShots(errors: ErrorsInput, options: FarDaysOptions): FarDays {
  const {
    component,
    farKm,
    nearKm = farKm / 2,
    reference = 'absolute',
    confidence = 0.95,
    weights,
  } = options;
  const { data } = referenceData(errors, { component, reference, weights });
  const used = Array.from(data.w.keys()).filter((i) => data.w[i]! > 0);
  const farDays = new Set(used.filter((i) => data.l[i]! >= farKm ** 2).map((i) => data.day[i]!));
  const near = used.filter((i) => data.l[i]! <= nearKm ** 2);
  const side = (withFar: boolean): Side => {
    const members = near.filter((i) => farDays.has(data.day[i]!) === withFar);
    return {
      squares: members.map((i) => data.y[i]!),
      weights: members.map((i) => data.w[i]!),
      days: members.map((i) => data.day[i]!),
    };
  };
  const [withFar, without] = [side(true), side(false)];
  const [daysWithFar, daysWithoutFar] = [new Set(withFar.days).size, new Set(without.days).size];
  const enough = daysWithFar >= FEWEST_DAYS && daysWithoutFar >= FEWEST_DAYS;
  const ratio = enough ? ratioOfMeanSquares(withFar, without, confidence) : null;
  return {
    daysWithFar,
    daysWithoutFar,
    near: ratio,
    message: verdict(ratio, daysWithFar, daysWithoutFar, farKm, nearKm),
  };
}

function verdict(
  ratio: RmsRatio | null,
  daysWithFar: number,
  daysWithoutFar: number,
  farKm: number,
  nearKm: number,
): Message {
  const [far, near] = [Number(farKm.toFixed(1)), Number(nearKm.toFixed(1))];
  const counts = `near shots (up to ${near} km) were taken on ${daysWithFar} days with shots from ${far} km on and on ${daysWithoutFar} days without`;
  if (ratio === null) {
    return message(
      'info',
      'far-days-not-compared',
      `Whether far marks were visited on better days than others cannot be told: ${counts}. It takes ${FEWEST_DAYS} days of either kind.`,
    );
  }
  const told = `${ratio.ratio.toFixed(2)} times as large (${ratio.low.toFixed(2)} to ${ratio.high.toFixed(2)}) on days with far shots`;
  if (ratio.pValue >= LEVEL) {
    return message(
      'info',
      'far-days-not-shown-to-differ',
      `Days with far shots are not shown to differ from other days: near errors are ${told}; ${counts}.`,
    );
  }
  const better = ratio.ratio < 1;
  return message(
    'warning',
    better ? 'far-days-better' : 'far-days-worse',
    `Near errors are ${told}; ${counts}. The far shots come from ${better ? 'good' : 'bad'} days, so the ppm is too ${better ? 'small' : 'large'} for the others. Visit far marks on all kinds of days.`,
  );
}
