import { type ErrorsInput, errorColumns } from '../errors/index.js';
import { azimuthSpread, type Component, type ErrorModel, sigmaAtMm } from '../fit/index.js';
import { componentRows } from './componentRows.js';
import { demandedShare } from './reach/demandedShare.js';
import type { PreparedGround, Reach } from './reach/preparedGround.js';
import { LARGEST_RMS_SHARE } from './reach/preparedGround.js';
import { marksBeyond } from './supportedLength.js';
import { type Tolerance, toleranceFactorAt } from './tolerance.js';

/** Below these numbers a rule would promise what the data do not hold. */
const FEWEST_DAYS = 15;
const LEAST_INFORMATION = 15;
/** Marks within a narrower sector show one slope of the atmosphere only. */
const NARROWEST_SECTOR_DEG = 90;

/** Why the data allow no rule, and what to collect next; null when they do. */
export function whyNoRule(
  errors: ErrorsInput,
  { model, days, height }: PreparedGround,
  { share }: Tolerance,
  supportedKm: number | null,
): string | null {
  if (model.days < FEWEST_DAYS) {
    return `${model.days} ${model.days === 1 ? 'day is' : 'days are'} too few: a rule needs ${FEWEST_DAYS} days; add ${FEWEST_DAYS - model.days} with near and far shots`;
  }
  if (!model.fitted.converged)
    return 'the fit did not converge: look at the chart for errors of another kind';
  if (model.uncertainty === null) {
    return 'the distances are too alike to separate mm and ppm: add marks at several times the distance of the others';
  }
  const sector = markSector(errors, model.component);
  if (sector !== null && sector < NARROWEST_SECTOR_DEG) {
    return `all marks lie within a sector of ${sector.toFixed(0)}° seen from the base, and errors in other directions are not known: add marks in other directions, over ${NARROWEST_SECTOR_DEG}° or more`;
  }
  if (supportedKm === null) {
    return 'no length has 20 occupations on 5 days and 2 marks at or beyond it: visit at least two marks again on more days';
  }
  if (model.informationNumber < LEAST_INFORMATION) {
    return `the shots say too little of distance (information number ${model.informationNumber.toFixed(0)}, a rule needs ${LEAST_INFORMATION}): add days with far shots${farFrom(model)}`;
  }
  if (height?.seenM !== undefined && Math.abs(height.differenceM) > height.seenM) {
    return `the site lies ${Math.abs(height.differenceM).toFixed(0)} m above or below its base and the shots at most ${height.seenM.toFixed(0)} m: add marks at such height differences`;
  }
  if (days === null && share > LARGEST_RMS_SHARE) {
    return `a share of ${percent(share)} cannot be derived from an RMS: errors of bad days are rarer and larger than a Gaussian factor allows for, and how days differ is not known. Add days with far shots, or ask for 95 %`;
  }
  return null;
}

/** Where the distance part exceeds the constant. */
function farFrom({ fitted }: ErrorModel): string {
  const { form, displayP, displayQ } = fitted;
  if (!(displayP > 0 && displayQ > 0)) return '';
  const km = form === 'root-sum-square' ? Math.sqrt(displayP / displayQ) : displayP / displayQ;
  return km < 100 ? `, beyond ${km.toFixed(0)} km` : '';
}

/** Sector that holds the directions of all marks, degrees; null where the errors do not tell. */
function markSector(errors: ErrorsInput, component: Component): number | null {
  const columns = errorColumns(errors);
  if (!columns.has('azimuthDeg')) return null;
  const azimuths = columns.numbers('azimuthDeg', 'the directions of a rule');
  const known = componentRows(columns, component)
    .map((i) => azimuths[i]!)
    .filter((azimuth) => !Number.isNaN(azimuth));
  return known.length === 0 ? null : azimuthSpread([...new Set(known)]);
}

/** Why the rule ends before the tolerance does, or at the base itself; null when the tolerance itself ends it. */
export function whyItEnds(
  errors: ErrorsInput,
  prepared: PreparedGround,
  tolerance: Tolerance,
  reach: Reach,
  { km, capped }: { readonly km: number; readonly capped: boolean },
): string | null {
  if (capped) return cappedReason(errors, tolerance.component, km);
  const next = km + 0.1;
  if (reach.allowedVariance(next) === -1) {
    const share = percent(prepared.shares.reckoned(next));
    return `${km === 0 ? 'wrong fixes alone defeat the share' : `beyond ${km.toFixed(1)} km wrong fixes alone defeat the share`}: ${percent(1 - tolerance.share)} of the positions may fail, and up to ${share} are wrong fixes; ask for a smaller share, or check every point twice`;
  }
  return km > 0 ? null : zeroReason(prepared, tolerance);
}

/** The tolerance holds as far as the data support a rule; what would carry it farther. */
function cappedReason(errors: ErrorsInput, component: Component, km: number): string {
  const stop = (Math.floor(km * 10) / 10).toFixed(1);
  const beyond = marksBeyond(errors, component, km);
  if (beyond.length === 0) {
    return `at least ${stop} km: the tolerance holds as far as the data reach, and nothing is known beyond`;
  }
  const names = beyond.map(({ mark, baselineKm }) => `"${mark}" at ${baselineKm.toFixed(1)} km`).join(', ');
  const few =
    beyond.length === 1
      ? `only one mark lies beyond (${names}), and one mark cannot be told from its own error`
      : `too few shots lie beyond (${names})`;
  return `it stops at ${stop} km because ${few}: a rule needs 2 marks with 20 occupations on 5 days at or beyond its length`;
}

function zeroReason({ model, shares, added }: PreparedGround, { share, limitMm }: Tolerance): string {
  const demanded = demandedShare(share, shares.reckoned(0.1));
  const allowedMm = limitMm / toleranceFactorAt(model, demanded, 0);
  const needed = `${percent(share)} within ${limitMm} mm needs a ${model.basis} of ${allowedMm.toFixed(1)} mm`;
  const constant = sigmaAtMm(model, 0);
  if (Math.hypot(constant, Math.sqrt(added)) <= allowedMm) {
    return `the upper limit of the constant exceeds the tolerance: ${needed}; more days narrow the limit`;
  }
  return constant > allowedMm
    ? `the constant alone exceeds the tolerance: ${needed}, the constant is ${constant.toFixed(1)} mm`
    : `the constant with what is added to it exceeds the tolerance: ${needed}, the constant is ${constant.toFixed(1)} mm and ${Math.sqrt(added).toFixed(1)} mm come from the base's coordinates and the height difference`;
}

export const percent = (share: number): string => `${Number((100 * share).toFixed(1))} %`;
