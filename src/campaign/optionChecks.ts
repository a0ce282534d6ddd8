import {
  axesFrom,
  type Check,
  isoDate,
  listOf,
  nullOr,
  numberFrom,
  objectOf,
  oneOf,
  plainText,
  rangeOf,
  refuse,
  wholeNumberFrom,
} from './checks.js';
import type { CampaignSettings, ShareByDistance } from './options.js';

const share = numberFrom(0, 0.5);

/** Both shares 0, or neither: a line over log distance cannot start at 0. */
const bothOrNone: Check = (value, path) => {
  const { shareAt1Km, shareAt12Km } = value as ShareByDistance;
  if ((shareAt1Km === 0) !== (shareAt12Km === 0)) refuse(path, 'both shares 0 or both above 0', value);
};

const all =
  (...checks: readonly Check[]): Check =>
  (value, path) => {
    for (const check of checks) check(value, path);
  };

const markPlan: Check = (value, path) => {
  const given = typeof value === 'object' && value !== null ? value : {};
  objectOf({
    name: plainText,
    baselineKm: numberFrom(0.01, 200),
    azimuthDeg: numberFrom(0, 360),
    heightM: numberFrom(-500, 9000),
    ...('source' in given ? { source: plainText } : {}),
    ...('sky' in given ? { sky: plainText } : {}),
  })(value, path);
};

const generator = objectOf({
  count: wholeNumberFrom(1, 1000),
  nearestKm: numberFrom(0.01, 200),
  farthestKm: numberFrom(0.01, 200),
  lowestM: numberFrom(-500, 9000),
  highestM: numberFrom(-500, 9000),
});

const baseChecks = {
  name: plainText,
  latitudeDeg: numberFrom(-89, 89),
  longitudeDeg: numberFrom(-180, 180),
  heightM: numberFrom(-500, 9000),
  mounting: oneOf('pillar', 'tripod'),
  setupsPerDay: wholeNumberFrom(1, 24),
};

const names = listOf(plainText, (element) => element);

/** What every option must be, taken by itself. */
export const OPTION_CHECKS: { readonly [K in keyof CampaignSettings]: Check } = {
  seed: wholeNumberFrom(0, 2 ** 32 - 1),
  days: wholeNumberFrom(1, 10_000),
  startDate: isoDate,
  weekdaysOnly: oneOf(true, false),
  utcOffsetHours: numberFrom(-12, 14),
  workHours: rangeOf(numberFrom(0, 24)),
  base: objectOf(baseChecks),
  otherBase: nullOr(
    objectOf({ ...baseChecks, fromDay: wholeNumberFrom(1, 10_000), toDay: wholeNumberFrom(1, 10_000) }),
  ),
  marks: (value, path) =>
    (Array.isArray(value) ? listOf(markPlan, (mark: { name: string }) => mark.name) : generator)(value, path),
  crews: names,
  rovers: names,
  occupationsPerDay: rangeOf(wholeNumberFrom(1, 10_000)),
  marksPerCrew: rangeOf(wholeNumberFrom(1, 1000)),
  roundsPerDay: wholeNumberFrom(1, 100),
  epochsPerOccupation: wholeNumberFrom(1, 60),
  epochSigmaMm: axesFrom(0),
  constantMm: axesFrom(0),
  ppm: axesFrom(0),
  dayFactorLogSd: numberFrom(0, 2),
  eastNorthCorrelation: numberFrom(-1, 1),
  tailDegrees: nullOr(wholeNumberFrom(3, 100)),
  dependent: oneOf(true, false),
  floatRowShare: numberFrom(0, 0.2),
  noFix: all(objectOf({ shareAt1Km: share, shareAt12Km: share }), bothOrNone),
  unknownMarkShare: share,
  duplicateRowShare: share,
  wrongFixes: nullOr(
    all(
      objectOf({
        shareAt1Km: share,
        shareAt12Km: share,
        shortestMm: numberFrom(1),
        longestMm: numberFrom(1),
        meanBurst: numberFrom(1, 100),
      }),
      bothOrNone,
    ),
  ),
  blunders: nullOr(
    objectOf({
      rodHeights: wholeNumberFrom(0, 1000),
      rodErrorMm: numberFrom(1),
      wrongMarks: wholeNumberFrom(0, 1000),
    }),
  ),
  markSigmaMm: axesFrom(0),
  statedMarkSigmaMm: objectOf({ horizontal: numberFrom(0), vertical: numberFrom(0) }),
  setupSigmaMm: axesFrom(0),
  middayRise: numberFrom(0, 3),
  badDays: nullOr(
    objectOf({
      runs: wholeNumberFrom(0, 1000),
      runLength: wholeNumberFrom(1, 1000),
      singles: wholeNumberFrom(0, 1000),
      factor: rangeOf(numberFrom(1, 100)),
    }),
  ),
  habitual: nullOr(
    objectOf({
      nearShare: numberFrom(0, 1),
      nearKm: numberFrom(0.01, 200),
      occupationsPerDay: rangeOf(wholeNumberFrom(1, 10_000)),
    }),
  ),
};
